import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { Endpoint, Input } from '../../../shared/api/endpoint.ts';
import {
  getSubmission,
  returnSubmission,
  ruleOnAssumption,
  type Submission,
  signSubmission,
  withdrawSubmission,
} from '../../../shared/api/submissions.ts';
import type { SubmissionFacts } from '../../../shared/domain/submission-policy.ts';
import { call } from '../../api/call.ts';

export const submissionQuery = (submissionId: string) =>
  queryOptions({
    queryKey: ['submission', submissionId],
    queryFn: ({ signal }) => call(getSubmission, { params: { submissionId } }, signal),
  });

/** A change to the submission on screen: the reply replaces it, and lists that count it are asked again. */
function useChange<E extends Endpoint>(submissionId: string, run: (body: Input<E>['body']) => Promise<Submission>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: run,
    // One after the other: each reply is the whole submission, and an older one must not replace a newer.
    scope: { id: `submission ${submissionId}` },
    onSuccess: (submission) => {
      queryClient.setQueryData(submissionQuery(submissionId).queryKey, submission);
      return queryClient.invalidateQueries({ queryKey: ['work-list'] });
    },
    // A refusal often means that the screen is old.
    onError: () => queryClient.invalidateQueries(submissionQuery(submissionId)),
  });
}

export const useRule = (submissionId: string) =>
  useChange<typeof ruleOnAssumption>(submissionId, (body) =>
    call(ruleOnAssumption, { params: { submissionId }, body }),
  );
export const useSign = (submissionId: string) =>
  useChange<typeof signSubmission>(submissionId, (body) => call(signSubmission, { params: { submissionId }, body }));
export const useReturn = (submissionId: string) =>
  useChange<typeof returnSubmission>(submissionId, (body) =>
    call(returnSubmission, { params: { submissionId }, body }),
  );
export const useWithdraw = (submissionId: string) =>
  useChange<typeof withdrawSubmission>(submissionId, (body) =>
    call(withdrawSubmission, { params: { submissionId }, body }),
  );

/** What the policies ask of a submission. */
export function factsOf(submission: Submission): SubmissionFacts {
  const { routeIds, evaluation } = submission.snapshot;
  return {
    studyId: submission.studyId,
    status: submission.status,
    submittedById: submission.submittedById,
    authorIds: submission.authorIds,
    rulings: submission.rulings,
    assumptions: routeIds.flatMap((routeId) =>
      (evaluation.routes[routeId]?.assumptions ?? []).map(({ key }) => ({ routeId, assumptionKey: key })),
    ),
  };
}
