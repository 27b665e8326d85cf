import { afterAll, beforeAll, expect, it } from 'vitest';
import { replayLog } from '../../../server/db/replay-log.ts';
import { addMember, removeMember } from '../../../shared/api/studies.ts';
import { returnSubmission, withdrawSubmission } from '../../../shared/api/submissions.ts';
import { analogueChain } from '../../reference/analogue-chain.ts';
import {
  acceptAll,
  asEdits,
  edit,
  gatherTeam,
  newStudy,
  removal,
  seen,
  send,
  sign,
  studyWithChain,
  submit,
  type Team,
  value,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

/** The present state in the form that a replay has. */
async function present(studyId: string) {
  const { title, question, model, members, routeStates } = await seen(team.engineer, studyId);
  return {
    title,
    question,
    model,
    members: Object.fromEntries(members.map(({ personId, role }) => [personId, role])),
    routes: Object.fromEntries(
      Object.entries(routeStates).map(([id, { status, revision }]) => [id, { status, revision }]),
    ),
  };
}

it('makes the present study anew from its log, at every step of its history', async () => {
  const { studyId, chain } = await studyWithChain(team);
  const { source, target, stated, balance, point } = chain;
  const second = { ...stated, id: crypto.randomUUID(), name: 'Second sheet', value: value(5) };
  const submission = async () => (await submit(team.engineer, studyId, target)).body;
  const withdraw = async () => {
    const { id } = await submission();
    return team.engineer.call(withdrawSubmission, { params: { submissionId: id }, body: { reason: 'Too early.' } });
  };
  const giveBack = async () => {
    const { id } = await submission();
    return team.manager.call(returnSubmission, { params: { submissionId: id }, body: { comments: 'Say more.' } });
  };
  const approve = async () => {
    const opened = await submission();
    await acceptAll(team.manager, opened);
    return sign(team.manager, opened);
  };
  const outsider = team.outsider.person.id;
  const history: (() => Promise<{ readonly status: number }>)[] = [
    () => send(team.engineer, studyId, [edit('quantity', { ...source, name: 'Feed ratio' }, 1)]),
    () =>
      send(team.colleague, studyId, [edit('route', second, 0), edit('operating-point', { ...point, fluid: 'oil' }, 1)]),
    () => send(team.engineer, studyId, [removal('route', stated)]),
    // Removed and put back: it stands at the end of the list now.
    () => send(team.engineer, studyId, [edit('route', stated, 0), removal('route', second)]),
    withdraw,
    giveBack,
    () => send(team.engineer, studyId, [edit('route', { ...balance, rationale: 'By definition.' }, 1)]),
    approve,
    () => send(team.engineer, studyId, [edit('route', { ...stated, value: value(4) }, 1)], 'The sheet was revised.'),
    approve,
    () => team.engineer.call(addMember, { params: { studyId }, body: { personId: outsider, role: 'engineer' } }),
    () => team.engineer.call(removeMember, { params: { studyId, personId: outsider } }),
  ];

  for (const step of history) {
    expect((await step()).status).toBe(200);
    expect(await replayLog(app.db, studyId)).toEqual(await present(studyId));
  }
  expect((await present(studyId)).routes).toEqual({
    [stated.id]: { status: 'approved', revision: 2 },
    [balance.id]: { status: 'approved', revision: 1 },
  });
});

it('makes a whole chain anew, number by number', async () => {
  const studyId = await newStudy(team);
  await send(team.engineer, studyId, asEdits(analogueChain()));

  const { model } = await replayLog(app.db, studyId);

  expect(model).toEqual(analogueChain());
  expect(model).toEqual((await seen(team.engineer, studyId)).model);
});
