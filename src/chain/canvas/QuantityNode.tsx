import { Handle, type Node, type NodeProps, Position, useStore } from 'reactflow';
import { routeInForce } from '../../../shared/engine/evaluate/upstream.ts';
import type { Quantity, Route } from '../../../shared/engine/model/study-model.ts';
import { typesetUnit } from '../../../shared/engine/quantity/format-measured.ts';
import { fromSi, parseUnit } from '../../../shared/engine/quantity/parse-unit.ts';
import { VerdictMark } from '../../charts/LogWindow.tsx';
import { plainNumber } from '../../charts/plain-number.ts';
import { Measured } from '../../ui/Measured.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain } from '../chain-context.ts';
import { describeQuantity, quantityState } from '../describe-quantity.ts';
import { originLines, originOf, routeKindWords } from '../origin.ts';
import { verdictTag } from '../verdict-words.ts';
import { outletY, portHeight, portsTop, portY } from './chain-graph.ts';
import { UncertaintyRule } from './Uncertainty.tsx';

export type QuantityNodeData = {
  readonly quantity: Quantity;
  readonly position: string;
  readonly isTabStop: boolean;
  readonly isSelected: boolean;
  readonly onFocus: (id: string) => void;
};
export type QuantityFlowNode = Node<QuantityNodeData, 'quantity'>;

type Detail = 'full' | 'card' | 'dot';

function useDetail(): Detail {
  const full = useStore((store) => store.transform[2] >= 0.7);
  const card = useStore((store) => store.transform[2] >= 0.4);
  return full ? 'full' : card ? 'card' : 'dot';
}

function LineStub({ route }: { readonly route: Route | null }) {
  const line = originLines[originOf(route)];
  return (
    <svg className="absolute inset-y-0 left-0 h-full w-3 border-r border-hair" aria-hidden="true">
      <line
        x1="6"
        x2="6"
        y1="0"
        y2="100%"
        stroke="var(--ink)"
        strokeWidth={line.width * 1.6}
        strokeDasharray={line.dash}
      />
    </svg>
  );
}

function Port({
  route,
  index,
  inForce,
  detail,
}: {
  readonly route: Route;
  readonly index: number;
  readonly inForce: boolean;
  readonly detail: Detail;
}) {
  const { evaluation } = useChain();
  const tag = verdictTag(evaluation.routes[route.id]?.checks ?? []);
  return (
    <div
      className={`absolute inset-x-0 flex items-center gap-1.5 border-t border-hair pr-2 pl-5 text-2xs ${inForce ? 'font-bold' : 'text-ink-2'}`}
      style={{ top: portsTop + index * portHeight, height: portHeight }}
    >
      {detail === 'full' && (
        <>
          <span className="min-w-0 flex-1 truncate">
            {route.name}
            {inForce && <span className="sr-only"> (in force)</span>}
          </span>
          {tag && <VerdictMark verdict={tag.verdict} words={tag.short} />}
        </>
      )}
      {detail === 'card' && (
        <>
          <span className="min-w-0 flex-1 truncate text-base">{routeKindWords[route.kind]}</span>
          {tag && tag.verdict !== 'inside' && (
            <span className="scale-125">
              <VerdictMark verdict={tag.verdict} words="" />
            </span>
          )}
        </>
      )}
    </div>
  );
}

/** From afar: the value to three digits in large type. */
function CardValue({
  quantity,
  result,
}: {
  readonly quantity: Quantity;
  readonly result: { readonly value: number; readonly u: number } | null;
}) {
  const unit = parseUnit(quantity.unit);
  if (!result || !unit.ok) return <span className="pt-1.5 text-lg text-ink-2">no value yet</span>;
  return (
    <span className="num truncate pt-1.5 text-[1.25rem]">
      <b>{plainNumber(fromSi(result.value, unit.unit))}</b> {typesetUnit(quantity.unit)}
    </span>
  );
}

