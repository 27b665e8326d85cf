import { eq } from 'drizzle-orm';
import { signSubmission } from '../../../shared/api/submissions.ts';
import { canSign } from '../../../shared/domain/submission-policy.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { people } from '../../db/schema/people.ts';
import { signatures } from '../../db/schema/submissions.ts';
import { basisHash } from '../../db/study-reads.ts';
import { describeSubmission, factsOf, lockSubmission } from '../../db/submission-reads.ts';
import { defineCommand } from '../../http/handler.ts';
import { passwordMatches } from '../../http/password.ts';
import { createThrottle } from '../../http/throttle.ts';
import { closeSubmission, othersToTell } from './close-submission.ts';

/** A throttle of its own: guessing here must not be paid from the tries of the sign-in page, nor the reverse. */
const throttle = createThrottle({ tries: 5, perSeconds: 900, what: 'signing' });

export const signSubmissionCommand = defineCommand(signSubmission, async ({ actor, params, body, tx, services }) => {
  const { study, row } = await lockSubmission(tx, actor, params.submissionId);
  const submission = await describeSubmission(tx, row);
  requireAllowed(canSign(actor, factsOf(submission)));
  if (body.snapshotHash !== row.snapshotHash) {
    throw new Problem('stale', 'What you saw is not what would be signed. Reload the submission and look again.');
  }
  if (submission.movedSince.length > 0) {
    throw new Problem(
      'stale',
      `The chain moved after it was submitted (${submission.movedSince.join(', ')}). Return it, so that it is submitted as it is now.`,
    );
  }

  const key = `signing ${actor.personId}`;
  await throttle.take(key);
  const [person] = await tx
    .select({ passwordHash: people.passwordHash })
    .from(people)
    .where(eq(people.id, actor.personId));
  if (!(await passwordMatches(person?.passwordHash ?? null, body.password))) {
    const sentence = 'This is not your password, so nothing was signed.';
    throw new Problem('not allowed', sentence, { fields: { 'body.password': sentence } });
  }
  await throttle.forgive(key);

  const at = services.now();
  await tx.insert(signatures).values({
    submissionId: row.id,
    signerId: actor.personId,
    signerName: actor.name,
    meaning: body.meaning,
    snapshotHash: row.snapshotHash,
    signedAt: at,
  });
  // Of what is signed, not of the chain as it is now: a route added beside it during the review is a changed basis.
  const { model, routeIds } = row.snapshot;
  const closed = await closeSubmission(tx, study, row, {
    status: 'signed',
    byPerson: actor.personId,
    at,
    comments: '',
    basisHashes: Object.fromEntries(routeIds.map((id) => [id, basisHash(model, id)])),
  });
  const { targetName, snapshotHash } = row;
  const told = await othersToTell(tx, [row.submittedBy, ...submission.authorIds], actor.personId);
  return {
    reply: await describeSubmission(tx, closed),
    audit: [
      {
        chain: study.id,
        event: {
          event: 'submission.signed',
          submissionId: row.id,
          targetName,
          routeIds,
          snapshotHash,
          signerName: actor.name,
          meaning: body.meaning,
        },
      },
    ],
    notices: [...new Set(told)].map((recipientId) => ({
      kind: 'submission-signed',
      recipientId,
      payload: {
        submissionId: row.id,
        studyTitle: study.title,
        targetName,
        byName: actor.name,
        meaning: body.meaning,
        snapshotHash,
      },
    })),
  };
});
