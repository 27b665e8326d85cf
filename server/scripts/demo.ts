import { openDatabase } from '../db/database.ts';
import { people } from '../db/schema/people.ts';
import type { LauncherEnvironment } from '../environment.ts';
import type { DatabaseServer } from './database.ts';

/** Fills an installation that has no people yet with the demo; leaves any other as it is. */
export async function seedDemoOnce(
  server: Pick<DatabaseServer, 'host' | 'port' | 'app'>,
  environment: Pick<LauncherEnvironment, 'databaseName' | 'publicAddress'>,
  say: (line: string) => void,
): Promise<void> {
  const db = openDatabase({
    host: server.host,
    port: server.port,
    ...server.app,
    database: environment.databaseName,
    connectionLimit: 2,
  });
  try {
    const anybody = await db.select({ id: people.id }).from(people).limit(1);
    if (anybody.length > 0) return;
    say('Filling in the demo: its people sign in and do their work.');
    // Only now: it loads the whole server, which every other start can do without.
    const { seedDemo } = await import('./demo/seed-demo.ts');
    await seedDemo(db, { publicAddress: environment.publicAddress });
  } finally {
    await db.$client.end();
  }
}
