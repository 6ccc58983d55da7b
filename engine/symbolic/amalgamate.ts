/**
 * Relaxed amalgamation (Ashcraft & Grimes 1989): a child joins its parent when the zeros this stores stay a small share of the
 * joined trapezoid. Small nodes may be padded more than large ones: there the dense kernels gain most.
 */
export interface Amalgamation {
  /** pairs [columns, share]: a joined node of at most `columns` columns may be padding up to `share` of its entries; increasing columns */
  readonly rules: readonly (readonly [number, number])[];
}

/** No padding at all. */
export const noAmalgamation: Amalgamation = { rules: [] };

/** Default rules, chosen by measurement on grids in 2 and 3 dimensions: up to 8 columns freely, then less and less. */
export const usualAmalgamation: Amalgamation = {
  rules: [
    [8, 0.6],
    [24, 0.2],
    [64, 0.1],
    [Number.POSITIVE_INFINITY, 0.03],
  ],
};

/** A forest of supernodes; node = supernode, parent > child. */
export interface NodeForest {
  readonly columns: Int32Array;
  readonly frontOrder: Int32Array;
  readonly parent: Int32Array;
}

/**
 * Joins nodes. `fixed` marks a node that takes no part (held-last unknowns), or −1.
 * @returns node -> the node it was joined into at last (itself if it stands), and the sizes of those that stand.
 */
export function amalgamate(
  forest: NodeForest,
  rule: Amalgamation,
  fixed: number,
): { into: Int32Array; sizes: NodeForest } {
  const count = forest.parent.length;
  const columns = Int32Array.from(forest.columns);
  const frontOrder = Int32Array.from(forest.frontOrder);
  const into = new Int32Array(count);
  for (let s = 0; s < count; s++) into[s] = s;
  // padding already stored in a node, entries
  const padding = new Float64Array(count);
  // children of a node, biggest first reached last: lists are filled from the back
  const firstChild = new Int32Array(count).fill(-1);
  const nextChild = new Int32Array(count).fill(-1);
  for (let s = count - 1; s >= 0; s--) {
    const p = forest.parent[s];
    if (p < 0) continue;
    nextChild[s] = firstChild[p];
    firstChild[p] = s;
  }
  for (let p = 0; p < count; p++) {
    if (p === fixed) continue;
    for (let c = firstChild[p]; c >= 0; c = nextChild[c]) {
      const joinedColumns = columns[c] + columns[p];
      const joinedOrder = columns[c] + frontOrder[p];
      const zeros = padding[c] + padding[p] + columns[c] * (joinedOrder - frontOrder[c]);
      const stored = joinedColumns * joinedOrder - (joinedColumns * (joinedColumns - 1)) / 2;
      if (zeros > 0 && !allowed(rule, joinedColumns, zeros / stored)) continue;
      if (zeros === 0 && rule.rules.length === 0) continue;
      into[c] = p;
      columns[p] = joinedColumns;
      frontOrder[p] = joinedOrder;
      padding[p] = zeros;
    }
  }
  for (let s = count - 1; s >= 0; s--) into[s] = into[s] === s ? s : into[into[s]];
  return { into, sizes: { columns, frontOrder, parent: forest.parent } };
}

function allowed(rule: Amalgamation, columns: number, share: number): boolean {
  for (let k = 0; k < rule.rules.length; k++) {
    if (columns <= rule.rules[k][0]) return share <= rule.rules[k][1];
  }
  return false;
}
