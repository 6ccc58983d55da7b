const chunkSize = 1 << 16;

/** Lines as chunks of bytes of some 64 KiB. */
export function* chunkedLines(lines: Iterable<string>): Generator<Uint8Array> {
  const encoder = new TextEncoder();
  let text = '';
  for (const line of lines) {
    text += `${line}\n`;
    if (text.length < chunkSize) continue;
    yield encoder.encode(text);
    text = '';
  }
  if (text !== '') yield encoder.encode(text);
}

/** One text as a chunk. */
export function textChunk(text: string): readonly Uint8Array[] {
  return [new TextEncoder().encode(text)];
}
