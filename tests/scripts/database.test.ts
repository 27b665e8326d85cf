import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import mysql from 'mysql2/promise';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createDatabase, type DatabaseServer, openAdmin, startDatabaseServer } from '../../server/scripts/database.ts';
import { findFreePort } from '../../server/scripts/port.ts';
import { startOfProcess } from '../../server/scripts/process-identity.ts';

let dataFolder: string;
const started: DatabaseServer[] = [];

async function start(folder = dataFolder): Promise<DatabaseServer> {
  const server = await startDatabaseServer({ dataFolder: folder, port: await findFreePort() });
  started.push(server);
  return server;
}

async function rows(server: DatabaseServer, sql: string): Promise<readonly Record<string, unknown>[]> {
  const admin = openAdmin(server);
  try {
    const [found] = await admin.query(sql);
    return Array.isArray(found) ? (found as Record<string, unknown>[]) : [];
  } finally {
    await admin.end();
  }
}

beforeEach(() => {
  dataFolder = mkdtempSync(join(tmpdir(), 'stemma-db-'));
});

afterEach(async () => {
  for (const server of started.splice(0)) await server.stop();
  rmSync(dataFolder, { recursive: true, force: true });
});

describe('the private database', () => {
  it('keeps its data over a stop and a start, and leaves no process behind', async () => {
    const first = await start();
    const admin = openAdmin(first);
    await createDatabase(admin, 'stemma');
    await admin.query('CREATE TABLE stemma.kept (value INT)');
    await admin.query('INSERT INTO stemma.kept VALUES (7)');
    await admin.end();

    await first.stop();
    const afterStop = startOfProcess(first.child.pid);
    const second = await start();

    expect(afterStop).toBeNull();
    expect(await rows(second, 'SELECT value FROM stemma.kept')).toEqual([{ value: 7 }]);
  });

  it('comes back with everything committed after its process was killed', async () => {
    const first = await start();
    const admin = openAdmin(first);
    await createDatabase(admin, 'stemma');
    await admin.query('CREATE TABLE stemma.kept (value INT)');
    await admin.query('INSERT INTO stemma.kept VALUES (8)');
    await admin.end();

    process.kill(first.child.pid, 'SIGKILL');
    await first.child.ended;
    const second = await start();

    expect(await rows(second, 'SELECT value FROM stemma.kept')).toEqual([{ value: 8 }]);
  });

  it('starts past a record of an earlier start whose process number now belongs to another program', async () => {
    const first = await start();
    await first.stop();
    writeFileSync(join(dataFolder, 'mariadb/database.process'), `${process.pid} 1 ${process.pid} 1\n`);

    const second = await start();

    expect(await rows(second, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
  });

  it('refuses a second start on the same folder, naming the process that runs', async () => {
    const first = await start();

    await expect(start()).rejects.toThrow(`The database of this folder already runs (process ${first.child.pid})`);
  });

  it('refuses a taken port with a sentence that names the variable to change', async () => {
    const other = createServer();
    const port = await new Promise<number>((resolve) =>
      other.listen(0, '127.0.0.1', () => {
        const address = other.address();
        resolve(address && typeof address === 'object' ? address.port : 0);
      }),
    );

    try {
      await expect(startDatabaseServer({ dataFolder, port })).rejects.toThrow(
        new RegExp(`^Port ${port}, meant for the database, is taken.*STEMMA_DB_PORT=`),
      );
    } finally {
      await new Promise((resolve) => other.close(resolve));
    }
  });

  it('shows the end of the log when the server cannot start', async () => {
    const first = await start();
    await first.stop();
    writeFileSync(join(dataFolder, 'mariadb/data/ibdata1'), 'not a tablespace');

    await expect(start()).rejects.toThrow(/The database did not start\. Its log ends with:\n.*InnoDB/s);
  });

  it('lets nobody in over TCP as root, and nobody at all without a password', async () => {
    const { host, port } = await start();

    const attempts = ['root', 'stemma_app', 'stemma_migrate', 'stemma_definer', ''].map((user) =>
      mysql.createConnection({ host, port, user }).then(
        () => 'let in',
        (error: { errno?: number }) => error.errno,
      ),
    );

    const denied = 1045;
    const locked = 4151;
    expect(await Promise.all(attempts)).toEqual([denied, denied, denied, expect.toBeOneOf([denied, locked]), denied]);
  });

  it('keeps folder and passwords to its owner', async () => {
    await start();

    const modes = ['', 'secrets.json', 'mariadb', 'mariadb/accounts.sql'].map((path) =>
      (statSync(join(dataFolder, path)).mode & 0o777).toString(8),
    );

    expect(modes).toEqual(['700', '600', '700', '600']);
  });

  it('works in a folder whose path is too long for a socket', async () => {
    const server = await start(join(dataFolder, 'a'.repeat(100)));

    expect(Buffer.byteLength(server.socketPath)).toBeLessThanOrEqual(107);
    expect(await rows(server, 'SELECT 1 AS one')).toEqual([{ one: 1 }]);
  });

  it('runs with the settings that the decision log and the signatures rely on', async () => {
    const server = await start();

    const found = await rows(
      server,
      `SHOW GLOBAL VARIABLES WHERE Variable_name IN ('innodb_flush_log_at_trx_commit', 'innodb_doublewrite',
       'secure_timestamp', 'local_infile', 'idle_write_transaction_timeout', 'innodb_lock_wait_timeout',
       'innodb_rollback_on_timeout', 'innodb_snapshot_isolation', 'character_set_server', 'time_zone',
       'max_allowed_packet', 'sql_mode', 'bind_address')`,
    );

    const settings = Object.fromEntries(found.map((row) => [row.Variable_name, row.Value]));
    expect(settings).toEqual({
      innodb_flush_log_at_trx_commit: '1',
      innodb_doublewrite: 'ON',
      secure_timestamp: 'YES',
      local_infile: 'OFF',
      idle_write_transaction_timeout: '10',
      innodb_lock_wait_timeout: '5',
      innodb_rollback_on_timeout: 'ON',
      innodb_snapshot_isolation: 'ON',
      character_set_server: 'utf8mb4',
      time_zone: '+00:00',
      max_allowed_packet: String(64 * 1024 * 1024),
      sql_mode: expect.stringContaining('STRICT_TRANS_TABLES'),
      bind_address: '127.0.0.1',
    });
  });

  it('says what to do about a damaged file of secrets instead of making new ones', async () => {
    const first = await start();
    await first.stop();
    writeFileSync(join(dataFolder, 'secrets.json'), '{');

    await expect(start()).rejects.toThrow(/secrets\.json is damaged/);
    expect(readFileSync(join(dataFolder, 'secrets.json'), 'utf8')).toBe('{');
  });
});
