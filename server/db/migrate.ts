import { join } from 'node:path';
import { drizzle } from 'drizzle-orm/mysql2';
import { migrate } from 'drizzle-orm/mysql2/migrator';
import mysql from 'mysql2/promise';
import type { DatabaseAddress } from './database.ts';

const migrationsFolder = join(import.meta.dirname, '../../migrations');

/**
 * Applies the migrations that the database lacks, as the account that may change tables.
 * Two starts at once would both apply them, so a named lock lets one through at a time.
 *
 * @throws Error when another process holds the lock for more than a minute, or a migration fails.
 */
export async function migrateDatabase(address: DatabaseAddress): Promise<void> {
  const { connectionLimit: _unused, ...target } = address;
  const connection = await mysql.createConnection({ ...target, timezone: 'Z', charset: 'utf8mb4_unicode_ci' });
  const lock = `stemma-migrate-${address.database}`.slice(0, 64);
  try {
    const [rows] = await connection.query<mysql.RowDataPacket[]>('SELECT GET_LOCK(?, 60) AS held', [lock]);
    if (rows[0]?.held !== 1) throw new Error('Another process has been migrating this database for over a minute.');
    await migrate(drizzle({ client: connection }), { migrationsFolder });
    await connection.query('SELECT RELEASE_LOCK(?)', [lock]);
  } finally {
    await connection.end();
  }
}
