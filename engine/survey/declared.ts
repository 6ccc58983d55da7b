import type { Fact } from './fact.ts';
import type { Symmetries } from './symmetry.ts';
import { figure } from './wording.ts';

/** Declared against measured symmetry. */
export interface Measured {
  /** what was measured, a few words: "symmetric exactly", "hermitian up to 2e-16 of the largest value", "not symmetric" */
  readonly words: string;
  /** set where a matrix declared general is symmetric but for rounding: why averaging with its mirror is on offer */
  readonly nearly: string | null;
}

/** Up to this share of the largest value a difference of mirrors is taken for rounding, so that averaging is offered. */
const rounding = 1e-10;

/** @param declared the symmetry the file declares */
export function measuredSymmetry(declared: string, { value, reason }: Fact<Symmetries>): Measured {
  if (value === null) return { words: reason ?? 'not defined', nearly: null };
  if (value.difference === null) {
    return {
      words: value.unmatched === 0 ? 'symmetric pattern, no values' : 'unsymmetric pattern, no values',
      nearly: null,
    };
  }
  if (value.valueSymmetric && value.hermitian) return { words: 'symmetric exactly', nearly: null };
  if (value.valueSymmetric) return { words: 'complex symmetric exactly, not hermitian', nearly: null };
  if (value.hermitian) return { words: 'hermitian exactly', nearly: null };
  if (value.skewSymmetric) return { words: 'skew-symmetric exactly', nearly: null };
  const plain = value.relativeDifference ?? Number.POSITIVE_INFINITY;
  const conjugate = value.relativeHermitianDifference ?? Number.POSITIVE_INFINITY;
  const share = Math.min(plain, conjugate);
  const word = conjugate < plain ? 'hermitian' : 'symmetric';
  if (share > rounding) {
    return { words: value.unmatched === 0 ? 'not symmetric, symmetric in pattern' : 'not symmetric', nearly: null };
  }
  const at = (conjugate < plain ? value.hermitianDifference : value.difference)?.at ?? [-1, -1];
  const words = `${word} up to ${figure(share)} of the largest value`;
  const where = at[0] < 0 ? '' : ` (largest difference in row ${at[0] + 1}, column ${at[1] + 1})`;
  return {
    words,
    nearly:
      declared === 'general'
        ? `Declared general, and ${words}${where}: it can be made symmetric by averaging mirrors.`
        : null,
  };
}
