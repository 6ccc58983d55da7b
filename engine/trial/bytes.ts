import type { FactorizationName } from './choice.ts';

/** Widths in bytes. */
export interface Widths {
  readonly value: number;
  readonly index: number;
  readonly pointer: number;
}

/** Widths of the figures in JSON: double precision, 32-bit indices, 64-bit pointers. */
export function usualWidths(complex: boolean): Widths {
  return { value: complex ? 16 : 8, index: 4, pointer: 8 };
}

/**
 * Bytes of the factors in compressed columns: (value + index) · entries + pointer · (n + 1) for each factor; the unit diagonal of
 * LU's L is not stored.
 */
export function factorBytes(kind: FactorizationName, n: number, lower: number, upper: number, w: Widths): number {
  const entry = w.value + w.index;
  const pointers = w.pointer * (n + 1);
  if (kind === 'cholesky' || kind === 'ldlt') return entry * lower + pointers;
  return entry * (lower - n) + pointers + entry * upper + pointers;
}
