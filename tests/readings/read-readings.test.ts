import { describe, expect, it } from 'vitest';
import { guessMapping } from '../../shared/readings/guess-mapping.ts';
import { flowOf, readReadings } from '../../shared/readings/read-readings.ts';
import type { ReadingsMapping } from '../../shared/readings/readings.ts';

const mapping: ReadingsMapping = {
  delimiter: ',',
  decimal: '.',
  headerRows: 1,
  time: { column: 0, unit: 's' },
  power: { column: 1, unit: 'W' },
  wallTemperature: { column: 2, unit: '°C' },
  bulkTemperature: { column: 3, unit: '°C' },
  flow: { column: 4, unit: 'm/s' },
};
const header = 'time (s),P (W),T_wall [°C],T_bulk [°C],u (m/s)';
const goodRows = [0, 10, 20, 30, 40].map((time) => `${time},186.2,36.4,25.1,0.45`);

function file(rows: readonly string[], firstLine = header): string {
  return [firstLine, ...rows].join('\n');
}

function problemsOf(text: string, with_: Partial<ReadingsMapping> = {}) {
  const read = readReadings(text, { ...mapping, ...with_ });
  if (read.ok) throw new Error('the file was read without a problem');
  return read.problems;
}

/** The good file with one row, by its number in a spreadsheet, put in place of another. */
function withRow(row: number, cells: string): string {
  return file(goodRows.map((good, place) => (place + 2 === row ? cells : good)));
}

describe('reading a file of steady readings', () => {
  it('converts to coherent SI and numbers rows as a spreadsheet does', () => {
    const read = readReadings(file(goodRows), mapping);

    expect(read.ok && read.readings).toHaveLength(5);
    const first = read.ok ? read.readings[0] : undefined;
    expect(first).toMatchObject({ row: 2, time: 0, power: 186.2, flow: 0.45 });
    expect(first?.wallTemperature).toBeCloseTo(309.55, 9);
    expect(first?.bulkTemperature).toBeCloseTo(298.25, 9);
  });

  it('reads kelvin as they stand', () => {
    const rows = goodRows.map((row) => row.replace('36.4', '309.55').replace('25.1', '298.25'));
    const inKelvin = { unit: 'K' };

    const read = readReadings(file(rows), {
      ...mapping,
      wallTemperature: { column: 2, ...inKelvin },
      bulkTemperature: { column: 3, ...inKelvin },
    });

    expect(read.ok && read.readings[0]?.wallTemperature).toBe(309.55);
  });

  it.each([
    ['semicolons and decimal commas', ';', ',', (text: string) => text.replaceAll(',', ';').replaceAll('.', ',')],
    ['tabs', '\t', '.', (text: string) => text.replaceAll(',', '\t')],
    [
      'a byte order mark and Windows line ends',
      ',',
      '.',
      (text: string) => `\uFEFF${text.replaceAll('\n', '\r\n')}\r\n`,
    ],
    [
      'padding columns and blank rows at the end',
      ',',
      '.',
      (text: string) => `${text.replaceAll('\n', ',,\n')},,\n,,,,,,\n\n`,
    ],
    [
      'quoted cells and a true minus sign',
      ',',
      '.',
      (text: string) => text.replaceAll('186.2', '"186.2"').replaceAll('\n0,', '\n−5,'),
    ],
  ] as const)('reads files with %s', (_, delimiter, decimal, change) => {
    const read = readReadings(change(file(goodRows)), { ...mapping, delimiter, decimal });

    expect(read).toMatchObject({ ok: true });
    expect(read.ok && read.readings.map((reading) => reading.power)).toEqual([186.2, 186.2, 186.2, 186.2, 186.2]);
  });

  it('passes over a row of units under the header', () => {
    const read = readReadings(file(['s,W,°C,°C,m/s', ...goodRows]), { ...mapping, headerRows: 2 });

    expect(read.ok && read.readings[0]?.row).toBe(3);
  });

  it('names the row, the column, the value and the reason of a cell that is no number', () => {
    expect(problemsOf(withRow(4, '20,OVERLOAD,36.4,25.1,0.45'))).toEqual([
      {
        row: 4,
        column: 'P (W)',
        sentence: 'Row 4, “P (W)”: “OVERLOAD” cannot be read as heater power: it is not a number.',
      },
    ]);
  });

  it.each([
    ['an empty cell', '20,186.2,,25.1,0.45', 'T_wall [°C]', 'the cell is empty. Enter the wall temperature'],
    ['a temperature below absolute zero', '20,186.2,36.4,-300,0.45', 'T_bulk [°C]', '-300 °C is below absolute zero'],
    ['a wall colder than the bulk', '20,186.2,24.1,25.1,0.45', 'T_wall [°C]', 'is not hotter than the bulk (25.10 °C)'],
    ['a negative flow', '20,186.2,36.4,25.1,-0.45', 'u (m/s)', 'the flow is negative'],
    ['a number beyond all bounds', '20,1e999,36.4,25.1,0.45', 'P (W)', 'too large'],
    ['too few cells', '20,186.2,36.4,25.1', null, 'Row 4 has 4 cells, the header has 5'],
    ['too many cells', '20,186,2,36.4,25.1,0.45', null, 'Row 4 has 6 cells, the header has 5'],
  ])('says which row has %s', (_, cells, column, words) => {
    const problems = problemsOf(withRow(4, cells));

    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ row: 4, column });
    expect(problems[0]?.sentence).toContain(words);
  });

  it('tells a decimal comma from something that is no number', () => {
    const rows = goodRows.map((row) => row.replaceAll(',', ';')).with(0, '0;186,2;36.4;25.1;0.45');

    const problems = problemsOf(file(rows, header.replaceAll(',', ';')), { delimiter: ';' });

    expect(problems[0]?.sentence).toContain('it has a decimal comma, but the file is read with a decimal point');
  });

  it('lists every problem of the file at once', () => {
    const rows = goodRows.with(1, '10,x,36.4,25.1,0.45').with(3, '30,186.2,y,z,0.45');

    expect(problemsOf(file(rows)).map(({ row, column }) => [row, column])).toEqual([
      [3, 'P (W)'],
      [5, 'T_wall [°C]'],
      [5, 'T_bulk [°C]'],
    ]);
  });

  it('counts the problems of a hopeless file instead of listing them all', () => {
    const problems = problemsOf(file(Array.from({ length: 500 }, () => 'a,b,c,d,e')));

    expect(problems).toHaveLength(201);
    expect(problems.at(-1)?.sentence).toContain('more problems');
  });

  it.each([
    [
      'an unknown unit',
      { power: { column: 1, unit: 'Wat' } },
      'The unit “Wat” of the heater power in column “P (W)” cannot be read',
    ],
    ['a unit of another kind', { power: { column: 1, unit: 'K' } }, 'it takes a unit like W'],
    ['no unit', { power: { column: 1, unit: ' ' } }, 'has no unit'],
    ['a column chosen twice', { flow: { column: 1, unit: 'W' } }, 'it takes a unit like m/s or m³/s'],
    ['the same column for wall and bulk', { bulkTemperature: { column: 2, unit: '°C' } }, 'is chosen twice'],
  ])('refuses a mapping with %s', (_, change, words) => {
    expect(
      problemsOf(file(goodRows), change)
        .map((problem) => problem.sentence)
        .join(' '),
    ).toContain(words);
  });

  it('asks for at least five readings', () => {
    const problems = problemsOf(file(goodRows.slice(0, 3)));

    expect(problems[0]?.sentence).toContain('The file holds 3 readings; at least 5 are needed');
  });

  it('tells a velocity from a volume flow by its unit', () => {
    expect(flowOf(mapping)).toBe('velocity');
    expect(flowOf({ ...mapping, flow: { column: 4, unit: 'L/min' } })).toBe('volume flow in a tube');
    expect(flowOf({ ...mapping, flow: { column: 4, unit: 'K' } })).toBeNull();
  });
});

