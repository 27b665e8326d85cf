import { parseFormula } from '../../../shared/engine/formula/parse-formula.ts';
import { useChain } from '../chain-context.ts';
import { bindingsFor } from '../editing/new-items.ts';
import { BindingField } from './BindingField.tsx';
import { Formula } from './Formula.tsx';
import { TextField } from './fields.tsx';
import type { RouteFieldsProps } from './RouteFields.tsx';
import { useRouteEdit } from './use-route-edit.ts';

/** A balance: the formula with its live check, and where each symbol takes its value. */
export function BalanceFields({ route, locked }: RouteFieldsProps<'balance'>) {
  const { state, document } = useChain();
  const change = useRouteEdit(route);
  const quantity = state.model.quantities.find((one) => one.id === route.quantityId);
  const formula = parseFormula(route.expression);
  return (
    <>
      <TextField
        label={`${quantity?.symbol ?? 'Result'} =`}
        mono
        value={route.expression}
        disabled={locked}
        hint={formula.ok ? 'Dimensions are checked as soon as every symbol has its source.' : formula.reason}
        onSettle={() => document.seal()}
        onChange={(expression) => {
          const read = parseFormula(expression);
          if (!read.ok) return { ok: false, sentence: read.reason };
          return change({ expression, bindings: bindingsFor(read.formula.variables, route.bindings) }, 'the formula');
        }}
      />
      {formula.ok && <Formula result={quantity?.symbol ?? ''} text={route.expression} />}
      {Object.entries(route.bindings).map(([symbol, binding]) => (
        <BindingField
          key={symbol}
          label={`${symbol} is`}
          binding={binding}
          ownQuantityId={route.quantityId}
          emptyWords="Not linked yet"
          locked={locked}
          onChange={(next) => change({ bindings: { ...route.bindings, [symbol]: next } }, `what ${symbol} is`)}
        />
      ))}
    </>
  );
}
