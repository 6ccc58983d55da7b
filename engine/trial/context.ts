import { type BlockTriangularForm, blockTriangularForm } from '../graph/blockTriangular.ts';
import { type Classes, connectedComponents } from '../graph/components.ts';
import { type Graph, graphOf } from '../graph/graph.ts';
import { type Matching, maximumTransversal } from '../graph/transversal.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import type { NodeCoordinates } from '../problems/examples/example.ts';
import { factsOf } from './facts.ts';
import type { MatrixFacts } from './rules.ts';

/** A matrix with what may come beside it. */
export interface TrialInput {
  readonly matrix: SparseMatrix;
  /** where the mesh nodes are; null if not given */
  readonly coordinates: NodeCoordinates | null;
  /** a permutation that was read, direction confirmed; null if none */
  readonly imported: NewToOld | null;
  /** unknowns to be kept at the end, original, 0-based; null if none */
  readonly heldLast: Int32Array | null;
}

/** What several trials of one matrix share, made when first needed and kept. Inputs are not changed. */
export class TrialContext {
  readonly input: TrialInput;
  readonly facts: MatrixFacts;
  private plus: Graph | null = null;
  private parts: Classes | null = null;
  private matched: Matching | null = null;
  private blocks: BlockTriangularForm | null = null;

  constructor(input: TrialInput) {
    this.input = input;
    this.facts = factsOf(input.matrix, input.coordinates !== null, input.imported !== null);
  }

  /** The graph of A + Aᵀ; square only. */
  graph(): Graph {
    this.plus ??= graphOf(this.input.matrix);
    return this.plus;
  }

  /** Connected components of A + Aᵀ. */
  components(): Classes {
    this.parts ??= connectedComponents(this.input.matrix);
    return this.parts;
  }

  /** A maximum matching of rows and columns. */
  matching(progress: Progress = noProgress): Matching {
    this.matched ??= maximumTransversal(this.input.matrix, progress);
    return this.matched;
  }

  /** Block triangular form; square only. */
  blockForm(progress: Progress = noProgress): BlockTriangularForm {
    this.blocks ??= blockTriangularForm(this.input.matrix, progress, this.matching(progress));
    return this.blocks;
  }
}

/** An input with nothing beside the matrix. */
export function plainInput(matrix: SparseMatrix): TrialInput {
  return { matrix, coordinates: null, imported: null, heldLast: null };
}
