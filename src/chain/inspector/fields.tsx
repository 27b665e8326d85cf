import { type ReactNode, useEffect, useId, useState } from 'react';
import type { EditOutcome } from '../editing/chain-document.ts';

const box =
  'min-h-9 w-full min-w-0 border border-line bg-surface px-2 py-1 disabled:bg-sunk aria-invalid:border-2 aria-invalid:border-bad';

/**
 * Text that belongs to an item of the chain. Each key press is an edit; one that is refused stays in the field with
 * the sentence under it, and nothing of it reaches the chain.
 */
export function TextField({
  label,
  value,
  onChange,
  onSettle,
  disabled = false,
  multiline = false,
  hint,
  mono = false,
}: {
  readonly label: string;
  readonly value: string;
  readonly onChange: (text: string) => EditOutcome;
  readonly onSettle?: () => void;
  readonly disabled?: boolean;
  readonly multiline?: boolean;
  readonly hint?: ReactNode;
  readonly mono?: boolean;
}) {
  const id = useId();
  const [text, setText] = useState(value);
  const [refused, setRefused] = useState<{ readonly text: string; readonly sentence: string } | null>(null);
  // A refusal stands as long as the text it speaks of.
  const refusal = refused?.text === text ? refused.sentence : null;

  // Set from outside (undo, somebody else's save); a space at the end of what is being typed is no difference.
  useEffect(() => {
    setText((typed) => (typed.trim() === value ? typed : value));
  }, [value]);

  function handle(next: string): void {
    setText(next);
    const outcome = onChange(next.trim());
    setRefused(outcome.ok ? null : { text: next, sentence: outcome.sentence });
  }

  const shared = {
    id,
    value: text,
    disabled,
    'aria-invalid': refusal !== null,
    'aria-describedby': `${id}-note`,
    onBlur: () => onSettle?.(),
    className: `${box} ${mono ? 'num' : ''}`,
  };
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="text-xs font-semibold">
        {label}
      </label>
      {multiline ? (
        <textarea {...shared} rows={2} onChange={(event) => handle(event.target.value)} />
      ) : (
        <input {...shared} autoComplete="off" onChange={(event) => handle(event.target.value)} />
      )}
      <p
        id={`${id}-note`}
        role={refusal ? 'alert' : undefined}
        className={`text-xs ${refusal ? 'font-semibold text-bad' : 'text-ink-2'}`}
      >
        {refusal ?? hint}
      </p>
    </div>
  );
}

/** A plain number with an optional bound; refuses what is none. */
export function NumberField({
  label,
  value,
  onChange,
  onSettle,
  disabled = false,
  hint,
  percent = false,
  emptyMeans,
}: {
  readonly label: string;
  readonly value: number | null;
  readonly onChange: (value: number | null) => EditOutcome;
  readonly onSettle?: () => void;
  readonly disabled?: boolean;
  readonly hint?: ReactNode;
  /** Shown and typed in per cent, kept as a fraction. */
  readonly percent?: boolean;
  /** What an empty field stands for; without it a number is needed. */
  readonly emptyMeans?: string;
}) {
  const factor = percent ? 100 : 1;
  const shown = value === null ? '' : String(Number((value * factor).toPrecision(12)));
  return (
    <TextField
      label={percent ? `${label} (%)` : label}
      value={shown}
      disabled={disabled}
      mono
      {...(onSettle ? { onSettle } : {})}
      hint={hint ?? (emptyMeans ? `Empty: ${emptyMeans}` : undefined)}
      onChange={(text) => {
        const typed = text
          .trim()
          .replace('−', '-')
          .replace(/^(-?\d+),(\d{1,2}|\d{4,})$/, '$1.$2')
          .replace(/\s*%$/, '');
        if (typed === '' && emptyMeans !== undefined) return onChange(null);
        const number = Number(typed);
        if (typed === '' || !Number.isFinite(number))
          return { ok: false, sentence: `“${text}” is not a number. Write it like 0.33 or 3.3e-1.` };
        return onChange(number / factor);
      }}
    />
  );
}

export type Option = { readonly value: string; readonly words: string; readonly group?: string };

export function ChoiceField({
  label,
  value,
  options,
  onChange,
  disabled = false,
  hint,
}: {
  readonly label: string;
  readonly value: string;
  readonly options: readonly Option[];
  readonly onChange: (value: string) => EditOutcome;
  readonly disabled?: boolean;
  readonly hint?: ReactNode;
}) {
  const id = useId();
  const [refusal, setRefusal] = useState<string | null>(null);
  const groups = [...new Set(options.map((option) => option.group))];
  const list = (group: string | undefined) =>
    options
      .filter((option) => option.group === group)
      .map((option) => (
        <option key={option.value} value={option.value}>
          {option.words}
        </option>
      ));
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="text-xs font-semibold">
        {label}
      </label>
      <select
        id={id}
        className={box}
        value={value}
        disabled={disabled}
        aria-invalid={refusal !== null}
        aria-describedby={`${id}-note`}
        onChange={(event) => {
          const outcome = onChange(event.target.value);
          setRefusal(outcome.ok ? null : outcome.sentence);
        }}
      >
        {groups.map((group) =>
          group === undefined ? (
            list(group)
          ) : (
            <optgroup key={group} label={group}>
              {list(group)}
            </optgroup>
          ),
        )}
      </select>
      <p
        id={`${id}-note`}
        role={refusal ? 'alert' : undefined}
        className={`text-xs ${refusal ? 'font-semibold text-bad' : 'text-ink-2'}`}
      >
        {refusal ?? hint}
      </p>
    </div>
  );
}

/** A part of the inspector with its own heading. */
export function Section({
  title,
  aside,
  children,
}: {
  readonly title: string;
  readonly aside?: ReactNode;
  readonly children: ReactNode;
}) {
  return (
    <section className="grid gap-2.5">
      <header className="flex flex-wrap items-baseline justify-between gap-2 border-b border-rule pb-1">
        <h3 className="text-sm font-semibold">{title}</h3>
        {aside}
      </header>
      {children}
    </section>
  );
}

export const smallButton =
  'min-h-8 border border-rule bg-surface px-2.5 text-xs font-semibold hover:bg-sunk disabled:border-line disabled:text-ink-2';
