import { useState } from 'react';
import type { Submission } from '../../../shared/api/submissions.ts';
import { type Ruling, rulingWords } from '../../../shared/domain/audit-events.ts';
import { canRule } from '../../../shared/domain/submission-policy.ts';
import type { Assumption, MatchCheck } from '../../../shared/engine/model/evaluation.ts';
import { useAsking } from '../../api/use-asking.ts';
import { LogWindow, VerdictMark } from '../../charts/LogWindow.tsx';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { factsOf, useRule } from './submission-queries.ts';

/** One assumption with its checks, the engineer's words and the manager's ruling. */
export function AssumptionRuling({
  submission,
  routeId,
  assumption,
  checks,
  justification,
}: {
  readonly submission: Submission;
  readonly routeId: string;
  readonly assumption: Assumption;
  readonly checks: readonly MatchCheck[];
  readonly justification: string;
}) {
  const asking = useAsking();
  const given = submission.rulings.find((one) => one.routeId === routeId && one.assumptionKey === assumption.key);
  return (
    <li className="grid grid-cols-[minmax(0,1fr)] gap-2 border border-line bg-surface p-3">
      <div className="flex flex-wrap items-start justify-between gap-2">
        <p className="font-semibold">{assumption.statement}</p>
        {assumption.verdict === 'by judgement' ? (
          <span className="text-sm text-ink-2">by judgement</span>
        ) : (
          <VerdictMark verdict={assumption.verdict} />
        )}
      </div>
      {checks.map((check) => (
        <LogWindow key={check.key} check={check} />
      ))}
      {justification && (
        <p className="border-l-4 border-primary pl-2">
          <span className="text-sm text-ink-2">The engineer writes: </span>
          {justification}
        </p>
      )}
      <p className="text-sm text-ink-2">If it fails: {assumption.ifItFails}</p>
      {given && (
        <p className="text-sm">
          <strong>Ruling: {given.ruling.ruling}</strong> by {given.byName}, <Moment at={given.at} />
          {given.ruling.comment && <span className="block">“{given.ruling.comment}”</span>}
          {given.ruling.condition && (
            <span className="block">
              Condition: {given.ruling.condition.text}, due on {given.ruling.condition.dueOn}
            </span>
          )}
        </p>
      )}
      {canRule(asking, factsOf(submission)).allowed && (
        <RulingForm
          submissionId={submission.id}
          routeId={routeId}
          assumption={assumption}
          given={given?.ruling ?? null}
        />
      )}
    </li>
  );
}

function RulingForm({
  submissionId,
  routeId,
  assumption,
  given,
}: {
  readonly submissionId: string;
  readonly routeId: string;
  readonly assumption: Assumption;
  readonly given: Ruling | null;
}) {
  const rule = useRule(submissionId);
  const [word, setWord] = useState<Ruling['ruling'] | null>(given?.ruling ?? null);
  const [comment, setComment] = useState(given?.comment ?? '');
  const [text, setText] = useState(given?.condition?.text ?? '');
  const [dueOn, setDueOn] = useState(given?.condition?.dueOn ?? '');
  const isConditional = word === 'accepted on condition';

  function save(next: Ruling['ruling']) {
    const condition = next === 'accepted on condition' ? { text, dueOn } : null;
    rule.mutate({ routeId, assumptionKey: assumption.key, ruling: { ruling: next, comment, condition } });
  }

  return (
    <form
      aria-label={`Ruling on: ${assumption.statement}`}
      className="grid gap-2 border-t border-hair pt-2"
      onSubmit={(event) => {
        event.preventDefault();
        if (word) save(word);
      }}
    >
      <fieldset className="flex flex-wrap gap-x-4 gap-y-1">
        <legend className="sr-only">Ruling</legend>
        {rulingWords.map((one) => (
          <label key={one} className="flex min-h-8 items-center gap-1.5">
            <input
              type="radio"
              name="ruling"
              value={one}
              checked={word === one}
              onChange={() => {
                setWord(one);
                // Nothing more to say to a plain acceptance, so it is kept at once.
                if (one === 'accepted' && comment === '') save(one);
              }}
            />
            {one}
          </label>
        ))}
      </fieldset>
      {isConditional && (
        <div className="flex flex-wrap items-end gap-3">
          <div className="min-w-0 flex-1">
            <Field label="Condition">
              {(parts) => (
                <input
                  {...parts}
                  value={text}
                  required
                  onChange={(event) => setText(event.target.value)}
                  className="input"
                />
              )}
            </Field>
          </div>
          <Field label="Due on">
            {(parts) => (
              <input
                {...parts}
                type="date"
                value={dueOn}
                required
                onChange={(event) => setDueOn(event.target.value)}
                className="input"
              />
            )}
          </Field>
        </div>
      )}
      {word && (word !== 'accepted' || comment !== '' || given || rule.error) && (
        <div className="flex flex-wrap items-end gap-3">
          <div className="min-w-0 flex-1">
            <Field label={word === 'refused' ? 'Reason' : 'Comment'}>
              {(parts) => (
                <input
                  {...parts}
                  value={comment}
                  required={word === 'refused'}
                  onChange={(event) => setComment(event.target.value)}
                  className="input"
                />
              )}
            </Field>
          </div>
          <Button type="submit" variant="plain" disabled={rule.isPending}>
            Keep the ruling
          </Button>
        </div>
      )}
      {rule.error && <ProblemNote error={rule.error} />}
    </form>
  );
}
