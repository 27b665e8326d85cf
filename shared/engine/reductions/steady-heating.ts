import { scatterNames } from '../evaluate/covariance.ts';
import type { Answer, SensitivityGraph, Term } from '../evaluate/sensitivity-graph.ts';
import type { ReadingsSummary, Test } from '../model/study-model.ts';
import { standardUncertainty } from '../quantity/standard-uncertainty.ts';

export type SteadyReading = {
  readonly power: number;
  readonly wallTemperature: number;
  readonly bulkTemperature: number;
  readonly flow: number;
};

/**
 * Means of steady readings and the covariance matrix of the means, s_ij / n (JCGM 100:2008, 4.2 and 5.2.3).
 *
 * @param readings - W, K, K and m/s or m³/s; at least two.
 */
export function summariseReadings(readings: readonly SteadyReading[]): ReadingsSummary {
  const count = readings.length;
  if (count < 2) throw new RangeError('A scatter needs at least two readings.');
  const columns = [
    readings.map((reading) => reading.power),
    readings.map((reading) => reading.wallTemperature),
    readings.map((reading) => reading.bulkTemperature),
    readings.map((reading) => reading.flow),
  ];
  const means = columns.map((column) => column.reduce((sum, value) => sum + value, 0) / count);
  const deviations = columns.map((column, place) => column.map((value) => value - (means[place] ?? 0)));
  const covarianceOfMeans = deviations.map((first) =>
    deviations.map(
      (second) => first.reduce((sum, value, row) => sum + value * (second[row] ?? 0), 0) / (count - 1) / count,
    ),
  );
  const [power = 0, wall = 0, bulk = 0, flow = 0] = means;
  return { count, means: [power, wall, bulk, flow], covarianceOfMeans };
}

export type ReducedTest = { readonly heatTransferCoefficient: Answer; readonly velocity: Answer };

/**
 * h = (P − Q_loss) / (A (T_w − T_b)) and the velocity from the means of a steady heating test, W/(m² K) and m/s.
 * The scatter of the means (type A) and the instruments (type B) are inputs of their own.
 *
 * @param lengthOf - The characteristic length of the test's operating point: the very input that its Reynolds number
 * and every other use of it share.
 */
export function reduceSteadyHeating(graph: SensitivityGraph, test: Test, lengthOf: () => Answer): ReducedTest {
  const { reduction } = test;
  const { instruments } = reduction;
  const means = scatterNames.map((_, place) => reduction.summary.means[place] ?? Number.NaN);
  const [power = Number.NaN, wall = Number.NaN, bulk = Number.NaN] = means;
  const stated = [instruments.power, instruments.wallTemperature, instruments.bulkTemperature, instruments.flow];
  const terms = scatterNames.map((name, place): Term => {
    const mean = means[place] ?? Number.NaN;
    const variance = reduction.summary.covarianceOfMeans[place]?.[place] ?? 0;
    const scatter = graph.input(0, {
      id: `test:${test.id}:${name} scatter`,
      label: `${called(name)} of “${test.name}”, scatter of the readings`,
      u: Math.sqrt(Math.max(0, variance)),
      degreesOfFreedom: reduction.summary.count - 1,
      group: `test:${test.id}:scatter`,
    });
    const instrument = graph.input(0, {
      id: `test:${test.id}:${name} instrument`,
      label: `${called(name)} of “${test.name}”, instrument`,
      u: standardUncertainty(stated[place] ?? { form: 'exact' }, mean),
      degreesOfFreedom: null,
    });
    return graph.combine(mean, [
      { term: scatter, by: 1 },
      { term: instrument, by: 1 },
    ]);
  });
  const [powerTerm, wallTerm, bulkTerm, flowTerm] = terms;
  if (!powerTerm || !wallTerm || !bulkTerm || !flowTerm) throw new Error('A steady heating test has four columns.');
  const measured = (name: string, value: { value: number; uncertainty: Parameters<typeof standardUncertainty>[0] }) =>
    graph.input(value.value, {
      id: `test:${test.id}:${name}`,
      label: `${name} of “${test.name}”`,
      u: standardUncertainty(value.uncertainty, value.value),
      degreesOfFreedom: null,
    });

  const loss = measured('heat loss', reduction.heatLoss);
  const length = lengthOf();
  const velocity = velocityOf(graph, test, flowTerm, length);

  const reasons: string[] = [];
  if (wall <= 0 || bulk <= 0) {
    reasons.push(`A mean temperature of “${test.name}” lies below absolute zero: check the units of its columns.`);
  } else if (wall <= bulk) {
    reasons.push(
      `In “${test.name}” the wall (${celsius(wall)}) is not hotter than the bulk (${celsius(bulk)}), so no heat-transfer ` +
        'coefficient follows. Check which column is which.',
    );
  }
  if (reduction.heatLoss.value >= power) {
    reasons.push(
      `In “${test.name}” the heat loss (${round(reduction.heatLoss.value)} W) is not smaller than the heater power ` +
        `(${round(power)} W), so nothing is left for the fluid.`,
    );
  }
  const area = areaOf(graph, test, length, measured);
  if (!area.ok) reasons.push(...area.reasons);
  if (reasons.length > 0 || !area.ok) return { heatTransferCoefficient: { ok: false, reasons }, velocity };
  const coefficient = graph.expression('(P - Q) / (A * (Tw - Tb))', {
    P: powerTerm,
    Q: loss,
    A: area.term,
    Tw: wallTerm,
    Tb: bulkTerm,
  });
  return {
    heatTransferCoefficient: coefficient
      ? { ok: true, term: coefficient }
      : { ok: false, reasons: [`The heat-transfer coefficient of “${test.name}” has no finite value.`] },
    velocity,
  };
}

function areaOf(
  graph: SensitivityGraph,
  test: Test,
  length: Answer,
  measured: (name: string, value: Test['reduction']['heatLoss']) => Term,
): Answer {
  const { surface } = test.reduction;
  if (surface.shape === 'stated area') return { ok: true, term: measured('heated area', surface.area) };
  const heatedLength = measured('heated length', surface.length);
  if (!length.ok) return length;
  return { ok: true, term: graph.product(Math.PI, [length.term, heatedLength]) };
}

function velocityOf(graph: SensitivityGraph, test: Test, flow: Term, length: Answer): Answer {
  if (test.reduction.flowIs === 'velocity') return { ok: true, term: flow };
  if (!length.ok) return length;
  const perSquare = graph.expression('V / d^2', { V: flow, d: length.term });
  return perSquare
    ? { ok: true, term: graph.product(4 / Math.PI, [perSquare]) }
    : { ok: false, reasons: [`The velocity of “${test.name}” has no finite value.`] };
}

function called(name: (typeof scatterNames)[number]): string {
  return name === 'power' ? 'heater power' : name;
}

function celsius(kelvin: number): string {
  return `${round(kelvin - 273.15)} °C`;
}

function round(value: number): string {
  return String(Number(value.toPrecision(4))).replace('-', '−');
}
