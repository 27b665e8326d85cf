import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { holdStudy, waitForLockWaits } from '../../support/lock-waits.ts';
import {
  acceptAll,
  edit,
  editsOf,
  gatherTeam,
  logOf,
  newStudy,
  removal,
  seen,
  seenSubmission,
  send,
  sign,
  smallChain,
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
  app = await startTestApp();
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

describe('an edit', () => {
  it('stores every item, raises the revision of the study and says the new revisions', async () => {
    const studyId = await newStudy(team);
    const chain = smallChain();
    const { revision } = await seen(team.engineer, studyId);

    const reply = await send(team.engineer, studyId, editsOf(chain));

    expect(reply.status).toBe(200);
    expect(reply.body.revision).toBe(revision + 1);
    expect(new Set(Object.values(reply.body.itemRevisions))).toEqual(new Set([1]));
    expect(reply.body.routeStates[chain.balance.id]).toEqual({
      status: 'draft',
      revision: 1,
      submissionId: null,
      basisChanged: false,
    });
    const { model } = await seen(team.manager, studyId);
    expect(model.quantities).toEqual([chain.source, chain.target]);
    expect(model.routes).toEqual([chain.stated, chain.balance]);
  });

  it('is logged with every item before and after', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const renamed = { ...chain.source, name: 'Feed ratio' };

    await send(team.colleague, studyId, [edit('quantity', renamed, 1), removal('route', chain.balance)]);

    expect((await logOf(app, studyId)).at(-1)).toEqual({
      actorId: team.colleague.person.id,
      event: {
        event: 'chain.edited',
        summary: 'Changed the chain',
        reason: '',
        changes: [
          { kind: 'quantity', id: renamed.id, before: chain.source, after: renamed },
          { kind: 'route', id: chain.balance.id, before: chain.balance, after: null },
        ],
      },
    });
  });

  it('that removes only what is not there is refused, and the study can still be submitted', async () => {
    const { studyId, chain } = await studyWithChain(team);

    const reply = await send(team.engineer, studyId, [removal('route', { id: randomUUID() }, 0)]);

    expect(reply.status).toBe(400);
    expect((await submit(team.engineer, studyId, chain.target)).status).toBe(200);
  });

  it('changes nothing at all when one of its items cannot be stored', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const before = await seen(team.engineer, studyId);
    const log = await logOf(app, studyId);

    const reply = await send(team.engineer, studyId, [
      edit('quantity', { ...chain.source, name: 'Feed ratio' }, 1),
      edit('quantity', { ...chain.target, operatingPointId: randomUUID() }, 1),
    ]);

    expect(reply.status).toBe(400);
    expect(await seen(team.engineer, studyId)).toEqual(before);
    expect(await logOf(app, studyId)).toEqual(log);
  });

  it('changes nothing at all when its log entry cannot be written', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const before = await seen(team.engineer, studyId);
    await app.fresh.admin.query(
      `CREATE TRIGGER refuse_entries BEFORE INSERT ON audit_entry FOR EACH ROW PRECEDES audit_entry_append
       SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'the log is full'`,
    );

    const reply = await send(team.engineer, studyId, [edit('quantity', { ...chain.source, name: 'Feed ratio' }, 1)]);
    await app.fresh.admin.query('DROP TRIGGER refuse_entries');

    expect(reply.status).toBe(500);
    expect(await seen(team.engineer, studyId)).toEqual(before);
  });
});

