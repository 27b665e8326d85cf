import type { RefObject } from 'react';

/** On top of a form that was refused. Takes the focus, so that it is read first. */
export function FormProblem({
  error,
  noteRef,
}: {
  readonly error: Error | null;
  readonly noteRef: RefObject<HTMLDivElement | null>;
}) {
  if (!error) return null;
  return (
    <div ref={noteRef} tabIndex={-1} role="alert" className="border-2 border-bad p-3 text-sm">
      <p className="font-bold">There is a problem</p>
      <p>{error.message}</p>
    </div>
  );
}
