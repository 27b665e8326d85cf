import type { MeasuredResult } from '../../shared/engine/model/evaluation.ts';
import { plainNumber } from './plain-number.ts';

const shownLines = 6;

/** Per cent with a sensible number of digits. */
function percent(share: number): string {
  const x = share * 100;
  return `${Math.abs(x) < 1 ? x.toFixed(1) : Math.round(x)} %`.replace('-', '−');
}

/**
 * Where the uncertainty of a result comes from: share of the variance by input, largest first, with the same
 * numbers as a table.
 */
export function BudgetBars({ result, unit }: { readonly result: MeasuredResult; readonly unit: string }) {
  const lines = result.budget.filter((line) => line.contribution > 0);
  if (lines.length === 0) return <p className="text-sm text-ink-2">Nothing here carries an uncertainty.</p>;
  const shown = lines.slice(0, shownLines);
  const rest = lines.slice(shownLines);
  const restShare = rest.reduce((sum, line) => sum + line.share, 0);
  const top = shown[0];
  return (
    <figure className="grid gap-1">
      <figcaption className="flex justify-between gap-2 border-b border-rule pb-1">
        <span className="font-semibold">Uncertainty budget</span>
        <span className="text-xs text-ink-2">share of variance</span>
      </figcaption>
      {top && (
        <p className="sr-only">
          {top.label} gives the largest share, {percent(top.share)}.
        </p>
      )}
      <ul className="grid gap-1 py-1" aria-label="Share of variance by input">
        {shown.map((line, index) => (
          <li key={line.inputId} className="grid grid-cols-[minmax(0,1fr)_6.5rem_3.5rem] items-center gap-2 text-sm">
            <span className="min-w-0 leading-tight break-words">{line.label}</span>
            <Bar share={line.share} first={index === 0} />
            <span className="num text-right text-xs">{percent(line.share)}</span>
          </li>
        ))}
        {rest.length > 0 && (
          <li className="grid grid-cols-[minmax(0,1fr)_6.5rem_3.5rem] items-center gap-2 text-sm">
            <span>Other, {rest.length} inputs</span>
            <Bar share={restShare} first={false} />
            <span className="num text-right text-xs">{percent(restShare)}</span>
          </li>
        )}
      </ul>
      {Math.abs(result.correlatedShare) > 0.0005 && (
        <p className="text-xs text-ink-2">
          Correlated inputs add {percent(result.correlatedShare)}; the shares above add to the rest.
        </p>
      )}
      <details>
        <summary className="min-h-7 cursor-pointer text-xs text-ink-2">Show as table</summary>
        <div className="relative overflow-x-auto">
          <table className="w-full text-xs">
            <caption className="pb-1 text-left text-ink-2">
              Standard uncertainties, all in coherent SI; contributions in {unit || '1'}
            </caption>
            <thead>
              <tr className="border-b border-rule text-left">
                <th scope="col" className="pr-2">
                  Input
                </th>
                <th scope="col" className="pr-2 text-right">
                  u
                </th>
                <th scope="col" className="pr-2 text-right">
                  Sensitivity
                </th>
                <th scope="col" className="pr-2 text-right">
                  Contribution
                </th>
                <th scope="col" className="text-right">
                  Share
                </th>
              </tr>
            </thead>
            <tbody>
              {lines.map((line) => (
                <tr key={line.inputId} className="border-b border-hair">
                  <th scope="row" className="pr-2 text-left font-normal">
                    {line.label}
                  </th>
                  <td className="num pr-2 text-right">{plainNumber(line.u)}</td>
                  <td className="num pr-2 text-right">{plainNumber(line.sensitivity)}</td>
                  <td className="num pr-2 text-right">{plainNumber(line.contribution)}</td>
                  <td className="num text-right">{percent(line.share)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      </details>
    </figure>
  );
}

function Bar({ share, first }: { readonly share: number; readonly first: boolean }) {
  return (
    <svg viewBox="0 0 100 12" preserveAspectRatio="none" className="h-3 w-full" aria-hidden="true">
      <rect
        x="0"
        y="0"
        width={Math.max(1, Math.min(1, Math.abs(share)) * 100)}
        height="12"
        fill={first ? 'var(--primary)' : 'var(--ink)'}
      />
    </svg>
  );
}
