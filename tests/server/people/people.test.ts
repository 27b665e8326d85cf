import { and, eq } from 'drizzle-orm';
import type { RowDataPacket } from 'mysql2';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { outbox } from '../../../server/db/schema/outbox.ts';
import { people } from '../../../server/db/schema/people.ts';
import type { Caller } from '../../../server/scripts/api-caller.ts';
import { changePerson, invitePerson, listPeople } from '../../../shared/api/people.ts';
import { getSession, setPassword, signIn } from '../../../shared/api/session.ts';
import { type BuiltPerson, person, testPassword } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let admin: BuiltPerson;
let administrator: Caller;

beforeEach(async () => {
  app = await startTestApp();
  admin = await person(app.db, { name: 'Ines Admin', isAdministrator: true });
  administrator = await app.as(admin);
});
afterEach(() => app.stop());

const invitation = { name: 'Bo Lind', email: 'bo@example.test', isAdministrator: false, isAuditor: false };
const asIs = ({ name, isAdministrator, isAuditor, isActive }: BuiltPerson) => ({
  name,
  isAdministrator,
  isAuditor,
  isActive,
});

async function systemEvents(kind: string) {
  const [rows] = await app.fresh.admin.query<RowDataPacket[]>(
    "SELECT payload FROM audit_entry WHERE chain = 'system' AND kind = ? ORDER BY seq",
    [kind],
  );
  return rows.map((row) => JSON.parse(row.payload));
}

it('invites a person, who chooses a password with the link of the mail and signs in', async () => {
  const reply = await administrator.call(invitePerson, { body: invitation });
  const [mail] = await app.db.select().from(outbox).where(eq(outbox.recipientId, reply.body.id));

  expect(reply.status).toBe(200);
  expect(reply.body.hasPassword).toBe(false);
  expect(mail?.kind).toBe('person-invited');
  expect(await systemEvents('person.invited')).toMatchObject([
    { actorName: 'Ines Admin', event: { name: 'Bo Lind', email: 'bo@example.test' } },
  ]);
  await app.anonymous.call(setPassword, { body: { token: String(mail?.payload.token), password: testPassword } });
  expect((await app.as({ email: 'bo@example.test' })).cookie).not.toBe('');
});

it('refuses a person who is not an administrator, with the reason', async () => {
  const caller = await app.as(await person(app.db));

  const replies = [
    await caller.call(invitePerson, { body: invitation }),
    await caller.call(changePerson, { params: { personId: admin.id }, body: { ...asIs(admin), isActive: false } }),
  ];

  for (const reply of replies) {
    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toBe('Only an administrator may do this.');
  }
  expect(await app.db.select().from(people).where(eq(people.email, invitation.email))).toHaveLength(0);
});

it('shows nobody to whoever is not signed in, and no hash of a password to anybody', async () => {
  const anonymous = await app.anonymous.fetch('/api/people');
  const list = await administrator.fetch('/api/people');

  expect(anonymous.status).toBe(401);
  expect(await list.text()).not.toContain('argon2');
  expect((await administrator.call(listPeople)).body.people.map((one) => one.name)).toEqual(['Ines Admin']);
});

it('takes one address for one person, in any case', async () => {
  await administrator.call(invitePerson, { body: invitation });

  const again = await administrator.call(invitePerson, { body: { ...invitation, email: 'BO@Example.test' } });

  expect(again.status).toBe(400);
  expect(again.problem.fields).toEqual({
    'body.email': 'bo@example.test belongs to Bo Lind already. Every person has an address of their own.',
  });
});

it('makes one account of two invitations to one address at the same moment', async () => {
  const invite = () => administrator.call(invitePerson, { body: invitation });

  const statuses = (await Promise.all([invite(), invite(), invite()])).map((reply) => reply.status);

  expect(statuses.sort()).toEqual([200, 400, 400]);
  expect(await systemEvents('person.invited')).toHaveLength(1);
});

