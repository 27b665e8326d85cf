import type { Submission } from '../../../shared/api/submissions.ts';
import { BeforeAfter } from '../../ui/BeforeAfter.tsx';
import { Measured } from '../../ui/Measured.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { changedItems, changedNumbers } from './changed-since-signed.ts';

const percent = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 1, signDisplay: 'exceptZero' });

/** The package against what was signed last: each number that moved, then each entry behind them that changed. */
export function ChangesSinceSigned({ submission }: { readonly submission: Submission }) {
  const { snapshot, signedBefore } = submission;
  if (!signedBefore) {
    return (
      <section aria-label="What changed">
        <h2 className="border-b border-rule pb-1 text-lg font-bold">What changed</h2>
        <p className="pt-2 text-ink-2">First review: nothing of this was signed before.</p>
      </section>
    );
  }
  const rows = changedNumbers(signedBefore, snapshot);
  const items = changedItems(signedBefore.model, snapshot.model);
  return (
    <section aria-label="What changed" className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <h2 className="flex justify-between border-b border-rule pb-1 text-lg font-bold">
        What changed{' '}
        <span className="text-sm font-normal text-ink-2">
          {rows.length === 0
            ? 'no number differs'
            : `${rows.length} of ${snapshot.model.quantities.length} numbers, the others hidden`}
        </span>
      </h2>
      {rows.length > 0 && (
        <section
          aria-label="Numbers that differ"
          className="relative overflow-x-auto"
          // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
          tabIndex={0}
        >
          <table className="w-full border border-rule bg-surface text-sm">
            <caption className="sr-only">Numbers that differ from what was signed last</caption>
            <thead>
              <tr className="border-b border-rule text-left">
                <th scope="col" className="px-2 py-1">
                  Quantity
                </th>
                <th scope="col" className="px-2 py-1">
                  Was
                </th>
                <th scope="col" className="px-2 py-1">
                  Now
                </th>
                <th scope="col" className="px-2 py-1 text-right">
                  Change
                </th>
              </tr>
            </thead>
            <tbody>
              {rows.map(({ quantity, now, was }) => (
                <tr key={quantity.id} className="border-b border-hair">
                  <th scope="row" className="px-2 py-1.5 text-left font-normal">
                    <Symbol_ symbol={quantity.symbol} /> {quantity.name}
                  </th>
                  <td className="px-2 py-1.5 text-ink-2">
                    {was ? <Measured value={was.value} u={was.u} unit={quantity.unit} /> : 'not signed before'}
                  </td>
                  <td className="px-2 py-1.5 font-semibold">
                    {now ? <Measured value={now.value} u={now.u} unit={quantity.unit} /> : 'no value'}
                  </td>
                  <td className="num px-2 py-1.5 text-right">
                    {now && was && was.value !== 0 ? `${percent.format((now.value / was.value - 1) * 100)} %` : '–'}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </section>
      )}
      {items.length > 0 ? (
        <details open={rows.length === 0}>
          <summary className="min-h-7 cursor-pointer text-sm text-primary underline">
            {items.length === 1 ? '1 entry' : `${items.length} entries`} changed, field by field
          </summary>
          {items.map((item) => (
            <BeforeAfter key={item.key} item={item} />
          ))}
        </details>
      ) : (
        <p className="text-ink-2">Every entry is as it was signed.</p>
      )}
    </section>
  );
}
