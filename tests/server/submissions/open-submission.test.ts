import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson, sha256 } from '../../../server/db/canonical-json.ts';
import { createStudy, removeMember } from '../../../shared/api/studies.ts';
import { getSubmission, openSubmission } from '../../../shared/api/submissions.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import type { Route, StudyModel } from '../../../shared/engine/model/study-model.ts';
import { analogueChain, analogueChainIds, expectedAnalogueChain as expected } from '../../reference/analogue-chain.ts';
import {
  acceptAll,
  asEdits,
  edit,
  editsOf,
  gatherTeam,
  logOf,
  newStudy,
  owedFor,
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
  app = await startTestApp({ now: () => new Date('2026-03-04T09:12:33.000Z') });
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

type Reasons = readonly { readonly sentence: string; readonly subject: unknown }[];

/** The assumptions of a route that ask for words. */
function unjustified(model: StudyModel, routeId: string): string[] {
  const assumptions = evaluateStudy(model).routes[routeId]?.assumptions ?? [];
  return assumptions.filter((assumption) => assumption.needsJustification).map((assumption) => assumption.key);
}

describe('a submission', () => {
  it('freezes what the target rests on, with the hash of its canonical text', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const aside = { ...chain.source, id: randomUUID(), name: 'Not upstream' };
    await send(team.engineer, studyId, [edit('quantity', aside, 0)]);

    const { status, body } = await submit(team.engineer, studyId, chain.target, 'For the layout.');

    expect(status).toBe(200);
    expect(body).toMatchObject({
      status: 'open',
      note: 'For the layout.',
      submittedById: team.engineer.person.id,
      submittedAt: '2026-03-04T09:12:33.000Z',
      signedBefore: null,
      movedSince: [],
      rulings: [],
      signatures: [],
      outcome: null,
    });
    expect(body.snapshot.model.quantities).toEqual([chain.source, chain.target]);
    expect(body.snapshot.routeIds.toSorted()).toEqual([chain.stated.id, chain.balance.id].toSorted());
    expect(body.snapshot.evaluation.quantities[chain.target.id]?.result).toMatchObject({ value: 6, u: 0.2 });
    expect(body.snapshotHash).toBe(sha256(canonicalJson(body.snapshot)));
    // What is read back from the database still has the hash that will be signed.
    const stored = await seenSubmission(team.manager, body);
    expect(sha256(canonicalJson(stored.snapshot))).toBe(body.snapshotHash);
  });

  it('puts its routes in review, says so in the log and owes each manager one mail', async () => {
    const { studyId, chain, submission } = await studyInReview(team);

    const { routeStates } = await seen(team.engineer, studyId);
    for (const route of [chain.stated, chain.balance]) {
      expect(routeStates[route.id]).toMatchObject({ status: 'in review', submissionId: submission.id });
    }
    expect((await logOf(app, studyId)).at(-1)).toEqual({
      actorId: team.engineer.person.id,
      event: {
        event: 'submission.opened',
        submissionId: submission.id,
        targetQuantityId: chain.target.id,
        targetName: 'Target ratio',
        routeIds: submission.snapshot.routeIds,
        snapshotHash: submission.snapshotHash,
        note: '',
      },
    });
    const owed = await owedFor(app, submission.id);
    expect(owed.map((mail) => mail.kind)).toEqual(['submission-waits', 'submission-waits']);
    expect(owed.map((mail) => mail.recipientId).toSorted()).toEqual(
      [team.manager.person.id, team.secondManager.person.id].toSorted(),
    );
  });

  it('leaves out what is approved on an unchanged basis', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);
    await send(
      team.engineer,
      studyId,
      [edit('route', { ...chain.balance, rationale: 'By definition.' }, 1)],
      'Wording.',
    );

    const { body } = await submit(team.engineer, studyId, chain.target);

    expect(body.snapshot.routeIds).toEqual([chain.balance.id]);
    expect(body.snapshot.model.routes).toHaveLength(2);
    expect(body.signedBefore).toEqual(submission.snapshot);
  });

  it('is never compared with what was signed after it', async () => {
    let clock = Date.parse('2026-03-02T08:00:00Z');
    const now = () => {
      clock += 1000;
      return new Date(clock);
    };
    const later = await startTestApp({ now });
    try {
      const others = await gatherTeam(later);
      const { studyId, chain, submission } = await studyInReview(others);
      await acceptAll(others.manager, submission);
      await sign(others.manager, submission);
      await send(others.engineer, studyId, [edit('route', { ...chain.balance, rationale: 'Again.' }, 1)], 'Wording.');
      const second = (await submit(others.engineer, studyId, chain.target)).body;
      await acceptAll(others.manager, second);
      expect((await sign(others.manager, second)).status).toBe(200);

      expect((await seenSubmission(others.manager, submission)).signedBefore).toBeNull();
      expect((await seenSubmission(others.manager, second)).signedBefore).toEqual(submission.snapshot);
    } finally {
      await later.stop();
    }
  });

  it('takes in again what is approved on a basis that changed', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);
    await send(team.engineer, studyId, [edit('route', { ...chain.stated, value: value(4, 0.1) }, 1)], 'New sheet.');

    const { body } = await submit(team.engineer, studyId, chain.target);

    expect(body.snapshot.routeIds.toSorted()).toEqual([chain.stated.id, chain.balance.id].toSorted());
  });

  it('names everybody who edited something in it, also those whose edit was edited over', async () => {
    const { studyId, chain } = await studyWithChain(team);
    await send(team.colleague, studyId, [edit('quantity', { ...chain.source, note: 'first' }, 1)]);
    await send(team.engineer, studyId, [edit('quantity', { ...chain.source, note: 'second' }, 2)]);

    const { body } = await submit(team.engineer, studyId, chain.target);

    expect(body.authorIds.toSorted()).toEqual([team.engineer.person.id, team.colleague.person.id].toSorted());
  });

  it('holds the numbers of an independent implementation for the whole analogue chain', async () => {
    const studyId = await newStudy(team);
    const chain = analogueChain();
    const routes = chain.routes.map((route) => {
      const words = unjustified(chain, route.id).map((key) => [key, 'Compared with the same reference.'] as const);
      return { ...route, justifications: Object.fromEntries(words) };
    });
    const entered = await send(team.engineer, studyId, asEdits({ ...chain, routes }));
    expect(entered.status).toBe(200);

    const { status, body } = await submit(team.engineer, studyId, { id: analogueChainIds.dissolutionTime });

    expect(status).toBe(200);
    const { quantities } = body.snapshot.evaluation;
    for (const [name, id] of [
      ['k', analogueChainIds.massTransferCoefficient],
      ['t', analogueChainIds.dissolutionTime],
    ] as const) {
      const result = quantities[id]?.result;
      expect(Math.abs((result?.value ?? Number.NaN) / expected[name].value - 1)).toBeLessThan(1e-6);
      expect(Math.abs((result?.u ?? Number.NaN) / expected[name].u - 1)).toBeLessThan(1e-6);
    }
  });
});

