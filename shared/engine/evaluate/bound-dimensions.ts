import { findPointVariable } from '../model/point-variables.ts';
import type { Binding, StudyModel } from '../model/study-model.ts';
import { type Dimension, parseUnit } from '../quantity/parse-unit.ts';

/** The dimension of a unit as text; null where it cannot be read. */
export function dimensionOfUnit(text: string): Dimension | null {
  const parsed = parseUnit(text);
  return parsed.ok ? parsed.unit.dimension : null;
}

/** The dimension of what a variable is bound to; null where the binding leads nowhere or its unit cannot be read. */
export function dimensionOfBinding(model: StudyModel, binding: Binding): Dimension | null {
  if (binding.from === 'point') {
    const variable = findPointVariable(binding.key);
    return variable ? dimensionOfUnit(variable.siUnit) : null;
  }
  const quantity = model.quantities.find((one) => one.id === binding.quantityId);
  return quantity ? dimensionOfUnit(quantity.unit) : null;
}
