import { describe, expect, it } from 'vitest';
import { formatMeasured, formatNumber } from '../../../shared/engine/quantity/format-measured.ts';

describe('a measured value', () => {
  it.each([
    [5.412e-5, 0.2961e-5, 'm/s', '(5.41 ± 0.59) × 10⁻⁵ m/s'],
    [308.15, 0.15, '°C', '(35.00 ± 0.30) °C'],
    [0.0009, 0.000009, 'mPa·s', '(0.900 ± 0.018) mPa·s'],
    [1234, 6, 'W/(m2 K)', '(1234 ± 12) W/(m² K)'],
    [-0.5, 0.05, 'K', '(−0.50 ± 0.10) K'],
    [1.27, 0.0123, '1', '1.270 ± 0.025'],
    // The uncertainty rounds up to three digits' place, and the value follows it.
    [10, 0.4998, 'm', '(10.0 ± 1.0) m'],
    // An uncertainty larger than its value still shares one power with it.
    [1e-7, 5e-6, 'm/s', '(0.0 ± 1.0) × 10⁻⁵ m/s'],
    [0, 0.5, 'm', '(0.0 ± 1.0) m'],
  ])('%s with u = %s in %s has U to two digits and the value to the same place', (value, u, unit, text) => {
    expect(formatMeasured(value, u, unit).text).toBe(text);
  });

  it('without uncertainty keeps what was entered', () => {
    expect(formatMeasured(1.2e-5, 0, 'm2/s').text).toBe('1.2 × 10⁻⁵ m²/s');
    expect(formatMeasured(0.02, 0, 'mm').text).toBe('20 mm');
  });

  it('is expanded with the factor that is asked for', () => {
    expect(formatMeasured(10, 1, 'm', 1).expanded).toBe('1.0');
    expect(formatMeasured(10, 1, 'm', 3).expanded).toBe('3.0');
  });

  it('that is not finite is no value', () => {
    expect(formatMeasured(Number.NaN, 1, 'm').text).toBe('no value');
    expect(formatMeasured(1, Number.POSITIVE_INFINITY, 'm').text).toBe('no value');
  });
});

describe('a plain number', () => {
  it.each([
    [25300, '25\u00a0300'],
    [1234, '1234'],
    [1.26992, '1.27'],
    [367000, '367\u00a0000'],
    [3670000, '3.67 × 10⁶'],
    [0.0000123, '1.23 × 10⁻⁵'],
    [-2.5, '−2.5'],
    [0, '0'],
    [Number.NaN, 'no value'],
  ])('%s', (x, text) => {
    expect(formatNumber(x)).toBe(text);
  });
});
