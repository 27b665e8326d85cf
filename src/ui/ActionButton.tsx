import { type ReactNode, useId } from 'react';
import type { Decision } from '../../shared/domain/decision.ts';
import { Button } from './Button.tsx';

/** A button whose refusal stays in sight: disabled, with the reason beside it and as its description. */
export function ActionButton({
  decision,
  busy = false,
  children,
  ...rest
}: {
  readonly decision: Decision;
  readonly busy?: boolean;
  readonly children: ReactNode;
  readonly type?: 'button' | 'submit';
  readonly variant?: 'primary' | 'plain' | 'danger';
  readonly onClick?: () => void;
}) {
  const reasonId = useId();
  const reason = decision.allowed ? null : decision.reason;
  return (
    <span className="inline-flex flex-wrap items-center gap-2">
      <Button {...rest} disabled={busy || reason !== null} aria-describedby={reason ? reasonId : undefined}>
        {children}
      </Button>
      {reason && (
        <span id={reasonId} className="text-xs text-ink-2">
          {reason}
        </span>
      )}
    </span>
  );
}
