import type { LauncherEnvironment } from '../environment.ts';
import { type DatabaseServer, startDatabaseServer } from './database.ts';
import { seedDemoOnce } from './demo.ts';
import { installMissing, mariadbServer } from './install-debian.ts';
import { type MailCatcher, startMailCatcher } from './mail-catcher.ts';
import { prepareDatabase } from './prepare-database.ts';
import type { Launch } from './run-until-stopped.ts';

/** Starts what the server needs around it: the database with its tables up to date, the mail catcher, the demo. */
export async function startSurroundings(
  environment: LauncherEnvironment,
  { say, keep }: Launch,
): Promise<{ readonly database: DatabaseServer; readonly mail: MailCatcher }> {
  const { dataFolder, databaseName } = environment;
  installMissing([mariadbServer], say);
  say(`Starting the database on port ${environment.databasePort} with its data in ${dataFolder}.`);
  const database = await keep('The database', () =>
    startDatabaseServer({ dataFolder, port: environment.databasePort, say }),
  );
  say('Bringing its tables up to date.');
  await prepareDatabase(database, databaseName);
  say(`Starting the mail catcher on port ${environment.smtpPort}.`);
  const mail = await keep('The mail catcher', () =>
    startMailCatcher({
      dataFolder,
      smtpPort: environment.smtpPort,
      pagePort: environment.mailPagePort,
      say,
    }),
  );
  if (environment.withDemo) await seedDemoOnce(database, environment, say);
  return { database, mail };
}
