import { describe, expect, it } from 'vitest';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { judgeReynoldsMatch, judgeWindow } from '../../../shared/engine/evaluate/judge-window.ts';
import type { OperatingPoint, PointVariableKey, Route } from '../../../shared/engine/model/study-model.ts';
import { ChainBuilder } from './chain-builder.ts';

type Entries = Partial<Record<PointVariableKey, number>>;

const bench: Entries = { L: 0.02, u: 0.5, nu: 1e-6, Pr: 6, lambda: 0.6, beta: 2e-4, dT: 10 };
const plant: Entries = { L: 0.1, u: 0.1, nu: 1e-6, D: 1e-9 };
const ratios = { family: 'tube', description: '', ratios: [{ name: 'L/d', value: 50 }] } as const;

function analogue(
  change: {
    bench?: Entries;
    plant?: Entries;
    plantShape?: OperatingPoint['geometry'];
    route?: Partial<Extract<Route, { kind: 'heat-analogue' }>>;
  } = {},
) {
  const chain = new ChainBuilder();
  const geometry = { ...ratios, ratios: [...ratios.ratios] };
  const from = chain.point('Rig', { ...bench, ...change.bench }, { geometry });
  const to = chain.point(
    'Reactor',
    { ...plant, ...change.plant },
    { scale: 'plant', geometry: change.plantShape ?? geometry },
  );
  const h = chain.quantity('h', 'W/(m² K)', from);
  chain.route('stated-value', h, {
    value: { text: '2500', value: 2500, unit: 'W/(m² K)', uncertaintyText: '', uncertainty: { form: 'exact' } },
    evidence: 'run 3',
  });
  const k = chain.quantity('k', 'm/s', to);
  const route = chain.route('heat-analogue', k, { sourceQuantityId: h.id, ...change.route });
  const evaluation = evaluateStudy(chain.model);
  const result = evaluation.routes[route.id];
  return {
    evaluation,
    route,
    k: evaluation.quantities[k.id]?.result,
    check: (key: string) => result?.checks.find((one) => one.key === key),
    assumptionOf: (key: string) => result?.assumptions.find((one) => one.checkKeys.includes(key)),
    findings: evaluation.findings.filter((finding) => finding.subject.id === route.id),
  };
}

