import { findPointVariable } from '../../../shared/engine/model/point-variables.ts';
import { type Binding, pointReadingKeys } from '../../../shared/engine/model/study-model.ts';
import { useChain } from '../chain-context.ts';
import type { EditOutcome } from '../editing/chain-document.ts';
import { ChoiceField, type Option } from './fields.tsx';

function keyOf(binding: Binding | null): string {
  if (binding === null) return '';
  return binding.from === 'quantity'
    ? `quantity ${binding.quantityId}`
    : `point ${binding.operatingPointId} ${binding.key}`;
}

/** Where a variable of a route takes its value: another quantity, or a reading of an operating point. */
export function BindingField({
  label,
  binding,
  ownQuantityId,
  emptyWords,
  locked,
  onChange,
}: {
  readonly label: string;
  readonly binding: Binding | null;
  readonly ownQuantityId: string;
  readonly emptyWords: string;
  readonly locked: boolean;
  readonly onChange: (binding: Binding | null) => EditOutcome;
}) {
  const { state } = useChain();
  const bindings = new Map<string, Binding>();
  const options: Option[] = [{ value: '', words: emptyWords }];
  function offer(candidate: Binding, words: string, group: string): void {
    bindings.set(keyOf(candidate), candidate);
    options.push({ value: keyOf(candidate), words, group });
  }
  for (const quantity of state.model.quantities) {
    if (quantity.id === ownQuantityId) continue;
    offer({ from: 'quantity', quantityId: quantity.id }, `${quantity.symbol}, ${quantity.name}`, 'Quantities');
  }
  for (const point of state.model.operatingPoints) {
    for (const key of pointReadingKeys) {
      const variable = findPointVariable(key);
      if (variable)
        offer({ from: 'point', operatingPointId: point.id, key }, `${variable.symbol}, ${variable.name}`, point.name);
    }
  }
  return (
    <ChoiceField
      label={label}
      value={keyOf(binding)}
      options={options}
      disabled={locked}
      onChange={(value) => onChange(bindings.get(value) ?? null)}
    />
  );
}
