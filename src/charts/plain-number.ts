const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** A number for an axis or a sentence: three to four digits, powers of ten outside 0.001 to 100 000, thin-space groups. */
export function plainNumber(x: number, digits = 3): string {
  if (x === 0 || !Number.isFinite(x)) return String(x);
  const size = Math.abs(x);
  const sign = x < 0 ? '−' : '';
  if (size >= 1e5 || size < 1e-3) {
    const [mantissa = '', exponent = '0'] = size.toExponential(digits - 1).split('e');
    const power = Number(exponent);
    const raised = [...String(Math.abs(power))].map((digit) => superscripts[Number(digit)]).join('');
    return `${sign}${String(Number(mantissa))} × 10${power < 0 ? '⁻' : ''}${raised}`;
  }
  const rounded = Number(size.toPrecision(digits + 1));
  const [whole = '', fraction] = String(rounded).split('.');
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u202f') : whole;
  return `${sign}${grouped}${fraction ? `.${fraction}` : ''}`;
}