describe('match checks of a heat analogue', () => {
  it.each([
    [0.1, 'inside', 'the same'],
    [0.104, 'inside', '4 % apart, matched within 5 %'],
    [0.115, 'near the edge', '15 % apart, more than their uncertainty of 0 %; the exponent m carries the difference'],
    [0.15, 'outside', '1.5 times higher at “Reactor”, not a match'],
    [0.05, 'outside', '2 times lower at “Reactor”, not a match'],
  ])('compare Re at a plant velocity of %d m/s: %s', (u, verdict, words) => {
    const check = analogue({ plant: { u } }).check('match:Re');

    expect(check).toMatchObject({ verdict, kind: 'match', window: { min: 0.8, max: 1.25, basis: 'indicative' } });
    expect(check?.sentence).toContain(words);
  });

  it('say which entry is missing where', () => {
    const { Pr: _, ...withoutPrandtl } = bench;
    const chain = new ChainBuilder();
    const from = chain.point('Rig', withoutPrandtl);
    const to = chain.point('Reactor', plant);
    const h = chain.quantity('h', 'W/(m² K)', from);
    chain.route('stated-value', h);
    const k = chain.quantity('k', 'm/s', to);
    const route = chain.route('heat-analogue', k, { sourceQuantityId: h.id });

    const { routes, findings } = evaluateStudy(chain.model);

    const check = routes[route.id]?.checks.find((one) => one.key === 'window:Pr');
    expect(check?.verdict).toBe('not evaluated');
    expect(check?.sentence).toContain('Pr of “Rig” is not known: enter it, or');
    expect(findings.find((one) => one.subject.id === route.id)).toMatchObject({ code: 'no-value', severity: 'stops' });
  });

  it('say by which factor Sc lies above the window of the analogy', () => {
    const { check, findings, assumptionOf } = analogue({ plant: { D: 2.5e-10 } });

    expect(check('window:Sc')).toMatchObject({ verdict: 'outside', target: expect.closeTo(4000, 6) });
    expect(check('window:Sc')?.sentence).toContain('1.33 times above the');
    expect(assumptionOf('window:Sc')).toMatchObject({ verdict: 'outside', needsJustification: true });
    expect(
      findings
        .filter((one) => one.code === 'needs-justification')
        .map((one) => one.sentence)
        .join(),
    ).toContain('1.33 times');
  });

  it('let an extrapolation allowance cover what is outside, as a line of its own in the budget', () => {
    const { k, route, findings, assumptionOf } = analogue({
      plant: { D: 2.5e-10 },
      route: { extrapolationAllowance: 0.2 },
    });

    expect(assumptionOf('window:Sc')?.needsJustification).toBe(false);
    expect(findings.map((one) => one.code)).toContain('extrapolated');
    const line = k?.budget.find((one) => one.inputId === `route:${route.id}:extrapolation`);
    expect(line?.contribution).toBeCloseTo(0.2 * (k?.value ?? 0), 15);
  });

  it('ask for words near an edge although an allowance is set', () => {
    const { assumptionOf } = analogue({ plant: { u: 0.115 }, route: { extrapolationAllowance: 0.2 } });

    expect(assumptionOf('match:Re')).toMatchObject({ verdict: 'near the edge', needsJustification: true });
  });

  it('stop asking once the justification is written', () => {
    const asked = analogue({ plant: { u: 0.115 } });
    const key = asked.assumptionOf('match:Re')?.key ?? '';

    const answered = analogue({
      plant: { u: 0.115 },
      route: { justifications: { [key]: 'm is known from three speeds.' } },
    });

    const count = (findings: { code: string }[]) => findings.filter((one) => one.code === 'needs-justification').length;
    expect(count(answered.findings)).toBe(count(asked.findings) - 1);
  });

  it.each([
    [50, 'inside', 'equal'],
    [52, 'inside', 'equal within 5 %'],
    [58, 'near the edge', '16 % apart'],
    [80, 'outside', '60 % apart, not similar'],
  ])('compare the length ratio with %d: %s', (value, verdict, words) => {
    const check = analogue({ plantShape: { ...ratios, ratios: [{ name: 'L/d', value }] } }).check('geometry:L/d');

    expect(check).toMatchObject({ verdict, source: 50, target: value });
    expect(check?.sentence).toContain(words);
  });

  it('see another shape and a ratio that is entered at one end only', () => {
    const { check } = analogue({ plantShape: { family: 'sphere', description: '', ratios: [] } });

    expect(check('geometry:family')).toMatchObject({ verdict: 'outside' });
    expect(check('geometry:L/d')?.sentence).toBe('L/d is entered at “Rig” but not at “Reactor”.');
  });

  it.each([
    [10, 'inside'],
    [1000, 'near the edge'],
    [1e6, 'outside'],
  ])('judge free convection at a temperature difference of %d K: %s', (dT, verdict) => {
    expect(analogue({ bench: { dT } }).check('window:Gr/Re² source')?.verdict).toBe(verdict);
  });

  it('see different flow regimes', () => {
    const check = analogue({ bench: { u: 0.1 }, plant: { u: 0.2 } }).check('regime:Re');

    expect(check).toMatchObject({ verdict: 'outside' });
    expect(check?.sentence).toContain('laminar at one end, turbulent at the other');
  });

  it('refuse a target that is no mass-transfer coefficient', () => {
    const chain = new ChainBuilder();
    const from = chain.point('Rig', bench);
    const h = chain.quantity('h', 'W/(m² K)', from);
    chain.route('stated-value', h);
    const wrong = chain.quantity('t', 's', from);
    const route = chain.route('heat-analogue', wrong, { sourceQuantityId: h.id });

    const { findings } = evaluateStudy(chain.model);

    expect(findings.find((one) => one.subject.id === route.id)?.sentence).toContain(
      'gives a mass-transfer coefficient in m/s, but “t” is in s',
    );
  });
});

