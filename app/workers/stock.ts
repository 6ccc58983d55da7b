import type { Loaded } from '../../engine/exchange/loaded.ts';
import type { NewToOld } from '../../engine/matrix/permutation.ts';
import type { NodeCoordinates } from '../../engine/problems/examples/example.ts';

/** A matrix with all that came beside it: what a worker must hold to work on it. */
export interface Stock {
  readonly loaded: Loaded;
  /** where the mesh nodes are; null if not given */
  readonly coordinates: NodeCoordinates | null;
  /** a permutation that was read, direction confirmed; null if none */
  readonly imported: NewToOld | null;
}
