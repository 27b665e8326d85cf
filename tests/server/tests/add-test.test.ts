import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { addTest, fileAddress, maxReadingsFileBytes } from '../../../shared/api/tests.ts';
import type { ReadingsMapping } from '../../../shared/readings/readings.ts';
import {
  gatherTeam,
  logOf,
  type SmallChain,
  seen,
  studyWithChain,
  type Team,
  value,
} from '../../support/study-team.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let team: Team;
let studyId: string;
let chain: SmallChain;

beforeAll(async () => {
  app = await startTestApp();
  team = await gatherTeam(app);
});
afterAll(() => app.stop());
beforeEach(async () => {
  ({ studyId, chain } = await studyWithChain(team));
});

const mapping: ReadingsMapping = {
  delimiter: ',',
  decimal: '.',
  headerRows: 1,
  time: { column: 0, unit: 's' },
  power: { column: 1, unit: 'W' },
  wallTemperature: { column: 2, unit: '°C' },
  bulkTemperature: { column: 3, unit: '°C' },
  flow: { column: 4, unit: 'm/s' },
};
const header = 'time (s),P (W),T_wall (°C),T_bulk (°C),u (m/s)';
const rows = [0, 10, 20, 30, 40].map((time) => `${time},${186 + time / 100},36.4,25.1,0.45`);
const csv = (changed: Readonly<Record<number, string>> = {}) =>
  [header, ...rows.map((row, place) => changed[place + 2] ?? row)].join('\n');

function upload(content: string | Uint8Array, with_: Partial<ReadingsMapping> = {}, caller = team.engineer) {
  return caller.call(addTest, {
    params: { studyId },
    file: { name: 'run "7" µ.csv', content },
    body: {
      id: randomUUID(),
      name: 'Run 7',
      operatingPointId: chain.point.id,
      performedOn: '2026-02-03',
      mapping: { ...mapping, ...with_ },
      reduction: {
        kind: 'steady-heating',
        instruments: {
          power: { form: 'relative', fraction: 0.004 },
          wallTemperature: { form: 'standard', u: 0.1 },
          bulkTemperature: { form: 'standard', u: 0.08 },
          flow: { form: 'relative', fraction: 0.01 },
        },
        flowIs: 'velocity',
        heatLoss: value(6, 1, 'W'),
        surface: { shape: 'stated area', area: value(0.01, 0.0001, 'm²') },
      },
    },
  });
}

it('reduces the readings, raises the revision and says so in the log', async () => {
  const before = await seen(team.engineer, studyId);

  const { status, body } = await upload(csv());

  expect(status).toBe(200);
  expect(body.revision).toBe(before.revision + 1);
  const study = await seen(team.colleague, studyId);
  expect(study.model.tests).toEqual([body.test]);
  expect(body.test.reduction.summary).toMatchObject({ count: 5 });
  expect((await logOf(app, studyId)).at(-1)?.event).toMatchObject({
    event: 'chain.edited',
    summary: expect.stringContaining('5 readings'),
  });
});

describe('a file that cannot be used is named by row and column, and nothing of it is stored:', () => {
  it.each([
    ['a row with a cell too few', csv({ 4: '20,186,36.4' }), {}, /Row 4/],
    ['a word for a number', csv({ 3: '10,186,warm,25.1,0.45' }), {}, /Row 3, “T_wall \(°C\)”/],
    ['a wall colder than the bulk', csv({ 5: '30,186,20.0,25.1,0.45' }), {}, /Row 5/],
    ['an unknown unit', csv(), { power: { column: 1, unit: 'horses' } }, /horses/],
    ['a unit of another kind', csv(), { power: { column: 1, unit: 'm/s' } }, /m\/s/],
    ['nothing but a header', header, {}, /reading/],
  ])('%s', async (_what, content, with_, words) => {
    const before = await seen(team.engineer, studyId);

    const reply = await upload(content, with_);

    expect(reply.status).toBe(400);
    expect(reply.problem.sentence).toMatch(words);
    expect(await seen(team.engineer, studyId)).toEqual(before);
    expect((await logOf(app, studyId)).filter(({ event }) => JSON.stringify(event).includes('Run 7'))).toEqual([]);
  });

  it('more than 5 MB', async () => {
    const before = await seen(team.engineer, studyId);

    const reply = await upload(new Uint8Array(maxReadingsFileBytes + 1).fill(0x31));

    expect(reply.status).toBe(413);
    expect(reply.problem.sentence).toContain('5 MB');
    expect(await seen(team.engineer, studyId)).toEqual(before);
  });
});

it('takes no file from a manager, and shows an outsider no study', async () => {
  const replies = [await upload(csv(), {}, team.manager), await upload(csv(), {}, team.outsider)];

  expect(replies.map((reply) => reply.status)).toEqual([403, 404]);
  expect((await seen(team.engineer, studyId)).model.tests).toEqual([]);
});

it('gives the original back byte for byte, as an attachment and to those who may read the study', async () => {
  const latin1 = Buffer.from(csv(), 'latin1');
  const { body } = await upload(latin1);
  const address = fileAddress(studyId, body.test.file.id);

  const reply = await team.studyAuditor.fetch(address);

  expect(reply.status).toBe(200);
  expect(Buffer.from(await reply.arrayBuffer()).equals(latin1)).toBe(true);
  expect(reply.headers.get('content-disposition')).toMatch(/^attachment; filename=/);
  expect(reply.headers.get('content-type')).toBe('application/octet-stream');
  expect(reply.headers.get('x-content-type-options')).toBe('nosniff');
  expect((await team.outsider.fetch(address)).status).toBe(404);
  expect((await app.anonymous.fetch(address)).status).toBe(401);
});
