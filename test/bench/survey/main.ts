/**
 * `npm run bench -- survey [SIZE]`: the survey of matrices of SIZE rows (default a million), against forming the pattern of the transpose in the same
 * run, the plainest pass that touches every entry out of order. Told besides: when each fact was known, and the longest silence between two calls of
 * progress, which is how late a stop can be heard.
 */

import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { transposePattern } from '../../../engine/matrix/transpose.ts';
import { modelProblems } from '../../../engine/problems/model.ts';
import { survey } from '../../../engine/survey/survey.ts';

const size = Number(process.argv[2] ?? 1_000_000);
const rounds = 3;

const kinds: readonly (readonly [string, number])[] = [
  ['grid2d5', Math.round(Math.sqrt(size))],
  ['grid3d7', Math.round(Math.cbrt(size))],
  ['convdiff2d', Math.round(Math.sqrt(size))],
  ['circuit', size],
  ['kkt', size],
  ['blocktri', size],
];

interface Measured {
  readonly seconds: number;
  readonly silence: number;
  readonly silenceIn: string;
  readonly known: readonly (readonly [string, number])[];
}

function measure(matrix: SparseMatrix): Measured {
  const known: [string, number][] = [];
  const start = performance.now();
  let last = start;
  let silence = 0;
  let silenceIn = '';
  let phase = 'start';
  survey(
    matrix,
    (_, p) => {
      const now = performance.now();
      if (now - last > silence) {
        silence = now - last;
        silenceIn = `${phase} … ${p}`;
      }
      last = now;
      phase = p;
    },
    (name) => known.push([name, performance.now() - start]),
  );
  return { seconds: (performance.now() - start) / 1e3, silence, silenceIn, known };
}

for (const [kind, k] of kinds) {
  const make = modelProblems[kind];
  if (make === undefined) throw new Error(`no model problem ${kind}`);
  const matrix = make(k);
  let reference = Number.POSITIVE_INFINITY;
  let best: Measured | null = null;
  for (let round = 0; round < rounds; round++) {
    const start = performance.now();
    transposePattern(matrix);
    reference = Math.min(reference, (performance.now() - start) / 1e3);
    const now = measure(matrix);
    if (best === null || now.seconds < best.seconds) best = now;
  }
  if (best === null) continue;
  console.log(
    `${kind} ${k}: ${matrix.rows} rows, ${matrix.rowIndex.length} entries: ${best.seconds.toFixed(2)} s, ${(best.seconds / reference).toFixed(1)} × a transpose; ` +
      `longest silence ${best.silence.toFixed(0)} ms (${best.silenceIn})`,
  );
  console.log(`  known after: ${best.known.map(([name, ms]) => `${name} ${(ms / 1e3).toFixed(2)}`).join(', ')}`);
}
