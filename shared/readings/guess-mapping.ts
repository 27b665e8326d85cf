import Papa from 'papaparse';
import { parseUnit, sameDimension } from '../engine/quantity/parse-unit.ts';
import { type ColumnKey, columnKinds } from './column-kinds.ts';
import { readNumber } from './read-number.ts';
import type { ReadingsMapping } from './readings.ts';

const delimiters = ['\t', ';', ','] as const;
type Delimiter = (typeof delimiters)[number];
const previewRows = 8;

/** How headers usually name a column. The order decides: "wall" is looked for before the bare T of a bulk. */
const names: Readonly<Record<ColumnKey, RegExp>> = {
  time: /\btime\b|\bzeit\b|elapsed|^t$|timestamp/i,
  power: /power|heater|watt|leistung|^p$|^q$|^p[_ ]?(el|heat)/i,
  wallTemperature: /wall|surface|wand|^t_?w\b|^t_?s\b|tw\b/i,
  bulkTemperature: /bulk|fluid|liquid|water|ambient|inlet|^t_?b\b|^t_?f\b|t_?inf|tb\b/i,
  flow: /flow|veloc|speed|rate|^u$|^u_|^v$|^v_|^w$/i,
};

/**
 * A first guess at how a file of readings is laid out, from its headers ("P (W)", "T_wall [°C]",
 * "heater power / W") or a row of units under them. What cannot be guessed is left out of the mapping.
 *
 * @returns The guess, the cells of the header row, and the first rows of readings as they stand in the file.
 */
export function guessMapping(text: string): {
  mapping: Partial<ReadingsMapping>;
  header: string[];
  preview: string[][];
} {
  const head = text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\r|\n/, 40)
    .join('\n');
  const delimiter = guessDelimiter(head);
  const rows = Papa.parse<string[]>(head, { delimiter }).data.filter((row) => row.some((cell) => cell.trim() !== ''));
  const decimal = guessDecimal(rows, delimiter);
  const headerRows = Math.max(
    0,
    rows.findIndex((row) => row.filter((cell) => readNumber(cell, decimal).ok).length >= Math.max(2, row.length / 2)),
  );
  const header = headerRows > 0 ? (rows[0] ?? []).map((cell) => cell.trim()) : [];
  const unitRow = headerRows > 1 ? rows[headerRows - 1] : undefined;
  const mapping: Partial<ReadingsMapping> = { delimiter, decimal, headerRows };

  const taken = new Set<number>();
  for (const key of Object.keys(columnKinds) as ColumnKey[]) {
    const column = header.findIndex((cell, place) => !taken.has(place) && names[key].test(nameOf(cell)));
    if (column === -1) continue;
    const unit = unitOf(header[column] ?? '', unitRow?.[column]);
    if (unit === null || !fits(key, unit)) continue;
    taken.add(column);
    mapping[key] = { column, unit };
  }
  return { mapping, header, preview: rows.slice(headerRows, headerRows + previewRows) };
}

function guessDelimiter(head: string): Delimiter {
  const lines = head.split('\n').filter((line) => line.trim() !== '');
  const counts = (delimiter: Delimiter) => lines.map((line) => line.split(delimiter).length - 1);
  // A decimal comma also appears on every line, so the marks that cannot be one are looked for first.
  return delimiters.find((delimiter) => Math.min(...counts(delimiter)) > 0) ?? ',';
}

function guessDecimal(rows: readonly string[][], delimiter: Delimiter): '.' | ',' {
  if (delimiter === ',') return '.';
  const cells = rows.flat().map((cell) => cell.trim());
  return cells.some((cell) => /^[+-−]?\d+,\d+$/.test(cell)) && !cells.some((cell) => /^[+-−]?\d+\.\d+$/.test(cell))
    ? ','
    : '.';
}

/** The name in a header, without the unit that follows it. */
function nameOf(cell: string): string {
  return cell
    .replace(/[([].*$/, '')
    .replace(/\/.*$/, '')
    .trim();
}

function unitOf(cell: string, below: string | undefined): string | null {
  const inside =
    /[([]([^)\]]+)[)\]]\s*$/.exec(cell)?.[1] ?? /\s\/\s*(.+)$/.exec(cell)?.[1] ?? /,\s*(.+)$/.exec(cell)?.[1];
  const text = inside ?? below?.replace(/^[([]|[)\]]$/g, '');
  const unit = text?.trim();
  return unit && parseUnit(unit).ok ? unit : null;
}

function fits(key: ColumnKey, unit: string): boolean {
  const parsed = parseUnit(unit);
  if (!parsed.ok) return false;
  return columnKinds[key].units.some((allowed) => {
    const expected = parseUnit(allowed);
    return expected.ok && sameDimension(parsed.unit.dimension, expected.unit.dimension);
  });
}
