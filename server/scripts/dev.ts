import { createServer as createHttpServer } from 'node:http';
import { createServer } from 'vite';
import { readLauncherEnvironment } from '../environment.ts';
import { startAppServer } from './app-server.ts';
import { findFreePort, requireFreePort } from './port.ts';
import { runUntilStopped } from './run-until-stopped.ts';
import { secretsOf } from './secrets.ts';
import { startSurroundings } from './surroundings.ts';

await runUntilStopped(async ({ say, keep }) => {
  const environment = readLauncherEnvironment();
  const { database, mail } = await startSurroundings(environment, { say, keep });
  await requireFreePort(environment.appPort, 'the app', 'STEMMA_PORT');

  say('Starting the server; it restarts when a file of it changes.');
  const serverPort = await findFreePort();
  const server = await keep('The server', () =>
    startAppServer({
      dataFolder: environment.dataFolder,
      port: serverPort,
      publicAddress: environment.publicAddress,
      database: { port: database.port, ...database.app, name: environment.databaseName },
      smtpPort: environment.smtpPort,
      sessionSecret: secretsOf(environment.dataFolder).sessionSecret,
      mode: 'development',
      say,
    }),
  );

  say('Starting Vite; pages change as their files do.');
  await keep('Vite', async () => {
    // As middleware of our own server: by itself Vite would end this process on SIGTERM before the rest is stopped.
    const http = createHttpServer();
    const vite = await createServer({
      server: {
        middlewareMode: { server: http },
        hmr: { server: http },
        // The host stays as the browser sent it: the server compares it with the page's origin on every write.
        proxy: { '/api': { target: server.address, changeOrigin: false } },
      },
    });
    http.on('request', vite.middlewares);
    await new Promise<void>((resolve) => http.listen(environment.appPort, '127.0.0.1', resolve));
    return {
      stop: async () => {
        await vite.close();
        http.closeAllConnections();
        await new Promise((resolve) => http.close(resolve));
      },
    };
  });
  say(`Mails that Stemma sends are shown at ${mail.address}`);
  say(`Stemma runs at ${environment.publicAddress} (Ctrl-C stops it)`);
});
