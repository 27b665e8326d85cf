import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { noncePlaceholder } from '../../../server/http/pages.ts';
import type { Caller } from '../../../server/scripts/api-caller.ts';
import { invitePerson, listPeople } from '../../../shared/api/people.ts';
import { problemSchema } from '../../../shared/api/problem.ts';
import { signIn } from '../../../shared/api/session.ts';
import { createStudy, getStudy } from '../../../shared/api/studies.ts';
import { addTest } from '../../../shared/api/tests.ts';
import { person, testPassword } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let caller: Caller;
let email: string;
let folder: string;
const log: string[] = [];

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'stemma-pages-'));
  await writeFile(join(folder, 'index.html'), `<style nonce="${noncePlaceholder}"></style>`);
  app = await startTestApp({ clientFolder: folder, writeLog: (line) => log.push(line) });
  ({ email } = await person(app.db, { isAdministrator: true }));
  caller = await app.as({ email });
});
afterAll(async () => {
  await app.stop();
  await rm(folder, { recursive: true, force: true });
});

const json = { 'content-type': 'application/json' };
const studyBody = JSON.stringify({ title: 'Wall transfer', question: '' });
const post = (headers: Record<string, string>, body = studyBody, path = '/api/studies') =>
  caller.fetch(path, { method: 'POST', headers, body });
async function problemOf(response: Response) {
  return problemSchema.parse(await response.json());
}

describe('a write that another site makes a browser send', () => {
  const foreign: Record<string, string>[] = [
    { 'sec-fetch-site': 'cross-site' },
    { 'sec-fetch-site': 'same-site' },
    { origin: 'https://elsewhere.example' },
    { origin: 'null' },
    { origin: 'https://elsewhere.example', 'sec-fetch-site': 'same-origin' },
  ];

  it.each(foreign)('is refused and not carried out: %o', async (headers) => {
    const response = await post({ ...json, ...headers });

    expect(response.status).toBe(403);
    expect((await problemOf(response)).sentence).toBe('This came from another site and was not carried out.');
  });

  it('is refused on every address that writes, also without a session', async () => {
    const writes: [string, string][] = [
      ['POST', '/api/session'],
      ['DELETE', '/api/session'],
      ['POST', '/api/setup'],
      ['POST', '/api/passwords'],
      ['POST', '/api/people'],
      ['PUT', '/api/people/x'],
    ];
    for (const [method, path] of writes) {
      const response = await app.anonymous.fetch(path, {
        method,
        headers: { ...json, origin: 'https://elsewhere.example' },
      });
      expect([path, response.status]).toEqual([path, 403]);
    }
  });

  it('is no write of our own pages, nor of a script without a browser', async () => {
    const own = await post({ ...json, origin: app.address, 'sec-fetch-site': 'same-origin' });
    const script = await post(json);

    expect([own.status, script.status]).toEqual([200, 200]);
  });
});

describe('what cannot be used', () => {
  it('is named field by field, in a sentence', async () => {
    const reply = await caller.call(invitePerson, {
      body: { name: '  ', email: 'nobody', isAdministrator: 'yes', isAuditor: false } as never,
    });

    expect(reply.status).toBe(400);
    expect(reply.problem.code).toBe('invalid');
    expect(Object.keys(reply.problem.fields as object).sort()).toEqual([
      'body.email',
      'body.isAdministrator',
      'body.name',
    ]);
    expect(reply.problem.fields).toMatchObject({ 'body.email': 'Enter one address such as name@example.test.' });
  });

  const unreadable: [string, Record<string, string>, string][] = [
    ['broken JSON', json, '{"title": '],
    ['a text', { 'content-type': 'text/plain' }, studyBody],
    ['a form', { 'content-type': 'application/x-www-form-urlencoded' }, 'title=x&question='],
    ['nothing', {}, ''],
    ['a list', json, '[]'],
    ['a number', json, '7'],
    ['deep nesting', json, '['.repeat(49_000) + ']'.repeat(49_000)],
    ['a number for a text', json, '{"title": 0, "question": ""}'],
    ['a prototype', json, '{"__proto__": {"title": "x", "question": ""}}'],
    ['an unknown character set', { 'content-type': 'application/json; charset=klingon' }, studyBody],
    ['a broken compression', { ...json, 'content-encoding': 'gzip' }, studyBody],
  ];

  it.each(unreadable)('is refused: %s', async (_what, headers, body) => {
    const response = await post(headers, body);

    expect(response.status).toBe(400);
    expect((await problemOf(response)).sentence).not.toBe('');
  });

  it('is an id that is none, as a number or with something after it', async () => {
    for (const studyId of ['0', '1 or 1=1', '1abc', '00000000-0000-4000-8000-00000000000x']) {
      expect((await caller.call(getStudy, { params: { studyId } })).status).toBe(400);
    }
  });

  it('is more than two megabytes at once, and the sentence says the limit', async () => {
    const response = await post(json, JSON.stringify({ title: 'x'.repeat(2_100_000), question: '' }));

    expect(response.status).toBe(413);
    expect((await problemOf(response)).sentence).toContain('2 MB');
  });

  it('is a file over the limit, and the sentence says the limit and what to do', async () => {
    const { maxBytes } = addTest.upload ?? { maxBytes: 0 };
    const study = await caller.call(createStudy, { body: { title: 'Wall transfer', question: '' } });

    const reply = await caller.call(addTest, {
      params: { studyId: study.body.id },
      file: { name: 'rig.csv', content: new Uint8Array(maxBytes + 1) },
    });

    expect(reply.status).toBe(413);
    expect(reply.problem.sentence).toContain(`${maxBytes / 1e6} MB`);
    expect(reply.problem.sentence).toContain('Split it');
  });

  it('is an upload without a file or with an unreadable form', async () => {
    const study = await caller.call(createStudy, { body: { title: 'Wall transfer', question: '' } });
    const path = `/api/studies/${study.body.id}/tests`;
    const form = new FormData();
    form.set('body', 'not json');
    form.set('file', new Blob(['a,b']), 'rig.csv');

    const without = await caller.fetch(path, { method: 'POST' });
    const unreadableForm = await caller.fetch(path, { method: 'POST', body: form });

    expect([without.status, unreadableForm.status]).toEqual([400, 400]);
    expect((await problemOf(without)).sentence).toBe('Choose a file to upload.');
  });
});

