import { valueWidth } from '../../engine/matrix/pattern.ts';
import { fillReason } from '../../engine/picture/fillPath.ts';
import { rasterOf } from '../maps/raster.ts';
import type { Job } from './jobs.ts';
import type { MapAnswer, Spot } from './mapOperations.ts';
import { outlinesOf } from './mapOutlines.ts';
import { type MapPlan, mapOf, mapPlanOf } from './mapPlan.ts';
import type { MatrixKey } from './protocol.ts';
import type { Shelf } from './shelf.ts';

/** The plan laid for a trial; null draws the matrix as read; undefined: it must be laid first. */
function planFor(shelf: Shelf, key: MatrixKey, trial: string | null): MapPlan | null | undefined {
  if (trial === null) return null;
  return shelf.derive<{ plan: MapPlan | undefined }>(key, `map ${trial}`, () => ({ plan: undefined })).plan;
}

export const layMap: Job<'layMap'> = ({ key, trial, result }, { shelf }) => {
  const slot = shelf.derive<{ plan: MapPlan | undefined }>(key, `map ${trial}`, () => ({ plan: undefined }));
  slot.plan ??= mapPlanOf(shelf.get(key).loaded.matrix, result);
  return outlinesOf(result);
};

export const map: Job<'map'> = ({ key, trial, window, cellRows, cellColumns, shade, inks }, { shelf, giveAway }) => {
  const plan = planFor(shelf, key, trial);
  if (plan === undefined) return { laid: false };
  const { matrix } = shelf.get(key).loaded;
  const counts = mapOf(matrix, plan, window, cellRows, cellColumns);
  const cellArea =
    ((window.rowEnd - window.rowStart) / cellRows) * ((window.columnEnd - window.columnStart) / cellColumns);
  const pixels = rasterOf({ ...counts, cellArea, shade }, inks);
  giveAway(counts.original.buffer as ArrayBuffer, counts.fill.buffer as ArrayBuffer, pixels.buffer);
  return { laid: true, counts, pixels } satisfies MapAnswer;
};

export const spot: Job<'spot'> = ({ key, trial, row, column }, { shelf }) => {
  const plan = planFor(shelf, key, trial);
  if (plan === undefined) return null;
  const { matrix, labels } = shelf.get(key).loaded;
  const j = plan === null ? column : plan.order[column];
  const pairedRow = plan === null ? row : plan.factor === null ? row : plan.order[row];
  const i = plan?.rowOf === undefined || plan.rowOf === null ? pairedRow : plan.rowOf[pairedRow];
  const at = matrix.rowIndex.subarray(matrix.columnPointer[j], matrix.columnPointer[j + 1]).indexOf(i);
  const width = valueWidth(matrix);
  const place = matrix.columnPointer[j] + at;
  const value =
    at < 0 || matrix.values === null ? null : Array.from(matrix.values.subarray(place * width, (place + 1) * width));
  const answer: Spot = {
    row: i,
    column: j,
    rowLabel: labels?.[i] ?? null,
    columnLabel: labels?.[j] ?? null,
    value,
    kind: at >= 0 ? 'original' : filled(plan, row, column) ? 'fill' : 'none',
  };
  return answer;
};

/** Whether the factor holds an entry at these positions. */
function filled(plan: MapPlan | null, row: number, column: number): boolean {
  const factor = plan?.factor;
  if (factor === undefined || factor === null) return false;
  if (row === column) return true;
  if (factor.half === 'lower' && row < column) return false;
  const late = Math.max(row, column);
  const early = Math.min(row, column);
  factor.rows.reset();
  const used = factor.rows.row(late);
  for (let k = 0; k < used; k += 2) {
    if (factor.rows.intervals[k] <= early && early <= factor.rows.intervals[k + 1]) return true;
  }
  return false;
}

export const whyFill: Job<'whyFill'> = ({ key, trial, row, column }, { shelf }) => {
  const plan = planFor(shelf, key, trial);
  if (plan === undefined || plan === null || plan.factor === null) return null;
  const reason = fillReason(plan.factor.graph, plan.order, plan.position, row, column);
  if (reason.kind !== 'fill') return null;
  return { unknowns: reason.path, positions: reason.path.map((u) => plan.position[u]) };
};