it.each(['not an address', 'a@example.test, b@example.test', 'a@example.test\r\nBcc: b@example.test'])(
  'refuses %j as a mail address, naming the field',
  async (email) => {
    const reply = await administrator.call(invitePerson, { body: { ...invitation, email } });

    expect(reply.status).toBe(400);
    expect(reply.problem.fields).toHaveProperty(['body.email']);
    expect(await app.db.select().from(outbox)).toHaveLength(0);
  },
);

it('keeps out what the call does not take: id, password, activity', async () => {
  const extra = { id: admin.id, passwordHash: 'x', isActive: false, createdAt: '1999-01-01' };

  const reply = await administrator.call(invitePerson, { body: { ...invitation, ...extra } as never });

  const [stored] = await app.db.select().from(people).where(eq(people.email, invitation.email));
  expect(reply.body.id).not.toBe(admin.id);
  expect(stored).toMatchObject({ passwordHash: null, isActive: true });
});

it('ends the sessions of a deactivated person at once and lets them in no more', async () => {
  const bo = await person(app.db);
  const caller = await app.as(bo);

  const setActive = (isActive: boolean) =>
    administrator.call(changePerson, { params: { personId: bo.id }, body: { ...asIs(bo), isActive } });
  await setActive(false);

  expect((await caller.call(listPeople)).status).toBe(401);
  expect((await caller.call(getSession)).body.actor).toBeNull();
  expect((await app.anonymous.call(signIn, { body: { email: bo.email, password: testPassword } })).status).toBe(401);
  // Ended, not asleep: the account coming back does not bring the session back.
  await setActive(true);
  expect((await caller.call(listPeople)).status).toBe(401);
});

it('acts on a change of role with the next call of an open session', async () => {
  const second = await person(app.db, { isAdministrator: true });
  const caller = await app.as(second);
  expect((await caller.call(invitePerson, { body: invitation })).status).toBe(200);

  const body = { ...asIs(second), isAdministrator: false };
  await administrator.call(changePerson, { params: { personId: second.id }, body });

  const after = await caller.call(invitePerson, { body: { ...invitation, email: 'other@example.test' } });
  expect(after.status).toBe(403);
});

it('logs what a person was before and after a change, and leaves earlier entries with the earlier name', async () => {
  await administrator.call(invitePerson, { body: invitation });

  await administrator.call(changePerson, {
    params: { personId: admin.id },
    body: { ...asIs(admin), name: 'Ines Berg' },
  });

  expect(await systemEvents('person.changed')).toMatchObject([
    { event: { before: { name: 'Ines Admin' }, after: { name: 'Ines Berg' } } },
  ]);
  expect(await systemEvents('person.invited')).toMatchObject([{ actorName: 'Ines Admin' }]);
});

it('keeps the last administrator', async () => {
  for (const less of [{ isAdministrator: false }, { isActive: false }]) {
    const reply = await administrator.call(changePerson, {
      params: { personId: admin.id },
      body: { ...asIs(admin), ...less },
    });

    expect(reply.status).toBe(400);
    expect(reply.problem.sentence).toBe('The last administrator has to stay. Make somebody else administrator first.');
  }
});

it('keeps one of two administrators who step down at the same moment, ten times over', async () => {
  for (let round = 0; round < 10; round += 1) {
    await app.fresh.admin.query('UPDATE people SET is_administrator = 0 WHERE id <> ?', [admin.id]);
    await app.fresh.admin.query('UPDATE people SET is_administrator = 1 WHERE id = ?', [admin.id]);
    const second = await person(app.db, { isAdministrator: true });
    const other = await app.as(second);
    const stepDown = (caller: Caller, who: BuiltPerson) =>
      caller.call(changePerson, { params: { personId: who.id }, body: { ...asIs(who), isAdministrator: false } });

    const replies = await Promise.all([stepDown(administrator, admin), stepDown(other, second)]);

    const left = await app.db
      .select({ id: people.id })
      .from(people)
      .where(and(eq(people.isAdministrator, true), eq(people.isActive, true)));
    expect(left).toHaveLength(1);
    expect(replies.filter((reply) => reply.status === 200)).toHaveLength(1);
  }
});
