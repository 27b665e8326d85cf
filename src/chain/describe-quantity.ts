import type { RouteStatus } from '../../shared/domain/route-lifecycle.ts';
import { routeInForce } from '../../shared/engine/evaluate/upstream.ts';
import type { StudyEvaluation } from '../../shared/engine/model/evaluation.ts';
import type { Quantity } from '../../shared/engine/model/study-model.ts';
import { formatMeasured } from '../../shared/engine/quantity/format-measured.ts';
import type { ChainState } from './editing/chain-document.ts';
import { routeKindWords } from './origin.ts';
import { verdictTag } from './verdict-words.ts';

export type ShownStatus = RouteStatus | 'basis changed';

export function routeStatus(state: ChainState, routeId: string): ShownStatus {
  const known = state.routeStates[routeId];
  if (!known) return 'draft';
  return known.status === 'approved' && known.basisChanged ? 'basis changed' : known.status;
}

/** The state of the route in force; null where there is none. */
export function quantityState(state: ChainState, quantity: Quantity): ShownStatus | null {
  const route = routeInForce(state.model, quantity.id);
  return route ? routeStatus(state, route.id) : null;
}

/** A quantity in one sentence, for names of nodes and for the live region. */
export function describeQuantity(state: ChainState, evaluation: StudyEvaluation, quantity: Quantity): string {
  const route = routeInForce(state.model, quantity.id);
  const result = evaluation.quantities[quantity.id]?.result ?? null;
  const point = state.model.operatingPoints.find((one) => one.id === quantity.operatingPointId);
  const value = result ? formatMeasured(result.value, result.u, quantity.unit).text : 'no value yet';
  const tag = route ? verdictTag(evaluation.routes[route.id]?.checks ?? []) : null;
  const parts = [
    `${quantity.name}, ${quantity.symbol}, ${value}`,
    route ? `by ${routeKindWords[route.kind].toLowerCase()}, ${routeStatus(state, route.id)}` : 'no route in force',
    ...(tag ? [tag.words] : []),
    `at ${point?.name ?? 'no operating point'}`,
  ];
  return `${parts.join('; ')}.`;
}
