import { useState } from 'react';
import { parseFormula } from '../../../shared/engine/formula/parse-formula.ts';
import { findMethod } from '../../../shared/engine/methods/catalogue.ts';
import type { MeasuredValue, Quantity, Route, RouteKind } from '../../../shared/engine/model/study-model.ts';
import { useChain, useEdit } from '../chain-context.ts';
import {
  bindingsFor,
  newBalance,
  newCorrelation,
  newHeatAnalogue,
  newStatedValue,
  newTestResult,
} from '../editing/new-items.ts';
import { routeKindWords } from '../origin.ts';
import { QuantityField } from '../QuantityField.tsx';
import { methodOptions } from './CorrelationFields.tsx';
import { ChoiceField, smallButton, TextField } from './fields.tsx';

/** Adds a way to estimate the quantity. What a route cannot be without is asked for here, the rest on its own panel. */
export function AddRoute({ quantity }: { readonly quantity: Quantity }) {
  const { state, newId, select } = useChain();
  const edit = useEdit();
  const [kind, setKind] = useState<RouteKind | null>(null);
  const [value, setValue] = useState<MeasuredValue | null>(null);
  const [methodId, setMethodId] = useState('');
  const [expression, setExpression] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const point = state.model.operatingPoints.find((one) => one.id === quantity.operatingPointId);
  const formula = parseFormula(expression);

  function add(route: Route): void {
    const outcome = edit([{ kind: 'route', id: route.id, body: route }], `Added ${route.name} to ${quantity.name}`);
    if (outcome.ok) {
      setKind(null);
      select(route.id);
    } else {
      setRefusal(outcome.sentence);
    }
  }

  function choose(next: RouteKind): void {
    setRefusal(null);
    if (next === 'heat-analogue') add(newHeatAnalogue(newId(), quantity.id, null));
    else if (next === 'test-result') add(newTestResult(newId(), quantity.id, state.model.tests.at(-1) ?? null));
    else setKind(kind === next ? null : next);
  }

  function submit(): void {
    const method = findMethod(methodId);
    if (kind === 'stated-value' && value) add(newStatedValue(newId(), quantity.id, value));
    if (kind === 'correlation' && method) add(newCorrelation(newId(), quantity.id, method));
    if (kind === 'balance' && formula.ok)
      add(newBalance(newId(), quantity.id, expression, bindingsFor(formula.formula.variables, {})));
  }

  const ready = kind === 'stated-value' ? value !== null : kind === 'correlation' ? methodId !== '' : formula.ok;
  return (
    <div className="grid gap-2">
      <fieldset className="flex flex-wrap gap-1.5">
        <legend className="pb-1 text-xs text-ink-2">Add a route</legend>
        {(Object.keys(routeKindWords) as RouteKind[]).map((one) => (
          <button
            key={one}
            type="button"
            className={smallButton}
            aria-pressed={kind === one}
            onClick={() => choose(one)}
          >
            + {routeKindWords[one]}
          </button>
        ))}
      </fieldset>
      {refusal && (
        <p role="alert" className="text-xs font-semibold text-bad">
          {refusal}
        </p>
      )}
      {kind !== null && (
        <form
          className="grid gap-2 border border-rule bg-surface p-3"
          onSubmit={(event) => {
            event.preventDefault();
            submit();
          }}
        >
          {kind === 'stated-value' && (
            <QuantityField
              label="Value"
              meaning={quantity.name}
              unit={quantity.unit}
              value={null}
              onChange={setValue}
              onHold={(text) => text && setValue(null)}
            />
          )}
          {kind === 'correlation' && (
            <ChoiceField
              label="Method"
              value={methodId}
              options={[{ value: '', words: 'Choose a method' }, ...methodOptions(point?.geometry.family)]}
              hint={findMethod(methodId)?.summary}
              onChange={(id) => {
                setMethodId(id);
                return { ok: true };
              }}
            />
          )}
          {kind === 'balance' && (
            <TextField
              label={`${quantity.symbol} =`}
              mono
              value={expression}
              hint="For instance V / (k * A). Each symbol gets its source next."
              onChange={(text) => {
                setExpression(text);
                const read = parseFormula(text);
                return read.ok ? { ok: true } : { ok: false, sentence: read.reason };
              }}
            />
          )}
          <span>
            <button type="submit" className={smallButton} disabled={!ready}>
              Add {routeKindWords[kind].toLowerCase()}
            </button>
          </span>
        </form>
      )}
    </div>
  );
}
