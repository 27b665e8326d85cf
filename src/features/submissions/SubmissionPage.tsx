import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import type { Submission } from '../../../shared/api/submissions.ts';
import { paths } from '../../api/paths.ts';
import { Loading } from '../../ui/Loading.tsx';
import { Measured } from '../../ui/Measured.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { StatusMark } from '../../ui/StatusMark.tsx';
import { Symbol_ } from '../../ui/Symbol.tsx';
import { ChangesSinceSigned } from './ChangesSinceSigned.tsx';
import { RouteReview } from './RouteReview.tsx';
import { submissionQuery } from './submission-queries.ts';
import { Verdict } from './Verdict.tsx';

/** A package under review: what is asked, what changed, each assumption with its ruling, and the verdict. */
export function Component() {
  const { submissionId = '' } = useParams();
  const submission = useQuery(submissionQuery(submissionId));
  if (submission.data) return <Review submission={submission.data} />;
  if (submission.error) return <ProblemNote error={submission.error} onRetry={() => void submission.refetch()} />;
  return <Loading what="the submission" />;
}

function Review({ submission }: { readonly submission: Submission }) {
  const { snapshot } = submission;
  const target = snapshot.model.quantities.find((quantity) => quantity.id === snapshot.targetQuantityId);
  const result = snapshot.evaluation.quantities[snapshot.targetQuantityId]?.result;
  return (
    <Page title={`Review of ${target?.name ?? 'a quantity'}`}>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-6 lg:grid-cols-[minmax(0,1fr)_20rem]">
        <div className="grid min-w-0 content-start gap-6">
          <section aria-label="What is submitted" className="grid gap-2">
            <p className="flex flex-wrap items-center gap-x-3 gap-y-1 text-sm">
              <StatusMark status={submission.status} />
              <Link to={paths.study(submission.studyId)} className="text-primary underline">
                {submission.studyTitle}
              </Link>
              <span>
                submitted by {submission.submittedByName}, <Moment at={submission.submittedAt} />
              </span>
            </p>
            {target && result && (
              <p className="border border-rule bg-surface p-3 text-lg font-bold">
                <Symbol_ symbol={target.symbol} /> = <Measured value={result.value} u={result.u} unit={target.unit} />{' '}
                <span className="text-sm font-normal text-ink-2">± is U with k = 2</span>
                {target.limit && (
                  <span className="block text-sm font-normal">
                    Accepted when {target.limit.side} {target.limit.text}.
                  </span>
                )}
                {target.unsafeSide && (
                  <span className="block text-sm font-semibold text-warn">
                    Safety-critical: too {target.unsafeSide} is the unsafe side. Local codes and licensed practice stand
                    above this estimate.
                  </span>
                )}
              </p>
            )}
            {submission.note && <p>“{submission.note}”</p>}
            {submission.movedSince.length > 0 && submission.status === 'open' && (
              <p role="alert" className="border-2 border-warn bg-surface p-3">
                The chain moved after it was submitted: {submission.movedSince.join(', ')}. Return it, so that it is
                submitted as it is now.
              </p>
            )}
          </section>
          <ChangesSinceSigned submission={submission} />
          {snapshot.routeIds.map((routeId) => (
            <RouteReview key={routeId} submission={submission} routeId={routeId} />
          ))}
        </div>
        <Verdict submission={submission} />
      </div>
    </Page>
  );
}
