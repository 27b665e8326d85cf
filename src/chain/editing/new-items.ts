import type {
  OperatingPoint,
  Quantity,
  Route,
  RouteKind,
  Scale,
  StudyModel,
} from '../../../shared/engine/model/study-model.ts';

export function newOperatingPoint(id: string, scale: Scale, model: StudyModel): OperatingPoint {
  const count = model.operatingPoints.filter((point) => point.scale === scale).length;
  const word = { bench: 'Bench', pilot: 'Pilot', plant: 'Plant' }[scale];
  return {
    id,
    name: count === 0 ? word : `${word} ${count + 1}`,
    scale,
    geometry: { family: 'tube', description: '', ratios: [] },
    fluid: '',
    entries: [],
  };
}

export function newQuantity(
  id: string,
  facts: { readonly symbol: string; readonly name: string; readonly unit: string; readonly operatingPointId: string },
): Quantity {
  return { id, ...facts, adoptedRouteId: null, limit: null, unsafeSide: null, note: '' };
}

type RouteOf<Kind extends RouteKind> = Extract<Route, { kind: Kind }>;
const base = { rationale: '', justifications: {} };

export function newStatedValue(id: string, quantityId: string, value: RouteOf<'stated-value'>['value']): Route {
  return { ...base, id, quantityId, name: 'Stated value', kind: 'stated-value', value, evidence: '' };
}

export function newTestResult(id: string, quantityId: string, test: { id: string; name: string } | null): Route {
  return {
    ...base,
    id,
    quantityId,
    name: test ? `Test ${test.name}` : 'Test result',
    kind: 'test-result',
    testId: test?.id ?? null,
  };
}

/** Exponents of the turbulent regime in pipes and over surfaces; the engineer corrects them where the flow differs. */
export function newHeatAnalogue(id: string, quantityId: string, sourceQuantityId: string | null): Route {
  return {
    ...base,
    id,
    quantityId,
    name: 'Heat analogue',
    kind: 'heat-analogue',
    sourceQuantityId,
    reynoldsExponent: { value: 0.8, u: 0.03 },
    schmidtExponent: { value: 0.3333, u: 0.02 },
    scatter: 0.05,
    extrapolationAllowance: null,
  };
}

export function newCorrelation(id: string, quantityId: string, method: { id: string; title: string }): Route {
  return {
    ...base,
    id,
    quantityId,
    name: method.title,
    kind: 'correlation',
    methodId: method.id,
    bindings: {},
    scatter: null,
    ownScatter: false,
    extrapolationAllowance: null,
  };
}

export function newBalance(
  id: string,
  quantityId: string,
  expression: string,
  bindings: RouteOf<'balance'>['bindings'],
): Route {
  return { ...base, id, quantityId, name: 'Balance', kind: 'balance', expression, bindings };
}

/** The bindings that a changed expression needs: kept where the symbol stays, open where it is new. */
export function bindingsFor(
  variables: readonly string[],
  before: RouteOf<'balance'>['bindings'],
): RouteOf<'balance'>['bindings'] {
  return Object.fromEntries(variables.map((variable) => [variable, before[variable] ?? null]));
}