describe('an edit is refused', () => {
  it.each([
    ['manager', 'Only a scale-up engineer of this study may change the chain; you are its technical manager.'],
    ['studyAuditor', 'Only a scale-up engineer of this study may change the chain; you are its auditor.'],
    ['auditor', 'Only a scale-up engineer of this study may change the chain; you are an auditor.'],
  ] as const)('to the %s', async (place, sentence) => {
    const { studyId, chain } = await studyWithChain(team);

    const reply = await send(team[place], studyId, [edit('quantity', chain.source, 1)]);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe(sentence);
  });

  it.each(['outsider', 'administrator'] as const)('to the %s as if the study did not exist', async (place) => {
    const { studyId, chain } = await studyWithChain(team);

    const here = await send(team[place], studyId, [edit('quantity', chain.source, 1)]);
    const nowhere = await send(team[place], randomUUID(), [edit('quantity', chain.source, 1)]);

    expect(here.status).toBe(404);
    expect(here.problem).toEqual(nowhere.problem);
  });

  it('when the item moved meanwhile, with both versions', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const theirs = { ...chain.source, name: 'Theirs' };
    const yours = { ...chain.source, name: 'Yours' };
    await send(team.colleague, studyId, [edit('quantity', theirs, 1)]);

    const reply = await send(team.engineer, studyId, [edit('quantity', yours, 1)]);

    expect(reply.status).toBe(409);
    expect(reply.problem).toMatchObject({
      code: 'stale',
      conflicts: [{ id: chain.source.id, yours, theirs, theirRevision: 2 }],
    });
  });

  it('when the item was removed meanwhile, with nothing on their side', async () => {
    const { studyId, chain } = await studyWithChain(team);
    await send(team.colleague, studyId, [removal('route', chain.balance)]);

    const reply = await send(team.engineer, studyId, [edit('route', { ...chain.balance, name: 'Mine' }, 1)]);

    expect(reply.status).toBe(409);
    expect(reply.problem).toMatchObject({ conflicts: [{ id: chain.balance.id, theirs: null, theirRevision: 0 }] });
  });

  it('when it removes what others rest on, naming them', async () => {
    const { studyId, chain } = await studyWithChain(team);

    const reply = await send(team.engineer, studyId, [
      removal('quantity', chain.source),
      removal('route', chain.stated),
    ]);

    expect(reply.status).toBe(400);
    expect(reply.problem.fields).toEqual({ [chain.balance.id]: expect.stringContaining('“Doubling”') });
  });

  it('when it would close a loop, naming it', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const back = {
      ...chain.balance,
      id: randomUUID(),
      quantityId: chain.source.id,
      bindings: { a: { from: 'quantity' as const, quantityId: chain.target.id } },
    };

    const reply = await send(team.engineer, studyId, [removal('route', chain.stated), edit('route', back, 0)]);

    expect(reply.status).toBe(400);
    expect(reply.problem.sentence).toMatch(/loop: .*“Source ratio”/);
    expect(reply.problem.sentence).toMatch(/“Target ratio”/);
  });

  it('when a balance does not fit the unit of its quantity', async () => {
    const { studyId, chain } = await studyWithChain(team);

    const reply = await send(team.engineer, studyId, [edit('quantity', { ...chain.target, unit: 'm/s' }, 1)]);

    expect(reply.status).toBe(400);
    expect(reply.problem.fields).toEqual({ [chain.balance.id]: expect.stringContaining('2 * a') });
  });

  it('when it touches what is in review, naming the submission and the way out', async () => {
    const { studyId, chain } = await studyInReview(team);

    const reply = await send(team.engineer, studyId, [edit('quantity', { ...chain.source, name: 'Feed ratio' }, 1)]);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe(
      '"Source ratio" is part of the submission of Target ratio, which is in review. Withdraw the submission to change it, or wait for the review.',
    );
  });
});

describe('an approved route', () => {
  it('is opened again only with a reason, and keeps what was signed', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);
    const changed = [edit('route', { ...chain.stated, value: value(4, 0.1) }, 1)];

    const silent = await send(team.engineer, studyId, changed);
    const explained = await send(team.engineer, studyId, changed, 'The data sheet was revised.');

    expect(silent.status).toBe(400);
    expect(silent.problem.fields).toEqual({ 'body.reason': expect.stringContaining('Say why') });
    expect(explained.status).toBe(200);
    expect(explained.body.routeStates[chain.stated.id]).toMatchObject({ status: 'draft', revision: 2 });
    // The route itself is as it was signed, but not what it rests on.
    expect(explained.body.routeStates[chain.balance.id]).toMatchObject({ status: 'approved', basisChanged: true });
    const { signatures, snapshot } = await seenSubmission(team.engineer, submission);
    expect(signatures).toHaveLength(1);
    expect(snapshot.model.routes).toContainEqual(chain.stated);
  });

  it('says nothing of a changed basis while everything is as it was signed', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);

    const { routeStates } = await seen(team.engineer, studyId);

    for (const route of [chain.stated, chain.balance]) {
      expect(routeStates[route.id]).toMatchObject({ status: 'approved', revision: 1, basisChanged: false });
    }
  });
});

describe('simultaneous edits', () => {
  it('take their turn at the study before they look at what is in it', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const release = await holdStudy(app.fresh.admin, studyId);

    // Stale in any case: without the turn it would be refused at once.
    const stale = send(team.engineer, studyId, [edit('quantity', chain.source, 7)]);
    await waitForLockWaits(app.fresh.admin, 1);
    await release();

    expect((await stale).status).toBe(409);
  });

  it('of different items are both kept', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const release = await holdStudy(app.fresh.admin, studyId);

    const both = [
      send(team.engineer, studyId, [edit('quantity', { ...chain.source, name: 'Feed ratio' }, 1)]),
      send(team.colleague, studyId, [edit('quantity', { ...chain.target, name: 'Product ratio' }, 1)]),
    ];
    await waitForLockWaits(app.fresh.admin, 2);
    await release();

    expect((await Promise.all(both)).map((reply) => reply.status)).toEqual([200, 200]);
    const { model } = await seen(team.engineer, studyId);
    expect(model.quantities.map((quantity) => quantity.name)).toEqual(['Feed ratio', 'Product ratio']);
  });

  it('of the same item let one through and show the other what it would have overwritten', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const release = await holdStudy(app.fresh.admin, studyId);

    const both = [
      send(team.engineer, studyId, [edit('quantity', { ...chain.source, name: 'Mine' }, 1)]),
      send(team.colleague, studyId, [edit('quantity', { ...chain.source, name: 'Yours' }, 1)]),
    ];
    await waitForLockWaits(app.fresh.admin, 2);
    await release();

    const replies = await Promise.all(both);
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 409]);
    const { model } = await seen(team.engineer, studyId);
    const kept = replies[0]?.status === 200 ? 'Mine' : 'Yours';
    expect(model.quantities[0]?.name).toBe(kept);
    const refused = replies.find((reply) => reply.status === 409);
    expect(refused?.problem).toMatchObject({ conflicts: [{ theirs: { name: kept } }] });
  });
});
