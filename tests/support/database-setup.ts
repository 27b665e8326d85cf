import { rmSync } from 'node:fs';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { readLauncherEnvironment } from '../../server/environment.ts';
import { startDatabaseServer } from '../../server/scripts/database.ts';
import { findFreePort } from '../../server/scripts/port.ts';

export type TestDatabaseServer = {
  readonly host: string;
  readonly port: number;
  readonly socketPath: string;
  readonly migrate: { readonly user: string; readonly password: string };
  readonly app: { readonly user: string; readonly password: string };
};

declare module 'vitest' {
  export interface ProvidedContext {
    databaseServer: TestDatabaseServer;
  }
}

type Running = { readonly server: TestDatabaseServer; readonly stop: () => Promise<void> };
type Shared = { running: Promise<Running> | null; users: number };

// Several projects of one run share the server and the last one out stops it. Each project loads this file anew, so
// what they share lives on the process.
const key = Symbol.for('stemma.test-database');
const holder = globalThis as unknown as Record<symbol, Shared | undefined>;
holder[key] ??= { running: null, users: 0 };
const shared: Shared = holder[key];

async function start(): Promise<Running> {
  // A folder for each run, so that two runs at once do not meet.
  const dataFolder = join(readLauncherEnvironment().dataFolder, 'test', String(process.pid));
  const server = await startDatabaseServer({ dataFolder, port: await findFreePort() });
  const { host, port, socketPath, migrate, app } = server;
  return {
    server: { host, port, socketPath, migrate, app },
    stop: async () => {
      await server.stop();
      rmSync(dataFolder, { recursive: true, force: true });
    },
  };
}

/** Starts one MariaDB for the run and tells the tests where it is. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  shared.users += 1;
  shared.running ??= start();
  const { server, stop } = await shared.running;
  project.provide('databaseServer', server);
  return async () => {
    shared.users -= 1;
    if (shared.users === 0) await stop();
  };
}
