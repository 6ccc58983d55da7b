/** Where a command writes; tests collect, the program prints. */
export interface Output {
  /** to standard output, a line */
  line(text: string): void;
  /** to standard error, a line */
  error(text: string): void;
  /** writes a file */
  file(path: string, chunks: Iterable<Uint8Array>): Promise<void>;
}

/** One JSON object; numbers that are not finite become null. */
export function jsonText(value: unknown): string {
  return JSON.stringify(value, (_key, v: unknown) => (typeof v === 'number' && !Number.isFinite(v) ? null : v), 2);
}

/** Columns of text, right-aligned except the first. */
export function tableText(rows: readonly (readonly string[])[]): string {
  const widths: number[] = [];
  for (const row of rows) {
    for (let c = 0; c < row.length; c++) widths[c] = Math.max(widths[c] ?? 0, [...row[c]].length);
  }
  return rows
    .map((row) =>
      row
        .map((cell, c) => {
          const pad = ' '.repeat(widths[c] - [...cell].length);
          return c === 0 ? cell + pad : pad + cell;
        })
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

/** Three significant digits with a thousands mark, integers below 100,000 in full. */
export function shortNumber(value: number | null): string {
  if (value === null) return '–';
  if (Number.isInteger(value) && Math.abs(value) < 100_000) return value.toLocaleString('en-US');
  return value.toExponential(2).replace('e+', 'e');
}

/** Bytes in a unit of 2¹⁰, 2²⁰ or 2³⁰. */
export function shortBytes(value: number | null): string {
  if (value === null) return '–';
  const units = ['B', 'KiB', 'MiB', 'GiB', 'TiB'];
  let size = value;
  let unit = 0;
  while (size >= 1024 && unit < units.length - 1) {
    size /= 1024;
    unit++;
  }
  return `${unit === 0 ? size : size.toPrecision(3)} ${units[unit]}`;
}

/** Seconds with a unit that fits. */
export function shortSeconds(value: number | null): string {
  if (value === null || !Number.isFinite(value)) return '–';
  if (value < 1e-3) return `${(value * 1e6).toPrecision(3)} µs`;
  if (value < 1) return `${(value * 1e3).toPrecision(3)} ms`;
  return value < 10_000 ? `${value.toPrecision(3)} s` : `${(value / 3600).toPrecision(3)} h`;
}
