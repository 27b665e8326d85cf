import { mkdirSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import type { TestProject } from 'vitest/node';
import { readLauncherEnvironment } from '../../server/environment.ts';
import { settleEarlierChild } from '../../server/scripts/child.ts';
import { startDatabaseServer } from '../../server/scripts/database.ts';
import { findFreePort } from '../../server/scripts/port.ts';
import { startOfProcess } from '../../server/scripts/process-identity.ts';

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

const testFolder = join(readLauncherEnvironment().dataFolder, 'test');

/** Removes what runs left behind that were killed before they could tidy up. */
async function sweepEarlierRuns(): Promise<void> {
  mkdirSync(testFolder, { recursive: true });
  for (const name of readdirSync(testFolder).filter((entry) => /^\d+$/.test(entry))) {
    if (startOfProcess(Number(name)) !== null) continue;
    await settleEarlierChild(join(testFolder, name, 'mariadb'), 'database', 'The test database', () => {});
    rmSync(join(testFolder, name), { recursive: true, force: true });
  }
}

async function start(): Promise<Running> {
  await sweepEarlierRuns();
  // A folder for each run, so that two runs at once do not meet.
  const dataFolder = join(testFolder, String(process.pid));
  const server = await startDatabaseServer({ dataFolder, port: await findFreePort() });
  // A run that breaks off skips the tear-down; this still tells the database to end.
  const endWithRun = () => process.kill(server.child.pid, 'SIGTERM');
  process.once('exit', endWithRun);
  const { host, port, socketPath, migrate, app } = server;
  return {
    server: { host, port, socketPath, migrate, app },
    stop: async () => {
      process.off('exit', endWithRun);
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