describe('guessing the layout of a file', () => {
  it('reads names and units out of the headers', () => {
    const { mapping: guess, header: found, preview } = guessMapping(file(goodRows));

    expect(guess).toEqual(mapping);
    expect(found[1]).toBe('P (W)');
    expect(preview[0]).toEqual(['0', '186.2', '36.4', '25.1', '0.45']);
  });

  it.each([
    ['heater power / W', 'power', 'W'],
    ['Heater power [kW]', 'power', 'kW'],
    ['P_el (W)', 'power', 'W'],
  ] as const)('takes “%s” for the heater power', (name, key, unit) => {
    const { mapping: guess } = guessMapping(file(goodRows, header.replace('P (W)', name)));

    expect(guess[key]).toEqual({ column: 1, unit });
  });

  it('finds semicolons, decimal commas and a row of units', () => {
    const text = [
      'Zeit;Leistung;T_wall;T_bulk;velocity',
      's;W;°C;°C;m/s',
      ...goodRows.map((row) => row.replaceAll(',', ';').replaceAll('.', ',')),
    ].join('\n');

    const { mapping: guess } = guessMapping(text);

    expect(guess).toEqual({ ...mapping, delimiter: ';', decimal: ',', headerRows: 2 });
  });

  it('leaves out what it cannot guess', () => {
    const { mapping: guess } = guessMapping('a,b\n1,2\n3,4\n');

    expect(guess).toEqual({ delimiter: ',', decimal: '.', headerRows: 1 });
  });
});