describe('a submission is refused', () => {
  it.each([
    ['manager', 403],
    ['studyAuditor', 403],
    ['auditor', 403],
    ['outsider', 404],
    ['administrator', 404],
  ] as const)('to the %s with %i', async (place, status) => {
    const { studyId, chain } = await studyWithChain(team);
    const { revision } = await seen(team.engineer, studyId);

    const reply = await team[place].call(openSubmission, {
      params: { studyId },
      body: { targetQuantityId: chain.target.id, revision, note: '' },
    });

    expect(reply.status).toBe(status);
  });

  it('when the study moved since it was looked at', async () => {
    const { studyId, chain } = await studyWithChain(team);
    const { revision } = await seen(team.engineer, studyId);

    const reply = await team.engineer.call(openSubmission, {
      params: { studyId },
      body: { targetQuantityId: chain.target.id, revision: revision - 1, note: '' },
    });

    expect(reply.status).toBe(409);
  });

  it('when something upstream has no value, saying which', async () => {
    const { studyId, chain } = await studyWithChain(team);
    await send(team.engineer, studyId, [removal('route', chain.stated)]);

    const reply = await submit(team.engineer, studyId, chain.target);

    expect(reply.status).toBe(422);
    const reasons = reply.problem.reasons as Reasons;
    expect(reasons.map((reason) => reason.subject)).toContainEqual({ kind: 'quantity', id: chain.source.id });
    expect(await owedFor(app, reply.body.id)).toEqual([]);
    expect((await seen(team.engineer, studyId)).submissions).toEqual([]);
  });

  it('when a check asks for words that are not written, and taken once they are', async () => {
    const { studyId, chain } = await studyWithChain(team);
    // Sc 800 lies below the range from 1000 that the correlation was tested in.
    const entries = [
      { key: 'L' as const, source: { from: 'entered' as const, value: value(0.08, 0, 'm') } },
      { key: 'u' as const, source: { from: 'entered' as const, value: value(0.2, 0, 'm/s') } },
      { key: 'nu' as const, source: { from: 'entered' as const, value: value(1e-6, 0, 'm²/s') } },
      { key: 'D' as const, source: { from: 'entered' as const, value: value(1.25e-9, 0, 'm²/s') } },
    ];
    const transfer = { ...chain.source, id: randomUUID(), symbol: 'k', name: 'Transfer coefficient', unit: 'm/s' };
    const correlation: Route = {
      id: randomUUID(),
      quantityId: transfer.id,
      name: 'Linton-Sherwood',
      rationale: '',
      justifications: {},
      kind: 'correlation',
      methodId: 'linton-sherwood',
      bindings: {},
      scatter: null,
      ownScatter: false,
      extrapolationAllowance: null,
    };
    const entered = await send(team.engineer, studyId, [
      edit('operating-point', { ...chain.point, entries }, 1),
      edit('quantity', transfer, 0),
      edit('route', correlation, 0),
    ]);
    expect(entered.status).toBe(200);

    const refused = await submit(team.engineer, studyId, transfer);
    const reasons = refused.problem.reasons as Reasons;
    const { model } = await seen(team.engineer, studyId);
    const needed = unjustified(model, correlation.id);
    const justifications = Object.fromEntries(needed.map((key) => [key, 'The exponent holds well below the range.']));
    await send(team.engineer, studyId, [edit('route', { ...correlation, justifications }, 1)]);
    const taken = await submit(team.engineer, studyId, transfer);

    expect(refused.status).toBe(422);
    expect(reasons).toHaveLength(needed.length);
    expect(reasons[0]).toMatchObject({ subject: { kind: 'route', id: correlation.id } });
    expect(reasons[0]?.sentence).toMatch(/^"Linton-Sherwood": write why this holds \((near the edge|outside)\)/);
    expect(taken.status).toBe(200);
  });

  it('when one of its routes is in review already', async () => {
    const { studyId, chain } = await studyInReview(team);

    const reply = await submit(team.colleague, studyId, chain.source);

    expect(reply.status).toBe(422);
    expect(reply.problem.sentence).toBe('Not ready for review: "Data sheet" is in review in another submission.');
  });

  it('when everything is approved as it stands', async () => {
    const { studyId, chain, submission } = await studyInReview(team);
    await acceptAll(team.manager, submission);
    await sign(team.manager, submission);

    const reply = await submit(team.engineer, studyId, chain.target);

    expect(reply.status).toBe(422);
    expect(reply.problem.sentence).toMatch(/nothing to review/);
  });

  it('when the study has nobody to review it', async () => {
    const created = await team.engineer.call(createStudy, { body: { title: 'Alone', question: '' } });
    const chain = smallChain();
    await send(team.engineer, created.body.id, editsOf(chain));

    const reply = await submit(team.engineer, created.body.id, chain.target);

    expect(reply.status).toBe(422);
    expect(reply.problem.sentence).toMatch(/no technical manager/);
  });
});

describe('reading a submission', () => {
  it.each(['outsider', 'administrator'] as const)('answers the %s as if there were none', async (place) => {
    const { submission } = await studyInReview(team);

    const here = await team[place].call(getSubmission, { params: { submissionId: submission.id } });
    const nowhere = await team[place].call(getSubmission, { params: { submissionId: randomUUID() } });

    expect(here.status).toBe(404);
    expect(here.problem).toEqual(nowhere.problem);
  });

  it('ends at once for a manager who is removed', async () => {
    const { studyId, submission } = await studyInReview(team);

    await team.engineer.call(removeMember, { params: { studyId, personId: team.manager.person.id } });

    const reply = await team.manager.call(getSubmission, { params: { submissionId: submission.id } });
    expect(reply.status).toBe(404);
  });
});
