import type { FactorKind } from '../symbolic/operations.ts';

/** Which convention explains figures that another solver reported. */
export interface OwnCounts {
  readonly size: number;
  /** "nested-dissection", to name in the sentence */
  readonly name: string;
  readonly lowerEntries: number;
  /** null: symmetric */
  readonly upperEntries: number | null;
  /** with padding; null without fronts */
  readonly storedFactorEntries: number | null;
  readonly kind: FactorKind;
  /** as in `factorOperations` */
  readonly operations: number;
  readonly paddedOperations: number | null;
  readonly complex: boolean;
  /** bytes of whole layouts, by name, for what is not entries times a width: panels, stacks, peaks */
  readonly layouts: readonly (readonly [string, number])[];
}

export interface Explanation {
  readonly name: string;
  readonly convention: string;
  readonly value: number;
  /** |reported − value| / reported */
  readonly distance: number;
}

/** distance at which a figure counts as explained */
export const explainedWithin = 0.005;

/** Readings of the factor entries. */
function entryReadings(c: OwnCounts): [string, number][] {
  const { size: n, lowerEntries: l } = c;
  const u = c.upperEntries ?? l;
  const out: [string, number][] = [
    ['entries of L, diagonal included', l],
    ['entries of L without its diagonal', l - n],
    ['entries of L and U, one diagonal', l + u - n],
    ['entries of L and U, both diagonals', l + u],
    ['entries of L and U without diagonals', l + u - 2 * n],
  ];
  if (c.storedFactorEntries !== null) {
    out.push(['entries of L with the padding of its fronts', c.storedFactorEntries]);
    out.push(['entries of L and U with padding, one diagonal', 2 * c.storedFactorEntries - n]);
  }
  return out;
}

function operationReadings(c: OwnCounts): [string, number][] {
  const divisions = c.lowerEntries - c.size;
  const roots = c.kind === 'cholesky' ? c.size : 0;
  // exact for real numbers; of complex ones the divisions, a small share, are taken at the mean of their two costs
  const multiplyAdds = (c.operations - roots - (c.complex ? 6.5 : 1) * divisions) / (c.complex ? 8 : 2);
  const scalar = 2 * multiplyAdds + divisions + roots;
  const out: [string, number][] = [
    ['operations, addition and multiplication as two', scalar],
    ['multiply–adds, each as one', multiplyAdds],
    ['multiplications and divisions', multiplyAdds + divisions],
  ];
  if (c.complex) out.push(['operations in real ones', c.operations]);
  if (c.kind !== 'lu') {
    // Σ l(1 + 2l) over the columns, from Σ l and Σ l(l + 1)/2 of the symmetric factor
    out.push(['operations of an LU on the same pattern', 4 * multiplyAdds - divisions]);
  }
  if (c.paddedOperations !== null) {
    out.push(['operations with padding', c.paddedOperations], ['multiply–adds with padding', c.paddedOperations / 2]);
  }
  return out;
}

function byteReadings(c: OwnCounts): [string, number][] {
  const out: [string, number][] = c.layouts.map(([word, bytes]) => [word, bytes]);
  for (const [word, entries] of entryReadings(c)) {
    for (const value of c.complex ? [16, 8] : [8, 4]) {
      for (const index of [4, 8, 0]) {
        const how = index === 0 ? `${value}-byte values alone` : `${value}-byte values and ${index}-byte indices`;
        out.push([`${word}; ${how}`, entries * (value + index)]);
      }
    }
  }
  return out;
}

/** Explanations of one reported figure over several trials, nearest first; empty when none comes within the limit. */
export function reconcile(
  what: 'entries' | 'operations' | 'bytes',
  reported: number,
  trials: readonly OwnCounts[],
): readonly Explanation[] {
  const readings = what === 'entries' ? entryReadings : what === 'operations' ? operationReadings : byteReadings;
  const all = trials.flatMap((c) =>
    readings(c).map(([convention, value]) => ({
      name: c.name,
      convention,
      value,
      distance: Math.abs(reported - value) / Math.abs(reported),
    })),
  );
  return all.filter((e) => e.distance <= explainedWithin).sort((a, b) => a.distance - b.distance);
}
