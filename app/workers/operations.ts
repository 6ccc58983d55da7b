import type { FileKind, Recognised } from '../../engine/exchange/recognise.ts';
import type { Direction, PermutationFormat } from '../../engine/exchange/writePermutation.ts';
import type { TrialForecast } from '../../engine/forecast/forecast.ts';
import type { Explanation } from '../../engine/forecast/reconcile.ts';
import type { Target } from '../../engine/forecast/target.ts';
import type { MatrixDifference } from '../../engine/matrix/difference.ts';
import type { NewToOld } from '../../engine/matrix/permutation.ts';
import type { Survey } from '../../engine/survey/survey.ts';
import type { Calibration } from '../../engine/trial/calibration.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { MatrixFacts } from '../../engine/trial/rules.ts';
import type { TrialSpread } from '../../engine/trial/spread.ts';
import type { HandoverOperations } from './handoverOperations.ts';
import type { MapOperations } from './mapOperations.ts';
import type { ProofOperations } from './proofOperations.ts';
import type { MatrixKey } from './protocol.ts';
import type { Stock } from './stock.ts';
import type { ImportSummary } from './summary.ts';
import type { NamedFact } from './surveyJobs.ts';
import type { TreeOperations } from './treeOperations.ts';
import type { TrialOutcome } from './trialFigures.ts';

/** A worked example drawn small: how full each cell of a coarse raster is. */
export interface Plate {
  readonly id: string;
  readonly title: string;
  readonly sentence: string;
  readonly sizes: readonly number[];
  readonly sizeMeans: string;
  readonly rows: number;
  readonly columns: number;
  readonly entries: number;
  readonly field: string;
  /** cells along an edge of the raster */
  readonly cells: number;
  /** entries in each cell, row by row from the top; length cells² */
  readonly density: Uint32Array;
}

/** A matrix that has come in: what the page says about it, and the arrays that it passes on without looking into them. */
export interface Arrival {
  readonly summary: ImportSummary;
  readonly facts: MatrixFacts;
  readonly stock: Stock;
}

/** A finished trial: its figures for the ledger, and the arrays that maps, proof and handover go on with. */
export interface TrialAnswer {
  readonly outcome: TrialOutcome;
  readonly result: TrialResult;
}

/** What a file beside a matrix can be used as. */
export type CompanionRole = 'permutation' | 'right-hand side' | 'labels' | 'coordinates';

/** A companion file is read and beside its matrix, or the user must say which way a permutation reads. */
export type Attached =
  | { readonly kind: 'attached'; readonly change: Partial<Stock>; readonly facts: MatrixFacts; readonly says: string }
  | {
      readonly kind: 'which-direction';
      readonly factorEntries: Readonly<Record<Direction, number | null>>;
      /** the direction with fewer factor entries; null where both are equal or unknown */
      readonly leaner: Direction | null;
    };

/** What a file looks like; of an archive with several members, what each of them looks like. */
export interface Inspected extends Recognised {
  readonly members:
    | readonly {
        readonly name: string;
        readonly size: number | null;
        readonly kind: FileKind | null;
        readonly role: Recognised['role'];
        readonly what: string;
      }[]
    | null;
}

/** A figure that another solver reported. */
export interface Reported {
  readonly what: 'entries' | 'operations' | 'bytes';
  readonly value: number;
}

/** One summand of a combination. */
export interface SummandAsk {
  readonly key: MatrixKey;
  readonly coefficient: readonly [number, number];
}

/** Every operation of a worker: what it asks, what it answers, what it can say early. */
export interface Operations extends MapOperations, TreeOperations, ProofOperations, HandoverOperations {
  /** the worked examples, drawn from their smallest size */
  plates: { ask: { cells: number }; answer: readonly Plate[]; early: Plate };
  /** a matrix from a file, with the repairs that were chosen */
  read: {
    ask: { key: MatrixKey; file: File; repairs: readonly string[] };
    answer: Arrival;
    early: { bytesDone: number; bytesAll: number | null };
  };
  /** what a file looks like by its first bytes */
  inspect: { ask: { file: File; member: string | null }; answer: Inspected; early: never };
  /** a file that belongs to a matrix: a permutation, right-hand sides, labels or coordinates */
  attach: {
    ask: {
      key: MatrixKey;
      file: File;
      member: string | null;
      role: CompanionRole;
      direction: Direction | null;
      /** which of two vectors in one permutation file */
      vector: 1 | 2 | null;
    };
    answer: Attached;
    early: never;
  };
  /** the matrix as read, sorted and summed, as a file */
  matrixFile: {
    ask: { key: MatrixKey; format: 'matrix-market' | 'rutherford-boeing'; half: boolean };
    answer: Blob;
    early: never;
  };
  /** how the matrix `other` differs from the matrix `key` */
  difference: { ask: { key: MatrixKey; other: MatrixKey }; answer: MatrixDifference; early: never };
  /** a sum of matrices with complex coefficients, as a new matrix */
  combine: { ask: { key: MatrixKey; name: string; terms: readonly SummandAsk[] }; answer: Arrival; early: never };
  /** a worked example made on the spot */
  example: { ask: { key: MatrixKey; id: string; size: number }; answer: Arrival; early: never };
  /** the facts of a matrix */
  survey: { ask: { key: MatrixKey }; answer: Survey; early: NamedFact };
  /** one trial: ordering, analysis, forecast */
  trial: { ask: { key: MatrixKey; choice: Choice; heldLast: Int32Array }; answer: TrialAnswer; early: never };
  /** a permutation file */
  permutation: { ask: { order: NewToOld; format: PermutationFormat }; answer: Uint8Array<ArrayBuffer>; early: never };
  /** a convention in words, with the first places of an order as its example */
  convention: {
    ask: { order: NewToOld; direction: Direction; base: 0 | 1 };
    answer: { formula: string; example: readonly string[]; selfInverse: boolean };
    early: never;
  };
  /** rates of this machine, from model problems factorized here */
  calibrate: { ask: { target: Target }; answer: Calibration; early: never };
  /** how far the figures of trials hang on seeds and numbering; "no difference" from the best where runs overlap */
  spread: {
    ask: {
      key: MatrixKey;
      trials: readonly { result: TrialResult; heldLast: Int32Array }[];
      runs: number;
    };
    answer: readonly (TrialSpread & { readonly noDifference: boolean })[];
    early: never;
  };
  /** which convention of counting, on which trial, explains figures that another solver reported */
  reconcile: {
    ask: {
      key: MatrixKey;
      trials: readonly { name: string; result: TrialResult; heldLast: Int32Array }[];
      target: Target;
      reported: readonly Reported[];
    };
    answer: readonly (Reported & { explanations: readonly Explanation[] })[];
    early: never;
  };
  /** what a finished trial costs on a target (bytes a proof in this page may take); null where counts are missing */
  forecast: {
    ask: {
      key: MatrixKey;
      result: TrialResult;
      heldLast: Int32Array;
      target: Target;
      pageMemoryBytes: number;
    };
    answer: TrialForecast | null;
    early: never;
  };
}
