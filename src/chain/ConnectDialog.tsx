import { useMemo, useState } from 'react';
import { parseFormula } from '../../shared/engine/formula/parse-formula.ts';
import { Dialog } from '../ui/Dialog.tsx';
import { useChain, useEdit } from './chain-context.ts';
import { type ConnectChoice, connectChoices, loopOf } from './editing/connect-choices.ts';
import { bindingsFor, newBalance } from './editing/new-items.ts';
import { smallButton } from './inspector/fields.tsx';

export type Connecting = {
  readonly sourceId: string;
  readonly targetId: string | null;
  readonly routeId: string | null;
};

/** Asks what a drawn link means: which quantity it leads to, and which variable of which route it feeds. */
export function ConnectDialog({
  connecting,
  onClose,
}: {
  readonly connecting: Connecting;
  readonly onClose: () => void;
}) {
  const { state } = useChain();
  const [targetId, setTargetId] = useState(connecting.targetId);
  const source = state.model.quantities.find((quantity) => quantity.id === connecting.sourceId);
  const target = state.model.quantities.find((quantity) => quantity.id === targetId);
  if (!source) return null;
  return (
    <Dialog open title={target ? `What does ${source.name} feed?` : `Connect ${source.name} to …`} onClose={onClose}>
      {target ? (
        <PortChoice source={source} target={target} routeId={connecting.routeId} onClose={onClose} />
      ) : (
        <TargetChoice sourceId={source.id} onChoose={setTargetId} />
      )}
    </Dialog>
  );
}

function TargetChoice({ sourceId, onChoose }: { readonly sourceId: string; readonly onChoose: (id: string) => void }) {
  const { state } = useChain();
  const [text, setText] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const found = state.model.quantities.filter(
    (quantity) =>
      quantity.id !== sourceId &&
      `${quantity.symbol} ${quantity.name}`.toLowerCase().includes(text.trim().toLowerCase()),
  );
  return (
    <div className="grid gap-3">
      <label className="grid gap-1 text-xs font-semibold">
        Find a quantity
        <input
          className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
          value={text}
          onChange={(event) => setText(event.target.value)}
        />
      </label>
      <p role="status" className="text-xs text-ink-2">
        {found.length} of {state.model.quantities.length - 1} quantities
      </p>
      <ul className="grid max-h-72 gap-1 relative overflow-y-auto">
        {found.map((quantity) => (
          <li key={quantity.id}>
            <button
              type="button"
              className={`${smallButton} w-full text-left`}
              onClick={() => {
                const loop = loopOf(state.model, sourceId, quantity.id);
                if (loop) setRefusal(loop);
                else onChoose(quantity.id);
              }}
            >
              {quantity.symbol}, {quantity.name}
            </button>
          </li>
        ))}
      </ul>
      {refusal && (
        <p role="alert" className="text-sm font-semibold text-bad">
          {refusal}
        </p>
      )}
    </div>
  );
}

type Ends = Parameters<typeof connectChoices>;

function PortChoice({
  source,
  target,
  routeId,
  onClose,
}: {
  readonly source: Ends[1];
  readonly target: Ends[2];
  readonly routeId: string | null;
  readonly onClose: () => void;
}) {
  const { state, newId, select, announce } = useChain();
  const edit = useEdit();
  const choices = useMemo(
    () => connectChoices(state.model, source, target, newId),
    [state.model, source, target, newId],
  );
  const preset = choices.find((choice) => choice.routeId === routeId) ?? choices[0];
  const [key, setKey] = useState(preset?.key);
  const [expression, setExpression] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const chosen = choices.find((choice) => choice.key === key);
  const sourceVariable = balanceVariable(chosen);
  const shownExpression = expression ?? sourceVariable ?? '';

  function link(): void {
    const edits = chosen && sourceVariable !== null ? balanceEdits(chosen, shownExpression) : chosen?.edits;
    if (!chosen || !edits) return;
    if (typeof edits === 'string') {
      setRefusal(edits);
      return;
    }
    const outcome = edit(edits, chosen.summary);
    if (!outcome.ok) {
      setRefusal(outcome.sentence);
      return;
    }
    announce(`${chosen.summary}.`);
    select(chosen.routeId);
    onClose();
  }

  function balanceEdits(choice: ConnectChoice, text: string): ConnectChoice['edits'] | string {
    const read = parseFormula(text);
    if (!read.ok) return read.reason;
    if (!sourceVariable || !read.formula.variables.includes(sourceVariable))
      return `The formula must contain ${sourceVariable}, which stands for ${source.name}.`;
    const bindings = {
      ...bindingsFor(read.formula.variables, {}),
      [sourceVariable]: { from: 'quantity' as const, quantityId: source.id },
    };
    const route = newBalance(choice.routeId, target.id, text, bindings);
    return [{ kind: 'route', id: route.id, body: route }];
  }

  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault();
        link();
      }}
    >
      <fieldset className="grid gap-1">
        <legend className="pb-1 text-sm">
          {source.symbol} → {target.symbol}, {target.name}
        </legend>
        {choices.map((choice) => (
          <label key={choice.key} className="flex min-h-8 items-center gap-2 text-sm">
            <input
              type="radio"
              name="port"
              checked={choice.key === key}
              onChange={() => {
                setKey(choice.key);
                setRefusal(null);
              }}
            />
            <span>
              {choice.words}
              {choice.replaces && <span className="text-ink-2"> (instead of {choice.replaces})</span>}
            </span>
          </label>
        ))}
      </fieldset>
      {sourceVariable !== null && (
        <label className="grid gap-1 text-xs font-semibold">
          {target.symbol} =
          <input
            className="num min-h-9 border border-line bg-surface px-2 text-sm font-normal"
            value={shownExpression}
            onChange={(event) => setExpression(event.target.value)}
          />
          <span className="font-normal text-ink-2">
            {sourceVariable} stands for {source.name}; other symbols get their sources next.
          </span>
        </label>
      )}
      {refusal && (
        <p role="alert" className="text-sm font-semibold text-bad">
          {refusal}
        </p>
      )}
      <span>
        <button type="submit" className={smallButton}>
          Link
        </button>
      </span>
    </form>
  );
}

/** The symbol that stands for the source in a new balance; null for every other choice. */
function balanceVariable(choice: ConnectChoice | undefined): string | null {
  if (choice?.key !== 'new:balance') return null;
  const body = choice.edits[0]?.body;
  return body && 'expression' in body ? body.expression : null;
}
