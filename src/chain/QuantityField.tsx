import { useId, useState } from 'react';
import type { MeasuredValue, Uncertainty } from '../../shared/engine/model/study-model.ts';
import { formatMeasured } from '../../shared/engine/quantity/format-measured.ts';
import { parseQuantity, parseUncertainty } from '../../shared/engine/quantity/parse-quantity.ts';
import { standardUncertainty } from '../../shared/engine/quantity/standard-uncertainty.ts';
import type { HeldText } from './chain-context.ts';

export const uncertaintyForms: Readonly<Record<Uncertainty['form'], string>> = {
  standard: 'u, standard',
  expanded: 'U, expanded (k = 2)',
  relative: 'u, relative (%)',
  'half-width': '± limits, rectangular',
  exact: 'exact',
};

export type Understood =
  | { readonly ok: true; readonly value: MeasuredValue }
  | { readonly ok: false; readonly reason: string; readonly part: 'value' | 'uncertainty' };

/** Reads what was typed; nothing is guessed, a refusal names the part that was not understood. */
export function understand(text: string, uncertaintyText: string, form: Uncertainty['form'], unit: string): Understood {
  const read = parseQuantity(text, unit);
  if (!read.ok) return { ok: false, reason: read.reason, part: 'value' };
  const typed = uncertaintyText.trim();
  if (form !== 'exact' && typed === '') {
    return { ok: false, reason: 'Give its uncertainty too, or choose “exact”.', part: 'uncertainty' };
  }
  const uncertainty: ReturnType<typeof parseUncertainty> =
    form === 'exact' ? { ok: true, uncertainty: { form: 'exact' } } : parseUncertainty(typed, form, read.value, unit);
  if (!uncertainty.ok) return { ok: false, reason: uncertainty.reason, part: 'uncertainty' };
  return {
    ok: true,
    value: {
      text: text.trim(),
      value: read.value,
      unit: read.unit,
      uncertaintyText: form === 'exact' ? '' : typed,
      uncertainty: uncertainty.uncertainty,
    },
  };
}

/**
 * A value with its unit and uncertainty as free text. A bare number means the unit shown; under the field stands
 * what was understood. Text that is not understood stays as typed, is explained, and is not handed on.
 */
export function QuantityField({
  label,
  meaning,
  unit,
  value,
  onChange,
  onSettle,
  held,
  onHold,
  disabled = false,
  refusal = null,
}: {
  readonly label: string;
  /** What it is read as, e.g. "kinematic viscosity". */
  readonly meaning?: string;
  readonly unit: string;
  readonly value: MeasuredValue | null;
  readonly onChange: (value: MeasuredValue) => void;
  /** Typing ended: the field lost the focus. */
  readonly onSettle?: () => void;
  readonly held?: HeldText | undefined;
  readonly onHold?: (text: HeldText | null) => void;
  readonly disabled?: boolean;
  readonly refusal?: string | null;
}) {
  const id = useId();
  const [text, setText] = useState(held?.text ?? value?.text ?? '');
  const [uncertaintyText, setUncertaintyText] = useState(held?.uncertaintyText ?? value?.uncertaintyText ?? '');
  const [form, setForm] = useState<Uncertainty['form']>(value?.uncertainty.form ?? 'standard');
  const [shown, setShown] = useState(value);
  const [touched, setTouched] = useState(held !== undefined);

  // Changed from outside (undo, somebody else's save): show that instead of what was typed here.
  if (value !== shown) {
    setShown(value);
    if (
      value &&
      (value.text !== text.trim() ||
        value.uncertaintyText !== uncertaintyText.trim() ||
        value.uncertainty.form !== form)
    ) {
      setText(value.text);
      setUncertaintyText(value.uncertaintyText);
      setForm(value.uncertainty.form);
    }
  }

  function handle(next: { text?: string; uncertaintyText?: string; form?: Uncertainty['form'] }): void {
    const typed = { text, uncertaintyText, form, ...next };
    setText(typed.text);
    setUncertaintyText(typed.uncertaintyText);
    setForm(typed.form);
    setTouched(true);
    const read = understand(typed.text, typed.uncertaintyText, typed.form, unit);
    onHold?.(read.ok ? null : { text: typed.text, uncertaintyText: typed.uncertaintyText });
    if (read.ok) onChange(read.value);
  }

  const read = understand(text, uncertaintyText, form, unit);
  const problem = refusal ?? (touched && !read.ok ? read.reason : null);
  const badPart = touched && !read.ok ? read.part : null;
  const describedBy = `${id}-echo`;
  return (
    // biome-ignore lint/a11y/useSemanticElements: a fieldset would put its legend before the grid
    <div role="group" aria-label={label} className="grid content-start gap-1">
      <div className="grid grid-cols-[minmax(0,1fr)_minmax(0,0.8fr)] gap-2">
        <label htmlFor={`${id}-value`} className="text-xs font-semibold">
          {label} <span className="font-normal text-ink-2">{unit && unit !== '1' ? `(${unit})` : ''}</span>
        </label>
        <label htmlFor={`${id}-form`} className="sr-only">
          How the uncertainty of {label} is stated
        </label>
        <select
          id={`${id}-form`}
          value={form}
          disabled={disabled}
          onChange={(event) => handle({ form: event.target.value as Uncertainty['form'] })}
          className="min-h-7 min-w-0 border-b border-line bg-transparent text-2xs text-ink-2"
        >
          {Object.entries(uncertaintyForms).map(([key, words]) => (
            <option key={key} value={key}>
              {words}
            </option>
          ))}
        </select>
        <input
          id={`${id}-value`}
          value={text}
          disabled={disabled}
          autoComplete="off"
          inputMode="text"
          aria-invalid={badPart === 'value' || refusal !== null}
          aria-describedby={describedBy}
          onChange={(event) => handle({ text: event.target.value })}
          onBlur={() => {
            setTouched(touched || text !== '');
            onSettle?.();
          }}
          className="num min-h-9 min-w-0 border border-line bg-surface px-2 aria-invalid:border-2 aria-invalid:border-bad"
        />
        <input
          aria-label={`Uncertainty of ${label}`}
          value={form === 'exact' ? '' : uncertaintyText}
          disabled={disabled || form === 'exact'}
          placeholder={form === 'relative' ? '3 %' : ''}
          autoComplete="off"
          aria-invalid={badPart === 'uncertainty'}
          aria-describedby={describedBy}
          onChange={(event) => handle({ uncertaintyText: event.target.value })}
          onBlur={() => onSettle?.()}
          className="num min-h-9 min-w-0 border border-line bg-surface px-2 aria-invalid:border-2 aria-invalid:border-bad"
        />
      </div>
      <p
        id={describedBy}
        className={`text-xs ${problem ? 'font-semibold text-bad' : 'text-ink-2'}`}
        role={problem ? 'alert' : undefined}
      >
        {problem ?? (read.ok ? echo(read.value, unit, meaning) : '')}
      </p>
    </div>
  );
}

/** What was understood, in the unit of the field, with the expanded uncertainty. */
function echo(value: MeasuredValue, unit: string, meaning: string | undefined): string {
  const u = standardUncertainty(value.uncertainty, value.value);
  const readAs = meaning ? `, read as ${meaning}` : '';
  if (u === 0) return `= ${formatMeasured(value.value, 0, unit).text}, exact${readAs}`;
  return `= ${formatMeasured(value.value, u, unit).text} (k = 2)${readAs}`;
}
