import { Dialog } from '../ui/Dialog.tsx';
import type { Removal } from './editing/remove-items.ts';
import { smallButton } from './inspector/fields.tsx';

/** Names what loses its link before something is removed. */
export function RemoveDialog({
  removal,
  onRemove,
  onClose,
}: {
  readonly removal: Removal;
  readonly onRemove: () => void;
  readonly onClose: () => void;
}) {
  return (
    <Dialog open title={removal.summary.replace(/^Removed/, 'Remove')} onClose={onClose}>
      <div className="grid gap-3 text-sm">
        <p>These rest on it and lose that link:</p>
        <ul className="list-disc pl-5">
          {removal.dependants.map((name) => (
            <li key={name}>{name}</li>
          ))}
        </ul>
        <p className="text-ink-2">Undo brings it back with its links and its place.</p>
        <span className="flex gap-2">
          <button type="button" className={`${smallButton} text-bad`} onClick={onRemove}>
            Remove
          </button>
          <button type="button" className={smallButton} onClick={onClose}>
            Keep
          </button>
        </span>
      </div>
    </Dialog>
  );
}
