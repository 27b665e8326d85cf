import { desc, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { outbox } from '../../../server/db/schema/outbox.ts';
import { getSession, requestPasswordLink, setPassword, signIn } from '../../../shared/api/session.ts';
import { type BuiltPerson, person, testPassword } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

const newPassword = 'four other words in a row';
let app: TestApp;
let clock = new Date('2026-02-02T08:00:00.000Z');
let ada: BuiltPerson;

beforeAll(async () => {
  app = await startTestApp({ now: () => clock });
});
afterAll(() => app.stop());
beforeEach(async () => {
  ada = await person(app.db);
});

const ask = (email: string) => app.anonymous.call(requestPasswordLink, { body: { email } });
const choose = (token: string, password = newPassword) =>
  app.anonymous.call(setPassword, { body: { token, password } });

async function owedTo(id: string) {
  return app.db.select().from(outbox).where(eq(outbox.recipientId, id)).orderBy(desc(outbox.createdAt));
}

async function mailedToken(): Promise<string> {
  clock = new Date(clock.getTime() + 1000);
  await ask(ada.email);
  const [latest] = await owedTo(ada.id);
  return String(latest?.payload.token);
}

it('answers alike for a known and an unknown address, and owes a mail to the known one only', async () => {
  const gone = await person(app.db, { isActive: false });
  const replies = [await ask(ada.email), await ask('nobody@example.test'), await ask(gone.email)];

  expect(replies.map((reply) => [reply.status, reply.body])).toEqual(Array(3).fill([200, {}]));
  expect(await owedTo(ada.id)).toHaveLength(1);
  expect(await owedTo(gone.id)).toHaveLength(0);
});

it('sends no sixth link within an hour', async () => {
  for (let count = 0; count < 5; count += 1) expect((await ask(ada.email)).status).toBe(200);

  const sixth = await ask(ada.email);

  expect(sixth.status).toBe(429);
  expect(sixth.problem.sentence).toContain('Too many password links');
  expect(await owedTo(ada.id)).toHaveLength(5);
});

it('ends every session of the person and the old password with a new one', async () => {
  const before = await app.as(ada);

  const reply = await choose(await mailedToken());

  expect(reply.body).toEqual({ email: ada.email });
  expect((await before.call(getSession)).body.actor).toBeNull();
  expect((await app.anonymous.call(signIn, { body: { email: ada.email, password: testPassword } })).status).toBe(401);
  expect((await app.anonymous.call(signIn, { body: { email: ada.email, password: newPassword } })).status).toBe(200);
});

it('takes a link once and for two hours', async () => {
  const used = await mailedToken();
  await choose(used);
  const late = await mailedToken();
  clock = new Date(clock.getTime() + 2 * 3_600_000 + 1000);

  expect((await choose(used)).status).toBe(400);
  expect((await choose(late)).status).toBe(400);
});

it('sets one password with a link that is used twice at the same moment', async () => {
  const token = await mailedToken();

  const replies = await Promise.all([choose(token), choose(token, 'yet another row of words')]);

  expect(replies.map((reply) => reply.status).sort()).toEqual([200, 400]);
});

it('lets no earlier mail undo a newer password', async () => {
  const [earlier, later] = [await mailedToken(), await mailedToken()];
  await choose(later);

  expect((await choose(earlier)).status).toBe(400);
});

it('names the field and the remedy for a password that is too short, and keeps the link', async () => {
  const token = await mailedToken();

  const short = await choose(token, 'too short');

  expect(short.status).toBe(400);
  expect(short.problem.fields).toEqual({
    'body.password': 'Use at least 15 characters; a sentence of a few words is easy to remember.',
  });
  expect((await choose(token)).status).toBe(200);
});

it('sets no password for a person who was deactivated since', async () => {
  const token = await mailedToken();
  await app.fresh.admin.query('UPDATE people SET is_active = 0 WHERE id = ?', [ada.id]);

  expect((await choose(token)).problem.sentence).toContain('deactivated');
});
