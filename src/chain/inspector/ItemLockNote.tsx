import { useChain } from '../chain-context.ts';
import { useItemLock } from './use-route-edit.ts';

/** Why the fields below are locked, for whoever could otherwise change them. */
export function ItemLockNote({ id }: { readonly id: string }) {
  const { mayEdit } = useChain();
  const lock = useItemLock(id);
  if (lock.allowed || !mayEdit.allowed) return null;
  return <p className="border-l-4 border-warn bg-surface p-3 text-sm">{lock.reason}</p>;
}
