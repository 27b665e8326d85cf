import { useState } from 'react';
import type { Quantity } from '../../../shared/engine/model/study-model.ts';
import { formatMeasured } from '../../../shared/engine/quantity/format-measured.ts';
import { parseQuantity } from '../../../shared/engine/quantity/parse-quantity.ts';
import { differenceFromSi, fromSi, parseUnit } from '../../../shared/engine/quantity/parse-unit.ts';
import { BudgetBars } from '../../charts/BudgetBars.tsx';
import { IntervalPlot } from '../../charts/IntervalPlot.tsx';
import { VerdictMark } from '../../charts/LogWindow.tsx';
import { Measured } from '../../ui/Measured.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain, useEdit } from '../chain-context.ts';
import { routeStatus } from '../describe-quantity.ts';
import type { EditOutcome } from '../editing/chain-document.ts';
import { originLines, originOf, routeKindWords } from '../origin.ts';
import { verdictTag } from '../verdict-words.ts';
import { AddRoute } from './AddRoute.tsx';
import { Findings } from './Findings.tsx';
import { ChoiceField, Section, smallButton, TextField } from './fields.tsx';
import { ItemLockNote } from './ItemLockNote.tsx';
import { useItemLock } from './use-route-edit.ts';

/** One quantity: its number, the routes to it side by side, what its uncertainty is made of, and its definition. */
export function QuantityPanel({
  quantity,
  onRemove,
}: {
  readonly quantity: Quantity;
  readonly onRemove: (id: string) => void;
}) {
  const { evaluation, state, mayEdit, select } = useChain();
  const lock = useItemLock(quantity.id);
  const result = evaluation.quantities[quantity.id]?.result ?? null;
  const point = state.model.operatingPoints.find((one) => one.id === quantity.operatingPointId);
  return (
    <>
      <p className="text-xs text-ink-2">
        Quantity at{' '}
        <button type="button" className="min-h-7 underline" onClick={() => select(quantity.operatingPointId)}>
          {point?.name ?? 'an operating point'}
        </button>
      </p>
      <div className="border-2 border-rule bg-surface p-3">
        {result ? (
          <p className="text-lg">
            <Symbol_ symbol={quantity.symbol} /> = <Measured value={result.value} u={result.u} unit={quantity.unit} />
          </p>
        ) : (
          <p className="text-ink-2">
            No value yet:{' '}
            {state.model.routes.some((route) => route.quantityId === quantity.id)
              ? 'adopt a route that gives one.'
              : 'add a route below.'}
          </p>
        )}
        {result && quantity.limit && <LimitLine quantity={quantity} value={result.value} u={result.u} />}
      </div>
      <ItemLockNote id={quantity.id} />
      <Findings kind="quantity" id={quantity.id} />
      <Routes quantity={quantity} />
      {mayEdit.allowed && <AddRoute key={quantity.id} quantity={quantity} />}
      <SideBySide quantity={quantity} />
      {result && <BudgetBars result={result} unit="SI" />}
      <Definition quantity={quantity} />
      {lock.allowed && (
        <p>
          <button type="button" className={`${smallButton} text-bad`} onClick={() => onRemove(quantity.id)}>
            Remove this quantity
          </button>
        </p>
      )}
    </>
  );
}

function LimitLine({
  quantity,
  value,
  u,
}: {
  readonly quantity: Quantity;
  readonly value: number;
  readonly u: number;
}) {
  const { limit } = quantity;
  if (!limit) return null;
  const margin = limit.side === 'at least' ? value - limit.value : limit.value - value;
  const verdict = margin >= 2 * u ? 'inside' : margin >= 0 ? 'near the edge' : 'outside';
  const words =
    verdict === 'inside'
      ? 'met with the whole of U'
      : verdict === 'near the edge'
        ? 'met, but U reaches beyond it'
        : 'not met';
  return (
    <p className="flex flex-wrap gap-x-3 pt-1 text-sm">
      <span>
        Limit: {limit.side} {limit.text}
      </span>
      <VerdictMark verdict={verdict} words={words} />
    </p>
  );
}

function Routes({ quantity }: { readonly quantity: Quantity }) {
  const { state, evaluation, select } = useChain();
  const lock = useItemLock(quantity.id);
  const edit = useEdit();
  const routes = state.model.routes.filter((route) => route.quantityId === quantity.id);
  if (routes.length === 0) return null;
  return (
    <Section
      title="Routes"
      aside={
        <span className="text-xs text-ink-2">
          {quantity.adoptedRouteId ? '' : routes.length > 1 ? 'none adopted' : 'the only one counts'}
        </span>
      }
    >
      <ul className="grid gap-2">
        {routes.map((route) => {
          const adopted = route.id === quantity.adoptedRouteId;
          const one = evaluation.routes[route.id];
          const tag = verdictTag(one?.checks ?? []);
          return (
            <li
              key={route.id}
              className={`grid gap-1 border bg-surface p-2 text-sm ${adopted ? 'border-2 border-primary' : 'border-line'}`}
            >
              <span className="flex flex-wrap items-center justify-between gap-2">
                <button
                  type="button"
                  className="min-h-7 text-left font-semibold underline"
                  onClick={() => select(route.id)}
                >
                  {route.name}
                </button>
                <span className="text-xs">
                  <StatusMark status={routeStatus(state, route.id)} />
                </span>
              </span>
              <span className="flex flex-wrap items-center justify-between gap-2 text-xs">
                <span className="text-ink-2">{routeKindWords[route.kind]}</span>
                {one?.result ? (
                  <Measured value={one.result.value} u={one.result.u} unit={quantity.unit} />
                ) : (
                  <span className="text-ink-2">no value yet</span>
                )}
              </span>
              <span className="flex flex-wrap items-center justify-between gap-2 text-xs">
                {tag ? (
                  <VerdictMark verdict={tag.verdict} words={tag.words} />
                ) : (
                  <span className="text-ink-2">nothing to check</span>
                )}
                {adopted ? (
                  <span className="font-semibold text-primary">adopted</span>
                ) : (
                  lock.allowed && (
                    <button
                      type="button"
                      className={smallButton}
                      onClick={() =>
                        edit(
                          [{ kind: 'quantity', id: quantity.id, body: { ...quantity, adoptedRouteId: route.id } }],
                          `Adopted ${route.name} for ${quantity.symbol}`,
                        )
                      }
                    >
                      Adopt {route.name}
                    </button>
                  )
                )}
              </span>
            </li>
          );
        })}
      </ul>
    </Section>
  );
}

