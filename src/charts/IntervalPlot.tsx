import { scaleLinear } from 'd3-scale';
import { plainNumber } from './plain-number.ts';

export type Interval = {
  readonly id: string;
  readonly name: string;
  /** In the unit shown. */
  readonly value: number;
  readonly u: number;
  readonly adopted: boolean;
  readonly dash: string | undefined;
};
export type LimitLine = { readonly side: 'at least' | 'at most'; readonly value: number };

const width = 360;
const rowHeight = 30;
const left = 10;
const right = width - 10;

/**
 * Routes of one quantity side by side: the tick is the value, the thick bar ± u, the thin line ± U with k = 2.
 * The acceptance limit is a line across; the same numbers stand in the table below.
 */
export function IntervalPlot({
  intervals: given,
  unit,
  limit: givenLimit,
}: {
  readonly intervals: readonly Interval[];
  readonly unit: string;
  readonly limit: LimitLine | null;
}) {
  if (given.length === 0) return null;
  // One shared power of ten, so that the axis shows plain numbers.
  const largest = Math.max(...given.map(({ value, u }) => Math.abs(value) + 2 * u));
  const power = Math.floor(Math.log10(largest || 1));
  const factor = power >= 5 || power < -2 ? 10 ** power : 1;
  const intervals = given.map((one) => ({ ...one, value: one.value / factor, u: one.u / factor }));
  const limit = givenLimit && { ...givenLimit, value: givenLimit.value / factor };
  const scaled = factor === 1 ? unit || 'dimensionless' : `${plainNumber(factor).replace('1 × ', '')} ${unit}`;
  const ends = intervals.flatMap(({ value, u }) => [value - 2 * u, value + 2 * u]);
  if (limit) ends.push(limit.value);
  const low = Math.min(...ends);
  const high = Math.max(...ends);
  const pad = (high - low || Math.abs(high) || 1) * 0.06;
  const x = scaleLinear()
    .domain([low - pad, high + pad])
    .nice()
    .range([left, right]);
  const height = intervals.length * rowHeight;
  const adopted = intervals.find((interval) => interval.adopted);
  return (
    <figure className="grid gap-1">
      <figcaption className="flex justify-between gap-2 border-b border-rule pb-1">
        <span className="font-semibold">Routes side by side</span>
        <span className="text-xs text-ink-2">{scaled}; thick ± u, thin ± U (k = 2)</span>
      </figcaption>
      <svg
        viewBox={`0 0 ${width} ${height + 22}`}
        className="w-full"
        role="img"
        aria-label={sentence(given, unit, givenLimit)}
      >
        {x.ticks(5).map((tick) => (
          <g key={tick}>
            <line x1={x(tick)} x2={x(tick)} y1="0" y2={height} stroke="var(--hair)" />
            <text x={x(tick)} y={height + 15} textAnchor="middle" fontSize="11" fill="var(--ink-2)" className="num">
              {plainNumber(tick)}
            </text>
          </g>
        ))}
        {adopted && (
          <line
            x1={x(adopted.value)}
            x2={x(adopted.value)}
            y1="0"
            y2={height}
            stroke="var(--primary)"
            strokeDasharray="2 3"
            strokeWidth="1.5"
          />
        )}
        {limit && (
          <g>
            <line x1={x(limit.value)} x2={x(limit.value)} y1="0" y2={height} stroke="var(--bad)" strokeWidth="2" />
            <path
              d={limit.side === 'at least' ? `M${x(limit.value)} 2 l8 4 l-8 4 Z` : `M${x(limit.value)} 2 l-8 4 l8 4 Z`}
              fill="var(--bad)"
            />
          </g>
        )}
        {intervals.map((interval, row) => {
          const y = row * rowHeight + 21;
          const at = (k: number) => x(interval.value + k * interval.u);
          return (
            <g key={interval.id}>
              <text
                x={left}
                y={y - 9}
                fontSize="12"
                fill="var(--ink)"
                fontWeight={interval.adopted ? 700 : 400}
                stroke="var(--surface)"
                strokeWidth="3"
                paintOrder="stroke"
              >
                {interval.name}
                {interval.adopted ? ' (adopted)' : ''}
              </text>
              <line
                x1={at(-2)}
                x2={at(2)}
                y1={y}
                y2={y}
                stroke="var(--ink)"
                strokeWidth="1.4"
                strokeDasharray={interval.dash}
              />
              <line x1={at(-1)} x2={at(1)} y1={y} y2={y} stroke="var(--ink)" strokeWidth="6" />
              <line
                x1={at(0)}
                x2={at(0)}
                y1={y - 6}
                y2={y + 6}
                stroke={interval.adopted ? 'var(--primary)' : 'var(--ink)'}
                strokeWidth="2.4"
              />
            </g>
          );
        })}
      </svg>
      <details>
        <summary className="min-h-7 cursor-pointer text-xs text-ink-2">Show as table</summary>
        <table className="w-full text-xs">
          <caption className="sr-only">Routes with value and uncertainties, in {scaled}</caption>
          <thead>
            <tr className="border-b border-rule text-left">
              <th scope="col">Route</th>
              <th scope="col" className="text-right">
                Value
              </th>
              <th scope="col" className="text-right">
                u
              </th>
              <th scope="col" className="text-right">
                U (k = 2)
              </th>
            </tr>
          </thead>
          <tbody>
            {intervals.map((interval) => (
              <tr key={interval.id} className="border-b border-hair">
                <th scope="row" className="text-left font-normal">
                  {interval.name}
                  {interval.adopted ? ' (adopted)' : ''}
                </th>
                <td className="num text-right">{plainNumber(interval.value)}</td>
                <td className="num text-right">{plainNumber(interval.u, 2)}</td>
                <td className="num text-right">{plainNumber(2 * interval.u, 2)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </details>
    </figure>
  );
}

function sentence(intervals: readonly Interval[], unit: string, limit: LimitLine | null): string {
  const parts = intervals.map(
    ({ name, value, u, adopted }) =>
      `${name}${adopted ? ', adopted' : ''}: ${plainNumber(value)} ± ${plainNumber(2 * u, 2)} ${unit}`,
  );
  if (limit) parts.push(`limit: ${limit.side} ${plainNumber(limit.value)} ${unit}`);
  return `${parts.join('; ')}.`;
}
