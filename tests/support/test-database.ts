import { randomUUID } from 'node:crypto';
import type { Pool } from 'mysql2/promise';
import { inject } from 'vitest';
import { type Database, type DatabaseAddress, openDatabase } from '../../server/db/database.ts';
import { applyGrants } from '../../server/db/grants.ts';
import { migrateDatabase } from '../../server/db/migrate.ts';
import { createDatabase, dropDatabase, openAdmin } from '../../server/scripts/database.ts';

export type FreshDatabase = {
  /** Signed in as the server's account. */
  readonly db: Database;
  /** Signed in as the database's root, in this database. */
  readonly admin: Pool;
  /** For a second connection as the server's account. */
  readonly address: DatabaseAddress;
  readonly drop: () => Promise<void>;
};

/** A database of its own, made by the migrations, on the MariaDB of this test run. */
export async function freshDatabase(): Promise<FreshDatabase> {
  const server = inject('databaseServer');
  const name = `stemma_test_${randomUUID().replaceAll('-', '')}`;
  const admin = openAdmin(server, undefined);
  try {
    await createDatabase(admin, name);
  } finally {
    await admin.end();
  }
  const ownAdmin = openAdmin(server, name);
  const { host, port } = server;
  await migrateDatabase({ host, port, ...server.migrate, database: name });
  await applyGrants(ownAdmin, name);
  const address: DatabaseAddress = { host, port, ...server.app, database: name };
  const db = openDatabase(address);
  return {
    db,
    admin: ownAdmin,
    address,
    drop: async () => {
      await db.$client.end();
      await dropDatabase(ownAdmin, name);
      await ownAdmin.end();
    },
  };
}
