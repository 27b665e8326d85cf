import type { Decision } from '../../../shared/domain/decision.ts';
import { allowed, denied } from '../../../shared/domain/decision.ts';
import type { Route } from '../../../shared/engine/model/study-model.ts';
import { useChain, useEdit } from '../chain-context.ts';
import type { EditOutcome } from '../editing/chain-document.ts';

/** Whether an item may be changed now: the person may, and no open submission rests on it. */
export function useItemLock(id: string): Decision {
  const { state, mayEdit } = useChain();
  const target = state.frozen.get(id);
  if (!mayEdit.allowed) return mayEdit;
  return target === undefined
    ? allowed
    : denied(
        `Part of the submission of ${target}, which is in review: what is being judged must not change. Withdraw the submission to change it.`,
      );
}

/** Whether a route may be changed now; an approved one opens with a reason. */
export function useRouteLock(route: Route): Decision {
  const { state } = useChain();
  const lock = useItemLock(route.id);
  const known = state.routeStates[route.id];
  if (!lock.allowed) return lock;
  if (known?.status === 'in review') {
    return denied(
      'This route is in review: what is being judged must not change. Withdraw the submission to change it.',
    );
  }
  if (known?.status === 'approved' && !state.reasons[route.id]) {
    return denied(
      'This route is approved and frozen. Open a new revision to change it; the signed one stays on record.',
    );
  }
  return allowed;
}

/** Changes fields of one route; `field` names them for the log and joins typing into one entry of the history. */
export function useRouteEdit<R extends Route>(route: R): (change: Partial<R>, field: string) => EditOutcome {
  const edit = useEdit();
  return (change, field) =>
    edit(
      [{ kind: 'route', id: route.id, body: { ...route, ...change } as Route }],
      `Changed ${field} of ${route.name}`,
      `route:${route.id}:${field}`,
    );
}
