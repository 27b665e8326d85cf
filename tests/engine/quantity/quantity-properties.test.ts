import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatMeasured } from '../../../shared/engine/quantity/format-measured.ts';
import { parseQuantity } from '../../../shared/engine/quantity/parse-quantity.ts';
import {
  differenceFromSi,
  differenceToSi,
  fromSi,
  parseUnit,
  toSi,
  type Unit,
} from '../../../shared/engine/quantity/parse-unit.ts';

// A failing property prints its seed; `fc.assert(…, { seed, path })` repeats it.
const rounds = { numRuns: 3000 };

/** Every kind of quantity of the chain, each with the ways in which it is typed. */
const spellings: readonly (readonly [shown: string, typed: readonly string[]])[] = [
  ['m²/s', ['m2/s', 'm^2/s', 'm² s⁻¹', 'cm²/s', 'mm2/s', 'cSt']],
  ['W/(m² K)', ['W/(m2 K)', 'W m-2 K-1', 'W m^-2 K^-1', 'kW/(m²·K)', 'W/(m² °C)']],
  ['J/(kg K)', ['kJ/(kg K)', 'J kg⁻¹ K⁻¹']],
  ['Pa·s', ['mPa·s', 'mPas', 'cP', 'kg/(m s)']],
  ['m³/s', ['L/min', 'm3/h', 'mL/s', 'l/h']],
  ['Pa', ['bar', 'bara', 'mbar', 'kPa', 'N/m²']],
  ['1/s', ['rpm', '1/min', 'Hz', 's⁻¹']],
  ['m', ['mm', 'cm', 'µm', 'μm', 'in']],
  ['1', ['%', '']],
  ['kg/m³', ['g/L', 'g/cm3', 'kg m-3']],
];
const typing = fc
  .constantFrom(...spellings)
  .chain(([shown, typed]) => fc.record({ shown: fc.constant(shown), typed: fc.constantFrom(...typed) }));

const magnitude = fc
  .tuple(fc.double({ min: 1, max: 9.999, noNaN: true }), fc.integer({ min: -12, max: 12 }), fc.constantFrom(1, -1))
  .map(([digits, exponent, sign]) => sign * Number(`${digits}e${exponent}`));

function unitOf(text: string): Unit {
  const read = parseUnit(text);
  if (!read.ok) throw new Error(read.reason);
  return read.unit;
}

function raised(exponent: number): string {
  return String(exponent)
    .replace('-', '⁻')
    .replace(/\d/g, (digit) => '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(digit)] ?? digit);
}

/** The same number in the ways in which a number is typed. */
const notation = fc.constantFrom<(x: number) => string>(
  (x) => String(x),
  (x) => x.toExponential(),
  (x) => x.toExponential().replace('.', ','),
  (x) => x.toExponential().replace(/e\+?(-?\d+)$/, (_, power: string) => `×10${raised(Number(power))}`),
  (x) => x.toExponential().replace(/e\+?(-?\d+)$/, ' x 10^$1'),
  (x) => x.toExponential().replace('-', '−'),
);

describe('a typed value, over random numbers, notations and units', () => {
  it('comes back from SI as the number that was typed', () => {
    fc.assert(
      fc.property(magnitude, typing, notation, (x, { shown, typed }, write) => {
        const text = `${write(x)} ${typed}`.trim();
        // One digit to three, a comma and three digits is refused as ambiguous; its own test says so.
        fc.pre(!/^[+−-]?[1-9]\d{0,2},\d{3}(?!\d)/.test(text));
        const read = parseQuantity(text, shown);

        expect(read).toMatchObject({ ok: true, number: x });
        if (read.ok) expect(fromSi(read.value, unitOf(typed || shown)) / x).toBeCloseTo(1, 12);
      }),
      rounds,
    );
  });

  it('means the same in every unit of its kind', () => {
    fc.assert(
      fc.property(magnitude, typing, (si, { shown, typed }) => {
        const inTyped = fromSi(si, unitOf(typed || shown));
        const inShown = fromSi(si, unitOf(shown));

        expect(toSi(inTyped, unitOf(typed || shown)) / toSi(inShown, unitOf(shown))).toBeCloseTo(1, 12);
      }),
      rounds,
    );
  });

  it('in degrees is a point on their scale, and a difference of two loses the offset', () => {
    const celsius = ['°C', '℃', 'degC', 'celsius', '(°C)', '·°C', '°C^1'].map((name) => [name, 1, 273.15] as const);
    const fahrenheit = ['°F', 'degF', 'fahrenheit'].map((name) => [name, 5 / 9, 459.67 * (5 / 9)] as const);
    const degrees = fc.double({ min: -200, max: 3000, noNaN: true });
    fc.assert(
      fc.property(degrees, degrees, fc.constantFrom(...celsius, ...fahrenheit), (a, b, [name, size, zero]) => {
        const read = parseQuantity(`${a} ${name}`, '°C');

        expect(read).toMatchObject({ ok: true });
        if (read.ok) expect(read.value).toBeCloseTo(a * size + zero, 8);
        expect(differenceToSi(a - b, unitOf(name))).toBeCloseTo((a - b) * size, 8);
        expect(differenceFromSi(differenceToSi(a, unitOf(name)), unitOf(name))).toBeCloseTo(a, 8);
      }),
      rounds,
    );
  });
});

describe('any text at all', () => {
  it('is read or refused in a sentence, and never throws', () => {
    const pieces = fc.constantFrom(
      ...['1', '0', '.', ',', 'e', '-', '−', '×10', '⁻', '²', '·', '/', '(', ')', '^', ' ', '%', '°', '°C', 'm', 'kg'],
      ...['W', 'K', 'Pa', 's', 'µ', 'bar', 'g', '__proto__', 'constructor', '±', '\u00a0', '\u0000', '🜁'],
    );
    const text = fc.oneof(
      fc.array(pieces, { maxLength: 14 }).map((parts) => parts.join('')),
      fc.string(),
    );
    fc.assert(
      fc.property(text, fc.constantFrom('m²/s', '°C', '1', 'rad/s'), (typed, shown) => {
        const read = parseQuantity(typed, shown);

        if (read.ok) expect(Number.isFinite(read.value)).toBe(true);
        else expect(read.reason).toMatch(/\.$/);
      }),
      rounds,
    );
  });
});

describe('a measured value, over random values and uncertainties', () => {
  it('has U to two digits, the value to the same place, no hyphen for a minus and no zero uncertainty', () => {
    const share = fc.double({ min: 1e-6, max: 10, noNaN: true });
    fc.assert(
      fc.property(magnitude, share, (value, relative) => {
        const u = Math.abs(value) * relative;
        const { mantissa, expanded, exponent, text } = formatMeasured(value, u, 'm');
        const digits = expanded.replace('.', '').replace(/^0+/, '');
        const decimals = (part: string) => part.split('.')[1]?.length ?? 0;
        const scale = 10 ** (exponent ?? 0);

        expect(digits).toMatch(/^[1-9]\d$/);
        expect(decimals(mantissa)).toBe(decimals(expanded));
        expect(text).not.toContain('-');
        expect(mantissa).not.toMatch(/^−0(\.0*)?$/);
        // Half a unit of the last place, and no more, is lost by rounding.
        const place = 0.5000001 * 10 ** -decimals(expanded) * scale;
        expect(Math.abs(Number(expanded) * scale - 2 * u)).toBeLessThanOrEqual(place);
        expect(Math.abs(Number(mantissa.replace('−', '-')) * scale - value)).toBeLessThanOrEqual(place);
      }),
      rounds,
    );
  });
});
