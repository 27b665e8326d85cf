import { type ReactNode, useEffect } from 'react';

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
  useEffect(() => {
    document.title = `${problem ? 'Error: ' : ''}${title} · Stemma`;
  }, [title, problem]);
  return (
    <div className={`mx-auto grid w-full content-start gap-4 p-4 md:p-6 ${narrow ? 'max-w-xl' : 'max-w-6xl'}`}>
      <div className="flex flex-wrap items-end justify-between gap-3">
        <h1 className="text-xl font-bold">{title}</h1>
        {actions}
      </div>
      {children}
    </div>
  );
}
