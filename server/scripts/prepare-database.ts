import { applyGrants } from '../db/grants.ts';
import { migrateDatabase } from '../db/migrate.ts';
import { createDatabase, type DatabaseServer, openAdmin } from './database.ts';

/** Makes the database when there is none, applies the migrations it lacks and the rights that follow from them. */
export async function prepareDatabase(
  server: Pick<DatabaseServer, 'host' | 'port' | 'socketPath' | 'migrate'>,
  name: string,
): Promise<void> {
  const admin = openAdmin(server);
  try {
    await createDatabase(admin, name);
    await migrateDatabase({ host: server.host, port: server.port, ...server.migrate, database: name });
    await applyGrants(admin, name);
  } finally {
    await admin.end();
  }
}
