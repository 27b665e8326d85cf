import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { addTest, getReadings } from '../../../shared/api/tests.ts';
import type { Test } from '../../../shared/engine/model/study-model.ts';
import {
  edit,
  gatherTeam,
  removal,
  type SmallChain,
  seen,
  send,
  studyWithChain,
  type Team,
  value,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;
let studyId: string;
let chain: SmallChain;
let test: Test;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});

afterAll(() => app.stop());

const powers = [186.0, 186.4, 185.9, 186.1, 186.3];
const csv = ['P (W),T_wall,T_bulk,u (m/s)', ...powers.map((power) => `${power},36.4,25.1,0.45`)].join('\n');

beforeEach(async () => {
  ({ studyId, chain } = await studyWithChain(team));
  const exact = { form: 'exact' as const };
  const reply = await team.engineer.call(addTest, {
    params: { studyId },
    file: { name: 'run-7.csv', content: csv },
    body: {
      id: randomUUID(),
      name: 'Run 7',
      operatingPointId: chain.point.id,
      performedOn: null,
      mapping: {
        delimiter: ',',
        decimal: '.',
        headerRows: 1,
        time: null,
        power: { column: 0, unit: 'W' },
        wallTemperature: { column: 1, unit: '°C' },
        bulkTemperature: { column: 2, unit: '°C' },
        flow: { column: 3, unit: 'm/s' },
      },
      reduction: {
        kind: 'steady-heating',
        instruments: { power: exact, wallTemperature: exact, bulkTemperature: exact, flow: exact },
        flowIs: 'velocity',
        heatLoss: value(6, 1, 'W'),
        surface: { shape: 'stated area', area: value(0.01, 0, 'm²') },
      },
    },
  });
  ({ test } = reply.body);
});

it('changes how a test is reduced', async () => {
  const revised = { ...test, reduction: { ...test.reduction, heatLoss: value(8, 1, 'W') } };

  const reply = await send(team.engineer, studyId, [edit('test', revised, 1)]);

  expect(reply.status).toBe(200);
  expect((await seen(team.engineer, studyId)).model.tests).toEqual([revised]);
});

it('puts a removed test back as it was, with its readings', async () => {
  const removed = await send(team.engineer, studyId, [removal('test', test)]);
  const restored = await send(team.engineer, studyId, [edit('test', test, 0)]);

  expect([removed.status, restored.status]).toEqual([200, 200]);
  const { body } = await team.manager.call(getReadings, { params: { studyId, testId: test.id } });
  expect(body.readings.map((reading) => reading.power)).toEqual(powers);
});

const [power, wall, bulk, flow] = [200, 310, 298, 0.5];
it.each<[string, (measured: Test) => Test]>([
  [
    'other means than its readings have',
    (measured) => ({
      ...measured,
      reduction: {
        ...measured.reduction,
        summary: { ...measured.reduction.summary, means: [power, wall, bulk, flow] },
      },
    }),
  ],
  ['the hash of another file', (measured) => ({ ...measured, file: { ...measured.file, sha256: '0'.repeat(64) } })],
  ['a file that was never uploaded', (measured) => ({ ...measured, file: { ...measured.file, id: randomUUID() } })],
])('refuses to give a test %s', async (_what, forge) => {
  const reply = await send(team.engineer, studyId, [edit('test', forge(test), 1)]);

  expect(reply.status).toBe(400);
  expect(reply.problem.fields).toEqual({
    [test.id]:
      'The readings of “Run 7” and their file stay as they were uploaded. Add a test with another file instead.',
  });
  expect((await seen(team.engineer, studyId)).model.tests).toEqual([test]);
});

it('refuses a test that was written and not uploaded', async () => {
  const reply = await send(team.engineer, studyId, [edit('test', { ...test, id: randomUUID() }, 0)]);

  expect(reply.status).toBe(400);
});

it('answers somebody who may not read the study as if there were no readings', async () => {
  const reply = await team.outsider.call(getReadings, { params: { studyId, testId: test.id } });

  expect(reply.status).toBe(404);
});