/** A quantity on the sheet: what it is, its value ± U, its state, where it comes from, and a port for each route. */
export function QuantityNode({ id, data }: NodeProps<QuantityFlowNode>) {
  const { state, evaluation } = useChain();
  const detail = useDetail();
  const { quantity } = data;
  const routes = state.model.routes.filter((route) => route.quantityId === id);
  const inForce = routeInForce(state.model, id);
  const result = evaluation.quantities[id]?.result ?? null;
  const status = quantityState(state, quantity);
  return (
    // biome-ignore lint/a11y/useSemanticElements: a fieldset cannot stand for a node of a graph
    <div
      className="chain-node relative h-full w-full cursor-pointer text-left"
      role="group"
      aria-roledescription="quantity"
      aria-label={`${describeQuantity(state, evaluation, quantity)} ${data.position}`}
      tabIndex={data.isTabStop ? 0 : -1}
      data-quantity={id}
      data-state={status ?? 'draft'}
      data-selected={data.isSelected}
      onFocus={() => data.onFocus(id)}
    >
      {data.isSelected && <span className="chain-crop" />}
      <LineStub route={inForce} />
      <div className="absolute inset-x-0 top-0 flex flex-col pt-1.5 pr-2.5 pl-5" style={{ height: portsTop }}>
        {detail === 'full' && (
          <>
            <span className="flex justify-between gap-2 text-2xs text-ink-2">
              <span className="truncate">
                {state.model.operatingPoints.find((point) => point.id === quantity.operatingPointId)?.name}
              </span>
              <span className="whitespace-nowrap">
                {inForce ? routeKindWords[inForce.kind] : routes.length > 1 ? 'none adopted' : 'no route'}
              </span>
            </span>
            <span className="shrink-0 truncate text-sm leading-tight font-semibold">{quantity.name}</span>
            <span className="flex flex-wrap items-baseline gap-x-1 pt-1 text-xs">
              <span className="text-lg leading-none">
                <Symbol_ symbol={quantity.symbol} />
              </span>
              {result ? (
                <Measured value={result.value} u={result.u} unit={quantity.unit} />
              ) : (
                <span className="text-ink-2">no value yet</span>
              )}
            </span>
            <span className="mt-auto flex items-center justify-between gap-2 pb-1.5 text-xs">
              {result ? <UncertaintyRule value={result.value} u={result.u} /> : <span />}
              {status && <StatusMark status={status} />}
            </span>
          </>
        )}
        {detail !== 'full' && (
          <>
            <span className={`truncate leading-none ${detail === 'dot' ? 'pt-4 text-6xl' : 'pt-1 text-3xl'}`}>
              <Symbol_ symbol={quantity.symbol} />
            </span>
            {detail === 'card' && <CardValue quantity={quantity} result={result} />}
            <span className={`mt-auto self-end pb-1.5 ${detail === 'dot' ? 'text-4xl' : 'text-lg'}`}>
              {status && <StatusMark status={status} />}
            </span>
          </>
        )}
      </div>
      {routes.map((route, index) => (
        <Port key={route.id} route={route} index={index} inForce={route.id === inForce?.id} detail={detail} />
      ))}
      {routes.length === 0 && detail === 'full' && (
        <div
          className="absolute inset-x-0 border-t border-hair py-1 pl-5 text-2xs text-ink-2"
          style={{ top: portsTop }}
        >
          Link something here, or add a route
        </div>
      )}
      {routes.map((route, index) => (
        <Handle
          key={route.id}
          type="target"
          position={Position.Left}
          id={route.id}
          className={route.id === inForce?.id ? 'is-adopted' : ''}
          style={{ top: portY(index) }}
          title={`Feed ${route.name}`}
        />
      ))}
      <Handle
        type="target"
        position={Position.Left}
        id="new"
        style={{ top: outletY }}
        title={`Feed ${quantity.name}`}
      />
      <Handle
        type="source"
        position={Position.Right}
        id="out"
        className="is-outlet"
        style={{ top: outletY }}
        title={`${quantity.name} feeds …`}
      />
    </div>
  );
}
