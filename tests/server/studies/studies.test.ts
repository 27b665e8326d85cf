import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  addMember,
  createStudy,
  getStudy,
  listStudies,
  removeMember,
  saveLayout,
} from '../../../shared/api/studies.ts';
import { person } from '../../support/builders.ts';
import {
  acceptAll,
  edit,
  gatherTeam,
  logOf,
  newStudy,
  seen,
  send,
  sign,
  studyInReview,
  studyWithChain,
  type Team,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

const listed = async (place: keyof Omit<Team, 'app'>) => (await team[place].call(listStudies)).body.studies;

describe('a new study', () => {
  it('has its creator as engineer, and says so in its log', async () => {
    const facts = { title: 'Tube', question: 'How long must it be?' };

    const reply = await team.engineer.call(createStudy, { body: facts });

    expect(reply.status).toBe(200);
    expect(reply.body).toMatchObject({ ...facts, myRole: 'engineer', quantityCount: 0 });
    const { id, name } = team.engineer.person;
    expect((await seen(team.engineer, reply.body.id)).members).toEqual([{ personId: id, name, role: 'engineer' }]);
    expect(await logOf(app, reply.body.id)).toEqual([
      { actorId: id, event: { event: 'study.created', study: facts } },
      { actorId: id, event: { event: 'member.added', personId: id, name, role: 'engineer' } },
    ]);
  });

  it('is not for an auditor of the installation to make', async () => {
    const reply = await team.auditor.call(createStudy, { body: { title: 'Tube', question: '' } });

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('An auditor of the installation reads studies and creates none.');
  });

  it('needs a title', async () => {
    const reply = await team.engineer.call(createStudy, { body: { title: '   ', question: '' } });

    expect(reply.status).toBe(400);
    expect(Object.keys(reply.problem.fields as object)).toEqual(['body.title']);
  });

  it('is not for somebody who is signed out', async () => {
    const reply = await app.anonymous.call(createStudy, { body: { title: 'Tube', question: '' } });

    expect(reply.status).toBe(401);
  });
});

describe('the list of studies', () => {
  it('shows members and auditors the study, and nobody else a trace of it', async () => {
    const studyId = await newStudy(team);

    for (const place of ['engineer', 'colleague', 'manager', 'studyAuditor', 'auditor'] as const) {
      expect((await listed(place)).map((study) => study.id)).toContain(studyId);
    }
    for (const place of ['outsider', 'administrator'] as const) expect(await listed(place)).toEqual([]);
  });

  it('counts quantities by what their route in force is', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    const mine = async () => (await listed('engineer')).find((study) => study.id === studyId);

    expect(await mine()).toMatchObject({ quantityCount: 2, approvedCount: 0, inReviewCount: 2, myRole: 'engineer' });
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);
    expect(await mine()).toMatchObject({ approvedCount: 2, inReviewCount: 0 });
    // A point that both rest on moves: both are approved, and neither as it stands.
    await send(team.engineer, studyId, [edit('operating-point', { ...chain.point, fluid: 'oil' }, 1)]);
    expect(await mine()).toMatchObject({ approvedCount: 0, inReviewCount: 0 });
  });
});

describe('reading a study', () => {
  it.each(['outsider', 'administrator'] as const)('answers the %s as if there were none', async (place) => {
    const studyId = await newStudy(team);

    const here = await team[place].call(getStudy, { params: { studyId } });
    const nowhere = await team[place].call(getStudy, { params: { studyId: randomUUID() } });

    expect(here.status).toBe(404);
    expect(here.problem).toEqual(nowhere.problem);
  });

  it('ends at once for a member who is removed', async () => {
    const studyId = await newStudy(team);
    const { id: personId } = team.manager.person;

    await team.engineer.call(removeMember, { params: { studyId, personId } });

    expect((await team.manager.call(getStudy, { params: { studyId } })).status).toBe(404);
  });
});

describe('the members of a study', () => {
  it('are added by an engineer, and the log says so', async () => {
    const studyId = await newStudy(team);
    const newcomer = await person(app.db);

    const reply = await team.colleague.call(addMember, {
      params: { studyId },
      body: { personId: newcomer.id, role: 'manager' },
    });

    expect(reply.body.members).toContainEqual({ personId: newcomer.id, name: newcomer.name, role: 'manager' });
    expect((await logOf(app, studyId)).at(-1)).toEqual({
      actorId: team.colleague.person.id,
      event: { event: 'member.added', personId: newcomer.id, name: newcomer.name, role: 'manager' },
    });
  });

  it.each(['manager', 'studyAuditor', 'auditor'] as const)('are not for the %s to choose', async (place) => {
    const studyId = await newStudy(team);

    const reply = await team[place].call(addMember, {
      params: { studyId },
      body: { personId: team.outsider.person.id, role: 'engineer' },
    });

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toMatch(/^Only a scale-up engineer of this study may choose its members/);
  });

  it('have one role each', async () => {
    const studyId = await newStudy(team);
    const { id: personId, name } = team.manager.person;

    const reply = await team.engineer.call(addMember, { params: { studyId }, body: { personId, role: 'engineer' } });

    expect(reply.status).toBe(400);
    expect(reply.problem.sentence).toBe(`${name} is technical manager of this study already. Remove that role first.`);
  });

  it.each([
    ['nobody has', () => Promise.resolve(randomUUID())],
    ['is deactivated', async () => (await person(app.db, { isActive: false })).id],
  ])('are not added from an account that %s', async (_what, make) => {
    const studyId = await newStudy(team);

    const reply = await team.engineer.call(addMember, {
      params: { studyId },
      body: { personId: await make(), role: 'manager' },
    });

    expect(reply.status).toBe(404);
  });

  it('keep at least one engineer', async () => {
    const studyId = await newStudy(team);
    const remove = (personId: string) => team.engineer.call(removeMember, { params: { studyId, personId } });

    const first = await remove(team.colleague.person.id);
    const last = await remove(team.engineer.person.id);

    expect(first.status).toBe(200);
    expect(last.status).toBe(400);
    expect(last.problem.sentence).toBe('The last scale-up engineer has to stay. Add another one first.');
  });
});

describe('the layout', () => {
  it('is kept without an entry in the log or a new revision', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const before = await seen(team.engineer, studyId);
    const log = await logOf(app, studyId);
    const layout = { [chain.source.id]: { x: 10, y: 20 } };

    const reply = await team.engineer.call(saveLayout, { params: { studyId }, body: { layout } });

    expect(reply.status).toBe(200);
    expect(await seen(team.engineer, studyId)).toEqual({ ...before, layout });
    expect(await logOf(app, studyId)).toEqual(log);
  });

  it('is for engineers to choose', async () => {
    const studyId = await newStudy(team);

    const reply = await team.manager.call(saveLayout, { params: { studyId }, body: { layout: {} } });

    expect(reply.status).toBe(403);
  });
});
