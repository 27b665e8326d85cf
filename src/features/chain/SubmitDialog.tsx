import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { Link } from 'react-router-dom';
import { openSubmission } from '../../../shared/api/submissions.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { useChain } from '../../chain/chain-context.ts';
import { routeStatus } from '../../chain/describe-quantity.ts';
import { findItem } from '../../chain/editing/chain-edits.ts';
import { targets } from '../../chain/outline/outline-rows.ts';
import { Button } from '../../ui/Button.tsx';
import { Dialog } from '../../ui/Dialog.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { problemOf, studyQuery } from './study-queries.ts';
import { type Obstacle, submissionReadiness } from './submission-readiness.ts';

/** Sends a quantity and all it rests on for review: what goes along, what is not ready yet, a note. */
export function SubmitDialog({ preset, onClose }: { readonly preset: string | null; readonly onClose: () => void }) {
  const { state, evaluation, document, studyId, select } = useChain();
  const queryClient = useQueryClient();
  const id = useId();
  const [targetId, setTargetId] = useState(preset ?? targets(state.model)[0] ?? '');
  const [note, setNote] = useState('');
  const ready = submissionReadiness(state.model, evaluation, state.routeStates, targetId);
  const submit = useMutation({
    mutationFn: async () => {
      await document.flush();
      if (document.isDirty)
        throw new Error(
          'Your last changes are not saved yet. Save them first: what is judged is what the server holds.',
        );
      const body = { targetQuantityId: targetId, revision: document.getState().revision, note };
      return call(openSubmission, { params: { studyId }, query: undefined, body });
    },
    onSettled: () => queryClient.invalidateQueries({ queryKey: studyQuery(studyId).queryKey }),
  });
  const refusal = submit.error ? problemOf(submit.error) : null;
  const fromServer = (refusal?.reasons ?? []).map(
    ({ sentence, subject }): Obstacle => ({ sentence, subjectId: subject.id }),
  );
  const obstacles = [
    ...ready.obstacles,
    ...fromServer.filter((one) => !ready.obstacles.some((known) => known.sentence === one.sentence)),
  ];

  if (submit.data) {
    return (
      <Dialog open title="Submitted for review" onClose={onClose}>
        <p className="pb-3 text-sm">
          The technical managers of the study have been told. The routes of the package are locked until they have
          ruled.
        </p>
        <Link className="font-semibold text-primary underline" to={paths.submission(submit.data.id)}>
          Open the review
        </Link>
      </Dialog>
    );
  }

  return (
    <Dialog open title="Submit for review" onClose={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          submit.mutate();
        }}
      >
        <label className="grid gap-1 text-xs font-semibold">
          Target quantity
          <select
            className="min-h-9 border border-line bg-surface px-2 text-sm font-normal"
            value={targetId}
            onChange={(event) => setTargetId(event.target.value)}
          >
            {state.model.quantities.map((quantity) => (
              <option key={quantity.id} value={quantity.id}>
                {quantity.symbol}, {quantity.name}
              </option>
            ))}
          </select>
        </label>
        <section className="grid gap-1">
          <h3 className="text-sm font-semibold">In the package</h3>
          <ul className="grid gap-1">
            {ready.routeIds.map((routeId) => {
              const route = state.model.routes.find((one) => one.id === routeId);
              const quantity = state.model.quantities.find((one) => one.id === route?.quantityId);
              return (
                <li key={routeId} className="flex justify-between gap-3 border-b border-hair py-1 text-sm">
                  <span>
                    {quantity?.name}: {route?.name}
                  </span>
                  <span className="text-xs">
                    <StatusMark status={routeStatus(state, routeId)} />
                  </span>
                </li>
              );
            })}
          </ul>
          {ready.routeIds.length === 0 && (
            <p className="text-sm text-ink-2">Nothing to judge: no route leads here, or all are approved.</p>
          )}
        </section>
        {obstacles.length > 0 && (
          <section className="grid gap-1" aria-labelledby={`${id}-missing`}>
            <h3 id={`${id}-missing`} className="text-sm font-semibold text-bad">
              Not ready yet
            </h3>
            <ul className="grid gap-1.5">
              {obstacles.map((obstacle) => (
                <li
                  key={`${obstacle.subjectId}:${obstacle.sentence}`}
                  className="flex items-start justify-between gap-3 border-l-4 border-bad pl-3 text-sm"
                >
                  {obstacle.sentence}
                  {findItem(state.model, obstacle.subjectId) && (
                    <Button
                      onClick={() => {
                        select(obstacle.subjectId);
                        onClose();
                      }}
                    >
                      Mend it
                    </Button>
                  )}
                </li>
              ))}
            </ul>
          </section>
        )}
        <label className="grid gap-1 text-xs font-semibold">
          Note to the technical manager
          <textarea
            rows={3}
            maxLength={4000}
            className="border border-line bg-surface px-2 py-1 text-sm font-normal"
            value={note}
            onChange={(event) => setNote(event.target.value)}
          />
        </label>
        {submit.error && fromServer.length === 0 && (
          <p role="alert" className="text-sm font-semibold text-bad">
            {refusal?.sentence ?? submit.error.message}
          </p>
        )}
        <span>
          <Button
            type="submit"
            disabled={submit.isPending || ready.obstacles.length > 0 || ready.routeIds.length === 0}
          >
            {submit.isPending ? 'Submitting' : 'Submit for review'}
          </Button>
        </span>
      </form>
    </Dialog>
  );
}
