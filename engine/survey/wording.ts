/** Numbers in sentences: the same in every browser, so without locale functions. */

/** "1,234,567" */
export function counted(n: number): string {
  const s = String(Math.round(n));
  let out = '';
  for (let k = 0; k < s.length; k++) {
    const left = s.length - k;
    out += s[k];
    if (left > 1 && left % 3 === 1 && s[k] !== '-') out += ',';
  }
  return out;
}

/** "1 row", "2,000 rows" */
export function plural(n: number, one: string, many = `${one}s`): string {
  return `${counted(n)} ${n === 1 ? one : many}`;
}

/** "is" after one, "are" after any other number */
export function are(n: number): string {
  return n === 1 ? 'is' : 'are';
}

/** Three significant digits: "0.125", "-3.2e-12" */
export function figure(x: number): string {
  if (x === 0) return '0';
  const size = Math.abs(x);
  if (!(size < Number.POSITIVE_INFINITY)) return String(x);
  if (size >= 1e-3 && size < 1e6) return String(Number(x.toPrecision(3)));
  return x
    .toExponential(2)
    .replace(/\.?0+e/, 'e')
    .replace('e+', 'e');
}

/** "12.5 %" of a share between 0 and 1; never "100 %" or "0 %" for a share that is neither. */
export function percent(share: number): string {
  if (share === 0 || share === 1) return `${100 * share} %`;
  if (share > 0.9995) return 'more than 99.9 %';
  return share < 5e-7 ? `${(100 * share).toExponential(1)} %` : `${Number((100 * share).toPrecision(3))} %`;
}

/** Lines counted from 1: "row 5", "rows 5, 7 and 9", "rows 5, 7, 9 and 12 more" */
export function lines(word: string, indices: ArrayLike<number>, count: number, shown = 3): string {
  if (count === 1) return `${word} ${counted(indices[0] + 1)}`;
  const first = Array.from(indices)
    .slice(0, shown)
    .map((i) => counted(i + 1));
  const more = count - first.length;
  if (more > 0) return `${word}s ${first.join(', ')} and ${counted(more)} more`;
  return `${word}s ${first.slice(0, -1).join(', ')} and ${first[first.length - 1]}`;
}
