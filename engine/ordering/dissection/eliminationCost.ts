import type { WholeGraph } from './wholeGraph.ts';

/**
 * Cholesky operations (Σ cⱼ² over unknowns) of eliminating the free vertices in the given order, held ones left out.
 * Elimination tree by path compression and counts by walking the row subtrees (Liu 1986): the work is one step for each
 * entry of the factor, so this is for graphs with little fill. Stops and returns Infinity once the entries walked pass
 * `mostSteps`.
 */
export function eliminationCost(whole: WholeGraph, order: Int32Array, mostSteps: number): number {
  const { pointer, neighbour, weight, freeOrder: n } = whole;
  const position = new Int32Array(whole.order).fill(n);
  for (let k = 0; k < n; k++) position[order[k]] = k;
  const parent = new Int32Array(n).fill(-1);
  const ancestor = new Int32Array(n).fill(-1);
  const mark = new Int32Array(n).fill(-1);
  // unknowns below the diagonal block of a column
  const below = new Float64Array(n);
  let steps = 0;
  for (let k = 0; k < n; k++) {
    const v = order[k];
    mark[k] = k;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const i = position[neighbour[p]];
      if (i >= k) continue;
      for (let x = i; ancestor[x] !== k; ) {
        const up = ancestor[x];
        ancestor[x] = k;
        if (up < 0) {
          parent[x] = k;
          break;
        }
        x = up;
      }
      for (let x = i; mark[x] !== k; x = parent[x]) {
        mark[x] = k;
        below[x] += weight[v];
        steps++;
      }
    }
    if (steps > mostSteps) return Number.POSITIVE_INFINITY;
  }
  let operations = 0;
  for (let k = 0; k < n; k++) {
    for (let c = below[k] + 1, last = below[k] + weight[order[k]]; c <= last; c++) operations += c * c;
  }
  return operations;
}
