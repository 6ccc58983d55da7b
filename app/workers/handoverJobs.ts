import { permutationExample, permutationFormula, writePermutation } from '../../engine/exchange/writePermutation.ts';
import { positionOf } from '../../engine/matrix/permutation.ts';
import type { Job } from './jobs.ts';

export const permutation: Job<'permutation'> = ({ order, format }) => {
  const chunks = [...writePermutation(order, format)];
  const bytes = new Uint8Array(chunks.reduce((sum, c) => sum + c.length, 0));
  let at = 0;
  for (const chunk of chunks) {
    bytes.set(chunk, at);
    at += chunk.length;
  }
  return bytes;
};

export const convention: Job<'convention'> = ({ order, direction, base }) => {
  const values = direction === 'new-to-old' ? order : positionOf(order);
  return {
    formula: permutationFormula(direction, base),
    example: permutationExample(values, direction, base),
    selfInverse: positionOf(order).every((position, i) => position === order[i]),
  };
};
