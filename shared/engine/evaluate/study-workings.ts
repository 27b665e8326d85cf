import { findMethod } from '../methods/catalogue.ts';
import type { Quantity, Route, StudyModel } from '../model/study-model.ts';
import { parseUnit } from '../quantity/parse-unit.ts';
import { standardUncertainty } from '../quantity/standard-uncertainty.ts';
import { type ReducedTest, reduceSteadyHeating } from '../reductions/steady-heating.ts';
import { followBalance } from './follow-balance.ts';
import { followCorrelation } from './follow-correlation.ts';
import {
  analogyMethodId,
  followHeatAnalogue,
  hasDimensionOf,
  heatTransferCoefficientUnit,
  massTransferCoefficientUnit,
} from './follow-heat-analogue.ts';
import { groupBy } from './group-by.ts';
import { OperatingPointReadings } from './operating-point-readings.ts';
import { type Answer, SensitivityGraph, type Term } from './sensitivity-graph.ts';
import { noValue, type RouteAnswer, type RouteOf, type Workings } from './workings.ts';

export type StudyWorkings = Workings & {
  readonly routeAnswer: (route: Route) => RouteAnswer;
  readonly routeInForce: (quantityId: string) => Route | null;
  readonly routesOf: (quantityId: string) => readonly Route[];
};

/** Sets a study up so that each of its numbers is computed when it is first asked for, and once. */
export function openStudy(model: StudyModel): StudyWorkings {
  const graph = new SensitivityGraph();
  const quantities = new Map(model.quantities.map((quantity) => [quantity.id, quantity]));
  const routesByQuantity = groupBy(model.routes, (route) => route.quantityId);
  const tests = new Map(model.tests.map((test) => [test.id, test]));
  const routeAnswers = new Map<string, RouteAnswer>();
  const reducedTests = new Map<string, ReducedTest>();
  const visiting = new Set<string>();
  const largestScatter = largestScatterByMethod(model);

  const points = new OperatingPointReadings(graph, model, (testId) => {
    const reduced = test(testId);
    return reduced?.velocity ?? { ok: false, reasons: ['The test is not in the study.'] };
  });

  function test(testId: string): ReducedTest | null {
    const known = reducedTests.get(testId);
    if (known) return known;
    const found = tests.get(testId);
    if (!found) return null;
    const reduced = reduceSteadyHeating(graph, found, () => points.read(found.operatingPointId, 'L'));
    reducedTests.set(testId, reduced);
    return reduced;
  }

  function routesOf(quantityId: string): readonly Route[] {
    return routesByQuantity.get(quantityId) ?? [];
  }

  function routeInForce(quantityId: string): Route | null {
    const routes = routesOf(quantityId);
    const adopted = quantities.get(quantityId)?.adoptedRouteId;
    if (adopted) return routes.find((route) => route.id === adopted) ?? null;
    return routes.length === 1 ? (routes[0] ?? null) : null;
  }

  function quantityValue(quantityId: string): Answer {
    const name = quantities.get(quantityId)?.name;
    if (name === undefined) return { ok: false, reasons: ['A quantity that is read is not in the study.'] };
    const route = routeInForce(quantityId);
    if (!route) {
      const reason =
        routesOf(quantityId).length === 0
          ? `“${name}” has no route yet.`
          : `None of the routes of “${name}” is adopted.`;
      return { ok: false, reasons: [reason] };
    }
    const { answer } = routeAnswer(route);
    // Why it has none is said once, at the route where it happens.
    return answer.ok ? answer : { ok: false, reasons: [`“${name}” has no value.`] };
  }

  function routeAnswer(route: Route): RouteAnswer {
    const known = routeAnswers.get(route.id);
    if (known) return known;
    if (visiting.has(route.id)) return noValue(`“${route.name}” rests on itself.`);
    visiting.add(route.id);
    const answer = follow(route);
    visiting.delete(route.id);
    routeAnswers.set(route.id, answer);
    return answer;
  }

  function follow(route: Route): RouteAnswer {
    const quantity = quantities.get(route.quantityId);
    switch (route.kind) {
      case 'stated-value':
        return { answer: { ok: true, term: statedTerm(graph, route, quantity) }, steps: [] };
      case 'test-result':
        return followTest(workings, route, quantity);
      case 'heat-analogue':
        return followHeatAnalogue(workings, route);
      case 'correlation':
        return followCorrelation(workings, route);
      case 'balance':
        return followBalance(workings, route);
    }
  }

  function scatterFactor(route: RouteOf<'heat-analogue' | 'correlation'>): Term {
    const methodId = route.kind === 'correlation' ? route.methodId : analogyMethodId;
    const title = findMethod(methodId)?.title ?? methodId;
    const scatter = scatterOf(route);
    if (route.kind === 'correlation' && route.ownScatter) {
      return graph.input(1, {
        id: `route:${route.id}:scatter`,
        label: `scatter of ${title} in “${route.name}”`,
        u: scatter,
        degreesOfFreedom: null,
      });
    }
    // One error for all its routes; a route that states a smaller scatter feels the smaller part of it.
    const largest = largestScatter.get(methodId) ?? scatter;
    const shared = graph.input(0, {
      id: `method:${methodId}`,
      label: `scatter of ${title}`,
      u: largest,
      degreesOfFreedom: null,
    });
    return graph.combine(1, [{ term: shared, by: largest > 0 ? scatter / largest : 0 }]);
  }

  const workings: StudyWorkings = {
    model,
    graph,
    points,
    quantity: (id) => quantities.get(id),
    quantityValue,
    test,
    scatterFactor,
    routeAnswer,
    routeInForce,
    routesOf,
  };
  return workings;
}

