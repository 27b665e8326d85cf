import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addMember, removeMember } from '../../../shared/api/studies.ts';
import { ruleOnAssumption, signatureMeanings } from '../../../shared/api/submissions.ts';
import { holdStudy, waitForLockWaits } from '../../support/lock-waits.ts';
import {
  acceptAll,
  assumptionsOf,
  edit,
  gatherTeam,
  logOf,
  owedFor,
  seen,
  seenSubmission,
  send,
  sign,
  studyInReview,
  studyWithChain,
  submit,
  type Team,
  value,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;

beforeAll(async () => {
  app = await startTestApp({ now: () => new Date('2026-03-04T09:12:33.000Z') });
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

/** A study whose managers have accepted everything and have only to sign. */
async function readyToSign() {
  const ready = await studyInReview(team);
  await acceptAll(team.manager, ready.submission);
  return ready;
}

describe('a signature', () => {
  it('stands with printed name, time, meaning and the hash of what was signed', async () => {
    const { submission } = await readyToSign();

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(200);
    expect(reply.body).toMatchObject({
      status: 'signed',
      signatures: [
        {
          signerName: team.manager.person.name,
          meaning: signatureMeanings[0],
          signedAt: '2026-03-04T09:12:33.000Z',
          snapshotHash: submission.snapshotHash,
        },
      ],
      outcome: { byName: team.manager.person.name, at: '2026-03-04T09:12:33.000Z' },
    });
  });

  it('approves the routes, is logged, and owes its author a mail', async () => {
    const { studyId, chain, submission } = await readyToSign();

    await sign(team.manager, submission);

    const { routeStates } = await seen(team.engineer, studyId);
    expect(routeStates[chain.balance.id]).toMatchObject({ status: 'approved', basisChanged: false });
    expect((await logOf(app, studyId)).at(-1)).toEqual({
      actorId: team.manager.person.id,
      event: {
        event: 'submission.signed',
        submissionId: submission.id,
        targetName: 'Target ratio',
        routeIds: submission.snapshot.routeIds,
        snapshotHash: submission.snapshotHash,
        signerName: team.manager.person.name,
        meaning: signatureMeanings[0],
      },
    });
    const owed = (await owedFor(app, submission.id)).filter((mail) => mail.kind === 'submission-signed');
    expect(owed.map((mail) => mail.recipientId)).toEqual([team.engineer.person.id]);
  });

  it('tells everybody who worked on the package, once', async () => {
    const { studyId, chain } = await studyWithChain(team);
    await send(team.colleague, studyId, [edit('quantity', { ...chain.source, note: 'Seen.' }, 1)]);
    const submission = (await submit(team.engineer, studyId, chain.target)).body;
    await acceptAll(team.manager, submission);

    await sign(team.manager, submission);

    const owed = (await owedFor(app, submission.id)).filter((mail) => mail.kind === 'submission-signed');
    expect(owed.map((mail) => mail.recipientId).toSorted()).toEqual(
      [team.engineer.person.id, team.colleague.person.id].toSorted(),
    );
  });

  it('covers what was submitted: a second route added during the review shows as a changed basis', async () => {
    const { studyId, chain, submission } = await readyToSign();
    const beside = { ...chain.stated, id: randomUUID(), name: 'Second sheet', value: value(5) };
    expect((await send(team.engineer, studyId, [edit('route', beside, 0)])).status).toBe(200);

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(200);
    const { routeStates } = await seen(team.engineer, studyId);
    expect(routeStates[chain.stated.id]).toMatchObject({ status: 'approved', basisChanged: false });
    expect(routeStates[chain.balance.id]).toMatchObject({ status: 'approved', basisChanged: true });
  });
});

describe('a signature is refused', () => {
  it.each([
    ['engineer', 'Only a technical manager of this study may sign; you are its scale-up engineer.'],
    ['studyAuditor', 'Only a technical manager of this study may sign; you are its auditor.'],
    ['auditor', 'Only a technical manager of this study may sign; you have no role in it.'],
  ] as const)('to the %s', async (place, sentence) => {
    const { submission } = await readyToSign();

    const reply = await sign(team[place], submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe(sentence);
  });

  it.each(['outsider', 'administrator'] as const)('to the %s as if there were no submission', async (place) => {
    const { submission } = await readyToSign();

    const reply = await sign(team[place], submission);

    expect(reply.status).toBe(404);
  });

  it('to a manager who worked on the package as an engineer before', async () => {
    const { studyId, chain } = await studyWithChain(team);
    await send(team.colleague, studyId, [edit('quantity', { ...chain.source, note: 'first' }, 1)]);
    // Edited over: the colleague is not the last editor any more.
    await send(team.engineer, studyId, [edit('quantity', { ...chain.source, note: 'second' }, 2)]);
    const personId = team.colleague.person.id;
    await team.engineer.call(removeMember, { params: { studyId, personId } });
    await team.engineer.call(addMember, { params: { studyId }, body: { personId, role: 'manager' } });
    const submission = (await submit(team.engineer, studyId, chain.target)).body;
    await acceptAll(team.manager, submission);

    const reply = await sign(team.colleague, submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('You worked on this package, so somebody else must sign it.');
  });

  it('while an assumption has no ruling, counting them', async () => {
    const { submission } = await studyInReview(team);

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('Rule on every assumption first: 0 of 2 have a ruling.');
  });

  it('while an assumption is refused', async () => {
    const { submission } = await readyToSign();
    const [assumption = { routeId: '', assumptionKey: '' }] = assumptionsOf(submission);
    const ruling = { ruling: 'refused' as const, comment: 'Wrong sheet.', condition: null };
    const params = { submissionId: submission.id };
    await team.secondManager.call(ruleOnAssumption, { params, body: { ...assumption, ruling } });

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toMatch(/^An assumption is refused/);
  });

  it('for another hash than the one that was on screen', async () => {
    const { submission } = await readyToSign();

    const reply = await sign(team.manager, submission, { snapshotHash: '0'.repeat(64) });

    expect(reply.status).toBe(409);
    expect((await seenSubmission(team.manager, submission)).status).toBe('open');
  });

  it('for another password, which leaves no trace but a used-up try', async () => {
    const { studyId, submission } = await readyToSign();
    const log = await logOf(app, studyId);

    const reply = await sign(team.manager, submission, { password: 'not the password of this person' });

    expect(reply.status).toBe(403);
    expect(reply.problem.fields).toEqual({ 'body.password': 'This is not your password, so nothing was signed.' });
    expect(await logOf(app, studyId)).toEqual(log);
    expect((await seenSubmission(team.manager, submission)).signatures).toEqual([]);
    // The right one still works and gives the tries back.
    expect((await sign(team.manager, submission)).status).toBe(200);
  });

  it('after five wrong passwords even to the right one, and to nobody else', async () => {
    const { submission } = await readyToSign();
    for (let attempt = 0; attempt < 5; attempt += 1) {
      const wrong = await sign(team.secondManager, submission, { password: `guess number ${attempt}` });
      expect(wrong.status).toBe(403);
    }

    const right = await sign(team.secondManager, submission);
    const other = await sign(team.manager, submission);

    expect(right.status).toBe(429);
    expect(right.problem.sentence).toMatch(/^Too many wrong passwords for signing\. Wait \d+ minutes/);
    expect(other.status).toBe(200);
  });

  it('a second time', async () => {
    const { submission } = await readyToSign();
    await sign(team.manager, submission);

    const reply = await sign(team.manager, submission);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('This submission is signed already.');
  });
});

describe('two verdicts at once', () => {
  it('take their turn at the study before they look at what is ruled', async () => {
    const { studyId, submission } = await studyInReview(team);
    const release = await holdStudy(app.fresh.admin, studyId);

    // Not to be signed in any case: without the turn it would be refused at once.
    const unruled = sign(team.manager, submission);
    await waitForLockWaits(app.fresh.admin, 1);
    await release();

    expect((await unruled).status).toBe(403);
  });

  it('are one signature, one log entry and one mail', async () => {
    const { studyId, submission } = await readyToSign();
    const other = await managerBeside(studyId);
    const release = await holdStudy(app.fresh.admin, studyId);

    const both = [sign(team.manager, submission), sign(other, submission)];
    await waitForLockWaits(app.fresh.admin, 2);
    await release();

    const replies = await Promise.all(both);
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 403]);
    expect(replies.find((reply) => reply.status === 403)?.problem.sentence).toBe('This submission is signed already.');
    expect((await seenSubmission(team.manager, submission)).signatures).toHaveLength(1);
    const signed = (await logOf(app, studyId)).filter(({ event }) => event.event === 'submission.signed');
    expect(signed).toHaveLength(1);
    const owed = (await owedFor(app, submission.id)).filter((mail) => mail.kind === 'submission-signed');
    expect(owed).toHaveLength(1);
  });

  it('never sign over a refusal that came first', async () => {
    const { studyId, submission } = await readyToSign();
    const other = await managerBeside(studyId);
    const [assumption = { routeId: '', assumptionKey: '' }] = assumptionsOf(submission);
    const ruling = { ruling: 'refused' as const, comment: 'Wrong sheet.', condition: null };
    const release = await holdStudy(app.fresh.admin, studyId);

    const refusing = other.call(ruleOnAssumption, {
      params: { submissionId: submission.id },
      body: { ...assumption, ruling },
    });
    await waitForLockWaits(app.fresh.admin, 1);
    const signing = sign(team.manager, submission);
    await waitForLockWaits(app.fresh.admin, 2);
    await release();

    // Whoever is served first: a signed submission has no refused assumption.
    const statuses = [(await refusing).status, (await signing).status];
    const after = await seenSubmission(team.manager, submission);
    const isRefused = after.rulings.some((one) => one.ruling.ruling === 'refused');
    expect([
      [200, 403],
      [403, 200],
    ]).toContainEqual(statuses);
    expect(after.status === 'signed').toBe(!isRefused);
  });
});

/** Another manager with all tries left: the throttle counts by person. */
async function managerBeside(studyId: string) {
  const newcomer = await gatherTeam(app);
  const body = { personId: newcomer.manager.person.id, role: 'manager' as const };
  await team.engineer.call(addMember, { params: { studyId }, body });
  return newcomer.manager;
}
