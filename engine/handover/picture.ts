import { positionOf } from '../matrix/permutation.ts';
import { factorDensity } from '../picture/factorDensity.ts';
import { patternDensity } from '../picture/patternDensity.ts';
import { cellCount, type DensityMap, wholeWindow } from '../picture/window.ts';
import { RowIntervals } from '../symbolic/rowIntervals.ts';
import type { TrialContext } from '../trial/context.ts';
import { frontGraph, pairedPattern } from '../trial/prepared.ts';
import type { TrialResult } from '../trial/result.ts';
import type { ReportPicture } from './report.ts';
import { whole } from './sheetText.ts';
import { plannedRowOrder } from './vectors.ts';

/** cells along an edge */
const cells = 72;
/** side of a picture in its own units */
const side = 360;

/** The pattern as read, and the factor or the matrix in the new order: small maps for a report, without a browser. */
export function reportPictures(context: TrialContext, trial: TrialResult): readonly ReportPicture[] {
  const { matrix } = context.input;
  const { rows, columns } = matrix;
  const window = wholeWindow(rows, columns);
  const down = cellCount(rows, cells);
  const across = cellCount(columns, cells);
  const before = patternDensity(matrix, null, null, window, down, across);
  const entries = context.facts.entries;
  const first: ReportPicture = {
    title: 'As read',
    words: `${whole(rows)} × ${whole(columns)}, ${whole(entries)} entries.`,
    content: {
      svg: densitySvg(before, `Pattern as read: ${whole(rows)} by ${whole(columns)}, ${whole(entries)} entries.`),
    },
  };
  return [first, afterOf(context, trial, down, across)];
}

function afterOf(context: TrialContext, trial: TrialResult, down: number, across: number): ReportPicture {
  const { matrix } = context.input;
  const { choice, counts, plan, parent, effective } = trial;
  const window = wholeWindow(matrix.rows, matrix.columns);
  const title = `${trial.ran.ordering}, ${choice.factorization}`;
  const drawsFactor = parent !== null && choice.factorization !== 'column-lu' && plan.blockStart === null;
  if (!drawsFactor || parent === null) {
    const rowPosition = matrix.rows === matrix.columns ? positionOf(plannedRowOrder(trial)) : null;
    const map = patternDensity(matrix, rowPosition, effective, window, down, across);
    const words = 'The matrix in the new order; its fill-in depends on pivots or blocks and is not drawn.';
    return { title, words, content: { svg: densitySvg(map, `${title}. ${words}`) } };
  }
  const graph = frontGraph(context, plan);
  const map = factorDensity(
    {
      matrix: pairedPattern(matrix, plan.plannedRow),
      order: effective,
      position: positionOf(effective),
      rows: new RowIntervals(graph, effective, parent),
      half: choice.factorization === 'lu' ? 'both' : 'lower',
    },
    window,
    down,
    across,
  );
  const words = `The factor${choice.factorization === 'lu' ? 's' : ' L'} in the new order: ${whole(counts.factorEntries)} entries${map.kind === 'sampled' ? ' (picture sampled)' : ''}.`;
  return { title, words, content: { svg: densitySvg(map, `${title}. ${words}`) } };
}

/** Cells that hold entries, filled and the darker the fuller; cells that hold fill-in, open and in the colour of fill. */
export function densitySvg(map: DensityMap, label: string): string {
  const { rows, columns, original, fill } = map;
  const size = side / Math.max(rows, columns);
  const width = columns * size;
  const height = rows * size;
  let most = 1;
  for (let c = 0; c < original.length; c++) most = Math.max(most, original[c] + fill[c]);
  const levels = ['', '', '', ''];
  let open = '';
  const at = (x: number) => Number(x.toFixed(2));
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      const k = r * columns + c;
      const square = (inset: number) => {
        const s = at(size - 2 * inset);
        return `M${at(c * size + inset)} ${at(r * size + inset)}h${s}v${s}h${-s}z`;
      };
      if (original[k] > 0) levels[Math.min(3, Math.floor(4 * Math.sqrt(original[k] / most)))] += square(0);
      if (fill[k] > 0) open += square(size / 5);
    }
  }
  const inks = levels.map((path, k) =>
    path === '' ? '' : `<path d="${path}" fill="#1e1b16" fill-opacity="${[0.4, 0.6, 0.8, 1][k]}"/>`,
  );
  const fills = open === '' ? '' : `<path d="${open}" fill="none" stroke="#d55e00" stroke-width="${at(size / 5)}"/>`;
  const words = label.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');
  return `<svg xmlns="http://www.w3.org/2000/svg" role="img" aria-label="${words}" viewBox="0 0 ${at(width)} ${at(height)}">${inks.join('')}${fills}</svg>`;
}
