import { describe, expect, it } from 'vitest';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import type { Uncertainty } from '../../../shared/engine/model/study-model.ts';
import { summariseReadings } from '../../../shared/engine/reductions/steady-heating.ts';
import { ChainBuilder, diagonal, measured } from '../evaluate/chain-builder.ts';

const standard = (u: number): Uncertainty => ({ form: 'standard', u });

describe('summarising steady readings', () => {
  it('gives means and the covariances of the means', () => {
    const readings = [
      { power: 100, wallTemperature: 310, bulkTemperature: 300, flow: 0.4 },
      { power: 102, wallTemperature: 311, bulkTemperature: 300, flow: 0.4 },
      { power: 104, wallTemperature: 312, bulkTemperature: 300, flow: 0.4 },
    ];

    const summary = summariseReadings(readings);

    // s²(P) = 4, s(P, T_w) = 2, s²(T_w) = 1, each over n = 3.
    expect(summary).toMatchObject({ count: 3, means: [102, 311, 300, expect.closeTo(0.4, 12)] });
    expect(summary.covarianceOfMeans[0]?.[0]).toBeCloseTo(4 / 3, 12);
    expect(summary.covarianceOfMeans[0]?.[1]).toBeCloseTo(2 / 3, 12);
    expect(summary.covarianceOfMeans[1]?.[1]).toBeCloseTo(1 / 3, 12);
  });

  it('refuses a single reading', () => {
    expect(() => summariseReadings([{ power: 1, wallTemperature: 2, bulkTemperature: 1, flow: 1 }])).toThrow(
      RangeError,
    );
  });
});

describe('reducing a steady heating test', () => {
  function rig(rest: Parameters<ChainBuilder['test']>[1] = {}) {
    const chain = new ChainBuilder();
    const point = chain.point('Rig', { L: { value: 0.02, u: 5e-5 } });
    const test = chain.test(point, rest);
    const evaluation = evaluateStudy(chain.model);
    return { chain, point, test, evaluation, reduced: evaluation.tests[test.id] };
  }

  it('gives h = (P − Q) / (π d L (T_w − T_b))', () => {
    const { reduced } = rig();

    expect(reduced?.heatTransferCoefficient?.value).toBeCloseTo(181.8 / (Math.PI * 0.02 * 0.1 * 11.3), 6);
    expect(reduced?.velocity?.value).toBe(0.45);
  });

  it('keeps the scatter of the readings apart from the instruments', () => {
    const { reduced } = rig({
      summary: { count: 10, means: [186, 309.55, 298.25, 0.45], covarianceOfMeans: diagonal([0.25, 0, 0, 0]) },
      instruments: {
        power: standard(1.5),
        wallTemperature: standard(0),
        bulkTemperature: standard(0),
        flow: standard(0),
      },
    });
    const h = reduced?.heatTransferCoefficient?.value ?? Number.NaN;

    expect(reduced?.typeA).toBeCloseTo((h * 0.5) / 181.8, 6);
    expect(reduced?.typeB).toBeCloseTo(h * Math.hypot(1.5 / 181.8, 5e-5 / 0.02), 6);
    expect(reduced?.heatTransferCoefficient?.u).toBeCloseTo(Math.hypot(reduced?.typeA ?? 0, reduced?.typeB ?? 0), 9);
    expect(reduced?.heatTransferCoefficient?.budget[0]?.label).toBe('heater power of “Rig run 3”, instrument');
  });

  it('gives scatter alone n − 1 degrees of freedom, however the columns move together', () => {
    const covarianceOfMeans = diagonal([0.25, 0.01, 0.01, 0]);
    const [power, wall] = covarianceOfMeans;
    if (power && wall) {
      power[1] = 0.03;
      wall[0] = 0.03;
    }
    const chain = new ChainBuilder();
    const point = chain.point('Rig', { L: 0.02 });
    const test = chain.test(point, {
      summary: { count: 10, means: [186, 309.55, 298.25, 0.45], covarianceOfMeans },
    });

    const h = evaluateStudy(chain.model).tests[test.id]?.heatTransferCoefficient;

    expect(h?.degreesOfFreedom).toBeCloseTo(9, 9);
    expect(h?.correlatedShare).not.toBe(0);
  });

  it('turns a volume flow in a tube into its velocity with the diameter of the operating point', () => {
    const { reduced } = rig({ flowIs: 'volume flow in a tube' });

    expect(reduced?.velocity?.value).toBeCloseTo((4 * 0.45) / (Math.PI * 0.02 ** 2), 6);
    expect(reduced?.velocity?.budget[0]?.sensitivity).toBeCloseTo((-2 * (reduced?.velocity?.value ?? 0)) / 0.02, 3);
  });

  it('counts the diameter once that is in the area of the test and in Re of the point', () => {
    const chain = new ChainBuilder();
    const point = chain.point('Rig', { L: { value: 0.02, u: 5e-5 }, nu: 1e-6, lambda: 0.6 });
    const test = chain.test(point);
    point.entries.push({ key: 'u', source: { from: 'test', testId: test.id } });
    const h = chain.quantity('h', 'W/(m² K)', point);
    chain.route('test-result', h, { testId: test.id });

    const evaluation = evaluateStudy(chain.model);

    expect(evaluation.quantities[h.id]?.result?.budget.map((line) => line.inputId)).toEqual([`point:${point.id}:L`]);
    expect(evaluation.points[point.id]?.find((reading) => reading.key === 'u')?.origin).toBe('test');
    expect(evaluation.points[point.id]?.find((reading) => reading.key === 'Re')?.value).toBeCloseTo(9000, 6);
  });

  it.each([
    [
      'a wall that is not hotter than the bulk',
      { summary: summaryOf([186, 298, 299, 0.45]) },
      'is not hotter than the bulk',
    ],
    [
      'a loss larger than the power',
      { heatLoss: measured(200, 0) },
      'the heat loss (200 W) is not smaller than the heater power (186 W)',
    ],
    ['a negative absolute temperature', { summary: summaryOf([186, -3, -5, 0.45]) }, 'below absolute zero'],
  ])('gives no coefficient but a sentence for %s', (_, rest, words) => {
    const { reduced, evaluation, test } = rig(rest);

    expect(reduced?.heatTransferCoefficient).toBeNull();
    const finding = evaluation.findings.find((one) => one.subject.id === test.id);
    expect(finding).toMatchObject({ code: 'test-without-result', severity: 'stops' });
    expect(finding?.sentence).toContain(words);
  });
});

function summaryOf(means: [number, number, number, number]) {
  return { count: 10, means, covarianceOfMeans: diagonal([0, 0, 0, 0]) };
}
