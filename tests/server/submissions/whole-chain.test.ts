import { afterAll, beforeAll, expect, it } from 'vitest';
import { canonicalJson, sha256 } from '../../../server/db/canonical-json.ts';
import { verifyLog } from '../../../shared/api/decision-log.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { analogueChain, analogueChainIds, expectedAnalogueChain as expected } from '../../reference/analogue-chain.ts';
import {
  acceptAll,
  asEdits,
  edit,
  gatherTeam,
  newStudy,
  seen,
  seenSubmission,
  send,
  sign,
  submit,
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

it('goes from entered numbers to a signed time that stands, also in the log, while the chain moves on', async () => {
  const studyId = await newStudy(team);
  const chain = analogueChain();
  const { routes: evaluated } = evaluateStudy(chain);
  const routes = chain.routes.map((route) => {
    const asked = (evaluated[route.id]?.assumptions ?? []).filter((assumption) => assumption.needsJustification);
    return { ...route, justifications: Object.fromEntries(asked.map(({ key }) => [key, 'Same rig, same range.'])) };
  });
  expect((await send(team.engineer, studyId, asEdits({ ...chain, routes }))).status).toBe(200);
  const submitted = await submit(team.engineer, studyId, { id: analogueChainIds.dissolutionTime });
  expect(submitted.status).toBe(200);
  await acceptAll(team.manager, submitted.body);

  const signed = await sign(team.manager, submitted.body);

  expect(signed.body).toMatchObject({ status: 'signed', signatures: [{ snapshotHash: submitted.body.snapshotHash }] });
  const after = await seen(team.engineer, studyId);
  expect(Object.values(after.routeStates).map(({ status }) => status)).toEqual(routes.map(() => 'approved'));

  const upstream = routes.find(({ kind, name }) => kind === 'stated-value' && name.startsWith('heater power'));
  if (!upstream) throw new Error('The chain has no heater power.');
  const moved = [edit('route', { ...upstream, rationale: 'New calibration.' }, 1)];
  expect((await send(team.colleague, studyId, moved)).status).toBe(400);
  expect((await send(team.colleague, studyId, moved, 'The meter was calibrated.')).status).toBe(200);

  const { routeStates } = await seen(team.engineer, studyId);
  expect(routeStates[upstream.id]).toMatchObject({ status: 'draft', revision: 2 });
  expect(routeStates[analogueChainIds.analogueRoute]).toMatchObject({ status: 'approved', basisChanged: true });

  const { snapshot, snapshotHash } = await seenSubmission(team.manager, submitted.body);
  expect(sha256(canonicalJson(snapshot))).toBe(snapshotHash);
  const time = snapshot.evaluation.quantities[analogueChainIds.dissolutionTime]?.result;
  expect((time?.value ?? Number.NaN) / expected.t.value).toBeCloseTo(1, 6);
  expect((time?.u ?? Number.NaN) / expected.t.u).toBeCloseTo(1, 6);
  const verified = await team.studyAuditor.call(verifyLog, { params: { studyId } });
  expect(verified.body).toMatchObject({ whole: true, broken: null });
});
