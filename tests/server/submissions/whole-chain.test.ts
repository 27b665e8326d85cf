import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { signatures } from '../../../server/db/schema/submissions.ts';
import { returnSubmission, type Submission, withdrawSubmission } from '../../../shared/api/submissions.ts';
import {
  acceptAll,
  assumptionsOf,
  edit,
  gatherTeam,
  logOf,
  owedFor,
  type SmallChain,
  seen,
  seenSubmission,
  send,
  sign,
  studyInReview,
  type Team,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;
let studyId: string;
let chain: SmallChain;
let submission: Submission;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});
afterAll(() => app.stop());
beforeEach(async () => {
  ({ studyId, chain, submission } = await studyInReview(team));
});

const statusesOf = async () => {
  const { routeStates } = await seen(team.engineer, studyId);
  return [chain.stated.id, chain.balance.id].map((id) => routeStates[id]?.status);
};
const signaturesOf = () => app.db.select().from(signatures).where(eq(signatures.submissionId, submission.id));
const kindsOwed = async () =>
  (await owedFor(app, submission.id))
    .filter(({ kind }) => kind !== 'submission-waits')
    .map(({ kind, recipientId }) => [kind, recipientId]);

describe('signing', () => {
  it('approves every route, and leaves a signature, a log entry and a mail to the author', async () => {
    await acceptAll(team.manager, submission);

    const { status, body } = await sign(team.manager, submission);

    expect(status).toBe(200);
    expect(body.status).toBe('signed');
    expect(await signaturesOf()).toMatchObject([
      { signerId: team.manager.person.id, snapshotHash: submission.snapshotHash },
    ]);
    expect(await statusesOf()).toEqual(['approved', 'approved']);
    expect((await logOf(app, studyId)).at(-1)).toMatchObject({
      actorId: team.manager.person.id,
      event: { event: 'submission.signed', submissionId: submission.id, snapshotHash: submission.snapshotHash },
    });
    expect(await kindsOwed()).toEqual([['submission-signed', team.engineer.person.id]]);
  });

  it('is not for an engineer, an auditor or an outsider', async () => {
    await acceptAll(team.manager, submission);

    const replies = [
      await sign(team.engineer, submission),
      await sign(team.studyAuditor, submission),
      await sign(team.outsider, submission),
    ];

    expect(replies.map((reply) => reply.status)).toEqual([403, 403, 404]);
    expect(replies[0]?.problem.sentence).toMatch(/Only a technical manager of this study may sign/);
    expect(await signaturesOf()).toEqual([]);
  });

  it('waits for a ruling on every assumption and says how many are left', async () => {
    const of = assumptionsOf(submission).length;
    expect(of).toBeGreaterThan(0);

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toContain(`0 of ${of} have a ruling`);
    expect(await signaturesOf()).toEqual([]);
  });

  it('does nothing with a wrong password, nor with the hash of something else', async () => {
    await acceptAll(team.manager, submission);

    const wrongPassword = await sign(team.manager, submission, { password: 'not the password of anybody' });
    const wrongHash = await sign(team.manager, submission, { snapshotHash: '0'.repeat(64) });

    expect([wrongPassword.status, wrongHash.status]).toEqual([403, 409]);
    expect(wrongPassword.problem.sentence).toBe('This is not your password, so nothing was signed.');
    expect(await signaturesOf()).toEqual([]);
    expect(await statusesOf()).toEqual(['in review', 'in review']);
    expect((await seenSubmission(team.manager, submission)).status).toBe('open');
  });

  it('by two managers at the same moment gives one signature', async () => {
    await acceptAll(team.manager, submission);

    const replies = await Promise.all([sign(team.manager, submission), sign(team.secondManager, submission)]);

    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 403]);
    expect(await signaturesOf()).toHaveLength(1);
    expect((await logOf(app, studyId)).filter(({ event }) => event.event === 'submission.signed')).toHaveLength(1);
  });
});

describe('a submission that is not signed', () => {
  it('goes back with comments to the author', async () => {
    const params = { submissionId: submission.id };
    const silent = await team.manager.call(returnSubmission, { params, body: { comments: ' ' } });
    const { status, body } = await team.manager.call(returnSubmission, { params, body: { comments: 'Which sheet?' } });

    expect([silent.status, status]).toEqual([400, 200]);
    expect(body.outcome?.comments).toBe('Which sheet?');
    expect(await statusesOf()).toEqual(['returned', 'returned']);
    expect(await kindsOwed()).toEqual([['submission-returned', team.engineer.person.id]]);
  });

  it('is withdrawn by its submitter alone', async () => {
    const call = { params: { submissionId: submission.id }, body: { reason: 'Too early.' } };
    const byColleague = await team.colleague.call(withdrawSubmission, call);
    const bySubmitter = await team.engineer.call(withdrawSubmission, call);

    expect([byColleague.status, bySubmitter.status]).toEqual([403, 200]);
    expect(byColleague.problem.sentence).toBe('Only the person who submitted it may withdraw it.');
    expect(await statusesOf()).toEqual(['draft', 'draft']);
    const told = await kindsOwed();
    expect(told).toHaveLength(2);
    expect(told).toEqual(expect.arrayContaining([['submission-withdrawn', team.manager.person.id]]));
  });

  it('keeps what was closed closed', async () => {
    const call = { params: { submissionId: submission.id }, body: { comments: 'Which sheet?' } };
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);

    const reply = await team.secondManager.call(returnSubmission, call);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('This submission is signed already.');
    expect(await statusesOf()).toEqual(['approved', 'approved']);
  });
});

it('marks an approved number whose basis changed upstream', async () => {
  await acceptAll(team.manager, submission);
  await sign(team.manager, submission);

  const changed = { ...chain.stated, evidence: 'Sheet 8' };
  const reply = await send(team.engineer, studyId, [edit('route', changed, 1)], 'The sheet was revised.');

  expect(reply.status).toBe(200);
  const { routeStates } = await seen(team.engineer, studyId);
  expect(routeStates[chain.stated.id]).toMatchObject({ status: 'draft', revision: 2 });
  expect(routeStates[chain.balance.id]).toMatchObject({ status: 'approved', basisChanged: true });
});
