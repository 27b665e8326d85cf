import { readFileSync } from 'node:fs';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { measuredResult } from '../../../shared/engine/evaluate/measured-result.ts';
import { SensitivityGraph } from '../../../shared/engine/evaluate/sensitivity-graph.ts';
import type { MeasuredResult } from '../../../shared/engine/model/evaluation.ts';
import type { Quantity } from '../../../shared/engine/model/study-model.ts';
import { ChainBuilder } from './chain-builder.ts';

function reference(name: string) {
  return JSON.parse(readFileSync(new URL(`../../reference/${name}`, import.meta.url), 'utf8'));
}

function resultOf(chain: ChainBuilder, quantity: Quantity): MeasuredResult {
  const result = evaluateStudy(chain.model).quantities[quantity.id]?.result;
  if (!result) throw new Error(`${quantity.symbol} has no value`);
  return result;
}

type SyntheticChain = {
  id: string;
  feature: string;
  expression: string;
  inputs: Record<string, { value: number; u: number }>;
  correlations: { a: string; b: string; r: number }[];
  expected: { value: number; u: number };
};
const synthetic: { relative_tolerance: number; records: SyntheticChain[] } = reference('synthetic-chains.json');

describe('first-order propagation', () => {
  it.each(synthetic.records)('agrees with an independent implementation: $id, $feature', (record) => {
    const chain = new ChainBuilder();
    const inputs = Object.entries(record.inputs).map(([symbol, { value, u }]) => chain.stated(symbol, value, u));
    const y = chain.balance('y', record.expression, inputs);
    const inputId = (symbol: string) => inputs.find((one) => one.symbol === symbol)?.inputId ?? '';
    for (const { a, b, r } of record.correlations) chain.correlate(inputId(a), inputId(b), r);

    const result = resultOf(chain, y);

    expect(Math.abs(result.value / record.expected.value - 1)).toBeLessThan(synthetic.relative_tolerance);
    expect(Math.abs(result.u / record.expected.u - 1)).toBeLessThan(synthetic.relative_tolerance);
  });

  it('agrees with the end gauge of JCGM 100:2008, H.1', () => {
    const { expression, inputs, expected } = reference('end-gauge.json');
    const graph = new SensitivityGraph();
    const terms = Object.fromEntries(
      Object.entries(inputs as Record<string, { value: number; u: number; degrees_of_freedom: number | null }>).map(
        ([id, { value, u, degrees_of_freedom: degreesOfFreedom }]) => [
          id,
          graph.input(value, { id, label: id, u, degreesOfFreedom }),
        ],
      ),
    );
    const term = graph.expression(expression, terms);

    const result = term && measuredResult(term, graph.inputs, []);

    expect(result?.value).toBeCloseTo(50_000_838, 0);
    expect(result?.u).toBeCloseTo(expected.recomputed.u, 3);
    expect(result?.degreesOfFreedom).toBeCloseTo(expected.recomputed.degrees_of_freedom_before_truncation, 1);
  });

  it.each(
    reference('degrees-of-freedom.json').records as {
      id: string;
      u: number[];
      degrees_of_freedom: (number | null)[];
      expected: { u: number; degrees_of_freedom: number };
    }[],
  )('gives the effective degrees of freedom of $id', (record) => {
    const graph = new SensitivityGraph();
    const parts = record.u.map((u, place) =>
      graph.input(0, { id: `x${place}`, label: '', u, degreesOfFreedom: record.degrees_of_freedom[place] ?? null }),
    );
    const sum = graph.combine(
      0,
      parts.map((term) => ({ term, by: 1 })),
    );

    const result = measuredResult(sum, graph.inputs, []);

    expect(Math.abs(result.u / record.expected.u - 1)).toBeLessThan(1e-6);
    expect(Math.abs((result.degreesOfFreedom ?? 0) / record.expected.degrees_of_freedom - 1)).toBeLessThan(1e-6);
  });

  it('gives a number minus itself no uncertainty', () => {
    const chain = new ChainBuilder();
    const x = chain.stated('x', 5, 0.3);
    const twice = chain.balance('y', '2 * x', [x]);
    const nothing = chain.balance('z', 'y - x - x', [twice, x]);

    const result = resultOf(chain, nothing);

    expect(result).toMatchObject({ value: 0, u: 0, budget: [] });
  });

  it('counts an input once that reaches the result by two ways', () => {
    const chain = new ChainBuilder();
    const x = chain.stated('x', 3, 0.1);
    const a = chain.balance('a', '2 * x', [x]);
    const b = chain.balance('b', '5 * x', [x]);
    const y = chain.balance('y', 'a + b', [a, b]);

    const result = resultOf(chain, y);

    expect(result.budget).toHaveLength(1);
    expect(result.u).toBeCloseTo(0.7, 12);
  });

  it.each([
    [1, 0.5],
    [0, Math.hypot(0.2, 0.3)],
    [-1, 0.1],
  ])('adds two inputs with r = %d to u = %d', (r, u) => {
    const chain = new ChainBuilder();
    const a = chain.stated('a', 1, 0.2);
    const b = chain.stated('b', 2, 0.3);
    const y = chain.balance('y', 'a + b', [a, b]);
    chain.correlate(a.inputId, b.inputId, r);

    const result = resultOf(chain, y);

    expect(result.u).toBeCloseTo(u, 12);
    expect(result.budget.reduce((sum, line) => sum + line.share, result.correlatedShare)).toBeCloseTo(1, 12);
  });

  it('cancels two equal uncertainties with r = −1 altogether', () => {
    const chain = new ChainBuilder();
    const a = chain.stated('a', 1, 0.3);
    const b = chain.stated('b', 2, 0.3);
    const y = chain.balance('y', 'a + b', [a, b]);
    chain.correlate(a.inputId, b.inputId, -1);

    expect(resultOf(chain, y).u).toBe(0);
  });

  it('names a group of correlations that no numbers can have, and computes without it', () => {
    const chain = new ChainBuilder();
    const [a, b, c] = ['a', 'b', 'c'].map((symbol) => chain.stated(symbol, 1, 0.1));
    const y = chain.balance(
      'y',
      'a + b + c',
      [a, b, c].flatMap((one) => (one ? [one] : [])),
    );
    chain.correlate(a?.inputId ?? '', b?.inputId ?? '', 0.9);
    chain.correlate(b?.inputId ?? '', c?.inputId ?? '', 0.9);
    chain.correlate(a?.inputId ?? '', c?.inputId ?? '', -0.9);

    const { findings } = evaluateStudy(chain.model);

    const finding = findings.find((one) => one.code === 'correlation-impossible');
    expect(finding?.severity).toBe('stops');
    expect(finding?.sentence).toContain('a (a), stated; b (b), stated; c (c), stated');
    expect(resultOf(chain, y).u).toBeCloseTo(0.1 * Math.sqrt(3), 12);
  });

  it('warns where every slope vanishes although the inputs are uncertain', () => {
    const chain = new ChainBuilder();
    const x = chain.stated('x', 0, 0.1);
    chain.balance('y', 'x^2', [x]);

    const { findings } = evaluateStudy(chain.model);

    expect(findings.map((one) => one.code)).toContain('sensitivity-vanishes');
  });

  it('gives a value without a finite result a sentence, not a number', () => {
    const chain = new ChainBuilder();
    const x = chain.stated('x', 1, 0.1);
    const y = chain.balance('y', '1 / (x - 1)', [x]);

    const evaluation = evaluateStudy(chain.model);

    expect(evaluation.quantities[y.id]?.result).toBeNull();
    expect(evaluation.findings.find((one) => one.code === 'no-value')?.sentence).toContain('division by zero');
  });

  it('has the slope of random chains by numeric differentiation, and budgets that sum to one', () => {
    const step = fc.constantFrom('p * q', 'p / q', 'p + q', '2 * p - q / 3', 'sqrt(p * q)', 'p^2 / q');
    const inputs = fc.array(fc.double({ min: 1, max: 4, noNaN: true }), { minLength: 2, maxLength: 5 });
    const picks = fc.array(fc.tuple(step, fc.nat(), fc.nat()), { minLength: 1, maxLength: 6 });

    fc.assert(
      fc.property(inputs, picks, (values, steps) => {
        const build = (numbers: readonly number[]) => {
          const chain = new ChainBuilder();
          const made: Quantity[] = numbers.map((value, place) => chain.stated(`x${place}`, value, 0.05));
          for (const [place, [expression, first, second]] of steps.entries()) {
            const [p, q] = [made[first % made.length], made[second % made.length]];
            if (!p || !q) continue;
            const names: Record<string, string> = { p: p.symbol, q: q.symbol };
            const text = expression.replace(/\b[pq]\b/g, (name) => names[name] ?? name);
            made.push(chain.balance(`y${place}`, text, [p, q]));
          }
          const last = made.at(-1);
          return { chain, result: last ? evaluateStudy(chain.model).quantities[last.id]?.result : null };
        };
        const { result } = build(values);
        fc.pre(
          result !== null && result !== undefined && Math.abs(result.value) > 1e-3 && Math.abs(result.value) < 1e6,
        );
        if (!result) return;

        for (const [place, value] of values.entries()) {
          const nudge = 1e-6 * value;
          const at = (by: number) =>
            build(values.map((one, other) => (other === place ? one + by : one))).result?.value;
          const slope = ((at(nudge) ?? Number.NaN) - (at(-nudge) ?? Number.NaN)) / (2 * nudge);
          const line = result.budget.find((one) => one.label.startsWith(`x${place} `));
          const scale = Math.max(1, Math.abs(result.value));
          if (Number.isFinite(slope)) expect(Math.abs((line?.sensitivity ?? 0) - slope) / scale).toBeLessThan(1e-3);
        }
        const sum = result.budget.reduce((total, line) => total + line.share, result.correlatedShare);
        if (result.u > 0) expect(sum).toBeCloseTo(1, 9);
        const sorted = result.budget.map((line) => line.contribution);
        expect(sorted).toEqual(sorted.toSorted((one, other) => other - one));
      }),
      { numRuns: 100 },
    );
  });
});
