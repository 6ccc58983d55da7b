import type { TrialForecast } from '../../engine/forecast/forecast.ts';
import type { Target, Workload } from '../../engine/forecast/target.ts';
import type { TableRow } from '../../engine/handover/csv.ts';
import type { HandoverFile } from '../../engine/handover/files.ts';
import type { Recipe, Sameness } from '../../engine/handover/recipe.ts';
import type { ReportPicture } from '../../engine/handover/report.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { ShownProof } from '../state/trial.ts';
import type { MatrixKey } from './protocol.ts';

/** What the files of a trial are made from. */
export interface HandoverAsk {
  readonly key: MatrixKey;
  readonly name: string;
  readonly trialName: string;
  readonly result: TrialResult;
  readonly heldLast: Int32Array;
  readonly forecast: TrialForecast | null;
  readonly target: Target;
  readonly workload: Workload;
  readonly proof: ShownProof | null;
  readonly table: { readonly rows: readonly TableRow[]; readonly figures: readonly string[] };
  /** null while files are only listed */
  readonly recipe: Recipe | null;
  readonly advice: readonly string[];
  readonly survey: readonly (readonly [string, string])[];
  /** drawn by the page; empty: the worker draws small ones */
  readonly pictures: readonly ReportPicture[];
  readonly prefix: string;
  readonly factorLimit: number;
  readonly memoryLimit: number;
}

/** A file as the page lists it. */
export type ListedFile = Omit<HandoverFile, 'chunks'>;

/** A finished trial as a recipe needs it. */
export interface RecipeSource {
  readonly name: string;
  readonly result: Pick<TrialResult, 'choice' | 'ran' | 'counts' | 'effective'>;
  readonly heldLast: readonly number[];
  readonly peakBytes: number | null;
}

/** What leaves the page, and what comes back to it. */
export interface HandoverOperations {
  /** the files of a trial: names, one line each, conventions, refusals */
  handoverList: { ask: HandoverAsk; answer: readonly ListedFile[]; early: never };
  /** one of them, whole */
  handoverFile: { ask: HandoverAsk & { readonly id: string }; answer: Blob; early: never };
  /** its first characters */
  handoverPreview: {
    ask: HandoverAsk & { readonly id: string; readonly most: number };
    answer: { readonly text: string; readonly more: boolean };
    early: never;
  };
  /** all that can be made, as one zip archive; files whose making fails are told and left out */
  handoverZip: {
    ask: HandoverAsk & { readonly folder: string };
    answer: { readonly zip: Blob; readonly left: readonly string[] };
    early: never;
  };
  /** the recipe of trials; `file` is hashed as it lies there, null where the matrix came from none */
  makeRecipe: {
    ask: {
      key: MatrixKey;
      name: string;
      file: File | null;
      read: readonly string[];
      trials: readonly RecipeSource[];
      chosen: string;
      target: Target;
      workload: Workload;
    };
    answer: Recipe;
    early: never;
  };
  /** how a matrix and what came beside it stand to a recipe */
  matchRecipe: {
    ask: { key: MatrixKey; name: string; recipe: Recipe; file: File | null };
    answer: { readonly sameness: Sameness; readonly words: string; readonly missing: readonly string[] };
    early: never;
  };
  /** what differs between the recorded numbers of a trial and those found */
  heldAgainst: {
    ask: { recorded: Recipe['trials'][number]; found: RecipeSource };
    answer: readonly string[];
    early: never;
  };
}
