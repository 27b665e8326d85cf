export type TypedNumber =
  | { readonly ok: true; readonly value: number; readonly rest: string }
  | { readonly ok: false; readonly reason: string };

const digits = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const space = '[ \u00a0\u2009\u202f]';

const pattern = new RegExp(
  `^([+-]?)(\\d{1,3}(?:${space}\\d{3})+(?:[.,]\\d+)?|\\d[\\d.,]*|[.,]\\d+)(?:\\s*(?:[eE]([+-]?\\d{1,3})|(?:[×x*·]\\s*10\\s*(?:\\^\\s*\\(?([+-]?\\d{1,3})\\)?|([⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,3})))))?`,
);

function fromSuperscript(text: string): string {
  return text
    .replace('⁻', '-')
    .replace('⁺', '')
    .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (digit) => String(digits.indexOf(digit)));
}

/** The decimal separator of a plain number: the last of two kinds, or the only one where it cannot mean thousands. */
function withPoint(text: string): string | { reason: string } {
  const bare = text.replace(new RegExp(space, 'g'), '');
  const commas = bare.split(',').length - 1;
  const points = bare.split('.').length - 1;
  if (commas > 0 && points > 0) {
    const decimal = bare.lastIndexOf(',') > bare.lastIndexOf('.') ? ',' : '.';
    const thousands = decimal === ',' ? '.' : ',';
    const [whole = '', fraction = '', ...more] = bare.split(decimal);
    const groups = whole.split(thousands);
    const isGrouped = groups.every((group, index) => (index === 0 ? /^\d{1,3}$/ : /^\d{3}$/).test(group));
    if (more.length > 0 || !isGrouped) return { reason: `"${text}" has its separators in the wrong places.` };
    return `${groups.join('')}.${fraction}`;
  }
  if (points > 1 || commas > 1) {
    return { reason: `"${text}" has more than one decimal sign. Write thousands with spaces or not at all.` };
  }
  if (commas === 1 && /^[1-9]\d{0,2},\d{3}$/.test(bare)) {
    const [whole, fraction] = bare.split(',');
    return {
      reason: `"${text}" can mean ${whole}.${fraction} or ${whole}${fraction}. Write ${whole}.${fraction} or ${whole}${fraction}.`,
    };
  }
  return bare.replace(',', '.');
}

/**
 * Reads the number that a text begins with: `1.2e-5`, `1.2×10⁻⁵`, `1.2 x 10^-5`, `12 500`, `1,5`.
 * A comma is a decimal sign where it cannot mean thousands; where it can, the text is refused with both readings.
 */
export function readTypedNumber(text: string): TypedNumber {
  const plain = text.trim().replace(/[−–]/g, '-');
  const match = pattern.exec(plain);
  if (!match) return { ok: false, reason: `"${text.trim()}" does not begin with a number.` };
  const [whole, sign = '', mantissa = '', exponentE, exponentCaret, exponentRaised] = match;
  const point = withPoint(mantissa);
  if (typeof point !== 'string') return { ok: false, reason: point.reason };
  const exponent = exponentE ?? exponentCaret ?? (exponentRaised && fromSuperscript(exponentRaised)) ?? '0';
  const value = Number(`${sign}${point}e${exponent}`);
  if (!Number.isFinite(value)) return { ok: false, reason: `"${text.trim()}" is not a number that can be used.` };
  return { ok: true, value, rest: plain.slice(whole.length).trim() };
}
