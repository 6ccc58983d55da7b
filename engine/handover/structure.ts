import type { TrialContext } from '../trial/context.ts';
import { treeOf } from '../trial/forecast.ts';
import type { TrialResult } from '../trial/result.ts';
import { chunkedLines } from './lines.ts';

/** Why there is no list of columns; null where there is one. */
export function whyNoColumns(trial: TrialResult): string | null {
  return trial.parent === null || trial.columnCount === null ? 'No elimination tree was formed for this trial.' : null;
}

/** Elimination tree and column counts as a table, one column a line in the effective order, 1-based; 0 for no parent. */
export function columnLines(trial: TrialResult): Iterable<Uint8Array> {
  return chunkedLines(columns(trial));
}

function* columns({ effective, parent, columnCount, choice }: TrialResult): Generator<string> {
  if (parent === null || columnCount === null) return;
  const tree = choice.factorization === 'column-lu' ? 'column elimination tree' : 'elimination tree';
  yield `% ${tree} and entries of each column of L, diagonal included; all numbers count from 1, parent 0 is a root`;
  yield '% position  original  parent  entries';
  for (let k = 0; k < parent.length; k++) yield `${k + 1} ${effective[k] + 1} ${parent[k] + 1} ${columnCount[k]}`;
}

/** Why there is no list of fronts; null where there is one. */
export function whyNoFronts(trial: TrialResult): string | null {
  return trial.choice.factorization === 'column-lu' ? 'Column LU has no fronts.' : whyNoColumns(trial);
}

/** The assembly tree, one front a line, children before parents, 1-based; 0 for no parent. */
export function frontLines(context: TrialContext, trial: TrialResult): Iterable<Uint8Array> {
  return chunkedLines(fronts(context, trial));
}

function* fronts(context: TrialContext, trial: TrialResult): Generator<string> {
  const tree = treeOf(context, trial);
  if (tree === null) return;
  yield '% assembly tree: fronts with the padding of amalgamation, in an internal postorder; all numbers count from 1, parent 0 is a root';
  yield '% the pivots of a front are the unknowns of its line; its order is pivots + rows of the contribution block';
  yield '% front  parent  order  pivots  original unknowns of the pivots';
  for (let s = 0; s < tree.count; s++) {
    const from = tree.firstColumn[s];
    const to = tree.firstColumn[s + 1];
    let pivots = '';
    for (let c = from; c < to; c++) pivots += ` ${tree.order[c] + 1}`;
    yield `${s + 1} ${tree.parent[s] + 1} ${tree.frontOrder[s]} ${to - from}${pivots}`;
  }
}
