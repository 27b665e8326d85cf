import type { RouteStatus, SubmissionStatus } from '../../shared/domain/route-lifecycle.ts';

export type MarkedStatus = RouteStatus | SubmissionStatus | 'basis changed';

const looks: Record<MarkedStatus, { readonly words: string; readonly tone: string; readonly glyph: React.ReactNode }> =
  {
    draft: { words: 'Draft', tone: 'text-ink-2', glyph: <circle cx="7" cy="7" r="5.2" strokeDasharray="2.4 2" /> },
    'in review': {
      words: 'In review',
      tone: 'text-info',
      glyph: (
        <>
          <circle cx="7" cy="7" r="5.2" />
          <path d="M7 1.8 a5.2 5.2 0 0 1 0 10.4 z" fill="currentColor" />
        </>
      ),
    },
    open: {
      words: 'In review',
      tone: 'text-info',
      glyph: (
        <>
          <circle cx="7" cy="7" r="5.2" />
          <path d="M7 1.8 a5.2 5.2 0 0 1 0 10.4 z" fill="currentColor" />
        </>
      ),
    },
    approved: { words: 'Approved', tone: 'text-ok', glyph: <Ticked /> },
    signed: { words: 'Signed', tone: 'text-ok', glyph: <Ticked /> },
    returned: { words: 'Returned', tone: 'text-bad', glyph: <path d="M7 1.6 L13 12.4 H1 Z M7 5.4 v3.4 M7 10.2 v1" /> },
    withdrawn: {
      words: 'Withdrawn',
      tone: 'text-ink-2',
      glyph: <path d="M1.8 7 a5.2 5.2 0 1 0 10.4 0 a5.2 5.2 0 1 0 -10.4 0 M2 12 L12 2" />,
    },
    'basis changed': {
      words: 'Basis changed',
      tone: 'text-warn',
      glyph: <path d="M1 9 L4 9 L6 3 L8 11 L10 5 L13 5" />,
    },
  };

function Ticked() {
  return (
    <>
      <rect x="1.5" y="1.5" width="11" height="11" fill="currentColor" />
      <path d="M3.8 7.2 l2.2 2.4 L10.4 4.4" className="stroke-surface" />
    </>
  );
}

/** A state as glyph and word, so that neither colour nor shape carries it alone. */
export function StatusMark({ status }: { readonly status: MarkedStatus }) {
  const { words, tone, glyph } = looks[status];
  return (
    <span className={`inline-flex items-center gap-1 font-semibold whitespace-nowrap ${tone}`}>
      <svg
        viewBox="0 0 14 14"
        className="size-3.5 shrink-0"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        aria-hidden="true"
      >
        {glyph}
      </svg>
      {words}
    </span>
  );
}
