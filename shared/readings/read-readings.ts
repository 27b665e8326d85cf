import Papa from 'papaparse';
import { parseUnit, sameDimension, toSi, type Unit } from '../engine/quantity/parse-unit.ts';
import { type ColumnKey, columnKinds } from './column-kinds.ts';
import { readNumber } from './read-number.ts';
import type { Reading, ReadingsMapping } from './readings.ts';

export type ReadingsProblem = {
  /** As a spreadsheet numbers it, from 1; null where the whole file or column is meant. */
  readonly row: number | null;
  /** The header of the column, or its letter where there is none. */
  readonly column: string | null;
  readonly sentence: string;
};

const fewestReadings = 5;
const mostProblems = 200;

/**
 * Reads a file of steady readings from a heated rig into coherent SI (W, K, K, m/s or m³/s, s).
 *
 * Every problem of the file is named with row and column, so that it can be corrected in one go; after the first
 * 200 the rest are only counted. Rows that are wholly empty are passed over.
 */
export function readReadings(
  text: string,
  mapping: ReadingsMapping,
): { ok: true; readings: Reading[] } | { ok: false; problems: ReadingsProblem[] } {
  const rows = Papa.parse<string[]>(text.replace(/^\uFEFF/, ''), { delimiter: mapping.delimiter }).data;
  const header = mapping.headerRows > 0 ? (rows[0] ?? []) : [];
  const columns = readColumns(mapping, header);
  if (!columns.ok) return columns;

  const problems: ReadingsProblem[] = [];
  const readings: Reading[] = [];
  const width = widthOf(rows[0] ?? []);
  let rowCount = 0;
  for (const [place, cells] of rows.entries()) {
    if (place < mapping.headerRows || cells.every((cell) => cell.trim() === '')) continue;
    rowCount += 1;
    const row = place + 1;
    const found = widthOf(cells) > width || cells.length < width ? raggedRow(row, cells, width, header) : [];
    const reading = found.length === 0 ? readRow(row, cells, columns.columns, mapping.decimal, found) : null;
    problems.push(...found);
    if (reading) readings.push(reading);
  }
  if (rowCount < fewestReadings) {
    problems.unshift({
      row: null,
      column: null,
      sentence:
        `The file holds ${rowCount === 1 ? '1 reading' : `${rowCount} readings`}; at least ${fewestReadings} are needed ` +
        'to judge their scatter. Add readings, or check the delimiter and the number of header rows.',
    });
  }
  if (problems.length === 0) return { ok: true, readings };
  const left = problems.length - mostProblems;
  if (left <= 0) return { ok: false, problems };
  const rest = { row: null, column: null, sentence: `And ${left} more problems of this kind.` };
  return { ok: false, problems: [...problems.slice(0, mostProblems), rest] };
}

/** What the flow column measures, by its unit; null where the unit is neither. */
export function flowOf(mapping: ReadingsMapping): 'velocity' | 'volume flow in a tube' | null {
  const unit = parseUnit(mapping.flow.unit);
  if (!unit.ok) return null;
  if (hasUnitLike(unit.unit, 'm/s')) return 'velocity';
  return hasUnitLike(unit.unit, 'm^3/s') ? 'volume flow in a tube' : null;
}

type Column = { readonly key: ColumnKey; readonly place: number; readonly unit: Unit; readonly label: string };

function hasUnitLike(unit: Unit, like: string): boolean {
  const expected = parseUnit(like);
  return expected.ok && sameDimension(unit.dimension, expected.unit.dimension);
}

