import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { pino } from 'pino';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { outbox } from '../../../server/db/schema/outbox.ts';
import { createDrain } from '../../../server/notices/drain.ts';
import { createMailer, type Mailer } from '../../../server/notices/mailer.ts';
import { waitUntil } from '../../../server/scripts/wait-until.ts';
import { type BuiltPerson, person } from '../../support/builders.ts';
import { type SmtpServer, startSmtpServer } from '../../support/smtp-server.ts';
import { type FreshDatabase, freshDatabase } from '../../support/test-database.ts';

const second = 1000;
let fresh: FreshDatabase;
let smtp: SmtpServer;
let mailers: Mailer[];
let clock: Date;
let ada: BuiltPerson;

beforeEach(async () => {
  [fresh, smtp] = await Promise.all([freshDatabase(), startSmtpServer()]);
  mailers = [];
  clock = new Date('2026-02-02T08:00:00.000Z');
  ada = await person(fresh.db, { email: 'ada@example.test' });
});
afterEach(async () => {
  for (const mailer of mailers) mailer.close();
  await smtp.stop();
  await fresh.drop();
});

const later = (ms: number) => {
  clock = new Date(clock.getTime() + ms);
};

/** A drain as a server of its own has it. */
function drain() {
  const mailer = createMailer({
    host: '127.0.0.1',
    port: smtp.port,
    from: 'Stemma <stemma@example.test>',
    publicAddress: 'https://stemma.example.test',
  });
  mailers.push(mailer);
  return createDrain({ db: fresh.db, mailer, now: () => clock, log: pino({ level: 'silent' }) });
}

async function owe(recipientId = ada.id, kind = 'password-link'): Promise<string> {
  const id = randomUUID();
  const payload = { token: 'secret-token' };
  await fresh.db.insert(outbox).values({ id, kind, recipientId, payload, createdAt: clock, dueAt: clock, attempts: 0 });
  return id;
}

async function rowOf(id: string) {
  const [row] = await fresh.db.select().from(outbox).where(eq(outbox.id, id));
  if (!row) throw new Error('The row is gone.');
  return row;
}

const messageIds = () => smtp.taken.map((mail) => /^Message-ID: <(.+)@stemma\.example\.test>$/im.exec(mail.text)?.[1]);

