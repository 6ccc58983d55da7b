/**
 * A postorder of a forest given by parents (parent[j] > j, −1 at roots): position -> column; children of a column keep their
 * order, each subtree is contiguous, and `keepLast` columns at the end are not moved (they must be the last columns).
 * Linear, without recursion.
 */
export function postorder(parent: Int32Array, keepLast = 0): Int32Array {
  const n = parent.length;
  const firstChild = new Int32Array(n).fill(-1);
  const nextSibling = new Int32Array(n).fill(-1);
  const limit = n - keepLast;
  // pushing from the back leaves each list of children in increasing order
  for (let j = limit - 1; j >= 0; j--) {
    const p = parent[j];
    if (p < 0 || p >= limit) continue;
    nextSibling[j] = firstChild[p];
    firstChild[p] = j;
  }
  const out = new Int32Array(n);
  const stack = new Int32Array(n);
  let count = 0;
  for (let root = 0; root < limit; root++) {
    if (parent[root] >= 0 && parent[root] < limit) continue;
    let depth = 0;
    stack[depth++] = root;
    while (depth > 0) {
      const j = stack[depth - 1];
      const child = firstChild[j];
      if (child >= 0) {
        firstChild[j] = nextSibling[child];
        stack[depth++] = child;
      } else {
        out[count++] = j;
        depth--;
      }
    }
  }
  for (let j = limit; j < n; j++) out[count++] = j;
  return out;
}
