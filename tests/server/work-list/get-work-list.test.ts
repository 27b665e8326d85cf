import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { returnSubmission, ruleOnAssumption, withdrawSubmission } from '../../../shared/api/submissions.ts';
import { getWorkList } from '../../../shared/api/work-list.ts';
import type { Ruling } from '../../../shared/domain/audit-events.ts';
import {
  acceptAll,
  assumptionsOf,
  edit,
  gatherTeam,
  send,
  sign,
  studyInReview,
  studyWithChain,
  type Team,
  type TeamMember,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;

beforeAll(async () => {
  app = await startTestApp({ now: () => new Date('2026-03-04T09:12:33.000Z') });
});

// People of its own for each test, since a work list spans all studies of a person.
beforeEach(async () => {
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

const workOf = async (caller: TeamMember) => (await caller.call(getWorkList)).body.items;
const kindsOf = async (caller: TeamMember) => (await workOf(caller)).map((item) => item.kind);

const onCondition: Ruling = {
  ruling: 'accepted on condition',
  comment: '',
  condition: { text: 'Repeat with the larger pump', dueOn: '2026-09-30' },
};

/** The small chain with one assumption accepted on a condition and the other accepted. */
async function reviewedOnCondition() {
  const reviewed = await studyInReview(team);
  const params = { submissionId: reviewed.submission.id };
  await acceptAll(team.manager, reviewed.submission);
  const [assumption = { routeId: '', assumptionKey: '' }] = assumptionsOf(reviewed.submission);
  await team.manager.call(ruleOnAssumption, { params, body: { ...assumption, ruling: onCondition } });
  return { ...reviewed, params };
}

describe('an engineer is shown', () => {
  it('what is still in draft', async () => {
    const { studyId } = await studyWithChain(team);

    expect(await workOf(team.engineer)).toEqual([
      {
        kind: 'draft',
        studyId,
        studyTitle: 'Rod in a duct',
        since: '2026-03-04T09:12:33.000Z',
        draftCount: 2,
      },
    ]);
  });

  it('her own submission while it waits, which a colleague is not', async () => {
    const { submission } = await studyInReview(team);

    expect(await workOf(team.engineer)).toMatchObject([
      { kind: 'your submission waits', submissionId: submission.id, targetName: 'Target ratio' },
    ]);
    expect(await workOf(team.colleague)).toEqual([]);
  });

  it('what came back, with the comments, until it is edited', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    const params = { submissionId: submission.id };
    await team.manager.call(returnSubmission, { params, body: { comments: 'Repeat the run.' } });

    const returned = await workOf(team.colleague);
    await send(team.engineer, studyId, [
      edit('route', { ...chain.stated, evidence: 'Sheet 8' }, 1),
      edit('route', { ...chain.balance, rationale: 'By definition.' }, 1),
    ]);

    expect(returned).toMatchObject([
      {
        kind: 'returned to you',
        submissionId: submission.id,
        byName: team.manager.person.name,
        comments: 'Repeat the run.',
      },
    ]);
    expect(await kindsOf(team.colleague)).toEqual(['draft']);
  });

  it('what is approved on a basis that changed', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);
    expect(await workOf(team.engineer)).toEqual([]);

    await send(team.engineer, studyId, [edit('operating-point', { ...chain.point, fluid: 'oil' }, 1)]);

    expect(await workOf(team.engineer)).toMatchObject([
      { kind: 'basis changed', quantityName: 'Source ratio' },
      { kind: 'basis changed', quantityName: 'Target ratio' },
    ]);
  });
});

describe('a manager is shown', () => {
  it('what waits for a review, until it is closed', async () => {
    const { submission } = await studyInReview(team);

    const waiting = await workOf(team.manager);
    const params = { submissionId: submission.id };
    await team.engineer.call(withdrawSubmission, { params, body: { reason: 'Too early.' } });

    expect(waiting).toMatchObject([
      {
        kind: 'submission waits for you',
        submissionId: submission.id,
        byName: team.engineer.person.name,
        outsideWindows: 0,
      },
    ]);
    expect(await workOf(team.manager)).toEqual([]);
  });

  it('the conditions of what was signed, as the engineer is', async () => {
    const { submission } = await reviewedOnCondition();
    expect(await kindsOf(team.manager)).toEqual(['submission waits for you']);

    await sign(team.manager, submission);

    const condition = {
      kind: 'condition',
      submissionId: submission.id,
      text: 'Repeat with the larger pump',
      dueOn: '2026-09-30',
    };
    expect(await workOf(team.manager)).toMatchObject([condition]);
    expect(await workOf(team.engineer)).toMatchObject([condition]);
  });

  it('no condition of what was returned', async () => {
    const { params } = await reviewedOnCondition();

    await team.manager.call(returnSubmission, { params, body: { comments: 'Repeat the run.' } });

    expect(await kindsOf(team.manager)).toEqual([]);
  });
});

it('an auditor is shown the latest signatures', async () => {
  const { submission } = await studyInReview(team);
  await acceptAll(team.manager, submission);
  await sign(team.manager, submission);

  const mine = (await workOf(team.auditor)).filter(
    (item) => 'submissionId' in item && item.submissionId === submission.id,
  );
  expect(mine).toMatchObject([{ kind: 'latest signature', byName: team.manager.person.name }]);
  expect(await workOf(team.studyAuditor)).toMatchObject([{ kind: 'latest signature', submissionId: submission.id }]);
});

it('somebody without a study is shown nothing of anybody else', async () => {
  await studyInReview(team);

  expect(await workOf(team.outsider)).toEqual([]);
  expect(await workOf(team.administrator)).toEqual([]);
});