describe('a mail that is owed', () => {
  it('arrives once, is marked as sent and leaves no token behind', async () => {
    const id = await owe();

    expect(await drain().sendDue()).toBe(1);
    expect(await drain().sendDue()).toBe(0);

    expect(smtp.taken.map((mail) => mail.to)).toEqual([['ada@example.test']]);
    expect(messageIds()).toEqual([id]);
    expect(smtp.taken[0]?.text).toContain('https://stemma.example.test/password/secret-token');
    expect(await rowOf(id)).toMatchObject({ attempts: 1, sentAt: clock, dueAt: null, payload: {}, lastError: null });
  });

  it('arrives exactly once when three servers drain one outbox', async () => {
    const owed = await Promise.all(Array.from({ length: 40 }, () => owe()));

    const sent = await Promise.all([drain(), drain(), drain()].map((one) => one.sendDue()));

    expect(sent.reduce((a, b) => a + b, 0)).toBe(40);
    expect(messageIds().sort()).toEqual(owed.sort());
  });

  it('waits while the mail server is away, is tried again later each time, and arrives once it is back', async () => {
    const { port } = smtp;
    const id = await owe();
    await smtp.stop();

    const waits: number[] = [];
    for (let attempt = 1; attempt <= 4; attempt += 1) {
      expect(await drain().sendDue()).toBe(0);
      const row = await rowOf(id);
      expect(row).toMatchObject({ attempts: attempt, sentAt: null });
      expect(row.lastError).toContain('ECONNREFUSED');
      waits.push((row.dueAt?.getTime() ?? 0) - clock.getTime());
      clock = row.dueAt ?? clock;
    }
    expect(waits).toEqual([2 * second, 4 * second, 8 * second, 16 * second]);

    smtp = await startSmtpServer(port);
    later(-1);
    expect(await drain().sendDue()).toBe(0);
    later(1);
    expect(await drain().sendDue()).toBe(1);
    expect(messageIds()).toEqual([id]);
  });

  it('that no server ever takes is left after twelve tries with its last error, and holds up no other', async () => {
    const bo = await person(fresh.db, { email: 'bo@example.test' });
    smtp.behaviour.answerTo = (address) => (address === 'ada@example.test' ? '550 no such mailbox' : '250 ok');
    const [poison, unknownKind] = [await owe(), await owe(ada.id, 'no-such-kind')];
    const fine = await owe(bo.id);
    const one = drain();

    for (let round = 0; round < 14; round += 1) {
      await one.sendDue();
      later(3600 * second);
    }

    expect(messageIds()).toEqual([fine]);
    expect(await rowOf(poison)).toMatchObject({ attempts: 12, dueAt: null, sentAt: null });
    expect((await rowOf(poison)).lastError).toContain('550 no such mailbox');
    expect((await rowOf(unknownKind)).lastError).toBe('There is no mail of the kind no-such-kind.');
  });

  it('comes again under the same Message-ID when the connection was cut after the server took it', async () => {
    const id = await owe();
    smtp.behaviour.cutAfterData = true;
    await drain().sendDue();
    expect(await rowOf(id)).toMatchObject({ attempts: 1, sentAt: null });

    smtp.behaviour.cutAfterData = false;
    later(2 * second);
    await drain().sendDue();

    expect(messageIds()).toEqual([id, id]);
    expect((await rowOf(id)).sentAt).toEqual(clock);
  });

  it('is left alone for a minute when the server that claimed it died, then sent by another', async () => {
    const id = await owe();
    await fresh.admin.query('UPDATE outbox SET attempts = 1, due_at = ? WHERE id = ?', [
      new Date(clock.getTime() + 60 * second),
      id,
    ]);

    later(59 * second);
    expect(await drain().sendDue()).toBe(0);
    later(1 * second);
    expect(await drain().sendDue()).toBe(1);
  });
});

describe('an address that would reach somebody else', () => {
  it.each([
    'ada@example.test\r\nBcc: evil@example.test',
    'ada@example.test, evil@example.test',
    'Ada <evil@example.test>',
  ])('reaches nobody: %j', async (email) => {
    const id = await owe((await person(fresh.db, { email })).id);

    expect(await drain().sendDue()).toBe(0);

    expect(smtp.taken).toEqual([]);
    expect((await rowOf(id)).lastError).not.toBeNull();
  });
});

describe('stopping', () => {
  it('waits for the mail in hand and leaves the rest', async () => {
    const ids = [await owe(), await owe()];
    let letGo = () => {};
    smtp.behaviour.hold = new Promise<void>((resolve) => {
      letGo = resolve;
    });
    const one = drain();
    one.start();
    await waitUntil(() => smtp.taken.length === 1, { timeoutMs: 10_000, tooLate: () => 'No mail came.' });

    let hasStopped = false;
    const stopped = one.stop().then(() => {
      hasStopped = true;
    });
    await rowOf(ids[0] ?? '');
    expect(hasStopped).toBe(false);
    letGo();
    await stopped;

    const rows = await Promise.all(ids.map(rowOf));
    expect(rows.filter((row) => row.sentAt !== null)).toHaveLength(1);
    expect(smtp.taken).toHaveLength(1);
  });

  it('is all that ends it: a database that fails for a while does not', async () => {
    await fresh.admin.query('RENAME TABLE outbox TO outbox_away');
    const one = drain();
    one.start();
    try {
      await fresh.admin.query('RENAME TABLE outbox_away TO outbox');
      await owe();
      await waitUntil(() => smtp.taken.length === 1, { timeoutMs: 10_000, tooLate: () => 'No mail came.' });
    } finally {
      await one.stop();
    }
    expect(messageIds()).toHaveLength(1);
  });
});
