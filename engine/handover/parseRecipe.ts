import { Fault } from '../matrix/fault.ts';
import {
  type Choice,
  factorizationNames,
  matchingNames,
  measureNames,
  orderingNames,
  pivotingNames,
  scalingNames,
} from '../trial/choice.ts';
import { type Recipe, recipeFormat } from './recipe.ts';

/** Whether the first bytes of a file look like a recipe. */
export function looksLikeRecipe(head: Uint8Array): boolean {
  const text = new TextDecoder('latin1').decode(head.subarray(0, 400));
  return /^(\xef\xbb\xbf)?\s*\{/.test(text) && text.includes(`"${recipeFormat}"`);
}

/** Whether a value is what a field must be, or what was expected, as words. */
type Check = (value: unknown) => string | null;

const number: Check = (v) => (typeof v === 'number' && Number.isFinite(v) ? null : 'a number');
const positive: Check = (v) => (typeof v === 'number' && v > 0 && Number.isFinite(v) ? null : 'a number above 0');
const whole: Check = (v) => (Number.isInteger(v) && (v as number) >= 0 ? null : 'a whole number of at least 0');
const text: Check = (v) => (typeof v === 'string' ? null : 'a text');
const flag: Check = (v) => (typeof v === 'boolean' ? null : 'true or false');
const hash: Check = (v) => (typeof v === 'string' && /^[0-9a-f]{64}$/.test(v) ? null : '64 hexadecimal digits');
const either =
  (...words: readonly unknown[]): Check =>
  (v) =>
    words.includes(v) ? null : `one of ${words.join(', ')}`;
const orNull =
  (check: Check): Check =>
  (v) => {
    const wanted = v === null ? null : check(v);
    return wanted === null ? null : `${wanted} or null`;
  };
const list =
  (check: Check): Check =>
  (v) => {
    if (!Array.isArray(v)) return 'a list';
    for (const x of v) {
      const wrong = check(x);
      if (wrong !== null) return `a list, each ${wrong}`;
    }
    return null;
  };

type Shape = { readonly [key: string]: Check | Shape };

const choice: Shape = {
  ordering: either(...orderingNames),
  factorization: either(...factorizationNames),
  pivoting: either(...pivotingNames),
  threshold: positive,
  scaling: either(...scalingNames),
  matching: either(...matchingNames),
  blocks: flag,
  seed: whole,
  tuning: {
    leafSize: orNull(positive),
    balance: orNull(positive),
    tries: orNull(positive),
    denseThreshold: orNull(number),
  },
  relabelling: orNull(whole),
  portfolio: {
    members: orNull(list(either(...orderingNames))),
    measure: either(...measureNames),
    rounds: positive,
    timeLimit: orNull(number),
  },
} satisfies { [K in keyof Choice]: Check | Shape };

const count = orNull(number);
const trial: Shape = {
  name: text,
  choice,
  ran: choice,
  heldLast: list(whole),
  figures: {
    factorEntries: count,
    operations: count,
    factorBytes: count,
    largestFront: count,
    treeHeight: count,
    peakBytes: count,
    orderSha256: hash,
  },
};

const recipe: Shape = {
  version: text,
  indexBase: either(0),
  matrix: {
    name: text,
    read: list(text),
    rows: whole,
    columns: whole,
    entries: whole,
    field: text,
    contentSha256: hash,
  },
  beside: { permutation: orNull(hash), coordinates: orNull(hash) },
  target: {
    memoryBytes: positive,
    largeRate: positive,
    smallRate: positive,
    bandwidth: positive,
    cores: positive,
    indexBytes: either(4, 8),
    scalarBytes: either(4, 8),
  },
  workload: { factorizations: positive, rightHandSides: whole, refinementSteps: whole },
  chosen: text,
};

/** Path of the first wrong field and what was expected there; null when all is right. */
function firstWrong(value: unknown, shape: Shape, path: string): string | null {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return `${path}: expected an object`;
  for (const [key, expected] of Object.entries(shape)) {
    const at = path === '' ? key : `${path}.${key}`;
    const inner = (value as Record<string, unknown>)[key];
    if (typeof expected !== 'function') {
      const wrong = firstWrong(inner, expected, at);
      if (wrong !== null) return wrong;
      continue;
    }
    const wanted = expected(inner);
    if (wanted !== null) return `${at}: expected ${wanted}${inner === undefined ? ', it is missing' : ''}`;
  }
  return null;
}

function refuse(name: string, wrong: string): Fault {
  return new Fault(
    'input',
    'bad-recipe',
    `${name}, ${wrong}. Take a recipe as Fillcast wrote it: "compare --recipe-out FILE", or the handover panel of the page.`,
    { file: name },
  );
}

/**
 * Reads a recipe and checks every field.
 * @throws Fault "bad-recipe" naming the field, "recipe-version" for a newer format
 */
export function parseRecipe(content: string, name: string): Recipe {
  let value: unknown;
  try {
    value = JSON.parse(content.replace(/^\ufeff/, ''));
  } catch (error) {
    throw refuse(name, `line 1: it is no JSON (${error instanceof Error ? error.message : String(error)})`);
  }
  const r = value as Partial<Recipe> & Record<string, unknown>;
  if (typeof r !== 'object' || r === null || r.format !== recipeFormat) {
    throw refuse(name, `field format: expected "${recipeFormat}"`);
  }
  if (r.formatVersion !== 1) {
    throw new Fault(
      'input',
      'recipe-version',
      `${name}, field formatVersion: ${String(r.formatVersion)} is not known here; expected 1. Replay it with the version of Fillcast that wrote it.`,
      { file: name },
    );
  }
  const wrong = firstWrong(r, recipe, '') ?? fileWrong((r.matrix as { file?: unknown }).file) ?? trialsWrong(r.trials);
  if (wrong !== null) throw refuse(name, `field ${wrong}`);
  const checked = value as Recipe;
  const names = checked.trials.map((t) => t.name);
  if (!names.includes(checked.chosen)) throw refuse(name, `field chosen: expected one of ${names.join(', ')}`);
  if (new Set(names).size < names.length) throw refuse(name, 'field trials: names must differ');
  const n = checked.matrix.columns;
  const far = checked.trials.find((t) => t.heldLast.some((i) => i >= n));
  if (far !== undefined) {
    throw refuse(name, `field heldLast of trial ${far.name}: expected indices below ${n}, counted from 0`);
  }
  return checked;
}

function fileWrong(file: unknown): string | null {
  return file === null ? null : firstWrong(file, { name: text, bytes: whole, sha256: hash }, 'matrix.file');
}

function trialsWrong(trials: unknown): string | null {
  if (!Array.isArray(trials) || trials.length === 0) return 'trials: expected a list of at least one trial';
  for (const [k, t] of trials.entries()) {
    const wrong = firstWrong(t, trial, `trials[${k}]`);
    if (wrong !== null) return wrong;
  }
  return null;
}
