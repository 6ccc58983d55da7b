import type { Base } from './base.ts';
import { notSquare } from './base.ts';
import { type Fact, fact, markWhere, undefinedFact } from './fact.ts';
import type { MirrorScan } from './mirror.ts';
import { counted, figure, lines, plural } from './wording.ts';

/** Lines with from … to entries. */
export interface Bin {
  readonly from: number;
  readonly to: number;
  readonly lines: number;
}

export interface Degrees {
  readonly smallest: number;
  readonly largest: number;
  readonly mean: number;
  /** exact below 64, then doubling: 64 … 127, 128 … 255; empty bins left out */
  readonly histogram: readonly Bin[];
}

function summary(count: Int32Array): Degrees {
  let smallest = count.length === 0 ? 0 : Number.POSITIVE_INFINITY;
  let largest = 0;
  let sum = 0;
  const bins = new Float64Array(64 + 26);
  for (let i = 0; i < count.length; i++) {
    const d = count[i];
    if (d < smallest) smallest = d;
    if (d > largest) largest = d;
    sum += d;
    // 31 − clz32 is the position of the leading bit: 6 for 64 … 127
    bins[d < 64 ? d : 64 + (31 - Math.clz32(d)) - 6]++;
  }
  const histogram: Bin[] = [];
  for (let b = 0; b < bins.length; b++) {
    if (bins[b] === 0) continue;
    const from = b < 64 ? b : 2 ** (b - 58);
    histogram.push({ from, to: b < 64 ? b : 2 * from - 1, lines: bins[b] });
  }
  return { smallest, largest, mean: count.length === 0 ? 0 : sum / count.length, histogram };
}

function degreesFact(count: Int32Array, line: 'row' | 'column' | 'unknown', what: [string, string]): Fact<Degrees> {
  const value = summary(count);
  const extreme = new Uint8Array(count.length);
  if (value.largest > value.smallest)
    for (let i = 0; i < count.length; i++) if (count[i] === value.largest) extreme[i] = 1;
  const many = (n: number): string => plural(n, what[0], what[1]);
  const sentence =
    count.length === 0
      ? `No ${line}s.`
      : value.smallest === value.largest
        ? `Every ${line} has ${many(value.largest)}.`
        : `From ${counted(value.smallest)} to ${many(value.largest)} for each ${line}, about ${figure(value.mean)} on average.`;
  return fact(value, sentence, what[1], 'exact', [markWhere(`${line}s with the most ${what[1]}`, `${line}s`, extreme)]);
}

export function rowDegreesFact(base: Base): Fact<Degrees> {
  return degreesFact(base.positions.rowCount, 'row', ['entry', 'entries']);
}

export function columnDegreesFact(base: Base): Fact<Degrees> {
  return degreesFact(base.positions.columnCount, 'column', ['entry', 'entries']);
}

/** Neighbours of each unknown in the graph of A + Aᵀ, itself not counted. */
export function neighbourCounts(base: Base, scan: MirrorScan): Int32Array {
  const { rowCount, columnCount, diagonalEntry } = base.positions;
  const out = new Int32Array(rowCount.length);
  for (let i = 0; i < out.length; i++) {
    out[i] = rowCount[i] + columnCount[i] - scan.mirroredOf[i] - (diagonalEntry[i] >= 0 ? 2 : 0);
  }
  return out;
}

export function neighboursFact(base: Base, neighbours: Int32Array | null): Fact<Degrees> {
  if (neighbours === null) return undefinedFact(notSquare(base.matrix), 'neighbours');
  return degreesFact(neighbours, 'unknown', ['neighbour', 'neighbours']);
}

export interface DenseLines {
  /** a row is dense with more entries than this: max(16, 10·√columns) */
  readonly rowThreshold: number;
  /** a column is dense with more entries than this: max(16, 10·√rows) */
  readonly columnThreshold: number;
  readonly rows: number;
  readonly columns: number;
}

/** Entries above which a line is called dense: ten times the root of its length (common practice, no source), 16 at least. */
export function denseThreshold(length: number): number {
  return Math.max(16, Math.floor(10 * Math.sqrt(length)));
}

export function denseLinesFact(base: Base): Fact<DenseLines> {
  const { rowCount, columnCount } = base.positions;
  const rowThreshold = denseThreshold(base.matrix.columns);
  const columnThreshold = denseThreshold(base.matrix.rows);
  const rows = markWhere('dense rows', 'rows', above(rowCount, rowThreshold));
  const columns = markWhere('dense columns', 'columns', above(columnCount, columnThreshold));
  const value = { rowThreshold, columnThreshold, rows: rows.count, columns: columns.count };
  const sentence =
    rows.count + columns.count === 0
      ? `No dense rows (more than ${counted(rowThreshold)} entries) and no dense columns (more than ${counted(columnThreshold)}).`
      : [
          rows.count > 0 &&
            `${plural(rows.count, 'dense row')} with more than ${counted(rowThreshold)} entries: ${lines('row', rows.indices, rows.count)}.`,
          columns.count > 0 &&
            `${plural(columns.count, 'dense column')} with more than ${counted(columnThreshold)} entries: ${lines('column', columns.indices, columns.count)}.`,
        ]
          .filter((part) => part !== false)
          .join(' ');
  return fact(value, sentence, 'lines', 'exact', [rows, columns]);
}

function above(count: Int32Array, threshold: number): Uint8Array {
  const flag = new Uint8Array(count.length);
  for (let i = 0; i < count.length; i++) if (count[i] > threshold) flag[i] = 1;
  return flag;
}

export interface EmptyLines {
  /** rows without entries */
  readonly rows: number;
  readonly columns: number;
  /** rows whose entries are all stored zeros (at least one entry); 0 for a pattern */
  readonly zeroRows: number;
  readonly zeroColumns: number;
}

/** A line without a nonzero value makes the matrix singular whatever the rest is. */
export function emptyLinesFact(base: Base): Fact<EmptyLines> {
  const { rowCount, columnCount } = base.positions;
  const sizes = base.sizes;
  const split = (count: Int32Array, largest: Float64Array | null): { empty: Uint8Array; zero: Uint8Array } => {
    const empty = new Uint8Array(count.length);
    const zero = new Uint8Array(count.length);
    for (let i = 0; i < count.length; i++) {
      if (count[i] === 0) empty[i] = 1;
      else if (largest !== null && largest[i] === 0) zero[i] = 1;
    }
    return { empty, zero };
  };
  const row = split(rowCount, sizes === null ? null : sizes.rowLargest);
  const column = split(columnCount, sizes === null ? null : sizes.columnLargest);
  const marks = [
    markWhere('rows without entries', 'rows', row.empty),
    markWhere('columns without entries', 'columns', column.empty),
    markWhere('rows of stored zeros only', 'rows', row.zero),
    markWhere('columns of stored zeros only', 'columns', column.zero),
  ];
  const value = {
    rows: marks[0].count,
    columns: marks[1].count,
    zeroRows: marks[2].count,
    zeroColumns: marks[3].count,
  };
  const told = marks
    .filter((m) => m.count > 0)
    .map((m) => `${counted(m.count)} ${m.label} (${lines(m.axis === 'rows' ? 'row' : 'column', m.indices, m.count)})`);
  return fact(
    value,
    told.length === 0 ? 'No empty rows or columns.' : `There are ${told.join('; ')}.`,
    'lines',
    'exact',
    marks,
  );
}
