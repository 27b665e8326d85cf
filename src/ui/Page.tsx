import type { ReactNode } from 'react';
import { usePageTitle } from './use-page-title.ts';

/** A page's heading, title and width. `problem` puts "Error:" before the title, as screen readers read it first. */
export function Page({
  title,
  actions,
  problem = false,
  narrow = false,
  children,
}: {
  readonly title: string;
  readonly actions?: ReactNode;
  readonly problem?: boolean;
  readonly narrow?: boolean;
  readonly children: ReactNode;
}) {
  usePageTitle(title, problem);
  return (
    <div
      className={`mx-auto grid w-full grid-cols-[minmax(0,1fr)] content-start gap-4 p-4 md:p-6 ${narrow ? 'max-w-xl' : 'max-w-6xl'}`}
    >
      <div className="flex flex-wrap items-end justify-between gap-3">
        <h1 className="text-xl font-bold">{title}</h1>
        {actions}
      </div>
      {children}
    </div>
  );
}
