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

/** Opens a pool with the settings that the rest of the server relies on: UTC, strict mode, JSON as text. */
export function openDatabase(address: DatabaseAddress): Database {
  const client = mysql.createPool({
    ...address,
    connectionLimit: address.connectionLimit ?? 10,
    timezone: 'Z',
    charset: 'utf8mb4_unicode_ci',
    jsonStrings: true,
    supportBigNumbers: true,
    dateStrings: ['DATETIME(6)'] as never,
    connectTimeout: 5000,
  });
  return drizzle({ client }) as unknown as Database;
}
