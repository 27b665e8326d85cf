import type {
  Binding,
  OperatingPoint,
  PointVariableKey,
  Quantity,
  Route,
  StudyModel,
  Test,
  Uncertainty,
} from '../../../shared/engine/model/study-model.ts';

type Entry = number | { readonly value: number; readonly u: number } | { readonly testId: string };
type RouteRest<Kind extends Route['kind']> = Partial<Extract<Route, { kind: Kind }>>;

/** Builds valid study models in a few lines; a test names only what matters to it. */
export class ChainBuilder {
  readonly model: StudyModel = {
    format: 'stemma-study',
    version: 1,
    operatingPoints: [],
    quantities: [],
    routes: [],
    tests: [],
    inputCorrelations: [],
  };
  #count = 0;

  id(): string {
    this.#count += 1;
    return `00000000-0000-4000-8000-${String(this.#count).padStart(12, '0')}`;
  }

  point(
    name: string,
    entries: Partial<Record<PointVariableKey, Entry>> = {},
    rest: Partial<OperatingPoint> = {},
  ): OperatingPoint {
    const point: OperatingPoint = {
      id: this.id(),
      name,
      scale: 'bench',
      geometry: { family: 'tube', description: '', ratios: [] },
      fluid: 'water',
      entries: Object.entries(entries).map(([key, entry]) => ({
        key: key as PointVariableKey,
        source:
          typeof entry === 'object' && 'testId' in entry
            ? { from: 'test', testId: entry.testId }
            : {
                from: 'entered',
                value: typeof entry === 'number' ? measured(entry, 0) : measured(entry.value, entry.u),
              },
      })),
      ...rest,
    };
    this.model.operatingPoints.push(point);
    return point;
  }

  quantity(symbol: string, unit = '1', point?: OperatingPoint): Quantity {
    const quantity: Quantity = {
      id: this.id(),
      symbol,
      name: symbol,
      unit,
      operatingPointId: (point ?? this.model.operatingPoints[0] ?? this.point('Rig')).id,
      adoptedRouteId: null,
      limit: null,
      unsafeSide: null,
      note: '',
    };
    this.model.quantities.push(quantity);
    return quantity;
  }

  /** A quantity with a stated value; answers with its input id as well. */
  stated(symbol: string, value: number, u: number, unit = '1'): Quantity & { inputId: string } {
    const quantity = this.quantity(symbol, unit);
    const route = this.route('stated-value', quantity, { value: measured(value, u, unit), evidence: 'data sheet' });
    return { ...quantity, inputId: `route:${route.id}` };
  }

  balance(symbol: string, expression: string, variables: readonly Quantity[], unit = '1'): Quantity {
    const quantity = this.quantity(symbol, unit);
    this.route('balance', quantity, {
      expression,
      bindings: Object.fromEntries(variables.map((one) => [one.symbol, readOf(one)])),
    });
    return quantity;
  }

  route<Kind extends Route['kind']>(kind: Kind, quantity: Quantity, rest: RouteRest<Kind> = {}): Route {
    const base = {
      id: this.id(),
      quantityId: quantity.id,
      name: `${quantity.symbol} by ${kind}`,
      rationale: '',
      justifications: {},
    };
    const complete: Record<Route['kind'], object> = {
      'stated-value': { value: measured(1, 0), evidence: 'data sheet' },
      'test-result': { testId: null },
      'heat-analogue': {
        sourceQuantityId: null,
        reynoldsExponent: { value: 0.6, u: 0 },
        schmidtExponent: { value: 1 / 3, u: 0 },
        scatter: 0.1,
        extrapolationAllowance: null,
      },
      correlation: { methodId: '', bindings: {}, scatter: null, ownScatter: false, extrapolationAllowance: null },
      balance: { expression: '', bindings: {} },
    };
    const route = { ...base, kind, ...complete[kind], ...rest } as Route;
    this.model.routes.push(route);
    return route;
  }

  test(point: OperatingPoint, rest: Partial<Test['reduction']> = {}): Test {
    const exact: Uncertainty = { form: 'exact' };
    const test: Test = {
      id: this.id(),
      name: 'Rig run 3',
      operatingPointId: point.id,
      performedOn: null,
      reduction: {
        kind: 'steady-heating',
        summary: { count: 10, means: [186, 309.55, 298.25, 0.45], covarianceOfMeans: diagonal([0, 0, 0, 0]) },
        instruments: { power: exact, wallTemperature: exact, bulkTemperature: exact, flow: exact },
        flowIs: 'velocity',
        heatLoss: measured(4.2, 0),
        surface: { shape: 'cylinder', length: measured(0.1, 0) },
        ...rest,
      },
      file: { id: this.id(), name: 'run-3.csv', sha256: '0'.repeat(64), bytes: 100 },
    };
    this.model.tests.push(test);
    return test;
  }

  correlate(a: string, b: string, r: number): void {
    this.model.inputCorrelations.push({ id: this.id(), a, b, r, reason: 'same reference' });
  }
}

export function measured(value: number, u: number, unit = '1') {
  const uncertainty: Uncertainty = u === 0 ? { form: 'exact' } : { form: 'standard', u };
  return { text: String(value), value, unit, uncertaintyText: String(u), uncertainty };
}

export function readOf(quantity: Quantity): Binding {
  return { from: 'quantity', quantityId: quantity.id };
}

export function diagonal(variances: readonly number[]): number[][] {
  return variances.map((variance, line) => variances.map((_, column) => (line === column ? variance : 0)));
}
