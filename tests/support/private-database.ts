import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type DatabaseServer, startDatabaseServer } from '../../server/scripts/database.ts';
import { findFreePort } from '../../server/scripts/port.ts';

export type PrivateDatabase = {
  readonly server: () => DatabaseServer;
  readonly dataFolder: string;
  readonly stop: () => Promise<void>;
  /** On the same folder and port as before. */
  readonly startAgain: () => Promise<void>;
  /** Stops it and removes its folder. */
  readonly remove: () => Promise<void>;
};

/** A MariaDB that a test may stop, pause or misconfigure without disturbing the others. */
export async function privateDatabase(): Promise<PrivateDatabase> {
  const dataFolder = await mkdtemp(join(tmpdir(), 'stemma-private-'));
  const port = await findFreePort();
  let running = await startDatabaseServer({ dataFolder, port });
  return {
    server: () => running,
    dataFolder,
    stop: () => running.stop(),
    startAgain: async () => {
      running = await startDatabaseServer({ dataFolder, port });
    },
    remove: async () => {
      await running.stop();
      await rm(dataFolder, { recursive: true, force: true });
    },
  };
}
