import { findMethod, methods } from '../../../shared/engine/methods/catalogue.ts';
import type { Method } from '../../../shared/engine/methods/method.ts';
import { plainNumber } from '../../charts/plain-number.ts';
import { useChain } from '../chain-context.ts';
import { BindingField } from './BindingField.tsx';
import { Formula } from './Formula.tsx';
import { ChoiceField, NumberField, type Option } from './fields.tsx';
import { AllowanceField, type RouteFieldsProps } from './RouteFields.tsx';
import { useRouteEdit } from './use-route-edit.ts';

/** How far the library's entry itself was checked, as it is. */
export const methodStatusWords: Record<Method['status'], string> = {
  'library-checked': 'checked against an independent implementation',
  analytic: 'follows from theory',
  'from memory': 'written down from memory; check it against its source before you rely on it',
};

export function windowWords(entry: Method['window'][number]): string {
  const range =
    entry.min !== null && entry.max !== null
      ? `${plainNumber(entry.min)} to ${plainNumber(entry.max)}`
      : entry.min !== null
        ? `at least ${plainNumber(entry.min)}`
        : entry.max !== null
          ? `at most ${plainNumber(entry.max)}`
          : 'any';
  return `${entry.group} ${range} (${entry.basis})`;
}

/** The methods of the library, those for the geometry at hand first. */
export function methodOptions(family: string | undefined): readonly Option[] {
  const fits = (method: Method) => family !== undefined && (method.family as readonly string[]).includes(family);
  return methods
    .filter((method) => method.kind === 'correlation')
    .map((method) => ({
      value: method.id,
      words: `${method.title} (${method.gives})`,
      group: fits(method) ? `For this geometry: ${family}` : 'For other geometries',
    }))
    .sort((a, b) => b.group.localeCompare(a.group) * -1);
}

export function CorrelationFields({ route, locked }: RouteFieldsProps<'correlation'>) {
  const { state, document } = useChain();
  const change = useRouteEdit(route);
  const quantity = state.model.quantities.find((one) => one.id === route.quantityId);
  const point = state.model.operatingPoints.find((one) => one.id === quantity?.operatingPointId);
  const method = findMethod(route.methodId);
  return (
    <>
      <ChoiceField
        label="Method"
        value={route.methodId}
        disabled={locked}
        options={[
          ...(method ? [] : [{ value: route.methodId, words: 'A method that is not in the library' }]),
          ...methodOptions(point?.geometry.family),
        ]}
        onChange={(methodId) =>
          change({ methodId, bindings: {}, name: findMethod(methodId)?.title ?? route.name }, 'the method')
        }
      />
      {method && (
        <>
          <Formula result={method.result.symbol} text={method.expression} />
          <dl className="grid grid-cols-[6rem_minmax(0,1fr)] gap-x-3 gap-y-1 text-xs">
            <dt className="text-ink-2">Window</dt>
            <dd>{method.window.length === 0 ? 'none stated' : method.window.map(windowWords).join('; ')}</dd>
            <dt className="text-ink-2">Length</dt>
            <dd>{method.length}</dd>
            <dt className="text-ink-2">Properties at</dt>
            <dd>{method.temperature}</dd>
            <dt className="text-ink-2">Scatter</dt>
            <dd>
              {plainNumber(method.scatter.relative * 100)} %, {method.scatter.reading}; {method.scatter.from}
            </dd>
            <dt className="text-ink-2">Source</dt>
            <dd>{method.source}</dd>
            {method.pitfalls.length > 0 && (
              <>
                <dt className="text-ink-2">Mind</dt>
                <dd>{method.pitfalls.join(' ')}</dd>
              </>
            )}
            <dt className="text-ink-2">Entry is</dt>
            <dd className={method.status === 'from memory' ? 'font-semibold text-warn' : ''}>
              {methodStatusWords[method.status]}
            </dd>
          </dl>
          {Object.entries(method.variables).map(([symbol, variable]) => (
            <BindingField
              key={symbol}
              label={`${symbol}, ${variable.meaning}`}
              binding={route.bindings[symbol] ?? null}
              ownQuantityId={route.quantityId}
              emptyWords={`From ${point?.name ?? 'the operating point'}`}
              locked={locked}
              onChange={(next) => {
                const { [symbol]: _, ...others } = route.bindings;
                return change(
                  { bindings: next === null ? others : { ...others, [symbol]: next } },
                  `what ${symbol} is`,
                );
              }}
            />
          ))}
          <NumberField
            label="Scatter, relative u"
            percent
            value={route.scatter}
            disabled={locked}
            emptyMeans={`the library's ${plainNumber(method.scatter.relative * 100)} %`}
            onSettle={() => document.seal()}
            onChange={(scatter) => change({ scatter }, 'the scatter')}
          />
          <ChoiceField
            label="Error of the method"
            value={route.ownScatter ? 'own' : 'shared'}
            disabled={locked}
            options={[
              { value: 'shared', words: 'the same in every route that uses this method' },
              { value: 'own', words: 'independent of other routes' },
            ]}
            onChange={(value) => change({ ownScatter: value === 'own' }, 'whether the error is shared')}
          />
          <AllowanceField route={route} locked={locked} />
        </>
      )}
    </>
  );
}
