import { eq } from 'drizzle-orm';
import type { RowDataPacket } from 'mysql2';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { errnoOf } from '../../../server/db/database-error.ts';
import { outbox } from '../../../server/db/schema/outbox.ts';
import { people } from '../../../server/db/schema/people.ts';
import { inTransaction } from '../../../server/http/run-handler.ts';
import type { Caller } from '../../../server/scripts/api-caller.ts';
import { changePerson, invitePerson } from '../../../shared/api/people.ts';
import { type BuiltPerson, person } from '../../support/builders.ts';
import { waitForLockWaits } from '../../support/lock-waits.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let administrator: Caller;
let bo: BuiltPerson;

beforeAll(async () => {
  app = await startTestApp();
  administrator = await app.as(await person(app.db, { isAdministrator: true }));
});
afterAll(() => app.stop());
beforeEach(async () => {
  bo = await person(app.db, { name: 'Bo Lind' });
});

const invite = (email: string) =>
  administrator.call(invitePerson, { body: { name: 'New', email, isAdministrator: false, isAuditor: false } });
const rename = (name: string) =>
  administrator.call(changePerson, {
    params: { personId: bo.id },
    body: { name, isAdministrator: false, isAuditor: false, isActive: true },
  });

async function counts() {
  const [rows] = await app.fresh.admin.query<RowDataPacket[]>(
    'SELECT (SELECT COUNT(*) FROM people) AS people, (SELECT COUNT(*) FROM one_time_links) AS links, ' +
      '(SELECT COUNT(*) FROM outbox) AS mails, (SELECT COUNT(*) FROM audit_entry) AS entries, ' +
      '(SELECT SUM(seq) FROM audit_head) AS heads',
  );
  return rows[0];
}

it('leaves nothing behind when the last write of a change fails: no row, no link, no mail, no entry', async () => {
  const before = await counts();
  // The entry is written last; without this right everything before it has been done already.
  const table = `\`${app.fresh.address.database}\`.audit_entry`;
  await app.fresh.admin.query(`REVOKE INSERT ON ${table} FROM 'stemma_app'@'127.0.0.1'`);
  const refused = await invite('undone@example.test');
  const between = await counts();
  await app.fresh.admin.query(`GRANT INSERT ON ${table} TO 'stemma_app'@'127.0.0.1'`);
  const done = await invite('done@example.test');

  expect(refused.status).toBe(500);
  expect(between).toEqual(before);
  expect(done.status).toBe(200);
  const after = await counts();
  for (const what of ['people', 'links', 'mails', 'entries'])
    expect([what, after?.[what]]).toEqual([what, before?.[what] + 1]);
});

it('owes the mail in the same commit as the change', async () => {
  const reply = await invite('owed@example.test');

  const [mail] = await app.db.select().from(outbox).where(eq(outbox.recipientId, reply.body.id));
  expect(mail).toMatchObject({ kind: 'person-invited', attempts: 0, sentAt: null });
});

it('does a change again from its start when another came between, and never on what it had read', async () => {
  const seen: string[] = [];

  await inTransaction(app.db, async (tx) => {
    const [row] = await tx.select().from(people).where(eq(people.id, bo.id));
    seen.push(row?.name ?? '');
    if (seen.length === 1) await app.fresh.admin.query("UPDATE people SET name = 'Bo' WHERE id = ?", [bo.id]);
    await tx
      .update(people)
      .set({ name: `${row?.name} the second` })
      .where(eq(people.id, bo.id));
  });

  const [stored] = await app.db.select().from(people).where(eq(people.id, bo.id));
  expect(seen).toEqual(['Bo Lind', 'Bo']);
  expect(stored?.name).toBe('Bo the second');
});

it('gives up after four tries with nothing changed', async () => {
  let tries = 0;
  const work = inTransaction(app.db, async (tx) => {
    tries += 1;
    await tx.select().from(people).where(eq(people.id, bo.id));
    await app.fresh.admin.query('UPDATE people SET name = ? WHERE id = ?', [`Outside ${tries}`, bo.id]);
    await tx.update(people).set({ name: 'Inside' }).where(eq(people.id, bo.id));
  });

  await expect(work).rejects.toSatisfy((error: unknown) => errnoOf(error) === 1020);
  expect(tries).toBe(4);
  const [stored] = await app.db.select().from(people).where(eq(people.id, bo.id));
  expect(stored?.name).toBe('Outside 4');
});

it('does not try again what failed for another reason', async () => {
  let tries = 0;
  const work = inTransaction(app.db, async (tx) => {
    tries += 1;
    await tx.insert(people).values(bo);
  });

  await expect(work).rejects.toSatisfy((error: unknown) => errnoOf(error) === 1062);
  expect(tries).toBe(1);
});

it('says so within ten seconds when somebody else holds what it needs, and leaves no half of the change', async () => {
  const holder = await app.fresh.admin.getConnection();
  await holder.beginTransaction();
  await holder.query('SELECT * FROM people WHERE id = ? FOR UPDATE', [bo.id]);
  const before = await counts();
  const begun = performance.now();

  const reply = await rename('Bo Berg');

  expect((performance.now() - begun) / 1000).toBeLessThan(10);
  await holder.rollback();
  holder.release();
  expect(reply.status).toBe(503);
  expect(reply.problem.sentence).toContain('Somebody else is changing the same thing');
  expect(await counts()).toEqual(before);
  expect((await rename('Bo Berg')).status).toBe(200);
});

it('waits for a change that is nearly done instead of refusing', async () => {
  const holder = await app.fresh.admin.getConnection();
  await holder.beginTransaction();
  await holder.query('SELECT * FROM people WHERE id = ? FOR UPDATE', [bo.id]);

  const waiting = rename('Bo Berg');
  await waitForLockWaits(app.fresh.admin, 1);
  await holder.commit();
  holder.release();

  expect((await waiting).status).toBe(200);
});

it('hands on no connection with an open transaction', async () => {
  await Promise.allSettled(
    Array.from({ length: 30 }, (_, count) =>
      inTransaction(app.db, async (tx) => {
        await tx
          .update(people)
          .set({ name: `Broken ${count}` })
          .where(eq(people.id, bo.id));
        throw new Error('the change fails');
      }),
    ),
  );

  const states = await Promise.all(
    Array.from({ length: 10 }, () => app.db.$client.query<RowDataPacket[]>('SELECT @@in_transaction AS open')),
  );
  expect(states.map(([rows]) => rows[0]?.open)).toEqual(Array(10).fill(0));
  const [stored] = await app.db.select().from(people).where(eq(people.id, bo.id));
  expect(stored?.name).toBe('Bo Lind');
});
