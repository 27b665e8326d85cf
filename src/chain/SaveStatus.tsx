import { useChain } from './chain-context.ts';
import { smallButton } from './inspector/fields.tsx';

const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** Always in sight: what has happened to the changes. Only a failure is announced. */
export function SaveStatus() {
  const { state, document } = useChain();
  const { save } = state;
  if (save.is === 'not saved') {
    return (
      <div role="alert" className="flex flex-wrap items-center gap-2 text-xs">
        <span className="font-semibold text-bad">Not saved.</span>
        <span>{save.sentence}</span>
        <button type="button" className={smallButton} onClick={() => void document.flush()}>
          Retry
        </button>
      </div>
    );
  }
  const words = {
    saved: save.is === 'saved' && save.at ? `Saved ${clock.format(save.at)}` : 'All changes saved',
    waiting: 'Changed',
    saving: 'Saving',
    conflict: 'Waiting for your choice',
  }[save.is];
  return (
    <span className="inline-flex items-center gap-1 text-xs whitespace-nowrap text-ink-2">
      {save.is === 'saved' && (
        <svg
          viewBox="0 0 14 14"
          className="size-3.5"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.6"
          aria-hidden="true"
        >
          <path d="M2 7 l3.5 4 L12 3" />
        </svg>
      )}
      {words}
    </span>
  );
}
