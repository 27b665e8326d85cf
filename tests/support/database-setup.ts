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
// Several projects of one run share the server; the last one out stops it.
let running: Promise<Running> | null = null;
let users = 0;

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
  users += 1;
  running ??= start();
  const { server, stop } = await running;
  project.provide('databaseServer', server);
  return async () => {
    users -= 1;
    if (users === 0) await stop();
  };
}