function readColumns(
  mapping: ReadingsMapping,
  header: readonly string[],
): { ok: true; columns: Column[] } | { ok: false; problems: ReadingsProblem[] } {
  const columns: Column[] = [];
  const problems: ReadingsProblem[] = [];
  for (const key of Object.keys(columnKinds) as ColumnKey[]) {
    const chosen = mapping[key];
    if (!chosen) continue;
    const { name, units } = columnKinds[key];
    const label = columnLabel(chosen.column, header);
    const say = (sentence: string) => problems.push({ row: null, column: label, sentence });
    const unit = parseUnit(chosen.unit);
    const same = columns.find((column) => column.place === chosen.column);
    if (chosen.unit.trim() === '') {
      say(`The ${name} in column “${label}” has no unit. Say which unit its numbers are in.`);
    } else if (!unit.ok) {
      say(`The unit “${chosen.unit}” of the ${name} in column “${label}” cannot be read: ${unit.reason}`);
    } else if (!units.some((like) => hasUnitLike(unit.unit, like))) {
      const wanted = units.map((like) => like.replace('^3', '³')).join(' or ');
      say(`The ${name} in column “${label}” is said to be in ${chosen.unit}; it takes a unit like ${wanted}.`);
    } else if (same) {
      say(`Column “${label}” is chosen twice, for the ${columnKinds[same.key].name} and for the ${name}.`);
    } else {
      columns.push({ key, place: chosen.column, unit: unit.unit, label });
    }
  }
  return problems.length === 0 ? { ok: true, columns } : { ok: false, problems };
}

function columnLabel(place: number, header: readonly string[]): string {
  const name = header[place]?.trim();
  return name ? name : letterOf(place);
}

/** A spreadsheet's name for a column: A, B, … Z, AA. */
function letterOf(place: number): string {
  const last = String.fromCharCode(65 + (place % 26));
  return place < 26 ? last : letterOf(Math.floor(place / 26) - 1) + last;
}

/** Cells up to the last that holds something: spreadsheets pad rows with empty ones. */
function widthOf(cells: readonly string[]): number {
  return cells.findLastIndex((cell) => cell.trim() !== '') + 1;
}

function raggedRow(row: number, cells: readonly string[], width: number, header: readonly string[]): ReadingsProblem[] {
  const first = header.length > 0 ? 'the header' : 'the first row';
  const count = Math.max(cells.length < width ? cells.length : 0, widthOf(cells));
  return [
    {
      row,
      column: null,
      sentence:
        `Row ${row} has ${count} ${count === 1 ? 'cell' : 'cells'}, ${first} has ${width}. ` +
        'A delimiter is missing or one too many, perhaps a decimal comma in a file that is separated by commas.',
    },
  ];
}

function readRow(
  row: number,
  cells: readonly string[],
  columns: readonly Column[],
  decimal: '.' | ',',
  problems: ReadingsProblem[],
): Reading | null {
  const values: Partial<Record<ColumnKey, number>> = {};
  for (const { key, place, unit, label } of columns) {
    const cell = cells[place] ?? '';
    const { name } = columnKinds[key];
    const say = (sentence: string) =>
      problems.push({ row, column: label, sentence: `Row ${row}, “${label}”: ${sentence}` });
    const number = readNumber(cell, decimal);
    if (!number.ok) {
      say(
        cell.trim() === ''
          ? `the cell is empty. Enter the ${name} or remove the row.`
          : `“${cell.trim()}” cannot be read as ${name}: ${number.reason}.`,
      );
      continue;
    }
    const value = toSi(number.value, unit);
    if ((key === 'wallTemperature' || key === 'bulkTemperature') && value < 0) {
      say(`${cell.trim()} ${unit.text} is below absolute zero. Check the value and the unit.`);
      continue;
    }
    if (key === 'flow' && value < 0) {
      say(`the flow is negative (${cell.trim()} ${unit.text}). Enter its magnitude.`);
      continue;
    }
    values[key] = value;
  }
  const { time, power, wallTemperature, bulkTemperature, flow } = values;
  if (power === undefined || wallTemperature === undefined || bulkTemperature === undefined || flow === undefined) {
    return null;
  }
  if (power > 0 && wallTemperature <= bulkTemperature) {
    const wall = columns.find((column) => column.key === 'wallTemperature');
    const celsius = (kelvin: number) => `${(kelvin - 273.15).toFixed(2)} °C`.replace('-', '−');
    problems.push({
      row,
      column: wall?.label ?? null,
      sentence:
        `Row ${row}, “${wall?.label}”: the wall (${celsius(wallTemperature)}) is not hotter than the bulk ` +
        `(${celsius(bulkTemperature)}) although the heater gives ${power} W. Check which column is which, and the units.`,
    });
    return null;
  }
  return { row, time: time ?? null, power, wallTemperature, bulkTemperature, flow };
}
