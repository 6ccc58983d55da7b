/** Orders up to this are taken whatever the entries. */
const ordinaryOrder = 2 ** 22;

/**
 * Whether arrays by row or column would be absurd: beyond 4 million rows or columns a file must hold an entry for a thousand of them.
 * Says what would be needed, or null where all is well.
 */
export function absurdOrder(rows: number, columns: number, entries: number): string | null {
  const order = Math.max(rows, columns);
  if (order <= ordinaryOrder || entries >= order / 1000) return null;
  return `${rows} × ${columns} with only ${entries} entries would need ${4 * (order + 1)} bytes for its empty rows or columns alone; expected an order that fits the entries`;
}
