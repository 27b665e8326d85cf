import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dimensionOfFormula } from '../../../shared/engine/formula/check-dimensions.ts';
import { readFormulaTree } from '../../../shared/engine/formula/formula-tree.ts';
import { type Formula, parseFormula } from '../../../shared/engine/formula/parse-formula.ts';
import { formulaToMathMl } from '../../../shared/engine/formula/to-markup.ts';
import { writeFormula } from '../../../shared/engine/formula/write-formula.ts';

// A failing property prints its seed; `fc.assert(…, { seed, path })` repeats it.

/** Formulas that are smooth at positive arguments: every operation and function, nested up to four deep. */
const formulas = fc.letrec<{ term: string }>((tie) => ({
  term: fc.oneof(
    { maxDepth: 4, depthSize: 'medium' },
    fc.constantFrom('a', 'b', 'c', 'pi', '2', '0.7', '1.5e-1'),
    fc
      .tuple(tie('term'), fc.constantFrom('+', '-', '*', '/'), tie('term'))
      .map(([left, sign, right]) => `(${left}) ${sign} (${right})`),
    tie('term').map((of) => `-(${of})`),
    fc.tuple(tie('term'), fc.constantFrom('2', '3', '-1')).map(([of, power]) => `(${of})^${power}`),
    // A root has no slope at zero, so what it is taken of stays above.
    fc.tuple(tie('term'), fc.constantFrom('0.5', '(-2/3)')).map(([of, power]) => `(abs(${of}) + 0.1)^${power}`),
    fc.tuple(tie('term'), tie('term')).map(([base, power]) => `(abs(${base}) + 0.5)^tanh(${power})`),
    fc
      .tuple(fc.constantFrom('log', 'log10', 'sqrt', 'cbrt', 'abs'), tie('term'))
      .map(([name, of]) => `${name}(abs(${of}) + 0.1)`),
    fc
      .tuple(fc.constantFrom('sin', 'cos', 'tan', 'atan', 'tanh', 'exp'), tie('term'))
      .map(([name, of]) => `${name}(tanh(${of}))`),
    fc
      .tuple(fc.constantFrom('min', 'max'), tie('term'), tie('term'))
      .map(([name, left, right]) => `${name}(${left}, ${right})`),
  ),
})).term;
const point = fc.tuple(...['a', 'b', 'c'].map(() => fc.double({ min: 0.5, max: 3, noNaN: true })));

function read(text: string): Formula | null {
  const reading = parseFormula(text);
  return reading.ok ? reading.formula : null;
}

function at(formula: Formula, values: readonly number[]): number[] {
  return formula.variables.map((name) => values['abc'.indexOf(name)] ?? Number.NaN);
}

describe('over random formulas', () => {
  it('the exact derivatives are those of central differences', () => {
    let compared = 0;
    fc.assert(
      fc.property(formulas, point, (text, values) => {
        const formula = read(text);
        fc.pre(formula !== null);
        const place = at(formula, values);
        const { gradient } = formula.evaluate(place);
        // Through a division by zero or a root of it there is no derivative, and the evaluation of a study says so.
        if (!gradient.every(Number.isFinite)) return;
        place.forEach((x, index) => {
          const valueAt = (by: number) => formula.evaluate(place.map((y, i) => (i === index ? y + by : y))).value;
          const step = 1e-6 * x;
          const [behind, ahead] = [(valueAt(0) - valueAt(-step)) / step, (valueAt(step) - valueAt(0)) / step];
          const central = (behind + ahead) / 2;
          const size = Math.max(Math.abs(central), 1e-3 * Math.max(1, Math.abs(valueAt(0))));
          // At a kink, such as min(a, b) where a = b, the two sides differ and there is no number to compare with.
          // What passes here can move the central difference by half of it at most, which the bound below allows.
          if (!(Math.abs(ahead - behind) < 1e-4 * size) || size > 1e6) return;
          compared += 1;
          expect(Math.abs((gradient[index] ?? Number.NaN) - central)).toBeLessThanOrEqual(1e-4 * size);
        });
      }),
      { numRuns: 2000 },
    );

    expect(compared).toBeGreaterThan(1000);
  });

  it('a formula that is written anew has the same value', () => {
    fc.assert(
      fc.property(formulas, point, (text, values) => {
        const tree = readFormulaTree(text);
        fc.pre(tree.ok);
        const again = read(writeFormula(tree.tree));
        const first = read(text);

        expect(again?.variables).toEqual(first?.variables);
        if (again && first) {
          const [one, other] = [first, again].map((formula) => formula.evaluate(at(formula, values)).value);
          expect(other).toEqual(one);
        }
      }),
      { numRuns: 1000 },
    );
  });

  it('plain numbers give a plain number', () => {
    const none = [0, 0, 0, 0, 0, 0, 0];
    fc.assert(
      fc.property(formulas, (text) => {
        fc.pre(read(text) !== null);
        const reading = dimensionOfFormula(text, { a: none, b: none, c: none });

        expect(reading).toMatchObject({ ok: true });
        if (reading.ok) expect(reading.dimension.every((exponent) => exponent === 0)).toBe(true);
      }),
      { numRuns: 1000 },
    );
  });
});

describe('whatever text comes', () => {
  it('is read or refused in a sentence, is typeset, and reaches nothing outside', () => {
    const hostile = fc.constantFrom(
      ...['import', 'createUnit', 'constructor', '__proto__', 'evaluate', 'parse', 'simplify', 'derivative', 'config'],
      ...[
        '(',
        ')',
        '[',
        ']',
        '{',
        '}',
        '=',
        ':',
        ';',
        '"',
        "'",
        '.',
        ',',
        '+',
        '-',
        '*',
        '/',
        '^',
        '!',
        '%',
        '\n',
        '⁻',
      ],
      ...['a', '1', '1e999', 'i', 'NaN', 'Infinity', 'true', 'null', 'undefined', 'end', 'to', 'mod', 'not'],
    );
    const text = fc.oneof(
      fc.array(hostile, { maxLength: 20 }).map((parts) => parts.join('')),
      fc.string({ maxLength: 80 }),
    );
    const keys = Object.keys(Object.prototype);
    fc.assert(
      fc.property(text, (typed) => {
        const reading = parseFormula(typed);

        if (reading.ok)
          expect(typeof reading.formula.evaluate(reading.formula.variables.map(() => 1.3)).value).toBe('number');
        else expect(reading.reason).toMatch(/\.$/);
        expect(formulaToMathMl(typed)).toMatch(/^<math .*<\/math>$/s);
      }),
      { numRuns: 3000 },
    );

    expect(Object.keys(Object.prototype)).toEqual(keys);
  });

  it.each([
    'import({a: 1})',
    'createUnit("x")',
    'constructor(a)',
    '__proto__(a)',
    'a.constructor',
    'a["constructor"]',
    'f(x) = x',
    'a = 1',
    '1:3',
    '[1, 2; 3, 4]',
    '{a: 1}',
    '"text"',
    '3 cm',
    'a to b',
    '1e999 * a',
  ])('%s is refused', (text) => {
    expect(parseFormula(text)).toMatchObject({ ok: false });
  });
});
