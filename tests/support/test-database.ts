import { randomUUID } from 'node:crypto';
import type { Pool } from 'mysql2/promise';
import { inject } from 'vitest';
import { type Database, type DatabaseAddress, openDatabase } from '../../server/db/database.ts';
import { dropDatabase, openAdmin } from '../../server/scripts/database.ts';
import { prepareDatabase } from '../../server/scripts/prepare-database.ts';
import type { TestDatabaseServer } from './database-setup.ts';

export type FreshDatabase = {
  /** Signed in as the server's account. */
  readonly db: Database;
  /** Signed in as the database's root, in this database. */
  readonly admin: Pool;
  /** For a second connection as the server's account. */
  readonly address: DatabaseAddress;
  readonly drop: () => Promise<void>;
};

/** A database of its own, made by the migrations, on the MariaDB of this test run or on one that the test may stop. */
export async function freshDatabase(server: TestDatabaseServer = inject('databaseServer')): Promise<FreshDatabase> {
  const name = `stemma_test_${randomUUID().replaceAll('-', '')}`;
  await prepareDatabase(server, name);
  const { host, port } = server;
  const address: DatabaseAddress = { host, port, ...server.app, database: name };
  const db = openDatabase(address);
  const admin = openAdmin(server, name);
  return {
    db,
    admin,
    address,
    drop: async () => {
      await db.$client.end();
      await dropDatabase(admin, name);
      await admin.end();
    },
  };
}
