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
  readonly operations: number;
  readonly paddedOperations: number | null;
  readonly complex: boolean;
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
  const real = c.complex ? 4 : 1;
  const out: [string, number][] = [
    ['operations, addition and multiplication as two', c.operations],
    ['operations, multiply–add as one', c.operations / 2],
    ['operations of an LU on the same pattern', 2 * c.operations],
  ];
  if (c.complex) out.push(['complex operations', c.operations / real], ['complex multiply–adds', c.operations / 8]);
  if (c.paddedOperations !== null) {
    out.push(['operations with padding', c.paddedOperations], ['multiply–adds with padding', c.paddedOperations / 2]);
  }
  return out;
}

function byteReadings(c: OwnCounts): [string, number][] {
  const out: [string, number][] = [];
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
