import { join } from 'node:path';
import { inheritedEnvironment } from '../environment.ts';
import { type Child, settleEarlierChild, startChild } from './child.ts';
import { requireFreePort } from './port.ts';
import { waitUntil } from './wait-until.ts';

const root = join(import.meta.dirname, '../..');

export type AppServer = { readonly address: string; readonly child: Child; readonly stop: () => Promise<void> };

/**
 * Runs `server/main.ts` in a process of its own and waits until it answers.
 *
 * @throws Error with a sentence and the end of its log.
 */
export async function startAppServer(options: {
  readonly dataFolder: string;
  readonly port: number;
  readonly publicAddress: string;
  readonly database: { readonly port: number; readonly user: string; readonly password: string; readonly name: string };
  readonly smtpPort: number;
  readonly sessionSecret: string;
  /** `development` restarts it when a source file changes. */
  readonly mode: 'production' | 'development';
  /** Told what the server prints for people; its log lines go to `server.log`. */
  readonly say?: (line: string) => void;
}): Promise<AppServer> {
  const { dataFolder, port, database, mode, say = () => {} } = options;
  await settleEarlierChild(dataFolder, 'server', 'The server', say);
  await requireFreePort(port, 'the app', 'STEMMA_PORT');
  const main = join(root, 'server/main.ts');
  const child = startChild({
    name: 'server',
    folder: dataFolder,
    command: process.execPath,
    args:
      mode === 'production'
        ? ['--enable-source-maps', '--import', 'tsx', main]
        : [join(root, 'node_modules/tsx/dist/cli.mjs'), 'watch', '--clear-screen=false', main],
    env: inheritedEnvironment({
      NODE_ENV: mode,
      STEMMA_PORT: String(port),
      STEMMA_PUBLIC_ADDRESS: options.publicAddress,
      STEMMA_DB_PORT: String(database.port),
      STEMMA_DB_NAME: database.name,
      STEMMA_DB_USER: database.user,
      STEMMA_DB_PASSWORD: database.password,
      STEMMA_SMTP_PORT: String(options.smtpPort),
      STEMMA_SESSION_SECRET: options.sessionSecret,
      STEMMA_CLIENT: join(root, 'dist'),
    }),
    onLine: (line) => {
      // The server logs one JSON object a line; anything else is meant for the person who started it.
      const isLogLine = line.startsWith('{');
      if (!isLogLine && line.trim() !== '') say(line);
      return isLogLine;
    },
  });
  const address = `http://127.0.0.1:${port}`;
  try {
    await waitUntil(
      async () => {
        if (child.hasEnded()) throw new Error(`The server did not start. Its log ends with:\n${child.logTail()}`);
        return fetch(`${address}/api/session`).then(
          (reply) => reply.ok,
          () => false,
        );
      },
      { timeoutMs: 60_000, tooLate: () => `The server does not answer. Its log ends with:\n${child.logTail()}` },
    );
  } catch (error) {
    await child.stop();
    throw error;
  }
  return { address, child, stop: child.stop };
}
