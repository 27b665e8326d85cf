import { afterAll, beforeAll, expect, it } from 'vitest';
import { people } from '../../../server/db/schema/people.ts';
import type { Caller } from '../../../server/scripts/api-caller.ts';
import { invitePerson, listPeople } from '../../../shared/api/people.ts';
import { person } from '../../support/builders.ts';
import { type PrivateDatabase, privateDatabase } from '../../support/private-database.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';
import { freshDatabase } from '../../support/test-database.ts';

let database: PrivateDatabase;
let app: TestApp;
let administrator: Caller;

beforeAll(async () => {
  database = await privateDatabase();
  app = await startTestApp({ on: await freshDatabase(database.server()) });
  administrator = await app.as(await person(app.db, { isAdministrator: true }));
});
afterAll(async () => {
  await app.stop();
  await database.remove();
});

const invite = (email: string) =>
  administrator.call(invitePerson, { body: { name: 'Bo Lind', email, isAdministrator: false, isAuditor: false } });

it('says in a sentence that the database does not answer, and works again by itself once it is back', async () => {
  await database.stop();

  const [read, write] = [await administrator.call(listPeople), await invite('away@example.test')];
  const [alive, ready] = [await app.anonymous.fetch('/healthz'), await app.anonymous.fetch('/readyz')];
  await database.startAgain();
  const after = await invite('back@example.test');

  for (const reply of [read, write]) {
    expect(reply.status).toBe(503);
    expect(reply.problem.code).toBe('unavailable');
    expect(reply.problem.sentence).toContain('What you typed is still on the screen');
  }
  expect([alive.status, ready.status]).toEqual([200, 503]);
  expect(after.status).toBe(200);
  expect((await app.anonymous.fetch('/readyz')).status).toBe(200);
  const emails = (await app.db.select({ email: people.email }).from(people)).map((row) => row.email);
  expect(emails).toContain('back@example.test');
  expect(emails).not.toContain('away@example.test');
});

it('answers every call within ten seconds while the database hangs, and works again once it goes on', async () => {
  // So that the calls meet connections that were open before.
  await Promise.all(Array.from({ length: 10 }, () => administrator.call(listPeople)));
  const { pid } = database.server().child;
  const timed = async () => {
    const begun = performance.now();
    const { status } = await administrator.call(listPeople);
    return { status, seconds: (performance.now() - begun) / 1000 };
  };

  process.kill(pid, 'SIGSTOP');
  let replies: Awaited<ReturnType<typeof timed>>[];
  try {
    replies = await Promise.all(Array.from({ length: 20 }, timed));
  } finally {
    process.kill(pid, 'SIGCONT');
  }

  expect(replies.map((reply) => reply.status)).toEqual(Array(20).fill(503));
  expect(Math.max(...replies.map((reply) => reply.seconds))).toBeLessThan(10);
  const after = await Promise.all(Array.from({ length: 20 }, timed));
  expect(after.map((reply) => reply.status)).toEqual(Array(20).fill(200));
});
