import { decimalEnd, parseDecimal } from './decimal.ts';

/**
 * Fortran formats as the Harwell–Boeing and Rutherford–Boeing formats use them (ISO/IEC 1539, formatted input): data edit descriptors
 * I, F, E, D, G in fixed fields, X, the scale factor P, repeat counts and groups.
 */
export interface FortranField {
  /** first character of the field in its record, 0-based */
  readonly at: number;
  readonly width: number;
  readonly integer: boolean;
  /** digits behind the point where the field has none */
  readonly decimals: number;
  /** scale factor k of kP: a field without exponent is divided by 10^k */
  readonly scale: number;
}

/** Most fields a record of these formats may have; guards against absurd repeat counts. */
const mostFields = 4096;

/** The fields of one record, or null if the format is not one of the above. */
export function parseFortranFormat(text: string): readonly FortranField[] | null {
  const compact = text.replace(/\s+/g, '').toUpperCase();
  if (!/^\(.*\)$/.test(compact)) return null;
  const out: FortranField[] = [];
  const state = { at: 0, scale: 0 };
  return expand(compact.slice(1, -1), state, out, 0) && out.length > 0 ? out : null;
}

function expand(list: string, state: { at: number; scale: number }, out: FortranField[], depth: number): boolean {
  let p = 0;
  while (p < list.length) {
    if (list[p] === ',') {
      p++;
      continue;
    }
    const rest = list.slice(p);
    const scale = /^([+-]?\d+)P/.exec(rest);
    if (scale !== null) {
      state.scale = Number(scale[1]);
      p += scale[0].length;
      continue;
    }
    const skip = /^(\d*)X/.exec(rest);
    if (skip !== null) {
      state.at += skip[1] === '' ? 1 : Number(skip[1]);
      p += skip[0].length;
      continue;
    }
    const group = /^(\d*)\(/.exec(rest);
    if (group !== null) {
      const inner = insideOf(rest, group[0].length);
      if (inner === null || depth > 3) return false;
      const times = group[1] === '' ? 1 : Number(group[1]);
      if (times > mostFields) return false;
      for (let k = 0; k < times; k++) if (!expand(inner, state, out, depth + 1)) return false;
      p += group[0].length + inner.length + 1;
      continue;
    }
    const item = /^(\d*)(I|F|E[NS]?|D|G)(\d+)(?:\.(\d+)(?:E\d+)?)?/.exec(rest);
    if (item === null) return false;
    const times = item[1] === '' ? 1 : Number(item[1]);
    const width = Number(item[3]);
    const integer = item[2] === 'I';
    if (width === 0 || width > 256 || times === 0 || out.length + times > mostFields) return false;
    for (let k = 0; k < times; k++) {
      out.push({ at: state.at, width, integer, decimals: integer ? 0 : Number(item[4] ?? 0), scale: state.scale });
      state.at += width;
    }
    p += item[0].length;
  }
  return state.at < 1 << 20;
}

/** The text up to the bracket that closes the one before `from`. */
function insideOf(text: string, from: number): string | null {
  let depth = 1;
  for (let p = from; p < text.length; p++) {
    if (text[p] === '(') depth++;
    else if (text[p] === ')' && --depth === 0) return text.slice(from, p);
  }
  return null;
}

/**
 * The number in one field of a record bytes[from … to); undefined for a blank field or one that holds no number. Blanks inside are
 * ignored, an exponent may lack its letter, a missing point is implied.
 */
export function readFortranField(bytes: Uint8Array, from: number, to: number, f: FortranField): number | undefined {
  let p = from + f.at;
  let end = Math.min(to, p + f.width);
  while (p < end && bytes[p] === 32) p++;
  while (end > p && bytes[end - 1] === 32) end--;
  if (p >= end) return undefined;
  if (f.integer) return integerField(bytes, p, end);
  const value = parseDecimal(bytes, p, end);
  if (decimalEnd === end && f.scale === 0 && hasPoint(bytes, p, end)) return value;
  let text = '';
  for (let q = p; q < end; q++) if (bytes[q] !== 32) text += String.fromCharCode(bytes[q]);
  return realWord(text, f);
}

function hasPoint(bytes: Uint8Array, from: number, to: number): boolean {
  for (let p = from; p < to; p++) if (bytes[p] === 46) return true;
  return false;
}

function integerField(bytes: Uint8Array, from: number, to: number): number | undefined {
  let p = from;
  const negative = bytes[p] === 45;
  if (negative || bytes[p] === 43) p++;
  let value = 0;
  let digits = 0;
  for (; p < to; p++) {
    if (bytes[p] === 32) continue;
    const d = bytes[p] ^ 48;
    if (d > 9) return undefined;
    value = value * 10 + d;
    digits++;
  }
  return digits === 0 ? undefined : negative ? -value : value;
}

function realWord(text: string, f: FortranField): number | undefined {
  if (/^[+-]?nan(\(.*\))?$/i.test(text)) return Number.NaN;
  if (/^[+-]?inf(inity)?$/i.test(text))
    return text.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  const parts = /^([+-]?)(\d*)(\.?)(\d*)(?:[ED]([+-]?\d+)|([+-]\d+))?$/i.exec(text);
  if (parts === null || parts[2] + parts[4] === '') return undefined;
  const [, sign, whole, point, part, lettered, bare] = parts;
  const written = lettered ?? bare;
  const exponent = written !== undefined ? Number(written) : -f.scale;
  const implied = point === '' ? f.decimals : 0;
  return Number(`${sign}${whole === '' ? '0' : whole}.${part === '' ? '0' : part}e${exponent - implied}`);
}
