import { findPointVariable } from '../../../shared/engine/model/point-variables.ts';
import type { Conflict } from './chain-document.ts';
import { type ItemBody, sameContent } from './chain-edits.ts';

export type Side = 'yours' | 'theirs';
export type ConflictField = { readonly field: string; readonly yours: unknown; readonly theirs: unknown };

/** Parts that hold several things of their own; each of those is chosen by itself. */
const nested = new Set(['geometry', 'bindings', 'justifications']);

type Keyed = { readonly key: string };
type Body = Readonly<Record<string, unknown>>;

function isKeyedList(value: unknown): value is readonly Keyed[] {
  return Array.isArray(value) && value.every((one) => typeof one === 'object' && one !== null && 'key' in one);
}

function isNested(field: string, value: unknown): value is Body {
  return nested.has(field) && typeof value === 'object' && value !== null;
}

/** Every part of a body that can be chosen by itself: `name`, `entries/u`, `geometry/family`. */
function partsOf(body: Body): Map<string, unknown> {
  const parts = new Map<string, unknown>();
  for (const [field, value] of Object.entries(body)) {
    if (isKeyedList(value)) for (const one of value) parts.set(`${field}/${one.key}`, one);
    else if (isNested(field, value)) for (const [key, one] of Object.entries(value)) parts.set(`${field}/${key}`, one);
    else parts.set(field, value);
  }
  return parts;
}

/** The body with one part as given; `undefined` takes the part out. */
function withPart(body: Body, path: string, part: unknown): Body {
  const [field = '', key] = path.split('/', 2);
  const old = body[field];
  if (key === undefined) return { ...body, [field]: part };
  if (isKeyedList(old)) {
    const others = part === undefined ? old.filter((one) => one.key !== key) : old;
    const place = others.findIndex((one) => one.key === key);
    const next = place < 0 ? [...others, ...(part === undefined ? [] : [part])] : others.with(place, part as Keyed);
    return { ...body, [field]: next };
  }
  const { [key]: _replaced, ...rest } = (old ?? {}) as Record<string, unknown>;
  return { ...body, [field]: part === undefined ? rest : { ...rest, [key]: part } };
}

/** The parts in which both versions of an item differ. Empty where one side removed it: then the whole item is chosen. */
export function conflictFields(conflict: Conflict): readonly ConflictField[] {
  const { yours, theirs } = conflict;
  if (yours === null || theirs === null) return [];
  const left = partsOf(yours as unknown as Body);
  const right = partsOf(theirs as unknown as Body);
  return [...new Set([...left.keys(), ...right.keys()])]
    .filter((field) => !sameContent(left.get(field), right.get(field)))
    .map((field) => ({ field, yours: left.get(field), theirs: right.get(field) }));
}

/**
 * One body out of two, part by part. Where the kinds of a route differ the parts do not fit together, so the
 * choice for `kind` carries the whole item.
 */
export function mergeConflict(conflict: Conflict, choices: Readonly<Record<string, Side>>): ItemBody | null {
  const { yours, theirs } = conflict;
  const whole = choices['*'] ?? choices.kind;
  if (whole) return whole === 'yours' ? yours : theirs;
  if (yours === null || theirs === null) return yours;
  const merged = conflictFields(conflict)
    .filter(({ field }) => (choices[field] ?? 'yours') === 'yours')
    .reduce<Body>((body, { field, yours: part }) => withPart(body, field, part), theirs as unknown as Body);
  return merged as unknown as ItemBody;
}

const fieldNames: Record<string, string> = {
  adoptedRouteId: 'adopted route',
  operatingPointId: 'operating point',
  unsafeSide: 'unsafe side',
  sourceQuantityId: 'source quantity',
  reynoldsExponent: 'Reynolds exponent',
  schmidtExponent: 'Schmidt exponent',
  extrapolationAllowance: 'extrapolation allowance',
  methodId: 'method',
  ownScatter: 'own scatter',
  testId: 'test',
  performedOn: 'date',
};

export function fieldWords(path: string): string {
  const [field = '', key] = path.split('/', 2);
  if (key === undefined) return fieldNames[field] ?? field;
  const variable = field === 'entries' ? findPointVariable(key) : undefined;
  if (variable) return `${variable.symbol}, ${variable.name}`;
  return field === 'geometry' ? key : `${fieldNames[field] ?? field}: ${key}`;
}

/** A part for reading: what was typed where something was typed, else compact JSON. */
export function valueWords(value: unknown): string {
  if (value === null || value === undefined) return 'none';
  if (typeof value === 'string') return value === '' ? 'empty' : value;
  if (typeof value === 'number' || typeof value === 'boolean') return String(value);
  if (Array.isArray(value)) return value.map(valueWords).join('\n') || 'none';
  if (typeof value !== 'object') return '';
  if ('source' in value) return valueWords(value.source);
  if ('from' in value && value.from === 'test') return 'from a test';
  if ('from' in value && value.from === 'entered' && 'value' in value) return valueWords(value.value);
  if ('text' in value && typeof value.text === 'string') {
    const hasUnit = /[^\d\s.,+\-−eE×^⁻⁰¹²³⁴⁵⁶⁷⁸⁹]/.test(value.text);
    const unit = !hasUnit && 'unit' in value && typeof value.unit === 'string' ? ` ${value.unit}` : '';
    const spread =
      'uncertaintyText' in value && value.uncertaintyText ? `, uncertainty ${String(value.uncertaintyText)}` : '';
    return `${value.text}${unit}${spread}`;
  }
  if ('name' in value && 'value' in value) return `${String(value.name)} = ${String(value.value)}`;
  return JSON.stringify(value, null, 1);
}
