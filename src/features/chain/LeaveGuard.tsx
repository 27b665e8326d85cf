import { useEffect } from 'react';
import { useBlocker } from 'react-router-dom';
import { useChain } from '../../chain/chain-context.ts';
import { Button } from '../../ui/Button.tsx';
import { Dialog } from '../../ui/Dialog.tsx';

/** On leaving with unsaved changes: saves first, and asks only when that does not work. */
export function LeaveGuard() {
  const { document } = useChain();
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) => document.isDirty && currentLocation.pathname !== nextLocation.pathname,
  );

  useEffect(() => {
    if (blocker.state !== 'blocked') return;
    void document.flush().then(() => {
      if (!document.isDirty) blocker.proceed();
    });
  }, [blocker, document]);

  if (blocker.state !== 'blocked' || document.getState().save.is === 'saving') return null;
  return (
    <Dialog open title="Your last changes are not saved" onClose={() => blocker.reset()}>
      <p className="pb-3 text-sm">
        They stay in this browser tab: come back to this study in it and they are sent again. In another tab or after
        closing this one they are lost.
      </p>
      <span className="flex gap-2">
        <Button onClick={() => blocker.reset()}>Stay here</Button>
        <Button onClick={() => blocker.proceed()}>Leave</Button>
      </span>
    </Dialog>
  );
}
