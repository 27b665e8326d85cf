import type { Uncertainty } from '../model/study-model.ts';
import { formatNumber } from './format-measured.ts';
import { describeDimension, differenceToSi, parseUnit, sameDimension, toSi, type Unit } from './parse-unit.ts';
import { readTypedNumber } from './read-typed-number.ts';

export type QuantityReading =
  | {
      readonly ok: true;
      /** Coherent SI. */
      readonly value: number;
      /** As typed, or the shown unit where none was typed. */
      readonly unit: string;
      /** The number as typed, in `unit`. */
      readonly number: number;
    }
  | { readonly ok: false; readonly reason: string };

type UnitOf = { readonly ok: true; readonly unit: Unit } | { readonly ok: false; readonly reason: string };

/** The typed unit, which must have the dimension of the shown one; nothing typed means the shown one. */
function unitFor(typed: string, shownUnit: string): UnitOf {
  const shown = parseUnit(shownUnit);
  if (typed === '' || !shown.ok) return shown;
  const own = parseUnit(typed);
  if (!own.ok) return own;
  if (!sameDimension(own.unit.dimension, shown.unit.dimension)) {
    const wanted =
      shownUnit === '' || shownUnit === '1' ? 'a number without a unit' : `a unit of the kind ${shownUnit}`;
    return { ok: false, reason: `"${typed}" is ${describeDimension(own.unit.dimension)}; this takes ${wanted}.` };
  }
  const isPlain = own.unit.dimension.every((exponent) => exponent === 0);
  if (!isPlain && namesRadians(typed) !== namesRadians(shownUnit)) {
    return {
      ok: false,
      reason:
        `One of "${typed}" and "${shownUnit}" is in radians, the other can count revolutions ` +
        `(6.28319 rad = 1 revolution). Convert the number and enter it in ${shownUnit}.`,
    };
  }
  return own;
}

/** The SI takes rad as 1, so that dimensions alone do not tell an angular velocity from a speed in revolutions. */
function namesRadians(unit: string): boolean {
  return /(?<![A-Za-z])rad(?![A-Za-z])/.test(unit);
}

/**
 * Reads a value the way engineers type it: `1.2e-5 m2/s`, `1.2×10⁻⁵ m²/s`, `35 °C`, `0.9 mPa·s`; a bare number is in
 * the shown unit. What can be read in two ways is refused with both readings.
 */
export function parseQuantity(text: string, shownUnit: string): QuantityReading {
  if (text.trim() === '') return { ok: false, reason: 'Enter a number, with its unit if it is not the shown one.' };
  const typed = readTypedNumber(text);
  if (!typed.ok) return typed;
  const unit = unitFor(typed.rest, shownUnit);
  if (!unit.ok) return unit;
  const value = toSi(typed.value, unit.unit);
  const shown = parseUnit(shownUnit);
  const isShownOnScale = shown.ok && shown.unit.offset !== 0;
  if (unit.unit.offset !== 0 && !isShownOnScale) {
    const [point, difference] = [value, differenceToSi(typed.value, unit.unit)].map((x) => formatNumber(x, 6));
    return {
      ok: false,
      reason: `"${text.trim()}" can be a temperature, ${point} K, or a difference, ${difference} K. Write it in K.`,
    };
  }
  if (isShownOnScale && value < -1e-9) {
    return { ok: false, reason: `${text.trim()} is below absolute zero (−273.15 °C). Check the sign and the unit.` };
  }
  return { ok: true, value, unit: typed.rest === '' ? shownUnit : typed.rest, number: typed.value };
}

/**
 * Reads an uncertainty as it was stated. `3 %` is relative to the value whatever the form; other amounts are in the
 * shown unit or one of its kind, as differences (0.2 °C is 0.2 K). An expanded one may name its factor: `0.3 K; k=2`.
 */
export function parseUncertainty(
  text: string,
  form: Uncertainty['form'],
  value: number,
  shownUnit: string,
  distribution: 'rectangular' | 'triangular' = 'rectangular',
): { readonly ok: true; readonly uncertainty: Uncertainty } | { readonly ok: false; readonly reason: string } {
  if (form === 'exact') return { ok: true, uncertainty: { form } };
  const [, amount = '', factor] = /^\s*(?:±|\+\/-)?\s*(.*?)\s*(?:[;,]?\s*\(?k\s*=\s*([\d.]+)\)?)?\s*$/.exec(text) ?? [];
  if (amount === '') return { ok: false, reason: 'Enter the uncertainty, for example 0.2 K or 3 %.' };
  const typed = readTypedNumber(amount);
  if (!typed.ok) return typed;
  if (typed.value < 0) return { ok: false, reason: 'An uncertainty is zero or more.' };
  const isRelative = typed.rest === '%' && isNotInPercent(shownUnit);
  const shown = parseUnit(shownUnit);
  if ((isRelative || form === 'relative') && shown.ok && shown.unit.offset !== 0) {
    const reason = 'A share of a temperature depends on the zero of its scale. Give an amount, for example 0.2 K.';
    return { ok: false, reason };
  }

  if (form === 'relative') {
    if (typed.rest !== '%' && typed.rest !== '')
      return { ok: false, reason: 'Enter a relative uncertainty in per cent, for example 3 %.' };
    return { ok: true, uncertainty: { form, fraction: typed.value / 100 } };
  }
  const unit = isRelative ? null : unitFor(typed.rest, shownUnit);
  if (unit && !unit.ok) return unit;
  const inSi = unit ? differenceToSi(typed.value, unit.unit) : (Math.abs(value) * typed.value) / 100;
  switch (form) {
    case 'standard':
      return { ok: true, uncertainty: { form, u: inSi } };
    case 'expanded': {
      const k = Number(factor ?? 2);
      if (!(k > 0)) return { ok: false, reason: 'The coverage factor k is a number above zero, for example k=2.' };
      return { ok: true, uncertainty: { form, U: inSi, k } };
    }
    case 'half-width':
      return { ok: true, uncertainty: { form, halfWidth: inSi, distribution } };
  }
}

/** Where the value itself is in per cent, "3 %" is an amount and not a share of the value. */
function isNotInPercent(shownUnit: string): boolean {
  return shownUnit.trim() !== '%';
}
