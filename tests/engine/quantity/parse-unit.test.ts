import { describe, expect, it } from 'vitest';
import {
  describeDimension,
  differenceToSi,
  fromSi,
  parseUnit,
  sameDimension,
  toSi,
  type Unit,
} from '../../../shared/engine/quantity/parse-unit.ts';

function unitOf(text: string): Unit {
  const read = parseUnit(text);
  if (!read.ok) throw new Error(read.reason);
  return read.unit;
}

function refusalOf(text: string): string {
  const read = parseUnit(text);
  if (read.ok) throw new Error(`"${text}" was read as ${describeDimension(read.unit.dimension)}`);
  return read.reason;
}

describe('a unit is read the way it is typed', () => {
  it.each([
    ['', 1, '1'],
    ['1', 1, '1'],
    ['%', 0.01, '1'],
    ['m²/s', 1, 'm²/s'],
    ['m2/s', 1, 'm²/s'],
    ['m^2/s', 1, 'm²/s'],
    ['m**2 s^-1', 1, 'm²/s'],
    ['m² s⁻¹', 1, 'm²/s'],
    ['cm²/s', 1e-4, 'm²/s'],
    ['W/(m2 K)', 1, 'W/(m² K)'],
    ['W/(m²·K)', 1, 'W/(m² K)'],
    ['W m^-2 K^-1', 1, 'W/(m² K)'],
    ['kW/(m² K)', 1000, 'W/(m² K)'],
    ['W/m²/K', 1, 'W/(m² K)'],
    ['W/(m² °C)', 1, 'W/(m² K)'],
    ['mPa·s', 1e-3, 'Pa·s'],
    ['mPas', 1e-3, 'Pa·s'],
    ['cP', 1e-3, 'Pa·s'],
    ['cSt', 1e-6, 'm²/s'],
    ['L/min', 1e-3 / 60, 'm³/s'],
    ['m3/h', 1 / 3600, 'm³/s'],
    ['mm', 1e-3, 'm'],
    ['µm', 1e-6, 'm'],
    ['μm', 1e-6, 'm'],
    ['bar', 1e5, 'Pa'],
    ['bara', 1e5, 'Pa'],
    ['rpm', 1 / 60, '1/s'],
    ['J/(kg K)', 1, 'J/(kg K)'],
    ['mol/L', 1000, 'mol/m³'],
    ['d', 86400, 's'],
  ])('%s', (text, factor, dimension) => {
    const unit = unitOf(text);

    expect(unit.factor / factor).toBeCloseTo(1, 12);
    expect(unit.offset).toBe(0);
    expect(describeDimension(unit.dimension)).toBe(dimension);
  });

  it('takes a bare °C as a point on its scale and a difference in it as kelvins', () => {
    const celsius = unitOf('°C');

    expect(toSi(35, celsius)).toBeCloseTo(308.15, 10);
    expect(fromSi(308.15, celsius)).toBeCloseTo(35, 10);
    expect(differenceToSi(35, celsius)).toBe(35);
    expect(sameDimension(celsius.dimension, unitOf('K').dimension)).toBe(true);
  });

  it('takes a bare °F as a point on its scale', () => {
    expect(toSi(212, unitOf('°F'))).toBeCloseTo(373.15, 10);
  });
});

describe('a unit is refused with a reason', () => {
  it.each([
    ['barg', /gauge pressure/],
    ['bar(g)', /gauge pressure/],
    ['Nm³', /conditions it does not name/],
    ['Nm3/h', /conditions it does not name/],
    ['W/m2 K', /two ways/],
    ['furlongs', /not a unit that is known/],
    ['constructor', /not a unit that is known/],
    ['toString', /not a unit that is known/],
    ['m/(s', /cannot be read as a unit/],
    ['m)', /cannot be read as a unit/],
    ['m/', /cannot be read as a unit/],
    ['m + s', /cannot be read as a unit/],
    ['m'.repeat(61), /at most 60/],
  ])('%s', (text, reason) => {
    expect(refusalOf(text)).toMatch(reason);
  });
});
