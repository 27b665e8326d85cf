import type { RowDataPacket } from 'mysql2';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { type Caller, callerAt, cookieOf } from '../../../server/scripts/api-caller.ts';
import { getSession, signIn, signOut } from '../../../shared/api/session.ts';
import { type BuiltPerson, person, testPassword } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

const hour = 3_600_000;
let app: TestApp;
let clock: Date;
let ada: BuiltPerson;

beforeAll(async () => {
  app = await startTestApp({ now: () => clock });
});
afterAll(() => app.stop());

beforeEach(async () => {
  clock = new Date('2026-02-02T08:00:00.000Z');
  ada = await person(app.db, { name: 'Ada Voss' });
});

const tryPassword = (email: string, password: string, caller: Caller = app.anonymous) =>
  caller.call(signIn, { body: { email, password } });

async function whoIs(caller: Caller): Promise<string | null> {
  return (await caller.call(getSession)).body.actor?.name ?? null;
}

it('lets a person in with the address in any case, and out again', async () => {
  const reply = await tryPassword(ada.email.toUpperCase(), testPassword);
  const caller = callerAt(app.address, cookieOf(reply.headers));

  expect(reply.status).toBe(200);
  expect(await whoIs(caller)).toBe('Ada Voss');
  await caller.call(signOut);
  expect(await whoIs(caller)).toBeNull();
});

it('gives a new session id at sign-in and ends the one from before', async () => {
  const before = await app.as(ada);

  const reply = await tryPassword(ada.email, testPassword, before);

  expect(cookieOf(reply.headers)).not.toBe('');
  expect(cookieOf(reply.headers)).not.toBe(before.cookie);
  expect(await whoIs(before)).toBeNull();
});

it('does not take up a session id that somebody else chose', async () => {
  const planted = callerAt(app.address, 'stemma=s%3Achosen.signature');

  const reply = await tryPassword(ada.email, testPassword, planted);

  expect(cookieOf(reply.headers)).not.toContain('chosen');
  expect(await whoIs(planted)).toBeNull();
});

it('answers a wrong password, an unknown address, an unanswered invitation and a deactivated account alike', async () => {
  const gone = await person(app.db, { isActive: false });
  const invited = await person(app.db, { passwordHash: null });

  const replies = [
    await tryPassword(ada.email, 'not the password at all'),
    await tryPassword('nobody@example.test', testPassword),
    await tryPassword(invited.email, testPassword),
    await tryPassword(gone.email, testPassword),
  ];

  for (const reply of replies) {
    expect(reply.status).toBe(401);
    expect(reply.problem).toEqual(replies[0]?.problem);
  }
});

it('takes as long for an unknown address as for a known one', async () => {
  const median = (times: number[]) => times.sort((a, b) => a - b)[Math.floor(times.length / 2)] ?? 0;
  const timesOf = async (email: string) => {
    const times: number[] = [];
    for (let count = 0; count < 7; count += 1) {
      const begun = performance.now();
      await tryPassword(email, 'not the password at all');
      times.push(performance.now() - begun);
    }
    return times;
  };

  const known = median(await timesOf(ada.email));
  const unknown = median(await timesOf('stranger@example.test'));

  // Without the hash an unknown address would answer in a tenth of the time.
  expect(unknown / known).toBeGreaterThan(0.5);
});

it('stops guessing at one account after ten tries, even with the right password, and leaves others alone', async () => {
  const other = await person(app.db);
  for (let count = 0; count < 10; count += 1) {
    expect((await tryPassword(ada.email, 'not the password at all')).status).toBe(401);
  }

  const reply = await tryPassword(ada.email, testPassword);

  expect(reply.status).toBe(429);
  expect(reply.problem.sentence).toMatch(/Wait \d+ minutes? and try again/);
  expect((await tryPassword(other.email, testPassword)).status).toBe(200);
});

