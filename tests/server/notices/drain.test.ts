import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { pino } from 'pino';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { outbox } from '../../../server/db/schema/outbox.ts';
import { inTransaction, recordChange } from '../../../server/http/run-handler.ts';
import { createDrain } from '../../../server/notices/drain.ts';
import { createMailer, type Mailer } from '../../../server/notices/mailer.ts';
import { type MailCatcher, startMailCatcher } from '../../../server/scripts/mail-catcher.ts';
import { findFreePort } from '../../../server/scripts/port.ts';
import { type BuiltPerson, person } from '../../support/builders.ts';
import { caughtMails } from '../../support/mails.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let folder: string;
let smtpPort: number;
let catcher: MailCatcher;
let mailer: Mailer;
let mailerToNowhere: Mailer;
let recipient: BuiltPerson;
let now = new Date('2026-03-04T09:12:33.000Z');

const mailerAt = (port: number) =>
  createMailer({ host: '127.0.0.1', port, from: 'stemma@example.test', publicAddress: 'http://localhost:8080' });

beforeAll(async () => {
  app = await startTestApp({ now: () => now });
  folder = mkdtempSync(join(tmpdir(), 'stemma-mails-'));
  smtpPort = await findFreePort();
  catcher = await startMailCatcher({ dataFolder: folder, smtpPort, pagePort: await findFreePort() });
  mailer = mailerAt(smtpPort);
  mailerToNowhere = mailerAt(await findFreePort());
});
afterAll(async () => {
  mailer.close();
  mailerToNowhere.close();
  await catcher.stop();
  await app.stop();
  rmSync(folder, { recursive: true, force: true });
});
beforeEach(async () => {
  recipient = await person(app.db);
});

const drainWith = (by: Mailer) =>
  createDrain({ db: app.db, mailer: by, now: () => now, log: pino({ level: 'silent' }) });

const comments = 'Use <b>Sheet 7</b> & say "why".';
const notice = () => ({
  kind: 'submission-returned',
  recipientId: recipient.id,
  payload: { submissionId: 'x', studyTitle: 'Rod', targetName: 'k', byName: 'Bo Lind', comments },
});
const owe = (fails = false) =>
  inTransaction(app.db, async (tx) => {
    await recordChange(
      tx,
      app.services,
      { personId: recipient.id, name: recipient.name },
      { audit: [], notices: [notice()] },
    );
    if (fails) throw new Error('the change failed');
  });
const received = async () =>
  (await caughtMails(catcher.address)).filter((mail) => mail.to.some(({ address }) => address === recipient.email));
const row = async () => (await app.db.select().from(outbox).where(eq(outbox.recipientId, recipient.id)))[0];

it('sends a mail once, also with two workers at the same moment, as text and as escaped HTML', async () => {
  await owe();

  await Promise.all([drainWith(mailer).sendDue(), drainWith(mailer).sendDue()]);
  await drainWith(mailer).sendDue();

  const mails = await received();
  expect(mails).toHaveLength(1);
  expect(mails[0]?.text).toContain(`Comments: ${comments}`);
  expect(mails[0]?.text).toContain('http://localhost:8080/submissions/x');
  expect(mails[0]?.html).toContain('Use &lt;b&gt;Sheet 7&lt;/b&gt; &amp; say');
  expect(await row()).toMatchObject({ sentAt: now, dueAt: null, payload: {} });
});

it('keeps a mail while the mail server is away, and sends it afterwards', async () => {
  await owe();

  expect(await drainWith(mailerToNowhere).sendDue()).toBe(0);

  expect(await received()).toEqual([]);
  expect(await row()).toMatchObject({ attempts: 1, sentAt: null, payload: notice().payload });
  expect(await drainWith(mailer).sendDue()).toBe(0);
  now = new Date(now.getTime() + 2000);
  expect(await drainWith(mailer).sendDue()).toBe(1);
  expect(await received()).toHaveLength(1);
});

it('owes nothing for a change that was rolled back', async () => {
  await expect(owe(true)).rejects.toThrow('the change failed');

  expect(await row()).toBeUndefined();
});
