import { Link } from 'react-router-dom';
import { abilityOf } from '../../../shared/domain/ability.ts';
import { canSubmit } from '../../../shared/domain/submission-policy.ts';
import { paths } from '../../api/paths.ts';
import { useActor } from '../../api/session.ts';
import { useChain } from '../../chain/chain-context.ts';
import { SaveStatus } from '../../chain/SaveStatus.tsx';
import { Button } from '../../ui/Button.tsx';
import type { View } from './use-selection.ts';

const viewNames: Record<View, string> = { canvas: 'Canvas', outline: 'Outline' };
const tool =
  'min-h-9 px-2.5 text-sm hover:bg-sunk disabled:text-ink-2 disabled:hover:bg-transparent aria-pressed:font-bold';

/** Title of the study, its views, undo and redo, what was saved, and the way to a review. */
export function Toolbar({
  view,
  onShow,
  showsContents,
  onContents,
  onSubmit,
}: {
  readonly view: View;
  readonly onShow: (view: View) => void;
  readonly showsContents: boolean;
  readonly onContents: () => void;
  readonly onSubmit: () => void;
}) {
  const { title, state, document, studyId, mayEdit } = useChain();
  const actor = useActor();
  const maySubmit = canSubmit({ ...actor, ability: abilityOf(actor) }, studyId).allowed;
  return (
    <header className="flex flex-wrap items-center gap-x-3 gap-y-1 border-b-2 border-rule bg-surface px-4 py-1.5 print:hidden">
      <h1 className="mr-2 max-w-full min-w-0 truncate text-base leading-tight font-bold">{title}</h1>
      <fieldset className="flex">
        <legend className="sr-only">View</legend>
        {(Object.keys(viewNames) as View[]).map((one) => (
          <button
            key={one}
            type="button"
            aria-pressed={view === one}
            className={`${tool} border-b-[3px] border-transparent aria-pressed:border-rule`}
            onClick={() => onShow(one)}
          >
            {viewNames[one]}
          </button>
        ))}
      </fieldset>
      <button type="button" className={tool} aria-pressed={showsContents} onClick={onContents}>
        Contents
      </button>
      {mayEdit.allowed && (
        <fieldset className="flex border-l border-hair pl-2">
          <legend className="sr-only">History</legend>
          <button
            type="button"
            className={tool}
            disabled={state.undoes === null}
            title={state.undoes ? `Undo: ${state.undoes}` : 'Nothing to undo'}
            onClick={() => document.undo()}
          >
            Undo
          </button>
          <button
            type="button"
            className={tool}
            disabled={state.redoes === null}
            title={state.redoes ? `Redo: ${state.redoes}` : 'Nothing to redo'}
            onClick={() => document.redo()}
          >
            Redo
          </button>
        </fieldset>
      )}
      <Link className={`${tool} inline-flex items-center`} to={paths.decisionLog(studyId)}>
        Decision log
      </Link>
      <Link className={`${tool} inline-flex items-center`} to={paths.members(studyId)}>
        Members
      </Link>
      <span className="ml-auto flex flex-wrap items-center gap-3">
        {mayEdit.allowed ? <SaveStatus /> : <span className="text-xs text-ink-2">{mayEdit.reason}</span>}
        {maySubmit && state.model.quantities.length > 0 && <Button onClick={onSubmit}>Submit for review</Button>}
      </span>
    </header>
  );
}
