import type { Route, StudyModel } from '../../../shared/engine/model/study-model.ts';
import type { ItemEdit } from './chain-edits.ts';

export type Removal = {
  readonly edits: readonly ItemEdit[];
  /** What loses a link or its value, by name, for the question before and the notice after. */
  readonly dependants: readonly string[];
  readonly summary: string;
};

/** The route without its reference to the quantity; the same object where it had none. */
function withoutSource(route: Route, quantityId: string): Route {
  switch (route.kind) {
    case 'heat-analogue':
      return route.sourceQuantityId === quantityId ? { ...route, sourceQuantityId: null } : route;
    case 'correlation': {
      const kept = Object.entries(route.bindings).filter(
        ([, binding]) => !(binding.from === 'quantity' && binding.quantityId === quantityId),
      );
      return kept.length === Object.keys(route.bindings).length
        ? route
        : { ...route, bindings: Object.fromEntries(kept) };
    }
    case 'balance': {
      const fed = Object.values(route.bindings).some(
        (binding) => binding?.from === 'quantity' && binding.quantityId === quantityId,
      );
      if (!fed) return route;
      const bindings = Object.entries(route.bindings).map(([symbol, binding]) => [
        symbol,
        binding?.from === 'quantity' && binding.quantityId === quantityId ? null : binding,
      ]);
      return { ...route, bindings: Object.fromEntries(bindings) };
    }
    default:
      return route;
  }
}

/** Removes a quantity with its routes; routes of others that it fed keep everything but that link. */
export function removeQuantity(model: StudyModel, quantityId: string): Removal {
  const quantity = model.quantities.find((one) => one.id === quantityId);
  const own = model.routes.filter((route) => route.quantityId === quantityId);
  const freed = model.routes.flatMap((route) => {
    if (route.quantityId === quantityId) return [];
    const next = withoutSource(route, quantityId);
    return next === route ? [] : [next];
  });
  const nameOf = (id: string) => model.quantities.find((one) => one.id === id)?.name ?? 'a quantity';
  return {
    edits: [
      ...freed.map((route) => ({ kind: 'route' as const, id: route.id, body: route })),
      ...own.map((route) => ({ kind: 'route' as const, id: route.id, body: null })),
      { kind: 'quantity', id: quantityId, body: null },
    ],
    dependants: freed.map((route) => `${nameOf(route.quantityId)} (${route.name})`),
    summary: `Removed ${quantity?.name ?? 'a quantity'}`,
  };
}

/** Removes a route; the quantity that adopted it adopts nothing. */
export function removeRoute(model: StudyModel, routeId: string): Removal {
  const route = model.routes.find((one) => one.id === routeId);
  const quantity = model.quantities.find((one) => one.id === route?.quantityId);
  const adopted = quantity?.adoptedRouteId === routeId;
  return {
    edits: [
      ...(quantity && adopted
        ? [{ kind: 'quantity' as const, id: quantity.id, body: { ...quantity, adoptedRouteId: null } }]
        : []),
      { kind: 'route', id: routeId, body: null },
    ],
    dependants: quantity && adopted ? [`${quantity.name} (adopted this route)`] : [],
    summary: `Removed the route ${route?.name ?? ''} of ${quantity?.name ?? 'a quantity'}`,
  };
}

/** What stands at an operating point and so keeps it from being removed. */
export function usersOfPoint(model: StudyModel, pointId: string): readonly string[] {
  return [
    ...model.quantities.filter((quantity) => quantity.operatingPointId === pointId).map((quantity) => quantity.name),
    ...model.tests.filter((test) => test.operatingPointId === pointId).map((test) => test.name),
    ...model.routes
      .filter(
        (route) =>
          (route.kind === 'balance' || route.kind === 'correlation') &&
          Object.values(route.bindings).some(
            (binding) => binding?.from === 'point' && binding.operatingPointId === pointId,
          ),
      )
      .map((route) => route.name),
  ];
}
