import { randomUUID } from 'node:crypto';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { RowDataPacket } from 'mysql2';
import { expect, inject, it } from 'vitest';
import { migrateDatabase } from '../../../server/db/migrate.ts';
import { createDatabase, dropDatabase, openAdmin } from '../../../server/scripts/database.ts';

const written = readdirSync(join(import.meta.dirname, '../../../migrations')).filter((name) => name.endsWith('.sql'));

it('applies each migration once when three servers start at the same moment, and nothing when one starts again', async () => {
  const server = inject('databaseServer');
  const name = `stemma_test_${randomUUID().replaceAll('-', '')}`;
  const admin = openAdmin(server);
  await createDatabase(admin, name);
  const migrate = () => migrateDatabase({ host: server.host, port: server.port, ...server.migrate, database: name });
  try {
    await Promise.all([migrate(), migrate(), migrate()]);
    await migrate();

    const [rows] = await admin.query<RowDataPacket[]>(`SELECT hash FROM \`${name}\`.__drizzle_migrations`);
    expect(rows).toHaveLength(written.length);
    const [triggers] = await admin.query<RowDataPacket[]>(
      'SELECT trigger_name FROM information_schema.triggers WHERE trigger_schema = ?',
      [name],
    );
    expect(triggers).toHaveLength(5);
  } finally {
    await dropDatabase(admin, name);
    await admin.end();
  }
});
