import { randomUUID } from 'node:crypto';
import type { ChainEdit } from '../../../shared/api/studies.ts';
import type {
  MeasuredValue,
  OperatingPoint,
  PointEntry,
  Quantity,
  Route,
} from '../../../shared/engine/model/study-model.ts';
import { parseQuantity, parseUncertainty } from '../../../shared/engine/quantity/parse-quantity.ts';

/** A value typed as an engineer would: `typed('0.460 m/s', '0.7 %')`; without an uncertainty it is exact. */
export function typed(text: string, uncertaintyText = ''): MeasuredValue {
  const unit = /[^\d\s.,+\-−eE×^⁻⁰¹²³⁴⁵⁶⁷⁸⁹].*$/.exec(text)?.[0] ?? '1';
  const value = parseQuantity(text, unit);
  if (!value.ok) throw new Error(value.reason);
  const form = uncertaintyText === '' ? 'exact' : uncertaintyText.endsWith('%') ? 'relative' : 'standard';
  const uncertainty = parseUncertainty(uncertaintyText, form, value.value, unit);
  if (!uncertainty.ok) throw new Error(uncertainty.reason);
  return { text, value: value.value, unit, uncertaintyText, uncertainty: uncertainty.uncertainty };
}

export function entry(key: PointEntry['key'], text: string, uncertaintyText = ''): PointEntry {
  return { key, source: { from: 'entered', value: typed(text, uncertaintyText) } };
}

export function quantity(
  facts: Pick<Quantity, 'symbol' | 'name' | 'unit' | 'operatingPointId'> & Partial<Quantity>,
): Quantity {
  return { id: randomUUID(), adoptedRouteId: null, limit: null, unsafeSide: null, note: '', ...facts };
}

/** What every route has; the kind's own parts come beside it. */
export function routeFor(of: Quantity, name: string, rationale = '', justifications: Record<string, string> = {}) {
  return { id: randomUUID(), quantityId: of.id, name, rationale, justifications };
}

export function statedValue(of: Quantity, value: MeasuredValue, evidence: string): Route {
  return { ...routeFor(of, 'Stated value'), kind: 'stated-value', value, evidence };
}

export function put(kind: 'operating-point', body: OperatingPoint, expectedRevision?: number): ChainEdit;
export function put(kind: 'quantity', body: Quantity, expectedRevision?: number): ChainEdit;
export function put(kind: 'route', body: Route, expectedRevision?: number): ChainEdit;
export function put(
  kind: 'operating-point' | 'quantity' | 'route',
  body: OperatingPoint | Quantity | Route,
  expectedRevision = 0,
): ChainEdit {
  return { kind, id: body.id, expectedRevision, body };
}
