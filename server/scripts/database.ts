import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir, userInfo } from 'node:os';
import { dirname, join } from 'node:path';
import mysql, { type Pool } from 'mysql2/promise';
import { inheritedEnvironment } from '../environment.ts';
import { type Child, settleEarlierChild, startChild } from './child.ts';
import { requireFreePort } from './port.ts';
import { secretsOf } from './secrets.ts';
import { waitUntil } from './wait-until.ts';

export type Account = { readonly user: string; readonly password: string };

/** A running MariaDB of our own: loopback only, its data in one folder, stopped by whoever started it. */
export type DatabaseServer = {
  readonly host: string;
  readonly port: number;
  readonly socketPath: string;
  /** Changes tables; used by the migrations only. */
  readonly migrate: Account;
  /** Reads and writes rows; what the server runs as. Its rights on tables come with the migrations. */
  readonly app: Account;
  readonly child: Child;
  readonly stop: () => Promise<void>;
};

type Options = {
  /** Absolute. Holds `mariadb/` and `secrets.json`; made when missing. */
  readonly dataFolder: string;
  readonly port: number;
  /** Told each step, one line each. */
  readonly say?: (line: string) => void;
};

/** Owner of the triggers that keep the decision log. Locked: nobody can sign in as it. */
export const definerAccount = "'stemma_definer'@'127.0.0.1'";

// The kernel cuts socket paths at 108 bytes including the closing zero; mariadbd aborts on a longer one.
const LONGEST_SOCKET_PATH = 107;

/** What the decision log and the signatures rely on; `server/main.ts` refuses to run on anything weaker. */
const safetySettings = [
  '--innodb-flush-log-at-trx-commit=1',
  '--innodb-doublewrite=ON',
  '--secure-timestamp=YES',
  '--sql-mode=STRICT_TRANS_TABLES,STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION',
  '--local-infile=0',
  '--idle-write-transaction-timeout=10',
  '--innodb-lock-wait-timeout=5',
  '--innodb-rollback-on-timeout=ON',
  '--innodb-snapshot-isolation=ON',
  '--character-set-server=utf8mb4',
  '--collation-server=utf8mb4_unicode_ci',
  '--default-time-zone=+00:00',
  '--max-allowed-packet=64M',
] as const;

/** Where a program of MariaDB is, or null. `/usr/sbin` is not on everybody's PATH. */
export function findProgram(name: string): string | null {
  const folders = [...(inheritedEnvironment().PATH ?? '').split(':'), '/usr/local/sbin', '/usr/sbin', '/usr/bin'];
  for (const folder of folders) {
    const path = join(folder, name);
    if (folder && existsSync(path)) return path;
  }
  return null;
}

function requireProgram(name: string): string {
  const path = findProgram(name);
  if (path) return path;
  throw new Error(`MariaDB's program ${name} is not on this machine. Install it with: apt-get install mariadb-server`);
}

/** The socket lies beside the data, or in a short private folder when that path would be too long. */
function socketPathFor(folder: string): string {
  const beside = join(folder, 'db.sock');
  if (Buffer.byteLength(beside) <= LONGEST_SOCKET_PATH) return beside;
  const name = `stemma-${userInfo().uid}-${createHash('sha256').update(folder).digest('hex').slice(0, 12)}`;
  const short = join(tmpdir(), name);
  mkdirSync(short, { recursive: true, mode: 0o700 });
  const { uid, mode } = statSync(short);
  // Who owns this folder can reach the root account of the database.
  if (uid !== userInfo().uid || (mode & 0o077) !== 0) {
    throw new Error(`${short} belongs to somebody else or is open to others. Remove it and start again.`);
  }
  return join(short, 'db.sock');
}

/** Its own, since every MariaDB clears the temporary tables of all others out of a folder that they share. */
function temporaryFolder(folder: string): NodeJS.ProcessEnv {
  const own = join(folder, 'tmp');
  mkdirSync(own, { recursive: true });
  return inheritedEnvironment({ TMPDIR: own });
}

function initialise(folder: string, say: (line: string) => void): void {
  const data = join(folder, 'data');
  if (existsSync(data)) return;
  say('Making a new database folder.');
  // A start that was cut off here leaves only the unfinished folder, which the next start replaces.
  const unfinished = join(folder, 'data.unfinished');
  rmSync(unfinished, { recursive: true, force: true });
  const result = spawnSync(
    requireProgram('mariadb-install-db'),
    [
      '--no-defaults',
      `--user=${userInfo().username}`,
      `--datadir=${unfinished}`,
      '--auth-root-authentication-method=normal',
      '--skip-test-db',
      '--skip-name-resolve',
    ],
    { encoding: 'utf8', env: temporaryFolder(folder) },
  );
  if (result.status !== 0) {
    throw new Error(`The database folder could not be made:\n${result.stdout ?? ''}${result.stderr ?? ''}`);
  }
  renameSync(unfinished, data);
}

