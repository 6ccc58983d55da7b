import type { Fact } from '../../engine/survey/fact.ts';
import type { FactName } from '../../engine/survey/survey.ts';

/** Heads of the facts, in groups an engineer would look for. */
export const factGroups: readonly {
  readonly title: string;
  readonly facts: readonly (readonly [FactName, string])[];
}[] = [
  {
    title: 'First of all',
    facts: [
      ['shapes', 'shape'],
      ['sizes', 'size'],
      ['symmetry', 'symmetry'],
      ['diagonal', 'diagonal'],
    ],
  },
  {
    title: 'Is it sound?',
    facts: [
      ['structuralRank', 'structural rank'],
      ['emptyLines', 'empty rows and columns'],
      ['duplicateRows', 'duplicate rows'],
      ['constrained', 'constrained unknowns'],
    ],
  },
  {
    title: 'How it hangs together',
    facts: [
      ['components', 'components'],
      ['strongComponents', 'strong components'],
      ['blocks', 'block triangular form'],
      ['saddlePoint', 'saddle point'],
    ],
  },
  {
    title: 'Extent in this numbering',
    facts: [
      ['bandwidth', 'bandwidth'],
      ['envelope', 'envelope'],
      ['wavefront', 'wavefront'],
    ],
  },
  {
    title: 'Counts',
    facts: [
      ['neighbours', 'neighbours'],
      ['rowDegrees', 'entries in a row'],
      ['columnDegrees', 'entries in a column'],
      ['denseLines', 'dense rows and columns'],
    ],
  },
  {
    title: 'Values',
    facts: [
      ['magnitudes', 'magnitudes'],
      ['norms', 'norms and scaling'],
      ['dominance', 'diagonal dominance'],
      ['gershgorin', 'Gershgorin range'],
    ],
  },
];

/** One column of a bar chart. */
export interface Column {
  readonly label: string;
  readonly height: number;
}

/** The histogram inside a fact, if it has one: bars in order, with the label of each. */
export function histogramOf(
  name: FactName,
  { value }: Fact<unknown>,
): { columns: readonly Column[]; of: string } | null {
  if (typeof value !== 'object' || value === null || !('histogram' in value)) return null;
  if (name === 'magnitudes') {
    const bins = value.histogram as readonly { decade: number; entries: number }[];
    return { of: 'entries by power of ten', columns: spread(bins.map((b) => [b.decade, b.entries])) };
  }
  const bins = value.histogram as readonly { from: number; to: number; lines: number }[];
  return {
    of: name === 'neighbours' ? 'unknowns by number of neighbours' : 'lines by number of entries',
    columns: bins.map((b) => ({ label: b.from === b.to ? String(b.from) : `${b.from}–${b.to}`, height: b.lines })),
  };
}

/** Decades with the empty ones between them, so that gaps are seen. */
function spread(bins: readonly (readonly [number, number])[]): readonly Column[] {
  if (bins.length === 0) return [];
  const first = bins[0][0];
  const out = Array.from({ length: bins[bins.length - 1][0] - first + 1 }, (_, k) => ({
    label: `1e${first + k}`,
    height: 0,
  }));
  for (const [decade, entries] of bins) out[decade - first] = { ...out[decade - first], height: entries };
  return out;
}
