import { create, type FactoryFunctionMap, type MathJsInstance, unitDependencies } from 'mathjs';

/** Exponents of m, kg, s, A, K, mol, cd. */
export type Dimension = readonly number[];

export type Unit = {
  /** As typed. */
  readonly text: string;
  readonly dimension: Dimension;
  /** SI value = x · factor + offset. The offset is only for a bare °C or °F, which name points on a scale. */
  readonly factor: number;
  readonly offset: number;
};
export type UnitReading = { readonly ok: true; readonly unit: Unit } | { readonly ok: false; readonly reason: string };

// An instance of our own: nobody else can change its configuration or units.
const math = create({ unitDependencies } as FactoryFunctionMap) as MathJsInstance;

/** mathjs lists mass, length, time, current, temperature, luminous intensity, amount, angle, bit. */
const placeInMathjs = [1, 0, 2, 3, 4, 6, 5] as const;

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** What engineers write that mathjs does not know: the same in names it does. */
const otherNames: Readonly<Record<string, string>> = { mPas: 'mPa s', Pas: 'Pa s', bara: 'bar', Ω: 'ohm', d: 'day' };

/** Names with a factor of our own: centipoise, centistokes, revolutions, per cent; radians are 1. */
const ownFactors: Readonly<Record<string, readonly [factor: number, dimension: Dimension]>> = {
  cP: [1e-3, [-1, 1, -1, 0, 0, 0, 0]],
  cSt: [1e-6, [2, 0, -1, 0, 0, 0, 0]],
  St: [1e-4, [2, 0, -1, 0, 0, 0, 0]],
  rpm: [1 / 60, [0, 0, -1, 0, 0, 0, 0]],
  rad: [1, [0, 0, 0, 0, 0, 0, 0]],
  '%': [0.01, [0, 0, 0, 0, 0, 0, 0]],
  '‰': [0.001, [0, 0, 0, 0, 0, 0, 0]],
  '1': [1, [0, 0, 0, 0, 0, 0, 0]],
};

const refusals: readonly { readonly pattern: RegExp; readonly reason: string }[] = [
  {
    pattern: /\bbarg\b|\bbar\(g\)|\bpsig\b/i,
    reason: 'is a gauge pressure. Add the ambient pressure and enter the absolute one in bar.',
  },
  {
    pattern: /\bNm[3³]|\bNm\^3|\bSm[3³]/,
    reason:
      'is a gas volume at conditions it does not name. Enter a mass, an amount or the volume at the actual state.',
  },
  { pattern: /\btons?(?![A-Za-z])/, reason: 'can be a metric, a long or a short ton. Write t or kg.' },
  { pattern: /\b(gal|gallons?)(?![A-Za-z])/, reason: 'can be a US or an imperial gallon. Write L or m3.' },
];

const dimensionless: Dimension = [0, 0, 0, 0, 0, 0, 0];
const cache = new Map<string, UnitReading>();

/**
 * Reads a unit the way engineers type it: `m²/s`, `m2/s`, `W/(m2 K)`, `W m^-2 K^-1`, `mPa·s`, `°C`, `%`, `L/min`.
 * Nothing and `1` are dimensionless. Two factors after a slash without brackets are refused as ambiguous.
 */
export function parseUnit(text: string): UnitReading {
  const trimmed = text.trim();
  const known = cache.get(trimmed);
  if (known) return known;
  const reading = readUnit(trimmed);
  if (cache.size > 2000) cache.clear();
  cache.set(trimmed, reading);
  return reading;
}

function readUnit(text: string): UnitReading {
  if (text === '' || text === '-') return { ok: true, unit: { text, dimension: dimensionless, factor: 1, offset: 0 } };
  if (text.length > 60) return { ok: false, reason: 'A unit has at most 60 characters.' };
  for (const { pattern, reason } of refusals)
    if (pattern.test(text)) return { ok: false, reason: `"${text}" ${reason}` };
  const bare = temperatureScale(text.replace('℃', '°C').replace(/^deg ?/, '°'));
  if (bare) return { ok: true, unit: { text, dimension: kelvin, ...bare } };
  return combine(text);
}

