import { type ColumnKey, columnKinds } from '../../../shared/readings/column-kinds.ts';
import type { Reading, ReadingsMapping } from '../../../shared/readings/readings.ts';
import { plainNumber } from '../../charts/plain-number.ts';
import type { ReadFile } from './reduce-preview.ts';

const optional: readonly ColumnKey[] = ['time'];

/** Which column is what, and in which unit: a choice and a unit for each thing that is needed. */
export function ColumnMapping({
  header,
  preview,
  mapping,
  onChange,
}: {
  readonly header: readonly string[];
  readonly preview: readonly (readonly string[])[];
  readonly mapping: Partial<ReadingsMapping>;
  readonly onChange: (mapping: Partial<ReadingsMapping>) => void;
}) {
  const count = Math.max(header.length, ...preview.map((row) => row.length), 0);
  const columns = Array.from({ length: count }, (_, index) => header[index] || `column ${index + 1}`);

  function set(key: ColumnKey, column: string, unit: string): void {
    const { [key]: _, ...others } = mapping;
    if (column === '') onChange(key === 'time' ? { ...others, time: null } : others);
    else onChange({ ...others, [key]: { column: Number(column), unit } });
  }

  return (
    <div className="relative overflow-x-auto">
      <table className="w-full min-w-120 text-sm">
        <caption className="sr-only">Columns of the file and their units</caption>
        <thead>
          <tr className="border-b border-rule text-left text-xs text-ink-2">
            <th scope="col" className="py-1">
              Needed
            </th>
            <th scope="col">Column in the file</th>
            <th scope="col">Unit of its numbers</th>
          </tr>
        </thead>
        <tbody>
          {(Object.keys(columnKinds) as ColumnKey[]).map((key) => {
            const chosen = mapping[key] ?? null;
            const name = columnKinds[key].name;
            return (
              <tr key={key} className="border-b border-hair">
                <th scope="row" className="py-1 text-left font-normal">
                  {name}
                  {optional.includes(key) && <span className="text-xs text-ink-2"> (optional)</span>}
                </th>
                <td className="pr-2">
                  <select
                    aria-label={`Column of the ${name}`}
                    className="min-h-9 w-full border border-line bg-surface px-2"
                    value={chosen?.column ?? ''}
                    onChange={(event) => set(key, event.target.value, chosen?.unit ?? '')}
                  >
                    <option value="">not chosen</option>
                    {columns.map((column, index) => (
                      // biome-ignore lint/suspicious/noArrayIndexKey: columns are known by their place
                      <option key={index} value={index}>
                        {column}
                      </option>
                    ))}
                  </select>
                </td>
                <td>
                  <input
                    aria-label={`Unit of the ${name}`}
                    className="num min-h-9 w-32 border border-line bg-surface px-2"
                    placeholder={columnKinds[key].units[0]}
                    value={chosen?.unit ?? ''}
                    disabled={chosen === null}
                    onChange={(event) => set(key, String(chosen?.column ?? ''), event.target.value)}
                  />
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

const shownRows = 8;

/** The first rows as they stand in the file beside what was read from them, in SI; then every problem by row. */
export function RawBesideRead({
  header,
  preview,
  file,
}: {
  readonly header: readonly string[];
  readonly preview: readonly (readonly string[])[];
  readonly file: ReadFile | null;
}) {
  const readings: readonly Reading[] = file?.ok ? file.readings.slice(0, shownRows) : [];
  return (
    <div className="grid gap-4 lg:grid-cols-2">
      <div className="relative overflow-x-auto border border-rule bg-surface">
        <table className="w-full text-xs">
          <caption className="border-b border-rule p-2 text-left font-semibold">As it stands in the file</caption>
          <thead>
            <tr className="border-b border-hair text-left">
              {header.map((cell, index) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: columns are known by their place
                <th key={index} scope="col" className="px-2 py-1">
                  {cell}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {preview.slice(0, shownRows).map((row, place) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: rows are known by their place
              <tr key={place} className="border-b border-hair">
                {row.map((cell, index) => (
                  // biome-ignore lint/suspicious/noArrayIndexKey: columns are known by their place
                  <td key={index} className="num px-2 py-1">
                    {cell}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <div className="relative overflow-x-auto border border-rule bg-surface">
        {readings.length > 0 ? (
          <ReadingsTable
            readings={readings}
            caption={`As it was read, in SI units (${file?.ok ? file.readings.length : 0} readings)`}
          />
        ) : (
          <p className="p-3 text-sm text-ink-2">
            {file === null
              ? 'Choose a column and a unit for everything that is needed.'
              : 'Nothing is taken over until the problems below are mended.'}
          </p>
        )}
      </div>
      {file && !file.ok && <Problems problems={file.problems} />}
    </div>
  );
}

export function ReadingsTable({
  readings,
  caption,
}: {
  readonly readings: readonly Reading[];
  readonly caption: string;
}) {
  return (
    <table className="w-full text-xs">
      <caption className="border-b border-rule p-2 text-left font-semibold">{caption}</caption>
      <thead>
        <tr className="border-b border-hair text-right">
          <th scope="col" className="px-2 py-1">
            Row
          </th>
          <th scope="col" className="px-2">
            time, s
          </th>
          <th scope="col" className="px-2">
            power, W
          </th>
          <th scope="col" className="px-2">
            wall, K
          </th>
          <th scope="col" className="px-2">
            bulk, K
          </th>
          <th scope="col" className="px-2">
            flow, m/s or m³/s
          </th>
        </tr>
      </thead>
      <tbody>
        {readings.map((reading) => (
          <tr key={reading.row} className="num border-b border-hair text-right">
            <th scope="row" className="px-2 py-1 font-normal">
              {reading.row}
            </th>
            <td className="px-2">{reading.time === null ? '' : plainNumber(reading.time)}</td>
            <td className="px-2">{plainNumber(reading.power, 4)}</td>
            <td className="px-2">{plainNumber(reading.wallTemperature, 4)}</td>
            <td className="px-2">{plainNumber(reading.bulkTemperature, 4)}</td>
            <td className="px-2">{plainNumber(reading.flow, 4)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Problems({
  problems,
}: {
  readonly problems: readonly { row: number | null; column: string | null; sentence: string }[];
}) {
  return (
    <div role="alert" className="grid gap-1 border-2 border-bad bg-surface p-3 lg:col-span-2">
      <h3 className="font-semibold text-bad">
        {problems.length === 1 ? 'There is a problem' : `There are ${problems.length} problems`} with the readings
      </h3>
      <ul className="grid gap-1 text-sm">
        {problems.map((problem) => (
          <li key={`${problem.row}:${problem.column}:${problem.sentence}`}>{problem.sentence}</li>
        ))}
      </ul>
    </div>
  );
}
