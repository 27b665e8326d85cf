import type { Conflict } from './chain-document.ts';
import { type ItemBody, sameContent } from './chain-edits.ts';

export type Side = 'yours' | 'theirs';
export type ConflictField = { readonly field: string; readonly yours: unknown; readonly theirs: unknown };

/** The fields in which both versions of an item differ. Empty where one side removed it: then the whole item is chosen. */
export function conflictFields(conflict: Conflict): readonly ConflictField[] {
  const { yours, theirs } = conflict;
  if (yours === null || theirs === null) return [];
  const left = yours as unknown as Record<string, unknown>;
  const right = theirs as unknown as Record<string, unknown>;
  return [...new Set([...Object.keys(left), ...Object.keys(right)])]
    .filter((field) => !sameContent(left[field], right[field]))
    .map((field) => ({ field, yours: left[field], theirs: right[field] }));
}

/**
 * One body out of two, field by field. Where the kinds of a route differ the fields do not fit together, so the
 * choice for `kind` carries the whole item.
 */
export function mergeConflict(conflict: Conflict, choices: Readonly<Record<string, Side>>): ItemBody | null {
  const { yours, theirs } = conflict;
  const whole = choices['*'] ?? choices.kind;
  if (whole) return whole === 'yours' ? yours : theirs;
  if (yours === null || theirs === null) return yours;
  const left = yours as unknown as Record<string, unknown>;
  const right = theirs as unknown as Record<string, unknown>;
  const merged: Record<string, unknown> = { ...right };
  for (const { field } of conflictFields(conflict)) {
    if ((choices[field] ?? 'yours') === 'theirs') continue;
    if (field in left) merged[field] = left[field];
    else delete merged[field];
  }
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

export function fieldWords(field: string): string {
  return fieldNames[field] ?? field;
}

/** A value of a field for reading: what was typed where something was typed, else compact JSON. */
export function valueWords(value: unknown): string {
  if (value === null || value === undefined) return 'none';
  if (typeof value === 'string') return value === '' ? 'empty' : value;
  if (typeof value === 'number' || typeof value === 'boolean') return String(value);
  if (typeof value === 'object' && 'text' in value && typeof value.text === 'string') {
    const unit = 'unit' in value && typeof value.unit === 'string' ? ` ${value.unit}` : '';
    const uncertainty =
      'uncertaintyText' in value && value.uncertaintyText ? `, uncertainty ${String(value.uncertaintyText)}` : '';
    return `${value.text}${unit}${uncertainty}`;
  }
  return JSON.stringify(value, null, 1);
}
