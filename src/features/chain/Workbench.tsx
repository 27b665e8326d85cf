import { useEffect, useRef, useState } from 'react';
import { ConflictDialog } from '../../chain/ConflictDialog.tsx';
import { ConnectDialog, type Connecting } from '../../chain/ConnectDialog.tsx';
import { ChainCanvas } from '../../chain/canvas/ChainCanvas.tsx';
import { useChain } from '../../chain/chain-context.ts';
import { EmptyChain } from '../../chain/EmptyChain.tsx';
import { type Removal, removeQuantity, removeRoute } from '../../chain/editing/remove-items.ts';
import { Inspector } from '../../chain/inspector/Inspector.tsx';
import { LinksDialog } from '../../chain/LinksDialog.tsx';
import { Outline } from '../../chain/outline/Outline.tsx';
import { RemoveDialog } from '../../chain/RemoveDialog.tsx';
import { LeaveGuard } from './LeaveGuard.tsx';
import { SubmitDialog } from './SubmitDialog.tsx';
import { Toolbar } from './Toolbar.tsx';
import { useSelection } from './use-selection.ts';

type Notice = { readonly text: string; readonly count: number };

/** Toolbar, the chain in one of its views, the inspector, and the dialogs that belong to them. */
export function Workbench({
  notice,
  onDismissNotice,
}: {
  readonly notice: Notice | null;
  readonly onDismissNotice: () => void;
}) {
  const { document: chain, state, selectedId, select, announce, mayEdit } = useChain();
  const { view, show } = useSelection();
  const heading = useRef<HTMLHeadingElement>(null);
  const stage = useRef<HTMLDivElement>(null);
  const [showsContents, setShowsContents] = useState(false);
  const [connecting, setConnecting] = useState<Connecting | null>(null);
  const [listing, setListing] = useState<string | null>(null);
  const [removing, setRemoving] = useState<Removal | null>(null);
  const [removed, setRemoved] = useState<string | null>(null);
  const [submitting, setSubmitting] = useState(false);
  const isOpen = selectedId !== null || showsContents;
  const isEmpty = state.model.quantities.length === 0 && !isOpen;

  useEffect(() => {
    function handleKey(event: KeyboardEvent): void {
      const target = event.target instanceof HTMLElement ? event.target : null;
      if (!(event.ctrlKey || event.metaKey) || target?.closest('input, textarea, select, dialog')) return;
      const key = event.key.toLowerCase();
      const back = key === 'z' && !event.shiftKey;
      const forth = key === 'y' || (key === 'z' && event.shiftKey);
      if (!back && !forth) return;
      event.preventDefault();
      if (back) chain.undo();
      else chain.redo();
    }
    window.addEventListener('keydown', handleKey);
    return () => window.removeEventListener('keydown', handleKey);
  }, [chain]);

  // The inspector is rendered with the selection; the focus goes there once it stands.
  function open(id: string): void {
    select(id);
    requestAnimationFrame(() => heading.current?.focus());
  }

  function close(): void {
    const last = state.model.routes.find((route) => route.id === selectedId)?.quantityId ?? selectedId;
    select(null);
    setShowsContents(false);
    stage.current?.querySelector<HTMLElement>(`[data-quantity="${last}"], [tabindex="0"][data-row]`)?.focus();
  }

  function ask(removal: Removal): void {
    if (!mayEdit.allowed) announce(mayEdit.reason);
    else if (removal.dependants.length > 0) setRemoving(removal);
    else remove(removal);
  }

  function remove(removal: Removal): void {
    setRemoving(null);
    const outcome = chain.edit(removal.edits, removal.summary);
    if (!outcome.ok) {
      announce(outcome.sentence);
      return;
    }
    select(null);
    setRemoved(removal.summary);
  }

  return (
    <div className="flex min-h-0 flex-col md:h-[calc(100dvh-var(--shell-height,3.5rem))]">
      <Toolbar
        view={view}
        onShow={show}
        showsContents={showsContents && selectedId === null}
        onContents={() => {
          setShowsContents(selectedId !== null || !showsContents);
          select(null);
        }}
        onSubmit={() => setSubmitting(true)}
      />
      <div role="status" className="sr-only">
        {notice && <span key={notice.count}>{notice.text}</span>}
      </div>
      {notice && (
        <p className="flex items-center justify-between gap-3 border-b border-rule bg-sunk px-4 py-1.5 text-sm print:hidden">
          {notice.text}
          <button type="button" className="min-h-7 px-2 text-xs underline" onClick={onDismissNotice}>
            Dismiss
          </button>
        </p>
      )}
      {removed && (
        <p className="flex flex-wrap items-center gap-3 border-b border-rule bg-sunk px-4 py-1.5 text-sm print:hidden">
          <span role="status">{removed}.</span>
          {state.undoes === removed && (
            <button
              type="button"
              className="min-h-7 border border-rule bg-surface px-2 text-xs font-semibold"
              onClick={() => {
                chain.undo();
                setRemoved(null);
              }}
            >
              Undo
            </button>
          )}
          <button type="button" className="min-h-7 px-2 text-xs underline" onClick={() => setRemoved(null)}>
            Dismiss
          </button>
        </p>
      )}
      <div
        className={`grid min-h-0 flex-1 ${isOpen ? 'md:grid-cols-[minmax(0,1fr)_24rem] xl:grid-cols-[minmax(0,1fr)_27rem] print:grid-cols-1' : ''}`}
      >
        <div ref={stage} className={`min-h-0 overflow-hidden ${view === 'canvas' ? 'max-md:h-[60vh]' : ''}`}>
          {isEmpty && <EmptyChain />}
          {!isEmpty && view === 'canvas' && (
            <ChainCanvas
              onConnect={(sourceId, targetId, routeId) => setConnecting({ sourceId, targetId, routeId })}
              onRemove={(id) => ask(removeQuantity(state.model, id))}
              onListLinks={setListing}
              onOpen={open}
            />
          )}
          {!isEmpty && view === 'outline' && <Outline onOpen={open} />}
        </div>
        {isOpen && (
          <Inspector
            headingRef={heading}
            onClose={close}
            onRemoveQuantity={(id) => ask(removeQuantity(state.model, id))}
            onRemoveRoute={(id) => ask(removeRoute(state.model, id))}
          />
        )}
      </div>
      {connecting && <ConnectDialog connecting={connecting} onClose={() => setConnecting(null)} />}
      {listing && <LinksDialog quantityId={listing} onClose={() => setListing(null)} />}
      {removing && (
        <RemoveDialog removal={removing} onRemove={() => remove(removing)} onClose={() => setRemoving(null)} />
      )}
      {submitting && (
        <SubmitDialog
          preset={state.model.quantities.some((one) => one.id === selectedId) ? selectedId : null}
          onClose={() => setSubmitting(false)}
        />
      )}
      {state.conflicts.length > 0 && <ConflictDialog />}
      <LeaveGuard />
    </div>
  );
}
