import { inUnit } from '../forecast/limits.ts';
import type { ConfigurationSheet } from './sheet.ts';

/** An integer in full with thousands marks. */
export function whole(x: number | null): string {
  return x === null ? 'not defined' : x.toLocaleString('en-US', { maximumFractionDigits: 0 });
}

/** Seconds with a unit that fits. */
export function secondsWords(x: number): string {
  if (x < 1e-3) return `${(x * 1e6).toPrecision(3)} µs`;
  if (x < 1) return `${(x * 1e3).toPrecision(3)} ms`;
  return x < 7200 ? `${x.toPrecision(3)} s` : `${(x / 3600).toPrecision(3)} h`;
}

/** A range in words. */
export function rangeWords(range: readonly [number, number] | null): string {
  return range === null ? '' : `; proven for every pivot sequence: ${whole(range[0])} to ${whole(range[1])}`;
}

/** One heading of the sheet with its lines: what, and how much. */
export interface SheetPart {
  readonly title: string;
  readonly lines: readonly (readonly [string, string])[];
}

/** The sheet in parts, for text and report alike. Memory in full bytes as well as in a unit. */
export function sheetParts(s: ConfigurationSheet): readonly SheetPart[] {
  const bytes = (x: number | null) => (x === null ? 'not defined' : `${whole(x)} bytes (${inUnit(x)})`);
  const { matrix, ordering, pivoting, scaling, memory, threads, time, proof, target } = s;
  const parts: SheetPart[] = [
    {
      title: 'Matrix',
      lines: [
        ['name', matrix.name],
        ['size', `${whole(matrix.rows)} × ${whole(matrix.columns)}, ${whole(matrix.entries)} entries`],
        ['kind', `${matrix.field}, ${matrix.symmetry} (measured)`],
      ],
    },
    {
      title: 'How to factorize',
      lines: [
        ['factorization', `${s.factorization.kind}: ${s.factorization.formula}`],
        [
          'worked on',
          s.factorization.form === 'fronts' ? 'dense fronts along the assembly tree' : 'columns, one after the other',
        ],
        [
          'ordering',
          `${ordering.method}${ordering.postordered ? ', postordered' : ''}, seed ${ordering.seed}${ordering.heldLast === 0 ? '' : `, ${whole(ordering.heldLast)} unknowns kept at the end`}`,
        ],
        ['how to use it', ordering.advice],
        [
          'pivoting',
          `${pivoting.strategy}${pivoting.threshold === null ? '' : `, threshold u = ${pivoting.threshold}`}: ${pivoting.meaning}`,
        ],
        ['scaling', scaling.strategy === 'none' ? 'none' : `${scaling.strategy}; the vectors are files of their own`],
        ['matching', scaling.matching],
        ['rests on values', scaling.valueDependent ? 'yes' : 'no, on the pattern alone'],
        [
          'block form',
          s.blockTriangularForm.used
            ? `block triangular, ${whole(s.blockTriangularForm.blocks)} diagonal blocks`
            : 'the whole matrix as one block',
        ],
      ],
    },
    {
      title: 'Fill and work',
      lines: [
        ['factor entries', `${whole(s.fill.factorEntries)} (${s.fill.kind}${rangeWords(s.fill.range)})`],
        ['fill-in', whole(s.fill.fillIn)],
        ['operations', `${whole(s.work.operations)} (${s.fill.kind}${rangeWords(s.work.range)})`],
      ],
    },
  ];
  if (memory !== null) {
    parts.push({
      title: 'Memory to reserve',
      lines: [
        [
          'reserve',
          `${bytes(memory.reserveBytes)}, margin ${(100 * memory.marginShare).toPrecision(3)} %: ${memory.basis}`,
        ],
        ['peak', `${bytes(memory.peakBytes)}, ${memory.layout}`],
        ['factors', `${bytes(memory.factorBytes)}, compressed columns`],
        ['matrix beside it', bytes(memory.matrixBytes)],
        ['target', `${bytes(target.memoryBytes)}: ${memory.fitsTarget ? 'it fits' : 'it does not fit'}`],
      ],
    });
  }
  parts.push({
    title: 'Threads that can help',
    lines: [
      ['threads', `${whole(threads.helpful)}: ${threads.basis}`],
      ['modelled gain', `${threads.modelledSpeedup.toPrecision(3)} times`],
      [
        'never more than',
        threads.bound === null ? 'not modelled' : `${threads.bound.toPrecision(3)} times, by the critical path`,
      ],
    ],
  });
  if (time !== null) {
    const { factorizations, rightHandSides } = s.workload;
    parts.push({
      title: 'Expected time (modelled)',
      lines: [
        ['one factorization', secondsWords(time.factorizationSeconds)],
        ['one solve', secondsWords(time.solveSeconds)],
        [
          'workload',
          `${whole(factorizations)} factorizations × ${whole(rightHandSides)} right-hand sides: ${secondsWords(time.workloadSeconds)}`,
        ],
        ['reckoned with', time.basis],
      ],
    });
  }
  parts.push({ title: 'Proof', lines: proof === null ? [['run', 'none was made']] : proofLines(proof) });
  return parts;
}

function proofLines(p: NonNullable<ConfigurationSheet['proof']>): readonly (readonly [string, string])[] {
  const figure = (x: number | null) => (x === null ? 'not finite' : x.toExponential(2));
  return [
    ['verdict', p.verdict],
    ['backward error', `${figure(p.backwardError)} normwise, ${figure(p.componentwiseBackwardError)} componentwise`],
    ['condition', `${figure(p.conditionEstimate)} (1-norm estimate, from below)`],
    ['digits to trust', p.trustedDigits === null ? 'unknown' : String(p.trustedDigits)],
    ['pivot growth', figure(p.pivotGrowth)],
    ['factor entries', `${whole(p.factorEntries)} (measured)`],
    ['peak', `${whole(p.peakBytes)} bytes (measured, this engine's own layout)`],
    ['factorization', `${secondsWords(p.numericSeconds)} (measured here)`],
  ];
}

/** The sheet as plain text for people. */
export function sheetText(s: ConfigurationSheet): string {
  const out = [
    `Configuration sheet: ${s.matrix.name}`,
    `Fillcast ${s.version}. The same as JSON: configuration-sheet.json`,
  ];
  for (const { title, lines } of sheetParts(s)) {
    out.push('', title, ...lines.map(([what, value]) => `  ${what.padEnd(18)}${value}`));
  }
  out.push('', 'Cautions', ...s.cautions.map((c) => `  - ${c}`), '');
  return out.join('\n');
}

/** The sheet as JSON, pointing to its schema. */
export function sheetJson(s: ConfigurationSheet): string {
  return `${JSON.stringify({ $schema: 'configuration-sheet.schema.json', ...s }, null, 2)}\n`;
}