function SideBySide({ quantity }: { readonly quantity: Quantity }) {
  const { state, evaluation } = useChain();
  const unit = parseUnit(quantity.unit);
  if (!unit.ok) return null;
  const routes = state.model.routes.filter((route) => route.quantityId === quantity.id);
  const intervals = routes.flatMap((route) => {
    const result = evaluation.routes[route.id]?.result;
    if (!result) return [];
    return [
      {
        id: route.id,
        name: route.name,
        value: fromSi(result.value, unit.unit),
        u: differenceFromSi(result.u, unit.unit),
        adopted: route.id === quantity.adoptedRouteId,
        dash: originLines[originOf(route)].dash,
      },
    ];
  });
  const limit = quantity.limit ? { side: quantity.limit.side, value: fromSi(quantity.limit.value, unit.unit) } : null;
  return <IntervalPlot intervals={intervals} unit={quantity.unit} limit={limit} />;
}

function Definition({ quantity }: { readonly quantity: Quantity }) {
  const { state, document } = useChain();
  const edit = useEdit();
  const locked = !useItemLock(quantity.id).allowed;
  const change = (part: Partial<Quantity>, field: string): EditOutcome =>
    edit(
      [{ kind: 'quantity', id: quantity.id, body: { ...quantity, ...part } }],
      `Changed ${field} of ${quantity.name}`,
      `quantity:${quantity.id}:${field}`,
    );
  const seal = () => document.seal();
  return (
    <Section title="Definition">
      <div className="grid grid-cols-2 gap-2">
        <TextField
          label="Symbol"
          value={quantity.symbol}
          disabled={locked}
          hint="k_w shows w below"
          onSettle={seal}
          onChange={(symbol) =>
            symbol === '' ? { ok: false, sentence: 'A quantity needs a symbol.' } : change({ symbol }, 'the symbol')
          }
        />
        <TextField
          label="Unit shown"
          mono
          value={quantity.unit}
          disabled={locked}
          onSettle={seal}
          onChange={(unit) => {
            const read = parseUnit(unit);
            return read.ok ? change({ unit }, 'the unit') : { ok: false, sentence: read.reason };
          }}
        />
      </div>
      <TextField
        label="Name"
        value={quantity.name}
        disabled={locked}
        onSettle={seal}
        onChange={(name) =>
          name === '' ? { ok: false, sentence: 'A quantity needs a name.' } : change({ name }, 'the name')
        }
      />
      <ChoiceField
        label="Operating point"
        value={quantity.operatingPointId}
        disabled={locked}
        options={state.model.operatingPoints.map((point) => ({
          value: point.id,
          words: point.name,
          group: point.scale,
        }))}
        onChange={(operatingPointId) => change({ operatingPointId }, 'the operating point')}
      />
      <Limit quantity={quantity} locked={locked} onChange={(limit) => change({ limit }, 'the acceptance limit')} />
      <ChoiceField
        label="Unsafe side"
        value={quantity.unsafeSide ?? ''}
        disabled={locked}
        options={[
          { value: '', words: 'not safety-critical' },
          { value: 'low', words: 'too low is unsafe' },
          { value: 'high', words: 'too high is unsafe' },
        ]}
        onChange={(side) => change({ unsafeSide: side === '' ? null : (side as 'low' | 'high') }, 'the unsafe side')}
      />
      <TextField
        label="Note"
        multiline
        value={quantity.note}
        disabled={locked}
        onSettle={seal}
        onChange={(note) => change({ note }, 'the note')}
      />
    </Section>
  );
}

function Limit({
  quantity,
  locked,
  onChange,
}: {
  readonly quantity: Quantity;
  readonly locked: boolean;
  readonly onChange: (limit: Quantity['limit']) => EditOutcome;
}) {
  const { document } = useChain();
  const [side, setSide] = useState<'at least' | 'at most'>(quantity.limit?.side ?? 'at least');
  const echo = quantity.limit
    ? `= ${quantity.limit.side} ${formatMeasured(quantity.limit.value, 0, quantity.unit).text}`
    : 'Empty: no limit';
  return (
    <div className="grid grid-cols-2 gap-2">
      <ChoiceField
        label="Acceptance limit"
        value={side}
        disabled={locked}
        options={[
          { value: 'at least', words: 'at least' },
          { value: 'at most', words: 'at most' },
        ]}
        onChange={(next) => {
          setSide(next as typeof side);
          return quantity.limit ? onChange({ ...quantity.limit, side: next as typeof side }) : { ok: true };
        }}
      />
      <TextField
        label={`Limit (${quantity.unit || '1'})`}
        mono
        value={quantity.limit?.text ?? ''}
        disabled={locked}
        hint={echo}
        onSettle={() => document.seal()}
        onChange={(text) => {
          if (text === '') return onChange(null);
          const read = parseQuantity(text, quantity.unit);
          return read.ok ? onChange({ side, value: read.value, text }) : { ok: false, sentence: read.reason };
        }}
      />
    </div>
  );
}
