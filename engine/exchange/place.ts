import { Fault, type Repair } from '../matrix/fault.ts';
import type { Field, SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import { type Columns, compressTriplets, expandLower, type MirrorRule } from './columns.ts';
import { DirectPlace } from './directPlace.ts';
import type { ImportNote } from './loaded.ts';
import { TripletStore } from './triplets.ts';

export interface PlaceRequest {
  readonly file: string;
  readonly rows: number;
  readonly columns: number;
  readonly field: Field;
  readonly symmetry: Symmetry;
  readonly duplicates: 'sum' | 'last';
}

export interface Placed {
  readonly matrix: SparseMatrix;
  readonly duplicates: number;
  readonly notes: readonly ImportNote[];
}

/** From entries as stored in a file to the matrix in memory: symmetric storage expanded, duplicates merged. */
export function placeTriplets(t: TripletStore, r: PlaceRequest): Placed {
  const notes: ImportNote[] = [];
  if (r.symmetry === 'general') {
    const c = compressTriplets(t, r.columns, r.duplicates);
    noteDuplicates(c, r.duplicates, notes);
    return { matrix: matrixOf(r, c), duplicates: c.duplicates, notes };
  }
  const { above, below } = triangles(t);
  if (above > 0 && below > 0) {
    const lower = bothTriangles(t, r, notes);
    noteDuplicates(lower, r.duplicates, notes);
    checkDiagonal(lower, r, t.width);
    return {
      matrix: matrixOf(r, expandLower(lower, t.width, ruleOf(r.symmetry))),
      duplicates: lower.duplicates,
      notes,
    };
  }
  if (above > 0) noteUpper(r.symmetry, notes);
  const whole = expanded(t, r);
  noteDuplicates(whole, r.duplicates, notes);
  checkDiagonal(whole, r, t.width);
  return { matrix: matrixOf(r, whole), duplicates: whole.duplicates, notes };
}

function ruleOf(symmetry: Symmetry): MirrorRule {
  return symmetry === 'hermitian' ? 'conjugate' : symmetry === 'skew-symmetric' ? 'negate' : 'same';
}

function triangles(t: TripletStore): { above: number; below: number } {
  const { row, column, count } = t;
  let above = 0;
  let below = 0;
  for (let e = 0; e < count; e++) {
    if (row[e] < column[e]) above++;
    else if (row[e] > column[e]) below++;
  }
  return { above, below };
}

/** Both triangles from one, whichever it is, without an intermediate form. */
function expanded(t: TripletStore, r: PlaceRequest): Columns {
  const { row, column, count } = t;
  const counts = new Int32Array(r.columns + 1);
  for (let e = 0; e < count; e++) {
    const i = row[e];
    const j = column[e];
    counts[j]++;
    if (i !== j) counts[i]++;
  }
  const direct = new DirectPlace({ columns: r.columns, counts }, t.width, r.symmetry);
  direct.take(t);
  return direct.finish(r.duplicates);
}

function matrixOf(
  r: PlaceRequest,
  c: { columnPointer: Int32Array; rowIndex: Int32Array; values: Float64Array },
): SparseMatrix {
  return {
    rows: r.rows,
    columns: r.columns,
    columnPointer: c.columnPointer,
    rowIndex: c.rowIndex,
    field: r.field,
    values: r.field === 'pattern' ? null : c.values,
  };
}

/** Notes how many entries were merged, and where first. */
export function noteDuplicates(c: Columns, merge: 'sum' | 'last', notes: ImportNote[]): void {
  if (c.duplicates === 0) return;
  const places = c.duplicatePlaces
    .slice(0, 10)
    .map(([i, j]) => `(${i + 1}, ${j + 1})`)
    .join(', ');
  const did = merge === 'sum' ? 'summed' : 'replaced by the last one';
  notes.push({
    code: merge === 'sum' ? 'duplicates-summed' : 'duplicates-last',
    text: `${c.duplicates} entries stood at a place already taken and were ${did}; first places (row, column): ${places}.`,
    offers: merge === 'sum' ? [{ id: 'keep-last-duplicate', text: 'Keep the last of them instead' }] : [],
  });
}

export function noteUpper(symmetry: Symmetry, notes: ImportNote[]): void {
  notes.push({
    code: 'upper-triangle',
    text: `The file stores the upper triangle of a ${symmetry} matrix; it was mirrored.`,
  });
}

/** The lower triangle of symmetric storage that holds entries of both. */
function bothTriangles(t: TripletStore, r: PlaceRequest, notes: ImportNote[]): Columns {
  const low = split(t, (i, j) => i >= j);
  const high = split(t, (i, j) => i < j);
  mirrorInPlace(high, ruleOf(r.symmetry));
  const a = compressTriplets(low, r.columns, r.duplicates);
  const b = compressTriplets(high, r.columns, r.duplicates);
  return mergeTriangles(a, b, t.width, r, notes);
}

function split(t: TripletStore, keep: (i: number, j: number) => boolean): TripletStore {
  const out = new TripletStore(t.width, t.count);
  for (let e = 0; e < t.count; e++) {
    if (!keep(t.row[e], t.column[e])) continue;
    const k = out.count++;
    out.row[k] = t.row[e];
    out.column[k] = t.column[e];
    for (let w = 0; w < t.width; w++) out.values[k * t.width + w] = t.values[e * t.width + w];
  }
  return out;
}

/** Moves entries above the diagonal to their mirror place. */
function mirrorInPlace(t: TripletStore, rule: MirrorRule): void {
  for (let e = 0; e < t.count; e++) {
    if (t.row[e] >= t.column[e]) continue;
    const i = t.row[e];
    t.row[e] = t.column[e];
    t.column[e] = i;
    if (rule === 'negate') for (let w = 0; w < t.width; w++) t.values[e * t.width + w] *= -1;
    if (rule === 'conjugate' && t.width === 2) t.values[2 * e + 1] *= -1;
  }
}

/** Two triangles that contradict the banner: as a general matrix both are taken; complex ones may fit the other banner throughout. */
function trianglesDiffer(a: Columns, b: Columns, width: 0 | 1 | 2, r: PlaceRequest, i: number, j: number): Fault {
  const repairs: Repair[] = [];
  const other = r.symmetry === 'symmetric' ? 'hermitian' : 'symmetric';
  const fits = width === 2 && r.symmetry !== 'skew-symmetric' && conjugatesThroughout(a, b, other === 'hermitian');
  if (fits) repairs.push({ id: `read-as-${other}`, text: `Read as complex ${other}: all stored pairs fit that` });
  repairs.push({ id: 'read-as-general', text: 'Read as general: both triangles as they are' });
  return new Fault(
    'input',
    'triangles-differ',
    `${r.file}: the banner says ${r.symmetry} and both triangles are stored, but the entries at (${i + 1}, ${j + 1}) and (${j + 1}, ${i + 1}) do not mirror each other.${fits ? ` All stored pairs are ${other === 'hermitian' ? 'conjugates' : 'equal'}, as in a ${other} matrix.` : ''} Store one triangle, or declare the file general.`,
    { file: r.file, row: i, column: j },
    repairs,
  );
}

/** Whether every pair stored in both triangles (b mirrored by the rule of the banner) is a pair of conjugates; `real`: and the diagonal real. */
function conjugatesThroughout(a: Columns, b: Columns, real: boolean): boolean {
  for (let j = 0; j < a.columnPointer.length - 1; j++) {
    let s = b.columnPointer[j];
    const sEnd = b.columnPointer[j + 1];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      if (real && i === j && a.values[2 * p + 1] !== 0) return false;
      while (s < sEnd && b.rowIndex[s] < i) s++;
      if (s === sEnd || b.rowIndex[s] !== i) continue;
      if (a.values[2 * p] !== b.values[2 * s] || a.values[2 * p + 1] !== -b.values[2 * s + 1]) return false;
    }
  }
  return true;
}

