/**
 * How figures are written: three significant digits with a unit, and the exact value beside it for hover, copies and exports.
 */

export interface Written {
  /** digits, "31.2" */
  readonly digits: string;
  /** unit or scale, "GiB", "M"; empty if none */
  readonly unit: string;
  /** the exact value with its unit, "31,234,567" */
  readonly exact: string;
}

const whole = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 0 });

/** An integer with thousands separators. */
export function exactly(x: number): string {
  return Number.isFinite(x) ? whole.format(x) : '–';
}

/** Three significant digits without an exponent, for 0.001 ≤ |x| < 1000. */
export function threeDigits(x: number): string {
  if (x === 0) return '0';
  // rounded first: 0.9999 is written 1.00 and not 1.000
  const rounded = Number(x.toPrecision(3));
  const decimals = 2 - Math.floor(Math.log10(Math.abs(rounded)) + 1e-12);
  return rounded.toFixed(Math.max(0, Math.min(decimals, 8)));
}

function scaled(x: number, base: number, units: readonly string[]): { digits: string; unit: string } {
  let k = 0;
  let v = x;
  // 999.5 would be written 1000 with three digits: step up before that
  while (Math.abs(v) >= 999.5 && k < units.length - 1) {
    v /= base;
    k++;
  }
  return { digits: k === 0 && Number.isInteger(v) ? String(v) : threeDigits(v), unit: units[k] };
}

/** A count of things: exact up to 9,999, then three digits and k, M, G, T, P, E (powers of 1000). */
export function count(x: number): Written {
  const exact = exactly(x);
  if (Math.abs(x) < 1e4) return { digits: exact, unit: '', exact };
  return { ...scaled(x, 1000, ['', 'k', 'M', 'G', 'T', 'P', 'E']), exact };
}

/** Bytes in powers of 1024. */
export function bytes(x: number): Written {
  return { ...scaled(x, 1024, ['B', 'KiB', 'MiB', 'GiB', 'TiB', 'PiB', 'EiB']), exact: `${exactly(x)} bytes` };
}

/** A duration in seconds. */
export function seconds(x: number): Written {
  const exact = `${x} s`;
  if (x === 0) return { digits: '0', unit: 's', exact };
  if (x < 1e-6) return { digits: '< 0.001', unit: 'ms', exact };
  if (x < 0.9995) return { digits: threeDigits(x * 1e3), unit: 'ms', exact };
  if (x < 120) return { digits: threeDigits(x), unit: 's', exact };
  if (x < 7200) return { digits: threeDigits(x / 60), unit: 'min', exact };
  if (x < 172800) return { digits: threeDigits(x / 3600), unit: 'h', exact };
  return { digits: threeDigits(x / 86400), unit: 'd', exact };
}

/** A rate of operations a second. */
export function rate(x: number): Written {
  const { digits, unit } = scaled(x, 1000, ['', 'k', 'M', 'G', 'T', 'P']);
  return { digits, unit: `${unit}op/s`, exact: `${exactly(x)} operations per second` };
}

/** A number without unit: plain from 0.001 to 10,000, else with a power of ten. */
export function plainNumber(x: number): Written {
  const exact = String(x);
  if (!Number.isFinite(x)) return { digits: '–', unit: '', exact: 'not a finite number' };
  const a = Math.abs(x);
  if (a === 0 || (a >= 1e-3 && a < 1e4)) return { digits: a >= 999.5 ? exactly(x) : threeDigits(x), unit: '', exact };
  const [mantissa, exponent] = x.toExponential(2).split('e');
  return { digits: `${mantissa}e${Number(exponent)}`, unit: '', exact };
}

/** How many times one figure is of another: "1.00×". */
export function times(x: number): Written {
  return { digits: threeDigits(x), unit: '×', exact: `${x} times` };
}

/** A share in percent. */
export function percent(x: number): Written {
  return { digits: threeDigits(x * 100), unit: '%', exact: `${x * 100} %` };
}

/** Digits and unit in one string. */
export function asText(w: Written): string {
  if (w.unit === '') return w.digits;
  return w.unit === '×' || w.unit === '%' ? `${w.digits}${w.unit}` : `${w.digits} ${w.unit}`;
}
