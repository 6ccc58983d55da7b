/** Gathers lines of ASCII into chunks of some 64 KiB. */
const enough = 1 << 16;

export function* chunked(lines: Iterable<string>): Generator<Uint8Array> {
  const encoder = new TextEncoder();
  let text = '';
  for (const line of lines) {
    text += `${line}\n`;
    if (text.length < enough) continue;
    yield encoder.encode(text);
    text = '';
  }
  if (text !== '') yield encoder.encode(text);
}

/** The shortest decimal that reads back to the same double (ECMA-262, Number::toString); nan and inf in words. */
export function numberWord(v: number): string {
  if (v - v !== 0) return Number.isNaN(v) ? 'nan' : v > 0 ? 'inf' : '-inf';
  return v === 0 && Object.is(v, -0) ? '-0' : String(v);
}

/** Comment lines in ASCII, each behind "% ". */
export function commentLines(comments: readonly string[]): string[] {
  return comments.flatMap((c) => c.split(/\r\n|\n|\r/)).map((c) => `% ${c.replace(/[^\x20-\x7e]/g, '?')}`);
}