it('lets no more than ten of thirty guesses through that arrive at once', async () => {
  // An address of its own, so that the other tests keep their tries.
  const guess = () =>
    app.anonymous.fetch('/api/session', {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'x-forwarded-for': '192.0.2.7' },
      body: JSON.stringify({ email: ada.email, password: 'not the password at all' }),
    });

  const statuses = (await Promise.all(Array.from({ length: 30 }, guess))).map((reply) => reply.status);

  expect(statuses.filter((status) => status === 401)).toHaveLength(10);
  expect(statuses.filter((status) => status === 429)).toHaveLength(20);
});

it('stops one network address that guesses at many accounts', async () => {
  const guess = (count: number) =>
    app.anonymous.fetch('/api/session', {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'x-forwarded-for': '192.0.2.8' },
      body: JSON.stringify({ email: `person-${count}@example.test`, password: 'not the password at all' }),
    });

  const statuses = (await Promise.all(Array.from({ length: 55 }, (_, count) => guess(count)))).map(
    (reply) => reply.status,
  );

  expect(statuses.filter((status) => status === 429)).toHaveLength(5);
});

it('keeps only the hash of a session id', async () => {
  const caller = await app.as(ada);
  const id =
    decodeURIComponent(caller.cookie)
      .replace(/^stemma=s:/, '')
      .split('.')[0] ?? '';

  const [rows] = await app.fresh.admin.query<RowDataPacket[]>('SELECT * FROM sessions WHERE person_id = ?', [ada.id]);

  expect(id.length).toBeGreaterThan(20);
  expect(rows).toHaveLength(1);
  expect(JSON.stringify(rows)).not.toContain(id);
});

it('hides the cookie from scripts and from other sites, without Secure on plain http', async () => {
  const flags = (await tryPassword(ada.email, testPassword)).headers.get('set-cookie') ?? '';

  expect(flags).toMatch(/^stemma=/);
  expect(flags).toContain('HttpOnly');
  expect(flags).toContain('SameSite=Lax');
  expect(flags).not.toContain('Secure');
});

it('ends a session after eight hours without a call', async () => {
  const caller = await app.as(ada);

  clock = new Date(clock.getTime() + 8 * hour - 1000);
  expect(await whoIs(caller)).toBe('Ada Voss');
  clock = new Date(clock.getTime() + 8 * hour + 1000);
  expect(await whoIs(caller)).toBeNull();
});

it('ends a session after a day, however busy it is', async () => {
  const caller = await app.as(ada);
  const seen: (string | null)[] = [];
  for (let hours = 0; hours < 24; hours += 6) {
    clock = new Date(clock.getTime() + 6 * hour);
    seen.push(await whoIs(caller));
  }

  expect(seen).toEqual(['Ada Voss', 'Ada Voss', 'Ada Voss', null]);
});

it('writes a sign-in into the log of the installation, and no failed one', async () => {
  const count = async () => {
    const [rows] = await app.fresh.admin.query<RowDataPacket[]>(
      "SELECT COUNT(*) AS n FROM audit_entry WHERE chain = 'system' AND kind = 'person.signed-in' AND actor_id = ?",
      [ada.id],
    );
    return rows[0]?.n;
  };

  await tryPassword(ada.email, 'not the password at all');
  expect(await count()).toBe(0);
  await tryPassword(ada.email, testPassword);
  expect(await count()).toBe(1);
});

it('ties the cookie to https and to this host where people come by https', async () => {
  const secure = await startTestApp({ publicAddress: 'https://stemma.example.test' });
  try {
    const someone = await person(secure.db);
    const reply = await secure.anonymous.fetch('/api/session', {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'x-forwarded-proto': 'https' },
      body: JSON.stringify({ email: someone.email, password: testPassword }),
    });
    const flags = reply.headers.get('set-cookie') ?? '';

    expect(flags).toMatch(/^__Host-stemma=/);
    expect(flags).toContain('Secure');
    expect(flags).toContain('Path=/');
    expect(flags).not.toContain('Domain');
    expect(reply.headers.get('strict-transport-security')).toContain('max-age');
  } finally {
    await secure.stop();
  }
});
