import type { ReactNode } from 'react';

/** What will be here, why there is nothing yet, and one thing to do about it. */
export function EmptyState({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <div className="grid justify-items-start gap-2 border border-dashed border-line p-6">
      <h2 className="text-lg font-bold">{title}</h2>
      <div className="grid max-w-[60ch] justify-items-start gap-3 text-ink-2">{children}</div>
    </div>
  );
}
