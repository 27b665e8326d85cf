import { useState } from 'react';
import { type Submission, signatureMeanings } from '../../../shared/api/submissions.ts';
import { canReturn, canRule, canSign, canWithdraw, countRulings } from '../../../shared/domain/submission-policy.ts';
import { useAsking } from '../../api/use-asking.ts';
import { ActionButton } from '../../ui/ActionButton.tsx';
import { Field } from '../../ui/Field.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { factsOf, useReturn, useSign, useWithdraw } from './submission-queries.ts';

/** What has been ruled on, and the ways to end the review. */
export function Verdict({ submission }: { readonly submission: Submission }) {
  const asking = useAsking();
  const facts = factsOf(submission);
  const { ruled, of } = countRulings(facts);
  const isManager = asking.memberships[submission.studyId] === 'manager';
  return (
    <aside aria-label="Verdict" className="grid content-start gap-5 lg:sticky lg:top-4">
      <section className="grid gap-2">
        <h2 className="flex justify-between border-b border-rule pb-1 font-bold">
          Assumptions{' '}
          <span className="text-sm font-normal" role="status">
            {ruled} of {of} ruled on
          </span>
        </h2>
        <progress value={ruled} max={of} className="h-2 w-full accent-primary" aria-label="Assumptions ruled on" />
      </section>
      {submission.signatures.map((signature) => (
        <section
          key={signature.signedAt}
          className="grid gap-1 border-4 border-double border-rule bg-surface p-3 text-sm"
        >
          <h2 className="font-bold">Signed by {signature.signerName}</h2>
          <p>{signature.meaning}</p>
          <Moment at={signature.signedAt} />
          <p className="num text-xs break-all whitespace-normal text-ink-2">SHA-256 {signature.snapshotHash}</p>
        </section>
      ))}
      {submission.outcome && submission.status !== 'signed' && (
        <section className="grid gap-1 border border-rule bg-surface p-3 text-sm">
          <h2 className="font-bold">
            {submission.status === 'returned' ? 'Returned' : 'Withdrawn'} by {submission.outcome.byName}
          </h2>
          <p>“{submission.outcome.comments}”</p>
          <Moment at={submission.outcome.at} />
        </section>
      )}
      {submission.status === 'open' && isManager && <SignForm submission={submission} />}
      {submission.status === 'open' && isManager && <ReturnForm submission={submission} />}
      {submission.status === 'open' && !isManager && (
        <p className="text-sm text-ink-2">{reasonOf(canRule(asking, facts))}</p>
      )}
      {submission.status === 'open' && submission.submittedById === asking.personId && (
        <WithdrawForm submission={submission} />
      )}
    </aside>
  );
}

function reasonOf(decision: ReturnType<typeof canRule>): string {
  return decision.allowed ? '' : decision.reason;
}

function SignForm({ submission }: { readonly submission: Submission }) {
  const asking = useAsking();
  const sign = useSign(submission.id);
  const [password, setPassword] = useState('');
  const [meaning, setMeaning] = useState<(typeof signatureMeanings)[number]>(signatureMeanings[0]);
  const count = submission.snapshot.routeIds.length;
  return (
    <form
      aria-label="Sign"
      className="grid gap-3 border border-rule bg-sunk p-3"
      onSubmit={(event) => {
        event.preventDefault();
        sign.mutate({ password, meaning, snapshotHash: submission.snapshotHash }, { onSettled: () => setPassword('') });
      }}
    >
      <h2 className="font-bold">Sign</h2>
      <p className="text-sm">
        Signing records <strong>{asking.name}</strong>, the time and the meaning, and freezes {count}{' '}
        {count === 1 ? 'route' : 'routes'}. It is bound to exactly what is shown here:{' '}
        <span className="num text-xs" title={submission.snapshotHash}>
          {submission.snapshotHash.slice(0, 16)}
        </span>
      </p>
      <fieldset className="grid gap-1 text-sm">
        <legend className="font-semibold">Meaning</legend>
        {signatureMeanings.map((one) => (
          <label key={one} className="flex items-start gap-2 py-1">
            <input
              type="radio"
              name="meaning"
              checked={meaning === one}
              onChange={() => setMeaning(one)}
              className="mt-1"
            />
            {one}
          </label>
        ))}
      </fieldset>
      <Field label="Your password">
        {(parts) => (
          <input
            {...parts}
            type="password"
            autoComplete="current-password"
            required
            value={password}
            onChange={(event) => setPassword(event.target.value)}
            className="input"
          />
        )}
      </Field>
      <ActionButton type="submit" decision={canSign(asking, factsOf(submission))} busy={sign.isPending}>
        Sign
      </ActionButton>
      {sign.error && <ProblemNote error={sign.error} />}
    </form>
  );
}

function ReturnForm({ submission }: { readonly submission: Submission }) {
  const asking = useAsking();
  const giveBack = useReturn(submission.id);
  const [comments, setComments] = useState('');
  return (
    <form
      aria-label="Return"
      className="grid gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        giveBack.mutate({ comments });
      }}
    >
      <Field label="Comments to the author" hint="What must change before you can sign.">
        {(parts) => (
          <textarea
            {...parts}
            rows={3}
            required
            value={comments}
            onChange={(event) => setComments(event.target.value)}
            className="input"
          />
        )}
      </Field>
      <ActionButton
        type="submit"
        variant="plain"
        decision={canReturn(asking, factsOf(submission))}
        busy={giveBack.isPending}
      >
        Return with comments
      </ActionButton>
      {giveBack.error && <ProblemNote error={giveBack.error} />}
    </form>
  );
}

function WithdrawForm({ submission }: { readonly submission: Submission }) {
  const asking = useAsking();
  const withdraw = useWithdraw(submission.id);
  const [reason, setReason] = useState('');
  return (
    <form
      aria-label="Withdraw"
      className="grid gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        withdraw.mutate({ reason });
      }}
    >
      <Field label="Reason" hint="Withdraw to change the package; it can be submitted again.">
        {(parts) => (
          <textarea
            {...parts}
            rows={2}
            required
            value={reason}
            onChange={(event) => setReason(event.target.value)}
            className="input"
          />
        )}
      </Field>
      <ActionButton
        type="submit"
        variant="plain"
        decision={canWithdraw(asking, factsOf(submission))}
        busy={withdraw.isPending}
      >
        Withdraw the submission
      </ActionButton>
      {withdraw.error && <ProblemNote error={withdraw.error} />}
    </form>
  );
}