describe('an address', () => {
  it.each(['/api/none', '/api/studies/x/none', '/assets/none.js'])(
    'that is none is answered in JSON: %s',
    async (path) => {
      const response = await caller.fetch(path);

      expect(response.status).toBe(404);
      expect(await problemOf(response)).toEqual({ code: 'not found', sentence: 'There is nothing at this address.' });
    },
  );

  it('that is malformed is refused, not an error of ours', async () => {
    expect((await caller.fetch('/api/studies/%E0%A4%A')).status).toBe(400);
  });

  it('takes the session from the cookie and from nothing else', async () => {
    expect((await app.anonymous.call(listPeople)).problem).toEqual({
      code: 'signed out',
      sentence: 'Sign in to go on.',
    });
  });
});

describe('every answer', () => {
  it('forbids scripts of others, framing, guessing of types and keeping of data', async () => {
    for (const path of ['/api/session', '/api/none', '/', '/studies/1', '/healthz', '/assets/none.js']) {
      const { headers } = await caller.fetch(path);
      const policy = headers.get('content-security-policy') ?? '';

      expect(policy).toContain("default-src 'none'");
      expect(policy).toContain("script-src 'self';");
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy).not.toContain('unsafe');
      expect(headers.get('x-content-type-options')).toBe('nosniff');
      expect(headers.get('x-powered-by')).toBeNull();
      if (path.startsWith('/api')) expect(headers.get('cache-control')).toBe('no-store');
    }
  });

  it('gives each page a nonce of its own, the same in its header and its text', async () => {
    const nonces = await Promise.all(
      ['/', '/studies/1'].map(async (path) => {
        const response = await caller.fetch(path);
        const nonce = /'nonce-([^']+)'/.exec(response.headers.get('content-security-policy') ?? '')?.[1] ?? '';
        expect(await response.text()).toBe(`<style nonce="${nonce}"></style>`);
        return nonce;
      }),
    );

    expect(nonces[0]).not.toBe(nonces[1]);
  });
});

describe('an error of ours', () => {
  it('is told without detail and logged in full, without what was typed', async () => {
    await app.fresh.admin.query(
      "CREATE TRIGGER broken BEFORE INSERT ON people FOR EACH ROW SIGNAL SQLSTATE '45000' SET MYSQL_ERRNO = 31999, MESSAGE_TEXT = 'broken'",
    );
    log.length = 0;
    const secret = 'quite.a.secret@example.test';
    const body = { name: 'Bo Lind', email: secret, isAdministrator: false, isAuditor: false };
    const reply = await caller.call(invitePerson, { body });
    await app.fresh.admin.query('DROP TRIGGER broken');

    expect(reply.status).toBe(500);
    expect(reply.body).toEqual({
      code: 'unexpected',
      sentence: 'Something went wrong on the server. Reload to see what was saved.',
    });
    const line = log.find((entry) => entry.includes('"msg":"unexpected"')) ?? '';
    expect(line).toContain('insert into `people`');
    expect(line).toContain('"errno":31999');
    expect(line).toMatch(/at .*people-routes\.ts/);
    expect(log.join('')).not.toContain(secret);
  });

  it('leaves no password and no cookie in the log of requests', async () => {
    log.length = 0;
    const reply = await app.anonymous.call(signIn, { body: { email, password: testPassword } });
    await caller.call(listPeople);

    const text = log.join('');
    expect(text).toContain('"url":"/api/session"');
    expect(text).not.toContain(testPassword);
    expect(text).not.toContain((reply.headers.get('set-cookie') ?? 'none').slice(8, 40));
    expect(text).not.toContain(caller.cookie.slice(8, 40));
  });
});
