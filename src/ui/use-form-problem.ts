import { useEffect, useRef } from 'react';
import { CallError } from '../api/call-error.ts';

/** A failed submission of a form: the server's word on each field, and a note that takes the focus. */
export function useFormProblem(error: Error | null) {
  const note = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (error) note.current?.focus();
  }, [error]);
  const fields = error instanceof CallError ? (error.problem?.fields ?? {}) : {};
  return { note, fieldError: (name: string): string | undefined => fields[`body.${name}`] };
}
