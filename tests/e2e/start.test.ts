import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { findFreePort } from '../../server/scripts/port.ts';

const bootstrap = join(import.meta.dirname, '../../server/scripts/bootstrap.mjs');
let dataFolder: string;
let settings: Record<string, string>;
const running = new Set<ChildProcess>();

type Start = {
  readonly printed: () => string;
  /** Resolves when a line contains the text; rejects when the script ends first. */
  readonly until: (text: string) => Promise<void>;
  readonly end: (signal: NodeJS.Signals) => Promise<number | null>;
  readonly ended: Promise<number | null>;
};

/** `npm start` without npm, on ports and in a folder of its own. */
function start(more: Record<string, string> = {}): Start {
  const script = spawn(process.execPath, [bootstrap, 'start'], {
    env: { PATH: process.env.PATH, HOME: process.env.HOME, ...settings, ...more },
  });
  running.add(script);
  let printed = '';
  const watchers = new Set<() => void>();
  const take = (chunk: Buffer) => {
    printed += chunk.toString('utf8');
    for (const watcher of watchers) watcher();
  };
  script.stdout.on('data', take);
  script.stderr.on('data', take);
  const ended = new Promise<number | null>((resolve) =>
    script.once('exit', (code) => {
      running.delete(script);
      resolve(code);
    }),
  );
  return {
    printed: () => printed,
    ended,
    until: (text) =>
      new Promise((resolve, reject) => {
        const look = () => {
          if (printed.includes(text)) resolve();
        };
        watchers.add(look);
        look();
        void ended.then(() => reject(new Error(`It ended before it said "${text}":\n${printed}`)));
      }),
    end: (signal) => {
      script.kill(signal);
      return ended;
    },
  };
}

/** Processes that mention the data folder on their command line or in their environment. */
function processesOfFolder(): string[] {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .filter((pid) => {
      try {
        const text = ['cmdline', 'environ'].map((file) => readFileSync(`/proc/${pid}/${file}`, 'utf8')).join('\0');
        return text.includes(dataFolder);
      } catch {
        return false;
      }
    });
}

beforeEach(async () => {
  dataFolder = mkdtempSync(join(tmpdir(), 'stemma-start-'));
  settings = {
    STEMMA_DATA: dataFolder,
    STEMMA_DEMO: 'no',
    STEMMA_PORT: String(await findFreePort()),
    STEMMA_DB_PORT: String(await findFreePort()),
    STEMMA_SMTP_PORT: String(await findFreePort()),
    STEMMA_MAIL_PORT: String(await findFreePort()),
  };
});

afterEach(async () => {
  for (const script of running) {
    const ended = new Promise((resolve) => script.once('exit', resolve));
    script.kill('SIGTERM');
    await ended;
  }
  rmSync(dataFolder, { recursive: true, force: true });
});

describe('npm start', () => {
  it('ends with the address of a running product, keeps the data over a restart and stops all it started', async () => {
    const address = `http://127.0.0.1:${settings.STEMMA_PORT}`;

    const first = start();
    await first.until(`Stemma runs at ${address}`);
    const page = await fetch(address, { headers: { accept: 'text/html' } });
    const mailPage = await fetch(`http://127.0.0.1:${settings.STEMMA_MAIL_PORT}`, { headers: { accept: 'text/html' } });
    const setUpLink = /http:\/\/\S*token\S*|http:\/\/\S*set-?up\S*/i.exec(first.printed())?.[0];
    const firstCode = await first.end('SIGINT');
    const leftRunning = processesOfFolder();
    const second = start();
    await second.until(`Stemma runs at ${address}`);
    const session = await fetch(`${address}/api/session`).then((reply) => reply.json());
    await second.end('SIGTERM');

    expect(page.status).toBe(200);
    expect(await page.text()).toContain('<div id="root">');
    expect(mailPage.status).toBe(200);
    expect(setUpLink).toContain(address);
    expect(firstCode).toBe(0);
    expect(leftRunning).toEqual([]);
    expect(second.printed()).not.toContain('Making a new database folder');
    expect(session).toMatchObject({ actor: null, needsSetup: true });
    expect(processesOfFolder()).toEqual([]);
  });

  it('refuses a wrong setting before it starts anything', async () => {
    const refused = start({ STEMMA_DEMO: 'perhaps' });

    expect(await refused.ended).toBe(1);
    expect(refused.printed().trim()).toBe('STEMMA_DEMO must be yes or no, but it is "perhaps".');
    expect(readdirSync(dataFolder)).toEqual([]);
  });

  it('says so when the same folder is already in use, and leaves the running product alone', async () => {
    const first = start();
    await first.until('Stemma runs at');

    const second = start();

    expect(await second.ended).toBe(1);
    expect(second.printed()).toContain('The database of this folder already runs');
    expect((await fetch(`http://127.0.0.1:${settings.STEMMA_PORT}/api/session`)).status).toBe(200);
  });

  it('brings the database back when it is killed, and gives up with the reason when that keeps happening', async () => {
    const product = start();
    await product.until('Stemma runs at');
    const databasePid = () => Number(readFileSync(join(dataFolder, 'mariadb/database.process'), 'utf8').split(' ')[0]);

    process.kill(databasePid(), 'SIGKILL');
    await product.until('The database runs again.');
    const session = await fetch(`http://127.0.0.1:${settings.STEMMA_PORT}/api/session`);
    process.kill(databasePid(), 'SIGKILL');

    expect(session.status).toBe(200);
    expect(await product.ended).toBe(1);
    expect(product.printed().trim()).toMatch(/The database ended by itself\. Its log ends with:\n\S/);
    expect(processesOfFolder()).toEqual([]);
  });
});
