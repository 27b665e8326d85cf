import { describe, expect, it } from 'vitest';
import { type Formula, parseFormula } from '../../../shared/engine/formula/parse-formula.ts';
import { methods } from '../../../shared/engine/methods/catalogue.ts';

function formulaOf(text: string): Formula {
  const read = parseFormula(text);
  if (!read.ok) throw new Error(read.reason);
  return read.formula;
}

function refusalOf(text: string): string {
  const read = parseFormula(text);
  if (read.ok) throw new Error(`"${text}" was read`);
  return read.reason;
}

/** Central differences by Richardson's extrapolation. */
function numericSlope(formula: Formula, at: readonly number[], index: number): number {
  const valueAt = (shift: number) => formula.evaluate(at.map((x, i) => (i === index ? x + shift : x))).value;
  const central = (step: number) => (valueAt(step) - valueAt(-step)) / (2 * step);
  // In proportion to the argument: a roughness of 2e-6 must not become negative.
  const step = 1e-3 * (Math.abs(at[index] ?? 0) || 1e-3);
  return (4 * central(step / 2) - central(step)) / 3;
}

describe('a formula', () => {
  it.each<[string, readonly number[], number]>([
    ['rho_s * layer / (k * dc)', [1200, 0.002, 1e-5, 30], 8000],
    ['2^3^2', [], 512],
    ['-x^2', [3], -9],
    ['a - b - c', [10, 3, 2], 5],
    ['a / b / c', [12, 3, 2], 2],
    ['pi * d^2 / 4', [2], Math.PI],
    ['x² · y⁻¹ − 1', [3, 2], 3.5],
    ['ln(x)', [Math.E], 1],
    ['cbrt(x)', [-27], -3],
    ['min(a, b, c)', [3, 1, 2], 1],
    ['α + β', [1, 2], 3],
    ['1.2e-5 * x', [2], 2.4e-5],
  ])('%s at %o is %s', (text, values, value) => {
    expect(formulaOf(text).evaluate(values).value / value).toBeCloseTo(1, 14);
  });

  it('names its variables in the order of their first appearance, without pi', () => {
    expect(formulaOf('b * pi + a * b').variables).toEqual(['b', 'a']);
  });

  it('is read once and kept', () => {
    expect(formulaOf('x + 41')).toBe(formulaOf('x + 41'));
  });

  it('has no value where there is none, and does not throw', () => {
    expect(formulaOf('log(x)').evaluate([-1]).value).toBeNaN();
    expect(formulaOf('1 / x').evaluate([0]).value).toBe(Number.POSITIVE_INFINITY);
    expect(formulaOf('x^0.5').evaluate([-1]).value).toBeNaN();
    expect(formulaOf('x').evaluate([]).value).toBeNaN();
  });

  it('has a finite slope where a factor is zero', () => {
    expect([...formulaOf('a * b').evaluate([0, 3]).gradient]).toEqual([3, 0]);
    expect([...formulaOf('a^2').evaluate([0]).gradient]).toEqual([0]);
    expect([...formulaOf('a^1').evaluate([0]).gradient]).toEqual([1]);
  });

  it('adds up what a variable gives in several places', () => {
    expect([...formulaOf('x * x * x').evaluate([2]).gradient]).toEqual([12]);
  });
});

describe('derivatives agree with numeric ones', () => {
  it.each<[string, readonly number[]]>([
    ['a + b - c', [1, 2, 3]],
    ['a * b / c', [2, 3, 5]],
    ['a^b', [2, 1.7]],
    ['a^(-2/3)', [3]],
    ['(a + b)^(1/3) * c^0.83', [2, 5, 7]],
    ['log(a) + log10(b) + exp(c)', [2, 3, 0.5]],
    ['sqrt(a) + cbrt(b) + abs(c)', [2, -3, -4]],
    ['sin(a) + cos(b) + tan(c)', [0.4, 0.5, 0.6]],
    ['tanh(a) + atan(b)', [0.4, 0.5]],
    ['min(a, b) * max(a, b)', [2, 3]],
    ['-(a - b)^2', [2, 3]],
  ])('%s at %o', (text, at) => {
    const formula = formulaOf(text);
    const { gradient } = formula.evaluate(at);

    for (const index of at.keys()) expect(gradient[index]).toBeCloseTo(numericSlope(formula, at, index), 7);
  });

  it.each(methods.map((method) => [method.id, method] as const))('of the method %s', (_, method) => {
    const given = method.checks[0]?.given ?? {};
    const formula = formulaOf(method.expression);
    const at = formula.variables.map((name) => given[name] ?? Number.NaN);
    const { gradient } = formula.evaluate(at);

    for (const index of at.keys()) {
      const numeric = numericSlope(formula, at, index);
      expect(Math.abs((gradient[index] ?? Number.NaN) - numeric)).toBeLessThanOrEqual(1e-7 * Math.abs(numeric) + 1e-10);
    }
  });
});

describe('a formula is refused in a sentence', () => {
  it.each([
    ['', /Write a formula/],
    ['   ', /Write a formula/],
    ['a +', /something is missing/],
    ['(a + b', /bracket/],
    ['a b', /needs its \*/],
    ['1 / 2 a', /needs its \*/],
    ['2 (a + b)', /needs its \*/],
    ['k(x)', /not a function that formulas may use/],
    ['eval(x)', /not a function that formulas may use/],
    ['import(x)', /not a function that formulas may use/],
    ['constructor(x)', /not a function that formulas may use/],
    ['toString()', /not a function that formulas may use/],
    ['sqrt', /sqrt is a function/],
    ['sqrt(a, b)', /takes one value/],
    ['max(a)', /two or more values/],
    ['a = 3', /"=" has no place/],
    ['a; b', /";" has no place/],
    ['[1, 2]', /"\[" has no place/],
    ['{a: 1}', /has no place/],
    ['"text"', /has no place/],
    ['a ? b : c', /has no place/],
    ['a!', /"!" has no place/],
    ["a'", /has no place/],
    ['a < b', /"<" has no place/],
    ['a\nb', /has no place/],
    ['x'.repeat(501), /at most 500/],
    [`${'('.repeat(51)}x${')'.repeat(51)}`, /nested 50/],
    [`${'-'.repeat(400)}x`, /too long/],
    [`${'a+'.repeat(249)}a`, /too long/],
  ])('%s', (text, reason) => {
    expect(refusalOf(text)).toMatch(reason);
  });

  it('and no text at all makes the reader throw', () => {
    const pieces = [
      'a',
      '2',
      '(',
      ')',
      '+',
      '-',
      '*',
      '/',
      '^',
      ',',
      '.',
      ' ',
      'e',
      'log',
      'pi',
      '=',
      '[',
      '²',
      '⁻',
      '·',
    ];
    let seed = 7;
    const next = (below: number) => {
      seed = (seed * 48271) % 2147483647;
      return seed % below;
    };
    for (let round = 0; round < 3000; round += 1) {
      const text = Array.from({ length: next(14) }, () => pieces[next(pieces.length)]).join('');
      const read = parseFormula(text);
      if (read.ok) expect(read.formula.evaluate(read.formula.variables.map(() => 1.3))).toHaveProperty('value');
      else expect(read.reason).toMatch(/\.$/);
    }
  });
});

it('A variable may have the name of something that every object has', () => {
  const formula = formulaOf('constructor + toString');

  expect(formula.variables).toEqual(['constructor', 'toString']);
  expect(formula.evaluate([1, 2]).value).toBe(3);
});