/** Both triangles are stored: mirror entries that agree are used once, others refuse the file. */
function mergeTriangles(a: Columns, b: Columns, width: 0 | 1 | 2, r: PlaceRequest, notes: ImportNote[]): Columns {
  const n = r.columns;
  const pointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(a.rowIndex.length + b.rowIndex.length);
  const values = new Float64Array(rowIndex.length * width);
  let q = 0;
  let both = 0;
  for (let j = 0; j < n; j++) {
    let p = a.columnPointer[j];
    let s = b.columnPointer[j];
    while (p < a.columnPointer[j + 1] || s < b.columnPointer[j + 1]) {
      const i1 = p < a.columnPointer[j + 1] ? a.rowIndex[p] : r.rows;
      const i2 = s < b.columnPointer[j + 1] ? b.rowIndex[s] : r.rows;
      const from = i1 <= i2 ? a : b;
      const at = i1 <= i2 ? p : s;
      if (i1 === i2) {
        both++;
        for (let w = 0; w < width; w++) {
          const x = a.values[p * width + w];
          const y = b.values[s * width + w];
          if (!Object.is(x, y) && x !== y) throw trianglesDiffer(a, b, width, r, i1, j);
        }
      }
      if (i1 <= i2) p++;
      if (i2 <= i1) s++;
      rowIndex[q] = Math.min(i1, i2);
      for (let w = 0; w < width; w++) values[q * width + w] = from.values[at * width + w];
      q++;
    }
    pointer[j + 1] = q;
  }
  notes.push({
    code: 'both-triangles',
    text: `Both triangles of a ${r.symmetry} matrix are stored; ${both} mirror pairs agree and were used once.`,
  });
  return {
    columnPointer: pointer,
    rowIndex: rowIndex.slice(0, q),
    values: values.slice(0, q * width),
    duplicates: a.duplicates + b.duplicates,
    duplicatePlaces: [...a.duplicatePlaces, ...b.duplicatePlaces].slice(0, 10),
  };
}

/** Skew-symmetric: the diagonal must be zero. Hermitian: it must be real. */
function checkDiagonal(lower: Columns, r: PlaceRequest, width: 0 | 1 | 2): void {
  if (r.symmetry === 'symmetric') return;
  for (let j = 0; j < r.columns; j++) {
    for (let p = lower.columnPointer[j]; p < lower.columnPointer[j + 1]; p++) {
      if (lower.rowIndex[p] !== j) continue;
      const re = width > 0 ? lower.values[p * width] : 0;
      const im = width === 2 ? lower.values[2 * p + 1] : 0;
      if (r.symmetry === 'skew-symmetric' && (re !== 0 || im !== 0)) {
        throw new Fault(
          'input',
          'skew-diagonal',
          `${r.file}: the banner says skew-symmetric, but the diagonal entry ${j + 1} is ${re}${im === 0 ? '' : ` + ${im}i`}; expected zero. Declare the file general, or leave the diagonal out.`,
          { file: r.file, row: j, column: j },
        );
      }
      if (r.symmetry === 'hermitian' && im !== 0) {
        throw new Fault(
          'input',
          'hermitian-diagonal',
          `${r.file}: the banner says hermitian, but the diagonal entry ${j + 1} has the imaginary part ${im}; expected 0. If the matrix is complex symmetric, read it so.`,
          { file: r.file, row: j, column: j },
          [{ id: 'read-as-symmetric', text: 'Read as complex symmetric' }],
        );
      }
    }
  }
}