const kelvin: Dimension = [0, 0, 0, 0, 1, 0, 0];
const temperatureScales: Readonly<Record<string, { factor: number; offset: number }>> = {
  '°C': { factor: 1, offset: 273.15 },
  celsius: { factor: 1, offset: 273.15 },
  '°F': { factor: 5 / 9, offset: 459.67 * (5 / 9) },
  fahrenheit: { factor: 5 / 9, offset: 459.67 * (5 / 9) },
};

/** Only names of its own: "constructor" is in every object. */
function temperatureScale(name: string): { factor: number; offset: number } | undefined {
  return Object.hasOwn(temperatureScales, name) ? temperatureScales[name] : undefined;
}

/** Factor and dimension of one name, such as `mPa`; null when nobody knows it. */
function oneUnit(name: string): readonly [number, Dimension] | null {
  if (Object.hasOwn(ownFactors, name)) return ownFactors[name] ?? null;
  // In a product a degree is a difference: a kelvin, or 5/9 of one.
  const scale = temperatureScale(name);
  if (scale) return [scale.factor, kelvin];
  try {
    const unit = math.unit(1, name) as unknown as { value: number; dimensions: number[] };
    const [, , , , , , , angle = 0, bit = 0] = unit.dimensions;
    if (angle !== 0 || bit !== 0 || !Number.isFinite(unit.value)) return null;
    return [unit.value, placeInMathjs.map((place) => unit.dimensions[place] ?? 0)];
  } catch {
    return null;
  }
}

/** Reads products, quotients, powers and brackets of names. */
function combine(text: string): UnitReading {
  const unreadable: UnitReading = {
    ok: false,
    reason: `"${text}" cannot be read as a unit. Write for example m2/s, W/(m2 K), mPa·s or °C.`,
  };
  let rest = withPlainPowers(text);
  let factor = 1;
  const dimension = [0, 0, 0, 0, 0, 0, 0];
  /** Sign of the exponents inside each open bracket, outermost first. */
  const signs = [1];
  let isBelow = false;
  /** Factors since the last slash outside brackets; −1 before the first slash. */
  let sinceSlash = -1;
  /** Names so far with their powers, to tell a degree that stands alone, as in "(°C)", from one in a product. */
  const names: (readonly [name: string, power: number])[] = [];
  while (rest !== '') {
    const [token = '', word, exponent] =
      /^(?:(°C|°F|[A-Za-zΩ]+|[%‰]|1(?![\d.]))(?:\^([+-]?\d{1,2}))?|[/()])\s*/.exec(rest) ?? [];
    if (token === '') return unreadable;
    rest = rest.slice(token.length);
    const sign = (signs.at(-1) ?? 1) * (isBelow ? -1 : 1);
    if (word !== undefined || token.startsWith('(')) {
      if (signs.length === 1 && sinceSlash >= 0) sinceSlash += 1;
      if (sinceSlash > 1) {
        const reason = `"${text}" can be read in two ways. Put everything below the line in brackets, as in W/(m2 K).`;
        return { ok: false, reason };
      }
    }
    if (word !== undefined) {
      const power = sign * Number(exponent ?? 1);
      if (word !== '1') names.push([word, power]);
      for (const name of (Object.hasOwn(otherNames, word) ? (otherNames[word] ?? word) : word).split(' ')) {
        const unit = oneUnit(name);
        if (!unit)
          return {
            ok: false,
            reason: `"${word}" is not a unit that is known here. Write for example m2/s, W/(m2 K), mPa·s or °C.`,
          };
        factor *= unit[0] ** power;
        unit[1].forEach((of, index) => {
          dimension[index] = (dimension[index] ?? 0) + of * power;
        });
      }
      if (signs.length === 1 || isBelow) isBelow = false;
    } else if (token.startsWith('/')) {
      isBelow = true;
      if (signs.length === 1) sinceSlash = 0;
    } else if (token.startsWith('(')) {
      signs.push(sign);
      isBelow = false;
    } else {
      if (signs.length === 1) return unreadable;
      signs.pop();
      isBelow = false;
    }
  }
  if (signs.length !== 1 || isBelow) return unreadable;
  const [[only, power] = ['', 0], ...others] = names;
  const scale = others.length === 0 && power === 1 ? temperatureScale(only) : undefined;
  return { ok: true, unit: { text, dimension, factor, offset: scale?.offset ?? 0 } };
}

