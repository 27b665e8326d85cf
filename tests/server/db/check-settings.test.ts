import { userInfo } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { unsafeSettings } from '../../../server/db/check-settings.ts';
import { openDatabase } from '../../../server/db/database.ts';
import { startAppServer } from '../../../server/scripts/app-server.ts';
import { type Child, startChild } from '../../../server/scripts/child.ts';
import { findProgram } from '../../../server/scripts/database.ts';
import { findFreePort } from '../../../server/scripts/port.ts';
import { prepareDatabase } from '../../../server/scripts/prepare-database.ts';
import { waitUntil } from '../../../server/scripts/wait-until.ts';
import { type PrivateDatabase, privateDatabase } from '../../support/private-database.ts';

let database: PrivateDatabase;
let bare: Child | null = null;

const address = () => {
  const { host, port, app } = database.server();
  return { host, port, ...app, database: 'stemma' };
};

async function sentences(): Promise<string[]> {
  const db = openDatabase(address());
  try {
    return await unsafeSettings(db);
  } finally {
    await db.$client.end();
  }
}

beforeAll(async () => {
  database = await privateDatabase();
  await prepareDatabase(database.server(), 'stemma');
});
afterAll(async () => {
  await bare?.stop();
  await database.remove();
});

/** The same data on a MariaDB as it is without our settings, with some set worse than its defaults. */
async function startBare(): Promise<void> {
  const { port, socketPath } = database.server();
  await database.stop();
  bare = startChild({
    name: 'bare',
    folder: join(database.dataFolder, 'mariadb'),
    command: findProgram('mariadbd') ?? '',
    args: [
      '--no-defaults',
      `--user=${userInfo().username}`,
      `--datadir=${join(database.dataFolder, 'mariadb/data')}`,
      '--bind-address=127.0.0.1',
      `--port=${port}`,
      `--socket=${socketPath}`,
      '--skip-name-resolve',
      '--innodb-flush-log-at-trx-commit=2',
      '--innodb-doublewrite=OFF',
      '--sql-mode=',
      '--character-set-server=latin1',
      '--collation-server=latin1_swedish_ci',
      '--log-bin',
    ],
  });
  await waitUntil(
    () =>
      sentences().then(
        () => true,
        () => false,
      ),
    { timeoutMs: 60_000, tooLate: () => `The bare database did not start:\n${bare?.logTail()}` },
  );
}

it('accepts the database that our scripts start', async () => {
  expect(await sentences()).toEqual([]);
});

it('names every setting that the record cannot rely on, its value and what would happen, and refuses to start', async () => {
  await startBare();

  const unsafe = await sentences();

  const named = unsafe.map((sentence) => /^MariaDB's (\w+) (is|must be) /.exec(sentence)?.[1]);
  expect(named.sort()).toEqual([
    'character_set_server',
    'idle_write_transaction_timeout',
    'innodb_doublewrite',
    'innodb_flush_log_at_trx_commit',
    'innodb_lock_wait_timeout',
    'innodb_rollback_on_timeout',
    'innodb_snapshot_isolation',
    'local_infile',
    'secure_timestamp',
    'sql_mode',
    'sync_binlog',
  ]);
  expect(unsafe).toContain(
    "MariaDB's innodb_flush_log_at_trx_commit is 2; it must be 1, or a power cut would lose changes that were confirmed.",
  );

  const printed: string[] = [];
  const { port, app } = database.server();
  const appPort = await findFreePort();
  const start = startAppServer({
    dataFolder: database.dataFolder,
    port: appPort,
    publicAddress: `http://127.0.0.1:${appPort}`,
    database: { port, ...app, name: 'stemma' },
    smtpPort: await findFreePort(),
    sessionSecret: 's'.repeat(32),
    mode: 'production',
    say: (line) => printed.push(line),
  });
  await expect(start).rejects.toThrow('did not start');
  expect(printed).toEqual(unsafe);
});
