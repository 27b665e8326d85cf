import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { ruleOnAssumption, type Submission } from '../../../shared/api/submissions.ts';
import type { Ruling } from '../../../shared/domain/audit-events.ts';
import {
  acceptAll,
  accepted,
  assumptionsOf,
  gatherTeam,
  logOf,
  seenSubmission,
  sign,
  studyInReview,
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

function first(submission: Submission) {
  const [assumption] = assumptionsOf(submission);
  if (!assumption) throw new Error('The package has no assumption.');
  return assumption;
}

function rule(
  caller: TeamMember,
  submission: Submission,
  ruling: Ruling,
  facts: Partial<ReturnType<typeof first>> = {},
) {
  return caller.call(ruleOnAssumption, {
    params: { submissionId: submission.id },
    body: { ...first(submission), ...facts, ruling },
  });
}

const onCondition: Ruling = {
  ruling: 'accepted on condition',
  comment: 'Plausible.',
  condition: { text: 'Repeat with the larger pump', dueOn: '2026-09-30' },
};

it('stores the ruling with the name of who gave it', async () => {
  const { submission } = await studyInReview(team);

  const reply = await rule(team.manager, submission, onCondition);

  expect(reply.status).toBe(200);
  expect(reply.body.rulings).toEqual([
    { ...first(submission), ruling: onCondition, byName: team.manager.person.name, at: expect.any(String) },
  ]);
});

it('keeps the last word and logs what stood before it', async () => {
  const { studyId, submission } = await studyInReview(team);
  await rule(team.manager, submission, onCondition);

  const reply = await rule(team.secondManager, submission, accepted);

  expect(reply.body.rulings).toHaveLength(1);
  const log = (await logOf(app, studyId)).filter(({ event }) => event.event === 'assumption.ruled');
  expect(log).toMatchObject([
    { actorId: team.manager.person.id, event: { before: null, after: onCondition, statement: expect.any(String) } },
    { actorId: team.secondManager.person.id, event: { before: onCondition, after: accepted } },
  ]);
});

it.each([
  [
    'a condition that is not said',
    { ruling: 'accepted on condition', comment: '', condition: null },
    'body.ruling.condition',
  ],
  ['a condition beside another word', { ...onCondition, ruling: 'accepted' }, 'body.ruling.condition'],
  ['a refusal without a reason', { ruling: 'refused', comment: ' ', condition: null }, 'body.ruling.comment'],
] as const)('refuses %s, at its field', async (_what, ruling, field) => {
  const { submission } = await studyInReview(team);

  const reply = await rule(team.manager, submission, ruling);

  expect(reply.status).toBe(400);
  expect(Object.keys(reply.problem.fields as object)).toEqual([field]);
  expect((await seenSubmission(team.manager, submission)).rulings).toEqual([]);
});

it.each(['engineer', 'studyAuditor', 'auditor'] as const)('is not for the %s', async (place) => {
  const { submission } = await studyInReview(team);

  const reply = await rule(team[place], submission, accepted);

  expect(reply.status).toBe(403);
  expect(reply.problem.sentence).toMatch(/^Only a technical manager of this study may rule on assumptions; you/);
});

it('answers an outsider as if there were no submission', async () => {
  const { submission } = await studyInReview(team);

  const reply = await rule(team.outsider, submission, accepted);

  expect(reply.status).toBe(404);
});

it.each([
  ['an assumption', { assumptionKey: 'no-such' }],
  ['a route', { routeId: randomUUID() }],
])('does not know %s that the package does not hold', async (_what, facts) => {
  const { submission } = await studyInReview(team);

  const reply = await rule(team.manager, submission, accepted, facts);

  expect(reply.status).toBe(404);
});

it('ends with the review', async () => {
  const { submission } = await studyInReview(team);
  await acceptAll(team.manager, submission);
  await sign(team.manager, submission);

  const reply = await rule(team.manager, submission, onCondition);

  expect(reply.status).toBe(403);
  expect(reply.problem.sentence).toBe('This submission is signed already.');
});