/** Superscripts and bare digits after a name become `^n`; every sign of a product becomes a space. */
function withPlainPowers(text: string): string {
  return text
    .replace(
      /[⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/g,
      (power) =>
        `^${power
          .replace('⁻', '-')
          .replace('⁺', '')
          .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (digit) => String(superscripts.indexOf(digit)))}`,
    )
    .replaceAll('℃', '°C')
    .replace(/\bdeg ?([CF])\b/g, '°$1')
    .replace(/[−–]/g, '-')
    .replaceAll('**', '^')
    .replace(/\s*\^\s*\(?\s*([+-]?\d+)\s*\)?/g, '^$1')
    .replace(/([A-Za-zΩ])([+-]?\d)/g, '$1^$2')
    .replace(/[·⋅∙×*]/g, ' ')
    .replace(/[µμ]/g, 'u')
    .trim();
}

/** A number in the unit, into coherent SI; a bare °C is a point on the scale and becomes kelvin. */
export function toSi(x: number, unit: Unit): number {
  return x * unit.factor + unit.offset;
}

export function fromSi(x: number, unit: Unit): number {
  return (x - unit.offset) / unit.factor;
}

/** A difference or an uncertainty in the unit: 5 °C of it are 5 K. */
export function differenceToSi(x: number, unit: Unit): number {
  return x * unit.factor;
}

export function differenceFromSi(x: number, unit: Unit): number {
  return x / unit.factor;
}

export function sameDimension(a: Dimension, b: Dimension): boolean {
  return a.every((exponent, index) => Math.abs(exponent - (b[index] ?? 0)) < 1e-9);
}

const baseUnits = ['m', 'kg', 's', 'A', 'K', 'mol', 'cd'] as const;
/** Named combinations, so that a sentence says W/(m² K) and not kg/(s³ K). */
const namedDimensions: readonly (readonly [string, Dimension])[] = [
  ['W/(m² K)', [0, 1, -3, 0, -1, 0, 0]],
  ['W/(m K)', [1, 1, -3, 0, -1, 0, 0]],
  ['J/(kg K)', [2, 0, -2, 0, -1, 0, 0]],
  ['Pa·s', [-1, 1, -1, 0, 0, 0, 0]],
  ['Pa', [-1, 1, -2, 0, 0, 0, 0]],
  ['W', [2, 1, -3, 0, 0, 0, 0]],
  ['J', [2, 1, -2, 0, 0, 0, 0]],
  ['N', [1, 1, -2, 0, 0, 0, 0]],
];

function power(name: string, exponent: number): string {
  if (exponent === 1) return name;
  const rounded = Number(exponent.toPrecision(4));
  if (!Number.isInteger(rounded)) return `${name}^${rounded}`;
  return (
    name +
    String(rounded)
      .replace('-', '⁻')
      .replace(/\d/g, (digit) => superscripts[Number(digit)] ?? digit)
  );
}

/** The coherent SI unit of a dimension, for a sentence: `kg/(m s)`; `1` where it has none. */
export function describeDimension(dimension: Dimension): string {
  const named = namedDimensions.find(([, known]) => sameDimension(known, dimension));
  if (named) return named[0];
  const part = (sign: 1 | -1) =>
    baseUnits.flatMap((name, index) => {
      const exponent = (dimension[index] ?? 0) * sign;
      return exponent > 1e-9 ? [power(name, exponent)] : [];
    });
  const [above, below] = [part(1), part(-1)];
  if (below.length === 0) return above.join(' ') || '1';
  return `${above.join(' ') || '1'}/${below.length === 1 ? below[0] : `(${below.join(' ')})`}`;
}
