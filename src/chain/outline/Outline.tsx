import { type KeyboardEvent, useRef, useState } from 'react';
import { routeInForce } from '../../../shared/engine/evaluate/upstream.ts';
import { VerdictMark } from '../../charts/LogWindow.tsx';
import { Measured } from '../../ui/Measured.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain } from '../chain-context.ts';
import { quantityState } from '../describe-quantity.ts';
import { originLines, originOf, routeKindWords } from '../origin.ts';
import { verdictTag } from '../verdict-words.ts';
import { type OutlineRow, outlineRows, targets } from './outline-rows.ts';

/** The same chain as a tree table: a quantity, and under it what it comes from. Made for keyboard and narrow screens. */
export function Outline({ onOpen }: { readonly onOpen: (id: string) => void }) {
  const { state, selectedId } = useChain();
  const { model } = state;
  const ends = targets(model);
  const [chosen, setChosen] = useState<string | null>(null);
  const [collapsed, setCollapsed] = useState<ReadonlySet<string>>(new Set());
  const [activeKey, setActiveKey] = useState<string | null>(null);
  const body = useRef<HTMLTableSectionElement>(null);
  const targetId =
    chosen !== null && model.quantities.some((quantity) => quantity.id === chosen) ? chosen : (ends[0] ?? null);
  if (targetId === null) return null;
  const rows = outlineRows(model, targetId, collapsed);
  const tabStop = rows.some((row) => row.key === activeKey) ? activeKey : (rows[0]?.key ?? null);

  function focusRow(key: string | undefined): void {
    if (key === undefined) return;
    setActiveKey(key);
    body.current?.querySelector<HTMLElement>(`[data-row="${key}"]`)?.focus();
  }

  function toggle(row: OutlineRow, open: boolean): void {
    const next = new Set(collapsed);
    if (open) next.delete(row.key);
    else next.add(row.key);
    setCollapsed(next);
  }

  function handleKeyDown(event: KeyboardEvent, row: OutlineRow, index: number): void {
    const isOpen = !collapsed.has(row.key);
    if (event.target !== event.currentTarget) return;
    if (event.key === 'ArrowDown') focusRow(rows[index + 1]?.key);
    else if (event.key === 'ArrowUp') focusRow(rows[index - 1]?.key);
    else if (event.key === 'Home') focusRow(rows[0]?.key);
    else if (event.key === 'End') focusRow(rows.at(-1)?.key);
    else if (event.key === 'Enter') open(row);
    else if (event.key === 'ArrowRight' && row.hasInputs) isOpen ? focusRow(rows[index + 1]?.key) : toggle(row, true);
    else if (event.key === 'ArrowLeft')
      row.hasInputs && isOpen ? toggle(row, false) : focusRow(row.parentKey ?? undefined);
    else return;
    event.preventDefault();
  }

  function open(row: OutlineRow): void {
    if (row.seeAbove) focusRow(row.seeAbove);
    else onOpen(row.quantityId);
  }

  return (
    <div className="grid content-start gap-3 relative overflow-auto p-4">
      <label className="flex flex-wrap items-center gap-2 text-sm">
        <span className="font-semibold">Start from</span>
        <select
          className="min-h-9 max-w-full border border-rule bg-surface px-2"
          value={targetId}
          onChange={(event) => setChosen(event.target.value)}
        >
          {[...ends, ...model.quantities.map((quantity) => quantity.id).filter((id) => !ends.includes(id))].map(
            (id) => {
              const quantity = model.quantities.find((one) => one.id === id);
              return (
                <option key={id} value={id}>
                  {quantity?.symbol}, {quantity?.name}
                </option>
              );
            },
          )}
        </select>
        <span className="text-ink-2">
          {new Set(rows.map((row) => row.quantityId)).size} of {model.quantities.length} quantities shown
        </span>
      </label>
      <div className="relative overflow-x-auto border border-rule bg-surface">
        {/* biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: a tree table; its cells take the role of grid cells from it */}
        <table role="treegrid" aria-label="What the quantity comes from" className="w-full text-sm">
          <thead>
            <tr className="border-b border-rule text-left text-xs text-ink-2">
              <th scope="col" className="px-3 py-2">
                Quantity and what it comes from
              </th>
              <th scope="col" className="px-2 max-md:hidden">
                Comes from
              </th>
              <th scope="col" className="px-2 max-md:hidden">
                Value ± U (k = 2)
              </th>
              <th scope="col" className="px-2 max-md:hidden">
                Match checks
              </th>
              <th scope="col" className="px-2 max-md:hidden">
                State
              </th>
            </tr>
          </thead>
          <tbody ref={body}>
            {rows.map((row, index) => (
              <tr
                key={row.key}
                data-row={row.key}
                aria-level={row.level}
                aria-posinset={row.place}
                aria-setsize={row.siblings}
                aria-selected={row.quantityId === selectedId && row.seeAbove === null}
                {...(row.hasInputs ? { 'aria-expanded': !collapsed.has(row.key) } : {})}
                tabIndex={row.key === tabStop ? 0 : -1}
                onFocus={() => setActiveKey(row.key)}
                onKeyDown={(event) => handleKeyDown(event, row, index)}
                onClick={() => open(row)}
                className="h-9 cursor-pointer border-b border-hair hover:bg-sunk focus-visible:outline-offset-[-3px] aria-selected:bg-sunk"
              >
                <RowCells
                  row={row}
                  isOpen={!collapsed.has(row.key)}
                  onToggle={() => toggle(row, collapsed.has(row.key))}
                  onSeeAbove={() => focusRow(row.seeAbove ?? undefined)}
                />
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </div>
  );
}

function RowCells({
  row,
  isOpen,
  onToggle,
  onSeeAbove,
}: {
  readonly row: OutlineRow;
  readonly isOpen: boolean;
  readonly onToggle: () => void;
  readonly onSeeAbove: () => void;
}) {
  const { state, evaluation } = useChain();
  const quantity = state.model.quantities.find((one) => one.id === row.quantityId);
  if (!quantity) return null;
  const route = routeInForce(state.model, quantity.id);
  const result = evaluation.quantities[quantity.id]?.result ?? null;
  const tag = route ? verdictTag(evaluation.routes[route.id]?.checks ?? []) : null;
  const line = originLines[originOf(route)];
  const status = quantityState(state, quantity);
  return (
    <>
      <td className="px-3">
        <span className="flex items-center gap-2" style={{ paddingInlineStart: (row.level - 1) * 24 }}>
          {row.hasInputs ? (
            <button
              type="button"
              tabIndex={-1}
              aria-label={`${isOpen ? 'Collapse' : 'Expand'} ${quantity.name}`}
              className="grid size-7 shrink-0 place-items-center hover:bg-paper"
              onClick={(event) => {
                event.stopPropagation();
                onToggle();
              }}
            >
              <svg viewBox="0 0 12 12" className={`size-3 ${isOpen ? 'rotate-90' : ''}`} aria-hidden="true">
                <path d="M3 1 L9 6 L3 11" fill="none" stroke="currentColor" strokeWidth="2" />
              </svg>
            </button>
          ) : (
            <span className="w-7 shrink-0" />
          )}
          <svg viewBox="0 0 30 8" className="h-2 w-7 shrink-0" aria-hidden="true">
            <line
              x1="0"
              x2="30"
              y1="4"
              y2="4"
              stroke="var(--ink)"
              strokeWidth={line.width}
              strokeDasharray={line.dash}
            />
          </svg>
          <Symbol_ symbol={quantity.symbol} />
          <span className="md:whitespace-nowrap">{quantity.name}</span>
          {row.seeAbove && (
            <button
              type="button"
              tabIndex={-1}
              className="min-h-7 whitespace-nowrap text-primary underline"
              onClick={(event) => {
                event.stopPropagation();
                onSeeAbove();
              }}
            >
              see above
            </button>
          )}
        </span>
        {row.seeAbove === null && (
          <span
            className="flex flex-wrap gap-x-3 gap-y-1 pb-2 text-xs md:hidden"
            style={{ paddingInlineStart: (row.level - 1) * 24 + 36 }}
          >
            {result && <Measured value={result.value} u={result.u} unit={quantity.unit} />}
            {tag && <VerdictMark verdict={tag.verdict} words={tag.words} />}
            {status && <StatusMark status={status} />}
          </span>
        )}
      </td>
      {row.seeAbove ? (
        <td colSpan={4} className="max-md:hidden" />
      ) : (
        <>
          <td className="px-2 max-md:hidden whitespace-nowrap">
            {route ? routeKindWords[route.kind] : 'no route in force'}
          </td>
          <td className="px-2 max-md:hidden whitespace-nowrap">
            {result ? (
              <Measured value={result.value} u={result.u} unit={quantity.unit} />
            ) : (
              <span className="text-ink-2">no value yet</span>
            )}
          </td>
          <td className="px-2 max-md:hidden text-xs">
            {tag ? (
              <VerdictMark verdict={tag.verdict} words={tag.words} />
            ) : (
              <span className="text-ink-2">nothing to check</span>
            )}
          </td>
          <td className="px-2 max-md:hidden text-xs">{status && <StatusMark status={status} />}</td>
        </>
      )}
    </>
  );
}
