import type { Route, StudyModel } from '../model/study-model.ts';
import { linkedQuantities } from './chain-links.ts';

/** What a quantity rests on; the quantity itself included. */
export type Upstream = {
  readonly quantityIds: string[];
  /** The adopted route of each quantity, or its only one. */
  readonly routeIds: string[];
  readonly operatingPointIds: string[];
  readonly testIds: string[];
};

/** The route that a quantity's value comes from: the adopted one, or the only one; else null. */
export function routeInForce(model: StudyModel, quantityId: string): Route | null {
  const quantity = model.quantities.find((one) => one.id === quantityId);
  const routes = model.routes.filter((route) => route.quantityId === quantityId);
  if (quantity?.adoptedRouteId) return routes.find((route) => route.id === quantity.adoptedRouteId) ?? null;
  return routes.length === 1 ? (routes[0] ?? null) : null;
}

/** Everything that the value of a quantity rests on, through the routes in force. Ends on a loop as well. */
export function upstreamOf(model: StudyModel, quantityId: string): Upstream {
  const quantityIds = new Set<string>();
  const routeIds = new Set<string>();
  const operatingPointIds = new Set<string>();
  const testIds = new Set<string>();

  function addPoint(id: string): void {
    const point = model.operatingPoints.find((one) => one.id === id);
    if (!point || operatingPointIds.has(id)) return;
    operatingPointIds.add(id);
    for (const entry of point.entries) if (entry.source.from === 'test') addTest(entry.source.testId);
  }

  function addTest(id: string): void {
    const test = model.tests.find((one) => one.id === id);
    if (!test || testIds.has(id)) return;
    testIds.add(id);
    addPoint(test.operatingPointId);
  }

  const waiting = [quantityId];
  for (let id = waiting.pop(); id !== undefined; id = waiting.pop()) {
    const quantity = model.quantities.find((one) => one.id === id);
    if (!quantity || quantityIds.has(id)) continue;
    quantityIds.add(id);
    addPoint(quantity.operatingPointId);
    const route = routeInForce(model, id);
    if (!route) continue;
    routeIds.add(route.id);
    waiting.push(...linkedQuantities(route).map((link) => link.quantityId));
    if (route.kind === 'test-result' && route.testId) addTest(route.testId);
    if (route.kind === 'correlation' || route.kind === 'balance') {
      for (const binding of Object.values(route.bindings)) {
        if (binding?.from === 'point') addPoint(binding.operatingPointId);
      }
    }
  }
  return {
    quantityIds: [...quantityIds],
    routeIds: [...routeIds],
    operatingPointIds: [...operatingPointIds],
    testIds: [...testIds],
  };
}

/** The study restricted to what a quantity rests on; correlations stay where both their inputs do. */
export function sliceModel(model: StudyModel, quantityId: string): StudyModel {
  const upstream = upstreamOf(model, quantityId);
  const keep = (ids: readonly string[]) => {
    const kept = new Set(ids);
    return (one: { readonly id: string }) => kept.has(one.id);
  };
  const routes = model.routes.filter(keep(upstream.routeIds));
  const owners = new Set([
    ...upstream.operatingPointIds.map((id) => `point:${id}`),
    ...upstream.routeIds.map((id) => `route:${id}`),
    ...upstream.testIds.map((id) => `test:${id}`),
    ...routes.flatMap((route) => (route.kind === 'correlation' ? [`method:${route.methodId}`] : [])),
    ...(routes.some((route) => route.kind === 'heat-analogue') ? ['method:chilton-colburn'] : []),
  ]);
  const ownerOf = (inputId: string) => inputId.split(':', 2).join(':');
  return {
    ...model,
    operatingPoints: model.operatingPoints.filter(keep(upstream.operatingPointIds)),
    quantities: model.quantities.filter(keep(upstream.quantityIds)),
    routes,
    tests: model.tests.filter(keep(upstream.testIds)),
    inputCorrelations: model.inputCorrelations.filter(
      (correlation) => owners.has(ownerOf(correlation.a)) && owners.has(ownerOf(correlation.b)),
    ),
  };
}
