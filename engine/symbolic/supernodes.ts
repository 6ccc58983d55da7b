/**
 * Fundamental supernodes of a postordered factor (Liu, Ng & Peyton 1993): column j + 1 joins column j when it is its parent, has no
 * other child, and its column of L is the same without row j.
 * @param parent, columnCount of a postordered tree
 * @param held the last so many columns never share a supernode with the columns before them, and form one of their own
 * @returns supernode -> first column; length count + 1
 */
export function fundamentalSupernodes(parent: Int32Array, columnCount: Int32Array, held = 0): Int32Array {
  const n = parent.length;
  const limit = n - held;
  const children = new Int32Array(n);
  for (let j = 0; j < n; j++) if (parent[j] >= 0) children[parent[j]]++;
  const first = new Int32Array(n + 1);
  let count = 0;
  for (let j = 0; j < limit; j++) {
    const joins = j > 0 && parent[j - 1] === j && children[j] === 1 && columnCount[j] === columnCount[j - 1] - 1;
    if (!joins) first[count++] = j;
  }
  if (held > 0) first[count++] = limit;
  first[count] = n;
  return first.slice(0, count + 1);
}
