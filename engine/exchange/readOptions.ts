import { Fault } from '../matrix/fault.ts';

/**
 * How a file is to be read where more than one reading is plausible. Every default refuses and offers: the fault's repairs
 * name the setting that would mend it, as `setting=value` or a bare word known to `applyRepair`.
 */
export interface ReadOptions {
  /** base of the indices in the file; "declared": what the format says (1), refused when the file looks 0-based */
  readonly base: 'declared' | 0 | 1;
  /** a file that ends before the declared entries: refuse, or use what is there (marked incomplete) */
  readonly incomplete: 'refuse' | 'use';
  /** more entries than declared: refuse, or use them all */
  readonly surplus: 'refuse' | 'use';
  /** entries at the same place */
  readonly duplicates: 'sum' | 'last';
  /** stored zeros (and below `dropBelow` in modulus) stay, or go */
  readonly zeros: 'keep' | 'drop';
  /** with zeros "drop": modulus up to which an entry goes too */
  readonly dropBelow: number;
  /** no banner: refuse and offer, or read as coordinate text */
  readonly banner: 'expected' | 'none';
  /** complex banner: read symmetric as hermitian or the reverse; any symmetric banner: take both triangles as they are */
  readonly mirror: 'declared' | 'symmetric' | 'hermitian' | 'general';
  /** field to read instead of the declared one */
  readonly field: 'declared' | 'real' | 'pattern' | 'complex';
  /** array values laid out column by column (the format) or row by row */
  readonly arrayBy: 'columns' | 'rows';
  /** five comma-separated columns node, dof, node, dof, value */
  readonly table: 'refuse' | 'node-dof';
  /** complex values whose imaginary parts are all zero */
  readonly imaginary: 'keep' | 'drop-zero';
  /** plain coordinate text holds all entries, or one triangle of a symmetric matrix */
  readonly storage: 'general' | 'symmetric';
  /** a general matrix that is symmetric but for rounding: as it is, or (A + Aᵀ)/2 */
  readonly mirrors: 'keep' | 'average';
  /** values of a pattern file: none, or made up and labelled so */
  readonly values: 'declared' | 'synthetic';
  /** which member of an archive, by its name there; null: the only one */
  readonly member: string | null;
}

export const defaultReadOptions: ReadOptions = {
  base: 'declared',
  incomplete: 'refuse',
  surplus: 'refuse',
  duplicates: 'sum',
  zeros: 'keep',
  dropBelow: 0,
  banner: 'expected',
  mirror: 'declared',
  field: 'declared',
  arrayBy: 'columns',
  table: 'refuse',
  imaginary: 'keep',
  storage: 'general',
  mirrors: 'keep',
  values: 'declared',
  member: null,
};

/** repair id -> the settings it stands for */
const repairSettings: Readonly<Record<string, Partial<ReadOptions>>> = {
  'read-as-0-based': { base: 0 },
  'use-incomplete': { incomplete: 'use' },
  'use-surplus': { surplus: 'use' },
  'keep-last-duplicate': { duplicates: 'last' },
  'drop-zeros': { zeros: 'drop' },
  'read-as-coordinate-text': { banner: 'none' },
  'infer-size': { banner: 'none' },
  'read-as-symmetric-text': { banner: 'none', storage: 'symmetric' },
  'read-as-1-based': { base: 1 },
  'read-as-hermitian': { mirror: 'hermitian' },
  'read-as-symmetric': { mirror: 'symmetric' },
  'read-as-general': { mirror: 'general' },
  'read-as-real': { field: 'real' },
  'read-as-pattern': { field: 'pattern' },
  'read-as-complex': { field: 'complex' },
  'read-by-rows': { arrayBy: 'rows' },
  'read-as-node-table': { table: 'node-dof' },
  'use-as-real': { imaginary: 'drop-zero' },
  symmetrise: { mirrors: 'average' },
  'synthetic-values': { values: 'synthetic' },
};

/** Words that `applyRepair` knows. */
export const repairIds: readonly string[] = Object.keys(repairSettings);

/** The options with one repair applied. @throws Fault for an unknown word. */
export function applyRepair(options: ReadOptions, id: string): ReadOptions {
  const below = /^drop-below=(\d*\.?\d+(?:e[+-]?\d+)?)$/i.exec(id);
  if (id.startsWith('member=')) return { ...options, member: id.slice('member='.length) };
  if (below !== null) return { ...options, zeros: 'drop', dropBelow: Number(below[1]) };
  const change = Object.hasOwn(repairSettings, id) ? repairSettings[id] : undefined;
  if (change === undefined) {
    throw new Fault(
      'input',
      'unknown-repair',
      `Unknown way of reading "${id}"; known: ${repairIds.join(', ')}, drop-below=NUMBER, member=NAME.`,
    );
  }
  return { ...options, ...change };
}
