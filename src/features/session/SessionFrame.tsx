import type { ReactNode } from 'react';
import { Mark } from '../../ui/Mark.tsx';
import { usePageTitle } from '../../ui/use-page-title.ts';

/** The sheet that the pages before sign-in stand on, with the caution that goes with every estimate. */
export function SessionFrame({
  title,
  problem = false,
  children,
}: {
  readonly title: string;
  readonly problem?: boolean;
  readonly children: ReactNode;
}) {
  usePageTitle(title, problem);
  return (
    <main className="grid min-h-dvh content-center justify-items-center gap-6 p-4">
      <div className="grid w-full max-w-md gap-5 border-2 border-rule bg-surface p-6">
        <p className="flex items-center gap-3 text-lg font-bold">
          <Mark /> Stemma
        </p>
        <h1 className="text-xl font-bold">{title}</h1>
        {children}
      </div>
      <p className="max-w-md text-xs text-ink-2">
        Estimates support engineering judgement. They replace neither tests nor the local codes nor licensed practice
        for relief, runaway, pressure equipment and toxic release.
      </p>
    </main>
  );
}
