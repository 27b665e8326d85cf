import { readLauncherEnvironment } from '../environment.ts';
import { startAppServer } from './app-server.ts';
import { buildClient } from './build-client.ts';
import { runUntilStopped } from './run-until-stopped.ts';
import { secretsOf } from './secrets.ts';
import { startSurroundings } from './surroundings.ts';

await runUntilStopped(async ({ say, keep }) => {
  const environment = readLauncherEnvironment();
  const { database, mail } = await startSurroundings(environment, { say, keep });
  buildClient(say);
  say('Starting the server.');
  await keep('The server', () =>
    startAppServer({
      dataFolder: environment.dataFolder,
      port: environment.appPort,
      publicAddress: environment.publicAddress,
      database: { port: database.port, ...database.app, name: environment.databaseName },
      smtpPort: environment.smtpPort,
      sessionSecret: secretsOf(environment.dataFolder).sessionSecret,
      mode: 'production',
      say,
    }),
  );
  say(`Mails that Stemma sends are shown at ${mail.address}`);
  say(`Stemma runs at ${environment.publicAddress} (Ctrl-C stops it)`);
});
