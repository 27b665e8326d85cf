import { Socket } from 'node:net';
import { drizzle, type MySql2Database } from 'drizzle-orm/mysql2';
import mysql, { type Pool } from 'mysql2/promise';

export type Database = MySql2Database & { readonly $client: Pool };
export type Transaction = Parameters<Parameters<MySql2Database['transaction']>[0]>[0];
/** What a query gets: it can only select. */
export type Reader = Pick<MySql2Database, 'select' | 'selectDistinct'>;

export type DatabaseAddress = {
  readonly host: string;
  readonly port: number;
  readonly user: string;
  readonly password: string;
  readonly database: string;
  readonly connectionLimit?: number;
};

/**
 * How long a connection in use may say nothing before it counts as lost. MariaDB gives up a statement one second
 * earlier, so only a server that hangs or is cut off gets this far. A request then ends within ten seconds.
 */
const silenceMs = 5000;
const statementSeconds = 4;
const lockWaitSeconds = 3;

/** Of a connection over TCP; the driver's types leave it out. */
function socketOf(connection: object): Socket {
  if ('stream' in connection && connection.stream instanceof Socket) return connection.stream;
  throw new Error('This version of the database driver hides its socket, so silence cannot be noticed.');
}

/** Opens a pool with the settings that the rest of the server relies on: UTC, JSON as text, no wait without an end. */
export function openDatabase(address: DatabaseAddress): Database {
  const client = mysql.createPool({
    ...address,
    connectionLimit: address.connectionLimit ?? 10,
    timezone: 'Z',
    charset: 'utf8mb4_unicode_ci',
    jsonStrings: true,
    supportBigNumbers: true,
    dateStrings: ['DATETIME(6)'] as never,
    connectTimeout: 3000,
  });
  client.pool.on('connection', (connection) => {
    const socket = socketOf(connection);
    socket.on('timeout', () => {
      socket.destroy(Object.assign(new Error('The database fell silent.'), { code: 'ETIMEDOUT' }));
    });
    // A failure ends the connection, which the statement queued behind this one reports.
    connection.query(
      `SET SESSION max_statement_time = ${statementSeconds}, innodb_lock_wait_timeout = ${lockWaitSeconds}`,
      () => undefined,
    );
  });
  client.pool.on('acquire', (connection) => socketOf(connection).setTimeout(silenceMs));
  client.pool.on('release', (connection) => socketOf(connection).setTimeout(0));
  return drizzle({ client }) as unknown as Database;
}
