import { randomBytes } from 'node:crypto';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { makeLink } from '../../../server/db/make-link.ts';
import { people } from '../../../server/db/schema/people.ts';
import { callerAt, cookieOf } from '../../../server/scripts/api-caller.ts';
import { getSession, setUpAdministrator } from '../../../shared/api/session.ts';
import { testPassword } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let clock: Date;

beforeEach(async () => {
  clock = new Date('2026-02-02T08:00:00.000Z');
  app = await startTestApp({ now: () => clock });
});
afterEach(() => app.stop());

/** What a start of the server without people prints. */
async function printedToken(): Promise<string> {
  const token = randomBytes(32).toString('hex');
  const expiresAt = new Date(clock.getTime() + 24 * 3_600_000);
  await makeLink(app.db, { token, personId: null, purpose: 'setup', expiresAt });
  return token;
}

const setUp = (token: string, email = 'first@example.test') =>
  app.anonymous.call(setUpAdministrator, { body: { token, name: 'First Person', email, password: testPassword } });

it('makes the first administrator, signed in, and is over then', async () => {
  expect((await app.anonymous.call(getSession)).body).toEqual({ actor: null, needsSetup: true });

  const reply = await setUp(await printedToken());

  expect(reply.status).toBe(200);
  const caller = callerAt(app.address, cookieOf(reply.headers));
  expect((await caller.call(getSession)).body.actor).toMatchObject({ name: 'First Person', isAdministrator: true });
  expect((await app.anonymous.call(getSession)).body).toEqual({ actor: null, needsSetup: false });
});

it('uses a link once, and with it the links of earlier starts', async () => {
  const [earlier, latest] = [await printedToken(), await printedToken()];
  await setUp(latest);

  const again = await setUp(latest, 'second@example.test');
  const withEarlier = await setUp(earlier, 'third@example.test');

  expect([again.status, withEarlier.status]).toEqual([400, 400]);
  expect(again.problem.sentence).toContain('used already');
  expect(await app.db.select().from(people)).toHaveLength(1);
});

it('makes one administrator of two that set up at the same moment with two links', async () => {
  const tokens = [await printedToken(), await printedToken()];

  const replies = await Promise.all(tokens.map((token, index) => setUp(token, `person-${index}@example.test`)));

  expect(replies.map((reply) => reply.status).sort()).toEqual([200, 400]);
  expect(await app.db.select().from(people)).toHaveLength(1);
});

it('refuses a link after a day, an invented one, and a number in its place', async () => {
  const token = await printedToken();
  const invented = await setUp('0'.repeat(64));
  const number = await app.anonymous.fetch('/api/setup', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ token: 0, name: 'X', email: 'x@example.test', password: testPassword }),
  });
  clock = new Date(clock.getTime() + 25 * 3_600_000);
  const late = await setUp(token);

  expect([invented.status, number.status, late.status]).toEqual([400, 400, 400]);
  expect(await app.db.select().from(people)).toHaveLength(0);
});

it('keeps the password as Argon2id with at least 19 MiB, two passes and one lane', async () => {
  await setUp(await printedToken());

  const [first] = await app.db.select().from(people);

  expect(first?.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
});
