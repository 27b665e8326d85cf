import { getSubmission, returnSubmission, withdrawSubmission } from '../../../shared/api/submissions.ts';
import { canReturn, canWithdraw } from '../../../shared/domain/submission-policy.ts';
import { requireAllowed } from '../../db/problem.ts';
import { managersOf } from '../../db/study-reads.ts';
import { describeSubmission, factsOf, lockSubmission, readSubmission } from '../../db/submission-reads.ts';
import { defineCommand, defineQuery, type Handler } from '../../http/handler.ts';
import { closeSubmission, othersToTell } from './close-submission.ts';
import { openSubmissionCommand } from './open-submission.ts';
import { ruleOnAssumptionCommand } from './rule-on-assumption.ts';
import { signSubmissionCommand } from './sign-submission.ts';

const getSubmissionQuery = defineQuery(getSubmission, ({ actor, params, reader }) =>
  readSubmission(reader, actor, params.submissionId),
);

const returnSubmissionCommand = defineCommand(returnSubmission, async ({ actor, params, body, tx, services }) => {
  const { study, row } = await lockSubmission(tx, actor, params.submissionId);
  const submission = await describeSubmission(tx, row);
  requireAllowed(canReturn(actor, factsOf(submission)));
  const closed = await closeSubmission(tx, study, row, {
    status: 'returned',
    byPerson: actor.personId,
    at: services.now(),
    comments: body.comments,
    basisHashes: {},
  });
  const { targetName } = row;
  const told = await othersToTell(tx, [row.submittedBy], actor.personId);
  return {
    reply: await describeSubmission(tx, closed),
    audit: [
      {
        chain: study.id,
        event: {
          event: 'submission.returned',
          submissionId: row.id,
          targetName,
          routeIds: row.snapshot.routeIds,
          comments: body.comments,
        },
      },
    ],
    notices: told.map((recipientId) => ({
      kind: 'submission-returned',
      recipientId,
      payload: {
        submissionId: row.id,
        studyTitle: study.title,
        targetName,
        byName: actor.name,
        comments: body.comments,
      },
    })),
  };
});

const withdrawSubmissionCommand = defineCommand(withdrawSubmission, async ({ actor, params, body, tx, services }) => {
  const { study, row } = await lockSubmission(tx, actor, params.submissionId);
  const submission = await describeSubmission(tx, row);
  requireAllowed(canWithdraw(actor, factsOf(submission)));
  const closed = await closeSubmission(tx, study, row, {
    status: 'withdrawn',
    byPerson: actor.personId,
    at: services.now(),
    comments: body.reason,
    basisHashes: {},
  });
  const { targetName } = row;
  const managers = await managersOf(tx, study.id);
  const told = await othersToTell(
    tx,
    managers.map((manager) => manager.personId),
    actor.personId,
  );
  return {
    reply: await describeSubmission(tx, closed),
    audit: [
      {
        chain: study.id,
        event: {
          event: 'submission.withdrawn',
          submissionId: row.id,
          targetName,
          routeIds: row.snapshot.routeIds,
          reason: body.reason,
        },
      },
    ],
    notices: told.map((recipientId) => ({
      kind: 'submission-withdrawn',
      recipientId,
      payload: { submissionId: row.id, studyTitle: study.title, targetName, byName: actor.name, reason: body.reason },
    })),
  };
});

export const submissionRoutes: Handler[] = [
  openSubmissionCommand,
  getSubmissionQuery,
  ruleOnAssumptionCommand,
  signSubmissionCommand,
  returnSubmissionCommand,
  withdrawSubmissionCommand,
];
