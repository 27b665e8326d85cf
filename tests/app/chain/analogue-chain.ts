import type { Study } from '../../../shared/api/studies.ts';
import type { OperatingPoint, Quantity, Route, StudyModel } from '../../../shared/engine/model/study-model.ts';

/** A small chain: h in the rig feeds k in the plant, k and a stated area feed a time, and the area feeds k's check too. */
export const ids = {
  rig: '10000000-0000-4000-8000-000000000001',
  plant: '10000000-0000-4000-8000-000000000002',
  h: '20000000-0000-4000-8000-000000000001',
  k: '20000000-0000-4000-8000-000000000002',
  area: '20000000-0000-4000-8000-000000000003',
  time: '20000000-0000-4000-8000-000000000004',
  hRoute: '30000000-0000-4000-8000-000000000001',
  kRoute: '30000000-0000-4000-8000-000000000002',
  areaRoute: '30000000-0000-4000-8000-000000000003',
  timeRoute: '30000000-0000-4000-8000-000000000004',
} as const;

function point(id: string, name: string, scale: OperatingPoint['scale']): OperatingPoint {
  return { id, name, scale, geometry: { family: 'tube', description: '', ratios: [] }, fluid: 'water', entries: [] };
}

function quantity(id: string, symbol: string, name: string, unit: string, operatingPointId: string): Quantity {
  return { id, symbol, name, unit, operatingPointId, adoptedRouteId: null, limit: null, unsafeSide: null, note: '' };
}

const base = { rationale: '', justifications: {} };
function stated(id: string, quantityId: string, value: number, unit: string): Route {
  return {
    ...base,
    id,
    quantityId,
    name: 'Stated value',
    kind: 'stated-value',
    evidence: '',
    value: {
      text: String(value),
      value,
      unit,
      uncertaintyText: '2 %',
      uncertainty: { form: 'relative', fraction: 0.02 },
    },
  };
}

export const analogueChain: StudyModel = {
  format: 'stemma-study',
  version: 1,
  operatingPoints: [point(ids.rig, 'Rig', 'bench'), point(ids.plant, 'Plant tube', 'plant')],
  quantities: [
    quantity(ids.time, 't', 'Time to dissolve', 'h', ids.plant),
    quantity(ids.k, 'k_w', 'Wall mass-transfer coefficient', 'm/s', ids.plant),
    quantity(ids.area, 'A', 'Coated area', 'm²', ids.plant),
    quantity(ids.h, 'h', 'Heat-transfer coefficient', 'W/(m² K)', ids.rig),
  ],
  routes: [
    stated(ids.hRoute, ids.h, 5420, 'W/(m² K)'),
    {
      ...base,
      id: ids.kRoute,
      quantityId: ids.k,
      name: 'Heat analogue',
      kind: 'heat-analogue',
      sourceQuantityId: ids.h,
      reynoldsExponent: { value: 0.8, u: 0.03 },
      schmidtExponent: { value: 0.3333, u: 0.02 },
      scatter: 0.05,
      extrapolationAllowance: null,
    },
    stated(ids.areaRoute, ids.area, 12, 'm²'),
    {
      ...base,
      id: ids.timeRoute,
      quantityId: ids.time,
      name: 'Balance',
      kind: 'balance',
      expression: 'A / (k * h)',
      bindings: {
        A: { from: 'quantity', quantityId: ids.area },
        k: { from: 'quantity', quantityId: ids.k },
        h: { from: 'quantity', quantityId: ids.h },
      },
    },
  ],
  tests: [],
  inputCorrelations: [],
};

export function studyOf(model: StudyModel, revision = 7): Study {
  const items = [...model.operatingPoints, ...model.quantities, ...model.routes, ...model.tests];
  return {
    id: '40000000-0000-4000-8000-000000000001',
    title: 'Wall-coated tube',
    question: '',
    revision,
    model,
    itemRevisions: Object.fromEntries(items.map((item) => [item.id, 1])),
    routeStates: Object.fromEntries(
      model.routes.map((route) => [
        route.id,
        { status: 'draft' as const, revision: 1, submissionId: null, basisChanged: false },
      ]),
    ),
    layout: {},
    members: [],
    submissions: [],
  };
}
