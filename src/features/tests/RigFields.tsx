import { useState } from 'react';
import type { MeasuredValue, OperatingPoint, Uncertainty } from '../../../shared/engine/model/study-model.ts';
import { parseUncertainty } from '../../../shared/engine/quantity/parse-quantity.ts';
import { QuantityField, uncertaintyForms } from '../../chain/QuantityField.tsx';
import type { Reduction } from './reduce-preview.ts';

export type InstrumentKey = keyof Reduction['instruments'];
export const instrumentNames: Record<InstrumentKey, { readonly name: string; readonly unit: string }> = {
  power: { name: 'heater power', unit: 'W' },
  wallTemperature: { name: 'wall temperature', unit: 'K' },
  bulkTemperature: { name: 'bulk temperature', unit: 'K' },
  flow: { name: 'flow', unit: 'm/s' },
};

/** The type B uncertainty of one instrument, from its certificate or data sheet. */
export function InstrumentField({
  name,
  unit,
  mean,
  onChange,
}: {
  readonly name: string;
  readonly unit: string;
  /** Mean reading in SI; null before readings are there. */
  readonly mean: number | null;
  readonly onChange: (uncertainty: Uncertainty | null) => void;
}) {
  const [form, setForm] = useState<Uncertainty['form']>('standard');
  const [text, setText] = useState('');

  function read(
    nextForm: Uncertainty['form'],
    nextText: string,
  ): { uncertainty: Uncertainty | null; reason: string | null } {
    if (nextForm === 'exact') return { uncertainty: { form: 'exact' }, reason: null };
    if (nextText.trim() === '') return { uncertainty: null, reason: null };
    const parsed = parseUncertainty(nextText, nextForm, mean ?? 1, unit);
    return parsed.ok ? { uncertainty: parsed.uncertainty, reason: null } : { uncertainty: null, reason: parsed.reason };
  }

  function handle(nextForm: Uncertainty['form'], nextText: string): void {
    setForm(nextForm);
    setText(nextText);
    onChange(read(nextForm, nextText).uncertainty);
  }

  const { reason } = read(form, text);
  return (
    <fieldset className="grid content-start gap-1">
      <legend className="pb-1 text-xs font-semibold">Instrument for the {name}</legend>
      <select
        aria-label={`How the uncertainty of the ${name} is stated`}
        className="min-h-9 border border-line bg-surface px-2 text-sm"
        value={form}
        onChange={(event) => handle(event.target.value as Uncertainty['form'], text)}
      >
        {Object.entries(uncertaintyForms).map(([key, words]) => (
          <option key={key} value={key}>
            {words}
          </option>
        ))}
      </select>
      <input
        aria-label={`Type B uncertainty of the ${name}`}
        className="num min-h-9 border border-line bg-surface px-2 aria-invalid:border-2 aria-invalid:border-bad"
        value={form === 'exact' ? '' : text}
        disabled={form === 'exact'}
        placeholder={form === 'relative' ? '1 %' : `0.15 ${unit}`}
        aria-invalid={reason !== null}
        onChange={(event) => handle(form, event.target.value)}
      />
      {reason && (
        <p role="alert" className="text-xs font-semibold text-bad">
          {reason}
        </p>
      )}
    </fieldset>
  );
}

/** Heat that does not reach the fluid, and the heated surface. */
export function RigFields({
  point,
  onHeatLoss,
  onSurface,
}: {
  readonly point: OperatingPoint | undefined;
  readonly onHeatLoss: (value: MeasuredValue | null) => void;
  readonly onSurface: (surface: Reduction['surface'] | null) => void;
}) {
  const [shape, setShape] = useState<Reduction['surface']['shape']>('cylinder');
  return (
    <div className="grid gap-3 sm:grid-cols-2">
      <QuantityField
        label="Heat loss"
        meaning="power that does not reach the fluid"
        unit="W"
        value={null}
        onChange={onHeatLoss}
        onHold={(text) => text && onHeatLoss(null)}
      />
      <div className="grid gap-2">
        <label className="grid gap-1 text-xs font-semibold">
          Heated surface
          <select
            className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
            value={shape}
            onChange={(event) => {
              setShape(event.target.value as typeof shape);
              onSurface(null);
            }}
          >
            <option value="cylinder">
              cylinder: π · {point ? `length L of ${point.name}` : 'diameter'} · heated length
            </option>
            <option value="stated area">stated area</option>
          </select>
        </label>
        {shape === 'cylinder' ? (
          <QuantityField
            key="length"
            label="Heated length"
            meaning="length along the flow"
            unit="m"
            value={null}
            onChange={(length) => onSurface({ shape: 'cylinder', length })}
            onHold={(text) => text && onSurface(null)}
          />
        ) : (
          <QuantityField
            key="area"
            label="Heated area"
            meaning="area"
            unit="m²"
            value={null}
            onChange={(area) => onSurface({ shape: 'stated area', area })}
            onHold={(text) => text && onSurface(null)}
          />
        )}
      </div>
    </div>
  );
}
