import { describe, expect, it } from 'vitest';
import { dimensionOfFormula } from '../../../shared/engine/formula/check-dimensions.ts';
import { type Dimension, describeDimension, parseUnit } from '../../../shared/engine/quantity/parse-unit.ts';

function dimensions(units: Readonly<Record<string, string>>): Record<string, Dimension> {
  return Object.fromEntries(
    Object.entries(units).map(([name, unit]) => {
      const read = parseUnit(unit);
      if (!read.ok) throw new Error(read.reason);
      return [name, read.unit.dimension];
    }),
  );
}

describe('the unit of a formula', () => {
  it.each<[string, Record<string, string>, string]>([
    ['rho_s * layer / (k * dc)', { rho_s: 'kg/m³', layer: 'm', k: 'm/s', dc: 'kg/m³' }, 's'],
    ['(P - Q) / (pi * d * L * (Tw - Tb))', { P: 'W', Q: 'kW', d: 'mm', L: 'm', Tw: '°C', Tb: 'K' }, 'W/(m² K)'],
    ['sqrt(a * b)', { a: 'm', b: 'm³' }, 'm²'],
    ['cbrt(V)', { V: 'L' }, 'm'],
    ['a^(1/3)', { a: 'm³' }, 'm'],
    ['a^(-2)', { a: 's' }, '1/s²'],
    ['exp(-t / tau)', { t: 'h', tau: 's' }, '1'],
    ['abs(-a)', { a: 'kg' }, 'kg'],
    ['min(a, b)', { a: 'mm', b: 'm' }, 'm'],
    ['x^y', { x: '1', y: '%' }, '1'],
  ])('%s', (text, units, unit) => {
    const read = dimensionOfFormula(text, dimensions(units));

    expect(read.ok ? describeDimension(read.dimension) : read.reason).toBe(unit);
  });
});

describe('a formula whose units do not fit names the term', () => {
  it.each<[string, Record<string, string>, string]>([
    ['a * (b + c)', { a: 'm', b: 'm', c: 's' }, 'Cannot add b (m) and c (s): their units are of different kinds.'],
    ['a - 1', { a: 'm' }, 'Cannot subtract a (m) and 1 (a plain number): their units are of different kinds.'],
    ['log(t)', { t: 's' }, 'log takes a plain number, but t (s) has a unit. Divide it by a reference value.'],
    ['2^t', { t: 's' }, 'The exponent t (s) must be a plain number.'],
    ['a^n', { a: 'm', n: '1' }, 'a (m) has a unit, so its exponent n must be a fixed number.'],
    ['max(a, b)', { a: 'm', b: 's' }, 'max cannot compare a (m) and b (s): their units are of different kinds.'],
    ['a * b', { a: 'm' }, 'b is not bound to anything yet, so its unit is not known.'],
    ['a * toString', { a: 'm' }, 'toString is not bound to anything yet, so its unit is not known.'],
  ])('%s', (text, units, reason) => {
    expect(dimensionOfFormula(text, dimensions(units))).toEqual({ ok: false, reason });
  });

  it('and one that cannot be read says so', () => {
    expect(dimensionOfFormula('a +', {})).toMatchObject({ ok: false });
  });
});
