import { describe, expect, it } from 'vitest';
import type { Uncertainty } from '../../../shared/engine/model/study-model.ts';
import { parseQuantity, parseUncertainty } from '../../../shared/engine/quantity/parse-quantity.ts';
import { standardUncertainty } from '../../../shared/engine/quantity/standard-uncertainty.ts';

function reasonOf(text: string, shownUnit: string): string {
  const read = parseQuantity(text, shownUnit);
  if (read.ok) throw new Error(`"${text}" was read as ${read.value}`);
  return read.reason;
}

describe('a value is read the way it is typed', () => {
  it.each([
    ['1.2e-5 m2/s', 'm²/s', 1.2e-5],
    ['1.2×10⁻⁵ m²/s', 'm²/s', 1.2e-5],
    ['1.2 x 10^-5 m2/s', 'm²/s', 1.2e-5],
    ['1.2·10⁻⁵', 'm²/s', 1.2e-5],
    ['0.12 cm2/s', 'm²/s', 1.2e-5],
    ['35 °C', '°C', 308.15],
    ['35', '°C', 308.15],
    ['308.15 K', '°C', 308.15],
    ['0.9 mPa·s', 'Pa s', 9e-4],
    ['0.9', 'mPa·s', 9e-4],
    ['1,5', 'm', 1.5],
    ['0,123', 'm', 0.123],
    ['1.234,5', 'm', 1234.5],
    ['1,234.5', 'm', 1234.5],
    ['12 500', '1', 12500],
    ['1 234', '1', 1234],
    ['−3 K', 'K', -3],
    ['.5 m', 'm', 0.5],
    ['15 %', '1', 0.15],
    ['12 L/min', 'm³/s', 2e-4],
    ['5 celsius', '°C', 278.15],
    ['5 (°C)', '°C', 278.15],
    ['60 rpm', '1/s', 1],
    ['3 rad/s', 'rad/s', 3],
    ['180 rad/min', 'rad/s', 3],
  ])('%s', (text, shownUnit, value) => {
    const read = parseQuantity(text, shownUnit);

    expect(read).toMatchObject({ ok: true });
    if (read.ok) expect(read.value / value).toBeCloseTo(1, 12);
  });

  it('keeps the unit as typed, or the shown one for a bare number', () => {
    expect(parseQuantity('12 L/min', 'm³/s')).toMatchObject({ unit: 'L/min', number: 12 });
    expect(parseQuantity('12', 'L/min')).toMatchObject({ unit: 'L/min', number: 12 });
  });
});

describe('a value is refused with a reason', () => {
  it.each([
    ['', 'm', /Enter a number/],
    ['fast', 'm/s', /does not begin with a number/],
    ['1,234', 'm', /1\.234 or 1234/],
    ['1.2.3', 'm', /more than one decimal sign/],
    ['12,34.5', 'm', /wrong places/],
    ['1e999', 'm', /not a number that can be used/],
    ['3 furlongs', 'm', /not a unit that is known/],
    ['3 kg', 'm', /"kg" is kg; this takes a unit of the kind m\./],
    ['3 m', '1', /a number without a unit/],
    ['2 barg', 'Pa', /gauge pressure/],
    ['-300 °C', '°C', /below absolute zero/],
    ['-300', '°C', /below absolute zero/],
    ['-5 K', '°C', /below absolute zero/],
    ['-300 celsius', '°C', /below absolute zero/],
    ['60 rpm', 'rad/s', /6\.28319 rad = 1 revolution/],
    ['60 1/min', 'rad/s', /revolution/],
    ['10 rad/s', '1/s', /revolution/],
    ['10 rad/s', 'rpm', /revolution/],
    ['2 ton', 'kg', /metric, a long or a short ton/],
  ])('%s in %s', (text, shownUnit, reason) => {
    expect(reasonOf(text, shownUnit)).toMatch(reason);
  });

  it('does not take a spelled-out degree for a kelvin', () => {
    expect(reasonOf('5 celsius', 'K')).toMatch(/278\.15 K, or a difference, 5 K/);
  });

  it('does not take degrees for a difference that is shown in kelvin, nor turn it into a point on the scale', () => {
    expect(reasonOf('5 °C', 'K')).toMatch(/278\.15 K, or a difference, 5 K/);
  });
});

describe('an uncertainty is read as it was stated', () => {
  it.each<[string, Uncertainty['form'], number, string, Uncertainty]>([
    ['3 %', 'relative', 2, 'm', { form: 'relative', fraction: 0.03 }],
    ['3', 'relative', 2, 'm', { form: 'relative', fraction: 0.03 }],
    ['0.15 K', 'standard', 308.15, '°C', { form: 'standard', u: 0.15 }],
    ['0.15 °C', 'standard', 308.15, '°C', { form: 'standard', u: 0.15 }],
    ['±0.15', 'standard', 308.15, '°C', { form: 'standard', u: 0.15 }],
    ['0.3 K; k=2', 'expanded', 308.15, '°C', { form: 'expanded', U: 0.3, k: 2 }],
    ['0.3 K (k = 3)', 'expanded', 308.15, '°C', { form: 'expanded', U: 0.3, k: 3 }],
    ['0.3', 'expanded', 1, 'm', { form: 'expanded', U: 0.3, k: 2 }],
    ['10 %', 'standard', -2, 'm', { form: 'standard', u: 0.2 }],
    ['0.5', 'half-width', 1, 'm', { form: 'half-width', halfWidth: 0.5, distribution: 'rectangular' }],
    ['2 %', 'standard', 0.5, '%', { form: 'standard', u: 0.02 }],
    ['anything', 'exact', 1, 'm', { form: 'exact' }],
  ])('%s, %s', (text, form, value, shownUnit, uncertainty) => {
    expect(parseUncertainty(text, form, value, shownUnit)).toEqual({ ok: true, uncertainty });
  });

  it.each<[string, Uncertainty['form'], string, RegExp]>([
    ['', 'standard', 'm', /Enter the uncertainty/],
    ['-1 m', 'standard', 'm', /zero or more/],
    ['1 kg', 'standard', 'm', /"kg" is kg/],
    ['3 m', 'relative', 'm', /per cent/],
    ['0.3 m; k=0', 'expanded', 'm', /above zero/],
    ['3 %', 'relative', '°C', /zero of its scale/],
    ['3 %', 'standard', '°C', /zero of its scale/],
  ])('refuses %s, %s in %s', (text, form, shownUnit, reason) => {
    const read = parseUncertainty(text, form, 308.15, shownUnit);

    expect(read.ok ? '' : read.reason).toMatch(reason);
  });
});

describe('a statement amounts to a standard uncertainty (JCGM 100:2008, 4.3)', () => {
  it.each<[Uncertainty, number]>([
    [{ form: 'exact' }, 0],
    [{ form: 'standard', u: 0.15 }, 0.15],
    [{ form: 'expanded', U: 0.3, k: 2 }, 0.15],
    [{ form: 'relative', fraction: 0.03 }, 0.06],
    [{ form: 'half-width', halfWidth: 3, distribution: 'rectangular' }, 1.7320508075688772],
    [{ form: 'half-width', halfWidth: 3, distribution: 'triangular' }, 1.2247448713915892],
  ])('%o', (uncertainty, u) => {
    expect(standardUncertainty(uncertainty, -2)).toBeCloseTo(u, 14);
  });
});
