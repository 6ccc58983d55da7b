import { SEPARATOR, type SeparationWorkspace, separationCost } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * Fiduccia–Mattheyses passes directly on a vertex separator (Fiduccia & Mattheyses 1982; Hendrickson & Rothberg 1998).
 * A move takes a separator vertex v into side t; its neighbours in the other side are pulled into the separator, so the
 * separator loses w(v) and gains the weight of those. Every vertex moves at most once a pass, moves that make it worse
 * are tried for a while (hill climbing), then the pass is rolled back to its best point.
 *
 * On entry `w.sizes` and `w.list` describe `part` (`w.measure`); on exit too. `balance`: share of both sides no side may pass.
 * `passes`: most passes; `patience`: moves without a new best before a pass ends. Returns the cost reached.
 */
export function refine(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  balance: number,
  passes: number,
  patience: number,
): number {
  const { sizes } = w;
  let best = separationCost(sizes[0], sizes[1], sizes[2], balance, w.evenness);
  for (let pass = 0; pass < passes; pass++) {
    const before = best;
    prepareGains(g, part, w);
    best = climb(g, part, w, balance, patience, best);
    if (!(best < before)) break;
  }
  return best;
}

/** Gains of all separator vertices, from scratch: the separator is small. */
function prepareGains(g: WeightedGraph, part: Int32Array, w: SeparationWorkspace): void {
  const { list, reach0, reach1, heap0, heap1 } = w;
  const { pointer, neighbour, weight } = g;
  heap0.clear();
  heap1.clear();
  for (let k = 0; k < w.count; k++) {
    const v = list[k];
    let r0 = 0;
    let r1 = 0;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const u = neighbour[p];
      if (part[u] === 0) r0 += weight[u];
      else if (part[u] === 1) r1 += weight[u];
    }
    reach0[v] = r0;
    reach1[v] = r1;
    heap0.push(v, weight[v] - r1);
    heap1.push(v, weight[v] - r0);
  }
}

/** One pass from prepared gains; `best`: cost at its start. Returns the cost it ends with. */
function climb(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  balance: number,
  patience: number,
  startCost: number,
): number {
  const { sizes, heap0, heap1, moved, log, reach0, reach1 } = w;
  const { pointer, neighbour, weight } = g;
  const stamp = ++w.stamp;
  let best = startCost;
  let logged = 0;
  let bestLogged = 0;
  let since = 0;
  while (since < patience) {
    // the better gain decides, an overweight side yields, and between equal gains the lighter side grows
    let t: number;
    if (heap0.size === 0) {
      if (heap1.size === 0) break;
      t = 1;
    } else if (heap1.size === 0) t = 0;
    else if (sizes[0] > balance * (sizes[0] + sizes[1])) t = 1;
    else if (sizes[1] > balance * (sizes[0] + sizes[1])) t = 0;
    else {
      const difference = heap0.topGain() - heap1.topGain();
      t = difference > 0 ? 0 : difference < 0 ? 1 : sizes[0] <= sizes[1] ? 0 : 1;
    }
    const toward = t === 0 ? heap0 : heap1;
    const away = t === 0 ? heap1 : heap0;
    const v = toward.top();
    toward.remove(v);
    if (sizes[t] + weight[v] > balance * (sizes[0] + sizes[1] + weight[v])) continue;
    away.remove(v);
    const o = 1 - t;
    const reachTo = t === 0 ? reach0 : reach1;
    const reachFrom = t === 0 ? reach1 : reach0;
    const weightOfV = weight[v];
    part[v] = t;
    moved[v] = stamp;
    sizes[2] -= weightOfV;
    sizes[t] += weightOfV;
    const firstPull = logged;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const u = neighbour[p];
      if (part[u] === SEPARATOR) {
        reachTo[u] += weightOfV;
        away.change(u, -weightOfV);
      } else if (part[u] === o) {
        // pull u into the separator
        const weightOfU = weight[u];
        part[u] = SEPARATOR;
        sizes[o] -= weightOfU;
        sizes[2] += weightOfU;
        log[logged++] = u;
        let to = 0;
        let from = 0;
        for (let q = pointer[u], last = pointer[u + 1]; q < last; q++) {
          const x = neighbour[q];
          const k = part[x];
          if (k === t) to += weight[x];
          else if (k === o) from += weight[x];
          else {
            reachFrom[x] -= weightOfU;
            toward.change(x, weightOfU);
          }
        }
        reachTo[u] = to;
        reachFrom[u] = from;
        if (moved[u] !== stamp) {
          toward.push(u, weightOfU - from);
          away.push(u, weightOfU - to);
        }
      }
    }
    log[logged] = logged - firstPull;
    log[logged + 1] = 2 * v + t;
    logged += 2;
    const cost = separationCost(sizes[0], sizes[1], sizes[2], balance, w.evenness);
    if (cost < best) {
      best = cost;
      bestLogged = logged;
      since = 0;
    } else since++;
  }
  rollBack(g, part, w, logged, bestLogged);
  return best;
}

/** Takes back the moves behind `keep` and renews the list of separator vertices. */
function rollBack(g: WeightedGraph, part: Int32Array, w: SeparationWorkspace, logged: number, keep: number): void {
  const { sizes, log, list } = w;
  const { weight } = g;
  let at = logged;
  while (at > keep) {
    const t = log[at - 1] & 1;
    const v = log[at - 1] >> 1;
    const pulls = log[at - 2];
    at -= 2;
    for (let k = 0; k < pulls; k++) {
      const u = log[--at];
      part[u] = 1 - t;
      sizes[1 - t] += weight[u];
      sizes[2] -= weight[u];
    }
    part[v] = SEPARATOR;
    sizes[2] += weight[v];
    sizes[t] -= weight[v];
  }
  // old members and pulled vertices are the only ones that can be in the separator now
  const stamp = ++w.stamp;
  let count = 0;
  const old = w.count;
  for (let k = 0; k < old; k++) {
    const v = list[k];
    if (part[v] === SEPARATOR) {
      list[count++] = v;
      w.moved[v] = stamp;
    }
  }
  at = keep;
  while (at > 0) {
    const pulls = log[at - 2];
    at -= 2;
    for (let k = 0; k < pulls; k++) {
      const u = log[--at];
      if (part[u] === SEPARATOR && w.moved[u] !== stamp) {
        list[count++] = u;
        w.moved[u] = stamp;
      }
    }
  }
  w.count = count;
}