function scatterOf(route: RouteOf<'heat-analogue' | 'correlation'>): number {
  if (route.kind === 'heat-analogue' || route.scatter !== null) return route.scatter ?? 0;
  return findMethod(route.methodId)?.scatter.relative ?? 0;
}

function largestScatterByMethod(model: StudyModel): Map<string, number> {
  const largest = new Map<string, number>();
  for (const route of model.routes) {
    if (route.kind !== 'heat-analogue' && (route.kind !== 'correlation' || route.ownScatter)) continue;
    const methodId = route.kind === 'correlation' ? route.methodId : analogyMethodId;
    largest.set(methodId, Math.max(largest.get(methodId) ?? 0, scatterOf(route)));
  }
  return largest;
}

function statedTerm(graph: SensitivityGraph, route: RouteOf<'stated-value'>, quantity: Quantity | undefined): Term {
  return graph.input(route.value.value, {
    id: `route:${route.id}`,
    label: quantity ? `${quantity.name} (${quantity.symbol}), stated` : `“${route.name}”, stated`,
    u: standardUncertainty(route.value.uncertainty, route.value.value),
    degreesOfFreedom: null,
  });
}

/** The heat-transfer coefficient or the velocity of a test, by the unit of the quantity. */
function followTest(workings: Workings, route: RouteOf<'test-result'>, quantity: Quantity | undefined): RouteAnswer {
  if (!quantity) return noValue(`The route “${route.name}” leads to a quantity that is not in the study.`);
  if (route.testId === null) return noValue(`No test is chosen for “${route.name}” yet.`);
  const reduced = workings.test(route.testId);
  if (!reduced) return noValue(`The test of “${route.name}” is not in the study.`);
  if (hasDimensionOf(quantity.unit, heatTransferCoefficientUnit)) {
    return { answer: reduced.heatTransferCoefficient, steps: [] };
  }
  if (hasDimensionOf(quantity.unit, massTransferCoefficientUnit)) return { answer: reduced.velocity, steps: [] };
  const unit = parseUnit(quantity.unit).ok ? quantity.unit || '1' : 'a unit that cannot be read';
  return noValue(
    `A steady heating test gives a heat-transfer coefficient in W/(m² K) and a velocity in m/s, but “${quantity.name}” ` +
      `is in ${unit}.`,
  );
}
