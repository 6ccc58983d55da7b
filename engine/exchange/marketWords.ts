import { decimalEnd, parseDecimal } from './decimal.ts';

const scratch = new Uint8Array(512);

/** A number as free text: decimal, NaN or infinity in words; undefined where it is none. */
export function wordNumber(word: string): number | undefined {
  const size = word.length;
  if (size <= scratch.length) {
    for (let p = 0; p < size; p++) scratch[p] = word.charCodeAt(p) & 255;
    const value = parseDecimal(scratch, 0, size);
    if (decimalEnd === size) return value;
  } else if (/^[+-]?(\d+\.?\d*|\.\d+)([ed][+-]?\d+)?$/i.test(word)) return Number(word.replace(/d/i, 'e'));
  if (/^[+-]?nan(\(.*\))?$/i.test(word)) return Number.NaN;
  if (/^[+-]?inf(inity)?$/i.test(word))
    return word.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  return undefined;
}

/** Why a word is no number, with the form that is expected. */
export function numberHint(word: string): string {
  if (/^[+-]?\d{1,3}([',]\d{3})+(\.\d+)?$/.test(word) && word.replace(/[^',]/g, '').length > 1) {
    return ' Thousands separators are not read; leave them out.';
  }
  if (/^[+-]?\d+,\d+/.test(word))
    return ' A decimal comma or a thousands separator is not read; write a decimal point and no separators.';
  if (/^[+-]?[\d.]+[+-]\d+$/.test(word))
    return ' An exponent without its letter has two readings here; write E before it.';
  if (/[ij*]$/i.test(word) || /^\(/.test(word)) return ' Write complex values as two numbers, real and imaginary part.';
  return '';
}
