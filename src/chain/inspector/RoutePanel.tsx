import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Route } from '../../../shared/engine/model/study-model.ts';
import { paths } from '../../api/paths.ts';
import { BudgetBars } from '../../charts/BudgetBars.tsx';
import { plainNumber } from '../../charts/plain-number.ts';
import { Measured } from '../../ui/Measured.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { useChain, useEdit } from '../chain-context.ts';
import { routeStatus } from '../describe-quantity.ts';
import { routeKindWords } from '../origin.ts';
import { BalanceFields } from './BalanceFields.tsx';
import { CorrelationFields } from './CorrelationFields.tsx';
import { Findings } from './Findings.tsx';
import { Section, smallButton, TextField } from './fields.tsx';
import { Assumptions, MatchStrip } from './MatchStrip.tsx';
import { HeatAnalogueFields, StatedValueFields, TestResultFields } from './RouteFields.tsx';
import { useRouteEdit, useRouteLock } from './use-route-edit.ts';

/** One route: its inputs, what it gives, what is checked, what it assumes. */
export function RoutePanel({ route, onRemove }: { readonly route: Route; readonly onRemove: (id: string) => void }) {
  const { state, evaluation, document, select } = useChain();
  const lock = useRouteLock(route);
  const locked = !lock.allowed;
  const change = useRouteEdit(route);
  const edit = useEdit();
  const quantity = state.model.quantities.find((one) => one.id === route.quantityId);
  const result = evaluation.routes[route.id];
  const known = state.routeStates[route.id];
  if (!quantity) return null;
  const adopted = quantity.adoptedRouteId === route.id;
  return (
    <>
      <p className="flex flex-wrap items-center gap-x-3 gap-y-1 text-xs">
        <StatusMark status={routeStatus(state, route.id)} />
        <span className="text-ink-2">
          {routeKindWords[route.kind]} for{' '}
          <button type="button" className="min-h-7 underline" onClick={() => select(quantity.id)}>
            <Symbol_ symbol={quantity.symbol} /> {quantity.name}
          </button>
        </span>
        {known && known.revision > 1 && <span className="text-ink-2">revision {known.revision}</span>}
        {known?.submissionId && (
          <Link className="text-primary underline" to={paths.submission(known.submissionId)}>
            Open the review
          </Link>
        )}
      </p>
      {!lock.allowed && (
        <LockNote
          reason={lock.reason}
          canOpen={known?.status === 'approved'}
          onOpen={(reason) => document.giveReason(route.id, reason)}
        />
      )}
      <div className="border border-rule bg-surface p-3">
        {result?.result ? (
          <p className="text-lg">
            <Symbol_ symbol={quantity.symbol} /> ={' '}
            <Measured value={result.result.value} u={result.result.u} unit={quantity.unit} />
          </p>
        ) : (
          <p className="text-ink-2">This route gives no value yet; the findings below say what is missing.</p>
        )}
      </div>
      <p>
        <button
          type="button"
          className={smallButton}
          disabled={locked || adopted}
          onClick={() =>
            edit(
              [{ kind: 'quantity', id: quantity.id, body: { ...quantity, adoptedRouteId: route.id } }],
              `Adopted ${route.name} for ${quantity.symbol}`,
            )
          }
        >
          {adopted ? 'Adopted' : `Adopt for ${quantity.symbol}`}
        </button>
      </p>
      <Findings kind="route" id={route.id} />
      <Section title="Inputs">
        <TextField
          label="Name of the route"
          value={route.name}
          disabled={locked}
          onSettle={() => document.seal()}
          onChange={(name) =>
            name === '' ? { ok: false, sentence: 'A route needs a name.' } : change({ name }, 'the name')
          }
        />
        {route.kind === 'stated-value' && <StatedValueFields key={route.id} route={route} locked={locked} />}
        {route.kind === 'test-result' && <TestResultFields route={route} locked={locked} />}
        {route.kind === 'heat-analogue' && <HeatAnalogueFields route={route} locked={locked} />}
        {route.kind === 'correlation' && <CorrelationFields route={route} locked={locked} />}
        {route.kind === 'balance' && <BalanceFields route={route} locked={locked} />}
        <TextField
          label="Why this route"
          multiline
          value={route.rationale}
          disabled={locked}
          onSettle={() => document.seal()}
          onChange={(rationale) => change({ rationale }, 'the rationale')}
        />
      </Section>
      {result && <MatchStrip result={result} />}
      {result && <Assumptions route={route} result={result} locked={locked} />}
      {result && result.steps.length > 0 && (
        <Section title="Steps">
          <table className="w-full text-sm">
            <caption className="sr-only">Named steps between the inputs and the result, in SI units</caption>
            <tbody>
              {result.steps.map((step) => (
                <tr key={step.symbol} className="border-b border-hair">
                  <th scope="row" className="py-1 text-left font-normal">
                    <Symbol_ symbol={step.symbol} /> <span className="text-xs text-ink-2">{step.meaning}</span>
                  </th>
                  <td className="num text-right">
                    {plainNumber(step.value)}{' '}
                    <span className="text-xs text-ink-2">
                      ± {plainNumber(2 * step.u, 2)} {step.unit === '1' ? '' : step.unit}
                    </span>
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </Section>
      )}
      {result?.result && <BudgetBars result={result.result} unit="SI" />}
      {!locked && (
        <p>
          <button type="button" className={`${smallButton} text-bad`} onClick={() => onRemove(route.id)}>
            Remove this route
          </button>
        </p>
      )}
    </>
  );
}

function LockNote({
  reason,
  canOpen,
  onOpen,
}: {
  readonly reason: string;
  readonly canOpen: boolean;
  readonly onOpen: (reason: string) => void;
}) {
  const [text, setText] = useState('');
  const { mayEdit } = useChain();
  return (
    <form
      className="grid gap-2 border-l-4 border-warn bg-surface p-3 text-sm"
      onSubmit={(event) => {
        event.preventDefault();
        if (text.trim() !== '') onOpen(text.trim());
      }}
    >
      <p>{reason}</p>
      {canOpen && mayEdit.allowed && (
        <>
          <label className="grid gap-1 text-xs font-semibold">
            Reason for the change (goes to the decision log)
            <textarea
              rows={2}
              required
              value={text}
              onChange={(event) => setText(event.target.value)}
              className="border border-line bg-surface px-2 py-1 text-sm font-normal"
            />
          </label>
          <button type="submit" className={smallButton} disabled={text.trim() === ''}>
            Open a new revision
          </button>
        </>
      )}
    </form>
  );
}
