/** What the first lines of plain coordinate text seem to hold; shown to the user, who confirms. */
export interface ColumnGuess {
  readonly first: string;
  /** line of `first`, 1-based */
  readonly firstLine: number;
  /** "row, column, value" */
  readonly columns: string;
  readonly base: 0 | 1;
  /** size in words */
  readonly size: string;
  /** every entry looked at lies in one triangle, and some off the diagonal */
  readonly oneTriangle: boolean;
}

const columnWords = ['', 'one number', 'row, column', 'row, column, value', 'row, column, real part, imaginary part'];

/** Looks at the whole lines of `head`. */
export function guessColumns(head: Uint8Array): ColumnGuess {
  const text = new TextDecoder('latin1').decode(head);
  const lines = text.split(/\r\n|\n|\r/);
  if (lines.length > 1) lines.pop();
  let first = '';
  let firstLine = 0;
  const rows: string[][] = [];
  for (let k = 0; k < lines.length; k++) {
    if (lines[k].trim() === '' || /^\s*(%|#|\/\/)/.test(lines[k])) continue;
    if (firstLine === 0) {
      first = lines[k];
      firstLine = k + 1;
    }
    rows.push(lines[k].trim().split(/\s*[,;]\s*|\s+/));
  }
  const width = Math.min(5, rows[rows.length - 1]?.length ?? 0);
  const sized = rows.length > 1 && rows[0].length === 3 && (width !== 3 || looksLikeSize(rows));
  const body = sized ? rows.slice(1) : rows;
  let top = 0;
  let base: 0 | 1 = 1;
  let above = false;
  let below = false;
  for (const r of body) {
    const i = Number(r[0]);
    const j = Number(r[1]);
    if (i === 0 || j === 0) base = 0;
    if (i < j) above = true;
    if (i > j) below = true;
    top = Math.max(top, i || 0, j || 0);
  }
  return {
    first,
    firstLine: Math.max(1, firstLine),
    columns: columnWords[width] ?? `${width} columns`,
    base,
    size: sized
      ? `with a size line ${rows[0][0]} × ${rows[0][1]}`
      : `indices up to ${top} in the first ${body.length} lines`,
    oneTriangle: above !== below,
  };
}

/** Three integers, the first two at least every index behind them and the third no small one, begin like a size line. */
export function looksLikeSize(rows: readonly (readonly string[])[]): boolean {
  const [m, n, count] = rows[0].map(Number);
  if (![m, n, count].every((x) => Number.isInteger(x) && x > 0) || count < rows.length - 1) return false;
  return rows.slice(1).every((r) => Number(r[0]) <= m && Number(r[1]) <= n);
}
