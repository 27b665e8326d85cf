import { differenceFromSi, fromSi, parseUnit } from './parse-unit.ts';

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const MINUS = '−';
const THIN_GAP = '\u00a0';

function raised(exponent: number): string {
  return String(exponent)
    .replace('-', '⁻')
    .replace(/\d/g, (digit) => superscripts[Number(digit)] ?? digit);
}

/** Fixed decimals with a true minus and no negative zero. */
function fixed(x: number, decimals: number): string {
  const text = x.toFixed(Math.min(Math.max(decimals, 0), 100));
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', MINUS);
}

/** Power of ten of the leading digit. */
function leadingPlace(x: number): number {
  return Number(x.toExponential().split('e')[1]);
}

/** Power of ten of the second digit of U once it is rounded to two digits. */
function lastPlaceOf(expanded: number): number {
  return Number(expanded.toExponential(1).split('e')[1]) - 1;
}

/** A unit as typed, in the typography of the trade: `m2/s` becomes `m²/s`. */
export function typesetUnit(unit: string): string {
  if (unit === '1') return '';
  return unit
    .replace(/\^\(?(-?\d+)\)?/g, (_, power: string) => raised(Number(power)))
    .replace(/([A-Za-zΩ)])(-?\d+)/g, (_, name: string, power: string) => name + raised(Number(power)))
    .replace(/\s*\*\s*/g, '·');
}

export type FormattedMeasured = {
  readonly mantissa: string;
  /** U = k·u to two digits; empty where the value is exact. */
  readonly expanded: string;
  /** Shared power of ten; null where none is needed. */
  readonly exponent: number | null;
  readonly unit: string;
  readonly text: string;
};

/**
 * A value with its expanded uncertainty U = k·u, U rounded to two digits (JCGM 100:2008, 7.2.6) and the value to the
 * same place, in the given unit.
 *
 * @param value - Coherent SI.
 * @param u - Standard uncertainty, coherent SI.
 */
export function formatMeasured(value: number, u: number, unit: string, k = 2): FormattedMeasured {
  const reading = parseUnit(unit);
  const shownValue = reading.ok ? fromSi(value, reading.unit) : value;
  const shownU = (reading.ok ? Math.abs(differenceFromSi(u, reading.unit)) : u) * k;
  const shownUnit = typesetUnit(unit);
  if (!Number.isFinite(shownValue) || !Number.isFinite(shownU)) {
    return { mantissa: '–', expanded: '', exponent: null, unit: shownUnit, text: 'no value' };
  }
  const after = shownUnit === '' ? '' : ` ${shownUnit}`;
  if (shownU === 0) {
    const plain = exactParts(shownValue);
    const power = plain.exponent === null ? '' : ` × 10${raised(plain.exponent)}`;
    return { ...plain, expanded: '', unit: shownUnit, text: `${plain.mantissa}${power}${after}` };
  }
  const last = lastPlaceOf(shownU);
  const largest = Math.max(Math.abs(shownValue), shownU);
  const lead = leadingPlace(largest);
  const needsPower = last > 0 || lead >= 5 || lead < -2;
  const exponent = needsPower ? lead : null;
  const scale = 10 ** -(exponent ?? 0);
  const decimals = (exponent ?? 0) - last;
  const mantissa = fixed(shownValue * scale, decimals);
  const expanded = fixed(shownU * scale, decimals);
  const pair = `${mantissa} ± ${expanded}`;
  const text =
    exponent === null && after === ''
      ? pair
      : `(${pair})${exponent === null ? '' : ` × 10${raised(exponent)}`}${after}`;
  return { mantissa, expanded, exponent, unit: shownUnit, text };
}

/** An exact number keeps what was entered, to twelve digits. */
function exactParts(x: number): { mantissa: string; exponent: number | null } {
  if (x === 0) return { mantissa: '0', exponent: null };
  const lead = leadingPlace(x);
  const exponent = lead >= 6 || lead < -3 ? lead : null;
  const scaled = exponent === null ? x : x / 10 ** exponent;
  return { mantissa: String(Number(scaled.toPrecision(12))).replace('-', MINUS), exponent };
}

/** A number without uncertainty for groups, ratios and sentences: `25 300`, `1.27`, `3.67 × 10⁵`. */
export function formatNumber(x: number, digits = 4): string {
  if (!Number.isFinite(x)) return 'no value';
  if (x === 0) return '0';
  const rounded = Number(x.toPrecision(digits));
  const lead = leadingPlace(rounded);
  if (lead >= 6 || lead < -3) {
    const mantissa = Number((rounded / 10 ** lead).toPrecision(digits));
    return `${String(mantissa).replace('-', MINUS)} × 10${raised(lead)}`;
  }
  const [whole = '', fraction] = String(Math.abs(rounded)).split('.');
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN_GAP) : whole;
  return `${rounded < 0 ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`;
}