/** Run by the server before it lets anybody in, so the open root accounts of a new folder are never reachable. */
function accountStatements(migratePassword: string, appPassword: string): string {
  return [
    "DELETE FROM mysql.global_priv WHERE User = '' OR (User = 'root' AND Host <> 'localhost');",
    'FLUSH PRIVILEGES;',
    "CREATE USER IF NOT EXISTS 'stemma_migrate'@'127.0.0.1';",
    `ALTER USER 'stemma_migrate'@'127.0.0.1' IDENTIFIED BY '${migratePassword}';`,
    "GRANT SELECT, INSERT, UPDATE, DELETE, CREATE, DROP, ALTER, INDEX, REFERENCES, TRIGGER, LOCK TABLES ON `stemma%`.* TO 'stemma_migrate'@'127.0.0.1';",
    // Naming the locked definer as owner of a trigger takes this right.
    "GRANT SET USER ON *.* TO 'stemma_migrate'@'127.0.0.1';",
    "CREATE USER IF NOT EXISTS 'stemma_app'@'127.0.0.1';",
    `ALTER USER 'stemma_app'@'127.0.0.1' IDENTIFIED BY '${appPassword}' WITH MAX_STATEMENT_TIME 30;`,
    `CREATE USER IF NOT EXISTS ${definerAccount};`,
    `ALTER USER ${definerAccount} ACCOUNT LOCK;`,
    '',
  ].join('\n');
}

async function accepts(socketPath: string): Promise<boolean> {
  try {
    const connection = await mysql.createConnection({ socketPath, user: 'root', connectTimeout: 2000 });
    await connection.end();
    return true;
  } catch {
    return false;
  }
}

/**
 * Starts MariaDB on its own folder, port and socket and waits until it answers. Works as root and as anybody else.
 *
 * @throws Error with a sentence, and the end of the server's log where it has one.
 */
export async function startDatabaseServer({ dataFolder, port, say = () => {} }: Options): Promise<DatabaseServer> {
  const program = requireProgram('mariadbd');
  const folder = join(dataFolder, 'mariadb');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  chmodSync(folder, 0o700);
  const secrets = secretsOf(dataFolder);
  await settleEarlierChild(folder, 'database', 'The database', say);
  await requireFreePort(port, 'the database', 'STEMMA_DB_PORT');
  initialise(folder, say);

  const socketPath = socketPathFor(folder);
  const initFile = join(folder, 'accounts.sql');
  writeFileSync(initFile, accountStatements(secrets.migratePassword, secrets.appPassword), { mode: 0o600 });

  const child = startChild({
    name: 'database',
    folder,
    command: program,
    args: [
      '--no-defaults',
      `--user=${userInfo().username}`,
      `--datadir=${join(folder, 'data')}`,
      '--bind-address=127.0.0.1',
      `--port=${port}`,
      `--socket=${socketPath}`,
      `--pid-file=${join(folder, 'mariadbd.pid')}`,
      `--init-file=${initFile}`,
      '--skip-name-resolve',
      ...safetySettings,
    ],
    env: temporaryFolder(folder),
    patienceMs: 60_000,
  });
  try {
    await waitUntil(
      () => {
        if (child.hasEnded()) throw new Error(`The database did not start. Its log ends with:\n${child.logTail()}`);
        return accepts(socketPath);
      },
      {
        timeoutMs: 120_000,
        tooLate: () => `The database did not answer within two minutes. Its log ends with:\n${child.logTail()}`,
      },
    );
  } catch (error) {
    await child.stop();
    throw error;
  }
  return {
    host: '127.0.0.1',
    port,
    socketPath,
    migrate: { user: 'stemma_migrate', password: secrets.migratePassword },
    app: { user: 'stemma_app', password: secrets.appPassword },
    child,
    stop: async () => {
      await child.stop();
      if (dirname(socketPath) !== folder) rmSync(dirname(socketPath), { recursive: true, force: true });
    },
  };
}

/** Signs in as the database's root through the socket, which only the folder's owner can reach. */
export function openAdmin(server: Pick<DatabaseServer, 'socketPath'>, database?: string): Pool {
  return mysql.createPool({
    socketPath: server.socketPath,
    user: 'root',
    ...(database ? { database } : {}),
    connectionLimit: 2,
    timezone: 'Z',
    jsonStrings: true,
  });
}

function requireName(name: string): void {
  if (!/^stemma[a-z0-9_]{0,50}$/.test(name)) throw new Error(`"${name}" cannot be the name of a database of Stemma.`);
}

/** Makes an empty database when there is none of this name. */
export async function createDatabase(admin: Pool, name: string): Promise<void> {
  requireName(name);
  await admin.query(`CREATE DATABASE IF NOT EXISTS \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`);
}

export async function dropDatabase(admin: Pool, name: string): Promise<void> {
  requireName(name);
  await admin.query(`DROP DATABASE IF EXISTS \`${name}\``);
}
