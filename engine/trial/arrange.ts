import type { BlockTriangularForm } from '../graph/blockTriangular.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { byBlocks } from '../ordering/byBlocks.ts';
import type { OrderingMethod, OrderingResult } from '../ordering/ordering.ts';
import { saddle } from '../ordering/saddle.ts';
import type { Choice } from './choice.ts';
import { byBlock } from './diagonalBlocks.ts';
import { gatherPairs, isFixed, type OrderingCompanions, runOrdering } from './order.ts';

/** What the ordering of a trial works on. */
export interface OrderingTask {
  /** rows renumbered by the columns they are planned for; entries between blocks left out where there are blocks */
  readonly pattern: Pattern;
  /** 2×2 pivots to be kept together, and the diagonals that are absent or zero; null: none */
  readonly pairs: { readonly partner: Int32Array; readonly zero: Uint8Array } | null;
  /** blocks to be ordered one by one; null: one block */
  readonly blocks: {
    readonly matrix: Pattern;
    readonly form: BlockTriangularForm;
    readonly blockOf: Int32Array;
    /** whether a method may see one block alone (not where pairs or companions number the whole) */
    readonly alone: boolean;
  } | null;
  readonly companions: OrderingCompanions;
}

/** The requested order of a trial by one method: on blocks, on pairs, or on the whole. */
export function arrange(task: OrderingTask, choice: Choice, progress: Progress): OrderingResult {
  const { blocks, companions } = task;
  if (blocks === null) return arrangeWhole(task, choice, progress);
  const whole = isFixed(choice.ordering) || choice.ordering === 'geometric-dissection' || !blocks.alone;
  if (whole) {
    const ordered = arrangeWhole(task, choice, progress);
    const order = byBlock(ordered.order, blocks.blockOf, blocks.form.blocks);
    return { order: asNewToOld(order), notes: ordered.notes };
  }
  const method: OrderingMethod = (block, _options, tick) =>
    runOrdering(block, choice, { ...companions, coordinates: null, imported: null, heldLast: null }, tick);
  const columnsOnly = choice.ordering === 'column-minimum-degree';
  const { columnOrder, notes } = byBlocks(blocks.matrix, blocks.form, method, {}, progress, columnsOnly);
  return { order: columnOrder, notes };
}

function arrangeWhole(task: OrderingTask, choice: Choice, progress: Progress): OrderingResult {
  const { pattern, pairs, companions } = task;
  if (pairs === null || isFixed(choice.ordering)) return runOrdering(pattern, choice, companions, progress);
  if (choice.ordering === 'geometric-dissection') {
    const { order, notes } = runOrdering(pattern, choice, companions, progress);
    return { order: gatherPairs(order, pairs.partner), notes };
  }
  const method: OrderingMethod = (compressed, options, tick) =>
    runOrdering(compressed, choice, { heldLast: options.heldLast ?? null, coordinates: null, imported: null }, tick);
  const { heldLast } = companions;
  const options = { partner: pairs.partner, ...(heldLast === null ? {} : { heldLast }) };
  return saddle(pattern, pairs.zero, method, options, progress);
}
