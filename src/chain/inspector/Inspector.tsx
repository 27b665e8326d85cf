import { type RefObject, useEffect } from 'react';
import { useChain } from '../chain-context.ts';
import { findItem } from '../editing/chain-edits.ts';
import { OverviewPanel } from './OverviewPanel.tsx';
import { PointPanel } from './PointPanel.tsx';
import { QuantityPanel } from './QuantityPanel.tsx';
import { RoutePanel } from './RoutePanel.tsx';

/** Edits what is selected; with nothing selected it lists the study's contents. */
export function Inspector({
  headingRef,
  onClose,
  onRemoveQuantity,
  onRemoveRoute,
}: {
  readonly headingRef: RefObject<HTMLHeadingElement | null>;
  readonly onClose: () => void;
  readonly onRemoveQuantity: (id: string) => void;
  readonly onRemoveRoute: (id: string) => void;
}) {
  const { state, selectedId, document } = useChain();
  const item = selectedId === null ? null : findItem(state.model, selectedId);

  // Another item, another entry of the history.
  // biome-ignore lint/correctness/useExhaustiveDependencies: the choice itself is what ends a run of typing
  useEffect(() => document.seal(), [selectedId, document]);

  const heading =
    item && 'name' in item.body
      ? item.body.name
      : selectedId === null
        ? 'Contents of the study'
        : 'Not in this study any more';
  return (
    <aside
      aria-labelledby="inspector-heading"
      className="min-h-0 relative overflow-y-auto border-rule bg-paper print:hidden max-md:border-t-2 md:border-l"
      onKeyDown={(event) => {
        if (event.key === 'Escape' && !event.defaultPrevented) onClose();
      }}
    >
      <header className="sticky top-0 z-[5] flex items-start justify-between gap-3 border-b border-rule bg-paper px-5 py-3">
        <h2 id="inspector-heading" ref={headingRef} tabIndex={-1} className="text-lg leading-tight font-bold">
          {heading}
        </h2>
        <button
          type="button"
          className="min-h-8 shrink-0 border border-line bg-surface px-2 text-xs hover:bg-sunk"
          onClick={onClose}
        >
          Close
        </button>
      </header>
      <div className="grid gap-5 px-5 py-4">
        {item?.kind === 'quantity' && (
          <QuantityPanel key={item.body.id} quantity={item.body} onRemove={onRemoveQuantity} />
        )}
        {item?.kind === 'route' && <RoutePanel key={item.body.id} route={item.body} onRemove={onRemoveRoute} />}
        {item?.kind === 'operating-point' && <PointPanel key={item.body.id} point={item.body} />}
        {!item && selectedId !== null && (
          <p className="text-sm">
            It was removed, here or by somebody else. Undo brings back what you removed yourself.
          </p>
        )}
        {selectedId === null && <OverviewPanel />}
      </div>
    </aside>
  );
}
