import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { returnSubmission, type Submission, withdrawSubmission } from '../../../shared/api/submissions.ts';
import {
  acceptAll,
  edit,
  gatherTeam,
  logOf,
  owedFor,
  seen,
  seenSubmission,
  send,
  sign,
  studyInReview,
  submit,
  type Team,
  type TeamMember,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

function giveBack(caller: TeamMember, submission: Submission, comments = 'Repeat the run.') {
  return caller.call(returnSubmission, { params: { submissionId: submission.id }, body: { comments } });
}

function withdraw(caller: TeamMember, submission: Submission, reason = 'A reading was wrong.') {
  return caller.call(withdrawSubmission, { params: { submissionId: submission.id }, body: { reason } });
}

describe('returning a submission', () => {
  it('returns its routes, keeps the comments and owes the submitter a mail with them', async () => {
    const { studyId, chain, submission } = await studyInReview(team);

    const reply = await giveBack(team.manager, submission);

    expect(reply.body).toMatchObject({
      status: 'returned',
      outcome: { byName: team.manager.person.name, comments: 'Repeat the run.' },
    });
    expect((await seen(team.engineer, studyId)).routeStates[chain.balance.id]?.status).toBe('returned');
    expect((await logOf(app, studyId)).at(-1)).toMatchObject({
      actorId: team.manager.person.id,
      event: { event: 'submission.returned', submissionId: submission.id, comments: 'Repeat the run.' },
    });
    const owed = (await owedFor(app, submission.id)).filter((mail) => mail.kind === 'submission-returned');
    expect(owed).toMatchObject([
      {
        recipientId: team.engineer.person.id,
        payload: { comments: 'Repeat the run.', byName: team.manager.person.name },
      },
    ]);
  });

  it('needs comments', async () => {
    const { submission } = await studyInReview(team);

    const reply = await giveBack(team.manager, submission, '  ');

    expect(reply.status).toBe(400);
    expect(reply.problem.fields).toEqual({ 'body.comments': 'Say what must change before you return it.' });
  });

  it.each(['engineer', 'studyAuditor', 'auditor'] as const)('is not for the %s', async (place) => {
    const { submission } = await studyInReview(team);

    const reply = await giveBack(team[place], submission);

    expect(reply.status).toBe(403);
  });

  it('lets the routes be edited, which makes them drafts, and be submitted again', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await giveBack(team.manager, submission);

    const edited = await send(team.engineer, studyId, [edit('route', { ...chain.stated, evidence: 'Sheet 8' }, 1)]);
    const again = await submit(team.engineer, studyId, chain.target);

    expect(edited.body.routeStates[chain.stated.id]).toMatchObject({ status: 'draft', revision: 1 });
    expect(edited.body.routeStates[chain.balance.id]?.status).toBe('returned');
    expect(again.status).toBe(200);
  });
});

describe('withdrawing a submission', () => {
  it('makes its routes drafts again and tells the managers', async () => {
    const { studyId, chain, submission } = await studyInReview(team);

    const reply = await withdraw(team.engineer, submission);

    expect(reply.body).toMatchObject({ status: 'withdrawn', outcome: { comments: 'A reading was wrong.' } });
    expect((await seen(team.engineer, studyId)).routeStates[chain.balance.id]?.status).toBe('draft');
    expect((await logOf(app, studyId)).at(-1)).toMatchObject({
      event: { event: 'submission.withdrawn', submissionId: submission.id, reason: 'A reading was wrong.' },
    });
    const owed = (await owedFor(app, submission.id)).filter((mail) => mail.kind === 'submission-withdrawn');
    expect(owed.map((mail) => mail.recipientId).toSorted()).toEqual(
      [team.manager.person.id, team.secondManager.person.id].toSorted(),
    );
  });

  it.each(['colleague', 'manager', 'studyAuditor', 'auditor'] as const)('is not for the %s', async (place) => {
    const { submission } = await studyInReview(team);

    const reply = await withdraw(team[place], submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('Only the person who submitted it may withdraw it.');
  });

  it('lets the chain move, and says by name what moved', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await withdraw(team.engineer, submission);

    await send(team.engineer, studyId, [edit('quantity', { ...chain.source, note: 'Seen.' }, 1)]);

    expect((await seenSubmission(team.manager, submission)).movedSince).toEqual(['Source ratio']);
  });
});

it.each([
  ['returned', giveBack],
  ['withdrawn', (_manager: TeamMember, submission: Submission) => withdraw(team.engineer, submission)],
] as const)('a %s submission is neither signed, returned nor withdrawn any more', async (status, close) => {
  const { submission } = await studyInReview(team);
  await acceptAll(team.manager, submission);
  await close(team.manager, submission);

  for (const reply of [
    await sign(team.manager, submission),
    await giveBack(team.manager, submission),
    await withdraw(team.engineer, submission),
  ]) {
    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe(`This submission is ${status} already.`);
  }
});
