import type { Fact } from './fact.ts';
import { factNames, type Survey } from './survey.ts';

/** A plain JSON value. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [name: string]: Json };

/** How many lines of a mark the JSON lists; `count` says how many there are. */
const listed = 10;

/**
 * The object `survey` of the survey's JSON. First the figures under names of their own (definitions: test/reference/README.md),
 * null where they are not defined, with the reason under the same name in `reasons`; then `facts`, every fact in full: value,
 * sentence, unit, kind, marks. Indices are 0-based (`indexBase`), sentences count from 1. Numbers that are not finite are null.
 */
export function surveyJson(survey: Survey): { readonly [name: string]: Json } {
  const reasons: Record<string, Json> = {};
  const pick = <Value>(name: string, from: Fact<Value>, value: (v: Value) => Json, missing = ''): Json => {
    const found = from.value === null ? null : plain(value(from.value));
    if (found === null) reasons[name] = from.reason ?? missing;
    return found;
  };
  const figures: Record<string, Json> = {};
  const put = <Value>(name: string, from: Fact<Value>, value: (v: Value) => Json, missing = ''): void => {
    figures[name] = pick(name, from, value, missing);
  };
  const s = survey;
  put('shapes', s.shapes, (v) => v.names);
  put('rows', s.sizes, (v) => v.rows);
  put('columns', s.sizes, (v) => v.columns);
  put('entries', s.sizes, (v) => v.entries);
  put('density', s.sizes, (v) => v.density, 'The matrix has no positions.');
  put('patternSymmetry', s.symmetry, (v) => v.patternSymmetry);
  put('valueSymmetric', s.symmetry, (v) => v.valueSymmetric);
  put('hermitian', s.symmetry, (v) => v.hermitian);
  const noDifference = 'The matrix is a pattern: it has positions and no values.';
  put('symmetricDifference', s.symmetry, (v) => (v.difference === null ? null : v.difference.largest), noDifference);
  put(
    'hermitianDifference',
    s.symmetry,
    (v) => (v.hermitianDifference === null ? null : v.hermitianDifference.largest),
    noDifference,
  );
  put('symmetrisedEntries', s.symmetry, (v) => v.symmetrisedEntries);
  put('lowerBandwidth', s.bandwidth, (v) => v.lower);
  put('upperBandwidth', s.bandwidth, (v) => v.upper);
  put('envelope', s.envelope, (v) => v.envelope);
  put('largestWavefront', s.wavefront, (v) => v.largest);
  put('rootMeanSquareWavefront', s.wavefront, (v) => v.rootMeanSquare);
  put('diagonalStored', s.diagonal, (v) => v.stored);
  put('diagonalNonzero', s.diagonal, (v) => v.nonzero);
  put('structuralRank', s.structuralRank, (v) => v.structuralRank);
  put('components', s.components, (v) => v.count);
  put('strongComponents', s.strongComponents, (v) => v.count);
  put('blocks', s.blocks, (v) => v.blocks);
  put('largestBlock', s.blocks, (v) => v.largest);
  put('identityRows', s.constrained, (v) => v.rows);
  put('identityColumns', s.constrained, (v) => v.columns);
  put('duplicateRows', s.duplicateRows, (v) => v.rows);
  put('saddlePoint', s.saddlePoint, (v) => v.saddlePoint);
  const facts: Record<string, Json> = {};
  for (const name of factNames) facts[name] = factJson(s[name]);
  return { ...figures, indexBase: 0, facts, reasons };
}

function factJson(f: Fact<unknown>): Json {
  return {
    value: plain(f.value),
    reason: f.reason,
    sentence: f.sentence,
    unit: f.unit,
    kind: f.kind,
    marks: f.marks.map((m) => ({
      label: m.label,
      axis: m.axis,
      count: m.count,
      indices: Array.from(m.indices.subarray(0, m.axis === 'entries' ? 2 * listed : listed)),
    })),
  };
}

/** A fact's value as plain JSON: typed arrays become lists, what is not finite becomes null. */
function plain(value: unknown): Json {
  if (value === null || value === undefined) return null;
  if (typeof value === 'number') return Number.isFinite(value) ? value : null;
  if (typeof value === 'boolean' || typeof value === 'string') return value;
  if (Array.isArray(value)) return value.map(plain);
  if (ArrayBuffer.isView(value)) return Array.from(value as Int32Array, plain);
  return Object.fromEntries(Object.entries(value as object).map(([name, v]) => [name, plain(v)]));
}
