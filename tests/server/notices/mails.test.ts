import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { mailCatalogue } from '../../../server/notices/catalogue.ts';
import { createMailer, type Mailer } from '../../../server/notices/mailer.ts';
import { type SmtpServer, startSmtpServer } from '../../support/smtp-server.ts';

const to = { name: 'Ada Voss' };
const submission = {
  submissionId: '40000000-0000-4000-8000-000000000001',
  studyTitle: 'Wall transfer',
  targetName: 'k_plant',
  byName: 'Bo Lind',
};

const kinds: readonly [string, Record<string, unknown>, string, readonly string[]][] = [
  [
    'submission-waits',
    { ...submission, note: 'Look at Pr.' },
    `/submissions/${submission.submissionId}`,
    ['Look at Pr.'],
  ],
  [
    'submission-signed',
    { ...submission, meaning: 'approval', snapshotHash: 'ab12' },
    `/submissions/${submission.submissionId}`,
    ['approval', 'ab12'],
  ],
  [
    'submission-returned',
    { ...submission, comments: 'Re is out.' },
    `/submissions/${submission.submissionId}`,
    ['Re is out.'],
  ],
  [
    'submission-withdrawn',
    { ...submission, reason: 'New run.' },
    `/submissions/${submission.submissionId}`,
    ['New run.'],
  ],
  ['person-invited', { token: 'f00d', byName: 'Bo Lind' }, '/password/f00d', ['Ada Voss', 'Bo Lind', '15 characters']],
  ['password-link', { token: 'f00d' }, '/password/f00d', ['two hours']],
];

describe('the catalogue', () => {
  it('has exactly the mails that are checked here', () => {
    expect(Object.keys(mailCatalogue).sort()).toEqual(kinds.map(([kind]) => kind).sort());
  });

  it.each(kinds)('%s says what happened and leads to its page', (kind, payload, path, words) => {
    const mail = mailCatalogue[kind]?.(payload, to);

    expect(mail?.link?.path).toBe(path);
    const text = mail?.paragraphs.join('\n') ?? '';
    for (const word of words) expect(text).toContain(word);
    if ('targetName' in payload) expect(`${mail?.subject} ${text}`).toMatch(/k_plant.*Wall transfer.*Bo Lind/s);
  });

  it.each(kinds)('%s refuses a payload of another shape', (kind) => {
    expect(() => mailCatalogue[kind]?.({ token: 7 }, to)).toThrow();
  });
});

describe('a mail on its way', () => {
  let smtp: SmtpServer;
  let mailer: Mailer;

  beforeEach(async () => {
    smtp = await startSmtpServer();
    mailer = createMailer({
      host: '127.0.0.1',
      port: smtp.port,
      from: 'Stemma <stemma@example.test>',
      publicAddress: 'https://stemma.example.test',
    });
  });
  afterEach(async () => {
    mailer.close();
    await smtp.stop();
  });

  /** As a reader of mail sees it: soft line breaks and encoded bytes undone. */
  const decoded = (text: string) =>
    Buffer.from(
      text
        .replace(/=\r?\n/g, '')
        .replace(/=([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(Number.parseInt(hex, 16))),
      'latin1',
    ).toString('utf8');

  const hostile = '<b onclick="x">k</b> & \'q\'\r\nBcc: evil@example.test\r\n\r\n=cmd|/c';

  async function sent(title: string) {
    const write = mailCatalogue['submission-waits'];
    if (!write) throw new Error('There is no such mail.');
    await mailer.send(write({ ...submission, studyTitle: title, note: title }, to), {
      id: '50000000-0000-4000-8000-000000000001',
      address: 'ada@example.test',
    });
    const [mail] = smtp.taken;
    if (!mail) throw new Error('No mail came.');
    return mail;
  }

  it('gains no header and no recipient from what people wrote', async () => {
    const { to: recipients, text } = await sent(hostile);

    const headers = text.slice(0, text.indexOf('\r\n\r\n'));
    expect(recipients).toEqual(['ada@example.test']);
    expect(headers).not.toMatch(/^Bcc:/im);
    expect(headers.match(/^Subject:/gim)).toHaveLength(1);
  });

  it('shows markup that people wrote as text', async () => {
    const text = decoded((await sent(hostile)).text);
    const html = text.slice(text.indexOf('<!doctype html>'));

    expect(html).toContain('&lt;b onclick=&quot;x&quot;&gt;k&lt;/b&gt; &amp; &#39;q&#39;');
    expect(html).not.toContain('<b ');
  });

  it('keeps Greek letters and superscripts, as plain text and as HTML', async () => {
    const parts = decoded((await sent('Δp, k = 5×10⁻⁵ m/s')).text).split('<!doctype html>');

    expect(parts).toHaveLength(2);
    for (const part of parts) expect(part).toContain('Δp, k = 5×10⁻⁵ m/s');
  });

  it('cuts a subject that is too long', async () => {
    const subject = /^Subject: (.*(?:\r\n .*)*)/m.exec((await sent('x'.repeat(5000))).text)?.[1] ?? '';

    expect(subject.length).toBeGreaterThan(50);
    expect(subject.length).toBeLessThan(300);
  });
});