describe('correlations', () => {
  function correlation(entries: Entries, unit = 'm/s') {
    const chain = new ChainBuilder();
    const point = chain.point('Reactor', entries);
    const k = chain.quantity('k', unit, point);
    const route = chain.route('correlation', k, { methodId: 'linton-sherwood' });
    const evaluation = evaluateStudy(chain.model);
    return { chain, point, k, route, evaluation, result: evaluation.routes[route.id] };
  }

  it('carry Sh to k with D / L of the own operating point', () => {
    const { result } = correlation({ Re: 2e4, Sc: 1500, D: 1e-9, L: 0.05 });

    expect(result?.steps.find((step) => step.symbol === 'Sh')?.value).toBeCloseTo(977.9, 0);
    expect(result?.result?.value).toBeCloseTo((977.9 * 1e-9) / 0.05, 7);
  });

  it('check each limit of the method and say how far out a value is', () => {
    const { result } = correlation({ Re: 88_900, Sc: 1500, D: 1e-9, L: 0.05 });

    const check = result?.checks.find((one) => one.key === 'window:Re');
    expect(check).toMatchObject({
      verdict: 'outside',
      target: 88_900,
      window: { min: 2000, max: 70_000, basis: 'sourced' },
    });
    expect(check?.sentence).toContain('1.27 times above the tested range');
  });

  it('say when the unit of the quantity does not fit the method', () => {
    const { evaluation, result } = correlation({ Re: 2e4, Sc: 1500, D: 1e-9, L: 0.05 }, 's');

    expect(result?.result).toBeNull();
    expect(evaluation.findings.find((one) => one.code === 'no-value')?.sentence).toContain('“k” is in s');
  });

  it.each([
    [false, 1],
    [true, 2],
  ])('of the same method share its scatter unless told otherwise (own scatter: %s)', (ownScatter, lines) => {
    const chain = new ChainBuilder();
    const point = chain.point('Reactor', { Re: 2e4, Sc: 1500 });
    const [a, b] = [chain.quantity('a', '1', point), chain.quantity('b', '1', point)];
    chain.route('correlation', a, { methodId: 'linton-sherwood' });
    chain.route('correlation', b, { methodId: 'linton-sherwood', ownScatter });
    const mean = chain.balance('y', '(a + b) / 2', [a, b]);

    const result = evaluateStudy(chain.model).quantities[mean.id]?.result;

    expect(result?.budget).toHaveLength(lines);
    expect((result?.u ?? 0) / (result?.value ?? 1)).toBeCloseTo(ownScatter ? 0.1 / Math.SQRT2 : 0.1, 9);
  });
});

describe('verdicts', () => {
  const window = { min: 100, max: 1000, basis: 'sourced' } as const;

  it.each([
    [500, 0, 'inside'],
    [104, 0, 'near the edge'],
    [96, 0, 'near the edge'],
    [94, 0, 'outside'],
    [970, 0, 'near the edge'],
    [1049, 0, 'near the edge'],
    [1060, 0, 'outside'],
    [800, 250, 'near the edge'],
    [1060, 500, 'outside'],
  ] as const)('put %d with U = %d in a window of 100 to 1000: %s', (value, expanded, verdict) => {
    expect(judgeWindow(value, expanded, window)).toBe(verdict);
  });

  it('do not let a wide uncertainty turn a mismatch of Re into a match', () => {
    expect(judgeReynoldsMatch(1.2, 0.25)).toBe('inside');
    expect(judgeReynoldsMatch(1.3, 0.5)).toBe('outside');
  });
});
