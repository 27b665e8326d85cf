import { type ReactNode, useEffect, useId, useRef } from 'react';

/** A modal of the browser's own: it keeps the focus inside, closes on Escape and gives the focus back. */
export function Dialog({
  open,
  title,
  onClose,
  children,
}: {
  readonly open: boolean;
  readonly title: string;
  readonly onClose: () => void;
  readonly children: ReactNode;
}) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    if (open && !element.open) {
      element.showModal();
      // Typing goes into the form: the browser alone would start at Close.
      element
        .querySelector<HTMLElement>('input:not(:disabled), select:not(:disabled), textarea:not(:disabled)')
        ?.focus();
    }
    if (!open && element.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      // Escape asks; whoever opened it decides, so that state and screen agree.
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      className="w-[min(44rem,calc(100vw-2rem))] border-2 border-rule bg-surface p-0 text-ink"
    >
      <div className="flex min-h-11 items-center justify-between gap-3 border-b border-rule px-4">
        <h2 id={titleId} className="text-lg font-bold">
          {title}
        </h2>
        <button type="button" onClick={onClose} className="grid size-8 place-items-center" aria-label="Close">
          <svg viewBox="0 0 14 14" className="size-4" stroke="currentColor" strokeWidth="1.8" aria-hidden="true">
            <path d="M2 2 L12 12 M12 2 L2 12" />
          </svg>
        </button>
      </div>
      <div className="max-h-[75vh] relative overflow-y-auto p-4">{children}</div>
    </dialog>
  );
}
