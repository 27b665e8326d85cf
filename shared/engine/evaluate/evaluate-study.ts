import { engineVersion } from '../engine-version.ts';
import { findMethod } from '../methods/catalogue.ts';
import type { Method } from '../methods/method.ts';
import type { Finding, MatchCheck, MeasuredResult, RouteResult, StudyEvaluation } from '../model/evaluation.ts';
import type { Route, StudyModel } from '../model/study-model.ts';
import { assumptionsOf } from './assumptions.ts';
import { type Covariance, gatherCovariances } from './covariance.ts';
import { findCycle } from './find-cycle.ts';
import { analogyMethodId } from './follow-heat-analogue.ts';
import { checkCorrelation, checkHeatAnalogue, type ExpandedOf } from './match-checks.ts';
import { measuredResult, standardUncertaintyOf, varianceOf } from './measured-result.ts';
import { routeFindings } from './route-findings.ts';
import type { Answer } from './sensitivity-graph.ts';
import { pointFindings, quantityFindings, testFindings } from './study-findings.ts';
import { openStudy, type StudyWorkings } from './study-workings.ts';

/**
 * Evaluates a study to first order (JCGM 100:2008): every route, quantity, operating point and test with value and
 * standard uncertainty in coherent SI, their budgets, match checks and assumptions, and what stands in the way.
 *
 * Never throws on a model that its schema accepts: whatever a person can cause comes back as a finding.
 */
export function evaluateStudy(model: StudyModel): StudyEvaluation {
  const study = openStudy(model);
  // Every input must be known before the covariances are gathered, so everything is read once here.
  const answers = new Map(model.routes.map((route) => [route.id, study.routeAnswer(route)]));
  for (const test of model.tests) study.test(test.id);
  const readings = new Map(model.operatingPoints.map((point) => [point.id, study.points.all(point.id)]));

  const { covariances, findings } = gatherCovariances(study.graph, model);
  const { inputs } = study.graph;
  const resultOf = (answer: Answer): MeasuredResult | null =>
    answer.ok ? measuredResult(answer.term, inputs, covariances) : null;
  const expandedOf: ExpandedOf = (term) => 2 * standardUncertaintyOf(term, inputs, covariances);

  const routes: Record<string, RouteResult> = {};
  const methodVersions: Record<string, number> = {};
  for (const route of model.routes) {
    const method = methodOf(route);
    if (method) methodVersions[method.id] = method.version;
    const { answer, steps } = answers.get(route.id) ?? study.routeAnswer(route);
    const checks = checksOf(study, route, method, expandedOf);
    const evaluated = {
      result: resultOf(answer),
      steps: steps.map(({ symbol, meaning, unit, term }) => ({
        symbol,
        meaning,
        unit,
        value: term.value,
        u: standardUncertaintyOf(term, inputs, covariances),
      })),
      checks,
      assumptions: assumptionsOf(route, method, checks),
    };
    routes[route.id] = { routeId: route.id, quantityId: route.quantityId, ...evaluated };
    findings.push(...routeFindings(route, answer, evaluated));
  }
  findings.push(...loopFinding(model), ...quantityFindings(study), ...pointFindings(study), ...testFindings(study));

  return {
    engineVersion,
    quantities: Object.fromEntries(
      model.quantities.map((quantity) => {
        const route = study.routeInForce(quantity.id);
        return [quantity.id, { routeId: route?.id ?? null, result: route ? (routes[route.id]?.result ?? null) : null }];
      }),
    ),
    routes,
    points: Object.fromEntries(
      [...readings].map(([id, found]) => [
        id,
        found.map(({ key, term, origin }) => ({
          key,
          value: term.value,
          u: standardUncertaintyOf(term, inputs, covariances),
          origin,
        })),
      ]),
    ),
    tests: Object.fromEntries(model.tests.map((test) => [test.id, testResult(study, test.id, covariances)])),
    findings: sortedBySeverity(findings),
    methodVersions,
  };
}

function methodOf(route: Route): Method | undefined {
  if (route.kind === 'heat-analogue') return findMethod(analogyMethodId);
  return route.kind === 'correlation' ? findMethod(route.methodId) : undefined;
}

function checksOf(
  study: StudyWorkings,
  route: Route,
  method: Method | undefined,
  expandedOf: ExpandedOf,
): MatchCheck[] {
  if (route.kind === 'heat-analogue') return checkHeatAnalogue(study, route, expandedOf);
  return route.kind === 'correlation' && method ? checkCorrelation(study, route, method, expandedOf) : [];
}

function testResult(
  study: StudyWorkings,
  testId: string,
  covariances: readonly Covariance[],
): StudyEvaluation['tests'][string] {
  const { inputs } = study.graph;
  const reduced = study.test(testId);
  const resultOf = (answer: Answer | undefined) =>
    answer?.ok ? measuredResult(answer.term, inputs, covariances) : null;
  const coefficient = reduced?.heatTransferCoefficient;
  const part = (isScatter: boolean) =>
    coefficient?.ok
      ? Math.sqrt(
          varianceOf(coefficient.term, inputs, covariances, (input) => (input.degreesOfFreedom !== null) === isScatter),
        )
      : null;
  return {
    heatTransferCoefficient: resultOf(coefficient),
    velocity: resultOf(reduced?.velocity),
    typeA: part(true),
    typeB: part(false),
  };
}

function loopFinding(model: StudyModel): Finding[] {
  const loop = findCycle(model);
  if (!loop) return [];
  const path = [...loop, loop[0] ?? ''].map((name) => `“${name}”`).join(' → ');
  const sentence = `These quantities rest on each other in a loop and have no value: ${path}. Remove one of the links.`;
  return [{ code: 'loop', severity: 'stops', subject: { kind: 'study', id: 'study' }, sentence }];
}

const severities: readonly Finding['severity'][] = ['stops', 'warns', 'tells'];

function sortedBySeverity(findings: readonly Finding[]): Finding[] {
  return findings.toSorted((one, other) => severities.indexOf(one.severity) - severities.indexOf(other.severity));
}
