/**
 * Reads one cell as a number with the decimal mark of the file. Grouped digits are refused rather than guessed at:
 * "1,234" means two different numbers in two countries.
 */
export function readNumber(
  cell: string,
  decimal: '.' | ',',
): { ok: true; value: number } | { ok: false; reason: string } {
  const text = cell.trim().replace('−', '-');
  if (text === '') return { ok: false, reason: 'the cell is empty' };
  const plain = decimal === ',' ? text.replace(',', '.') : text;
  const hasOtherMark = decimal === ',' ? text.includes('.') : text.includes(',');
  if (hasOtherMark && /^[+-]?[\d.,]+(e[+-]?\d+)?$/i.test(text)) {
    const [used, other] = decimal === ',' ? ['comma', 'point'] : ['point', 'comma'];
    return { ok: false, reason: `it has a decimal ${other}, but the file is read with a decimal ${used}` };
  }
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return { ok: false, reason: 'it is not a number' };
  const value = Number(plain);
  return Number.isFinite(value) ? { ok: true, value } : { ok: false, reason: 'it is too large a number' };
}
