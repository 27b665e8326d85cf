import { type ReactNode, useId } from 'react';

type Parts = { readonly id: string; readonly 'aria-invalid'?: true; readonly 'aria-describedby'?: string };

/** A label with its control, a hint and an error, tied together. */
export function Field({
  label,
  hint,
  error,
  children,
}: {
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string | undefined;
  readonly children: (parts: Parts) => ReactNode;
}) {
  const id = useId();
  const [hintId, errorId] = [`${id}-hint`, `${id}-error`];
  const describedBy = [hint ? hintId : '', error ? errorId : ''].filter(Boolean).join(' ');
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="text-sm font-semibold">
        {label}
      </label>
      {hint && (
        <p id={hintId} className="text-xs text-ink-2">
          {hint}
        </p>
      )}
      {children({
        id,
        ...(error ? { 'aria-invalid': true } : {}),
        ...(describedBy ? { 'aria-describedby': describedBy } : {}),
      })}
      {error && (
        <p id={errorId} className="text-xs font-semibold text-bad">
          {error}
        </p>
      )}
    </div>
  );
}
