import { randomBytes, randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { inject } from 'vitest';
import { startAppServer } from '../../server/scripts/app-server.ts';
import { dropDatabase, openAdmin } from '../../server/scripts/database.ts';
import { seedDemoOnce } from '../../server/scripts/demo.ts';
import { startMailCatcher } from '../../server/scripts/mail-catcher.ts';
import { findFreePort } from '../../server/scripts/port.ts';
import { prepareDatabase } from '../../server/scripts/prepare-database.ts';

export type Product = {
  /** Of the app, without a slash at the end. */
  readonly address: string;
  /** Of the mail catcher's page and API. */
  readonly mailAddress: string;
  /** What the server printed for people, such as the one-time set-up link. */
  readonly printed: readonly string[];
  readonly stop: () => Promise<void>;
};

/** Starts the whole product on free ports: a database of its own, the mail catcher, the server and the built client. */
export async function startProduct({ withDemo = true }: { readonly withDemo?: boolean } = {}): Promise<Product> {
  const databaseServer = inject('databaseServer');
  const dataFolder = await mkdtemp(join(tmpdir(), 'stemma-product-'));
  const name = `stemma_e2e_${randomUUID().replaceAll('-', '')}`;
  const [appPort, smtpPort, pagePort] = [await findFreePort(), await findFreePort(), await findFreePort()];
  const address = `http://127.0.0.1:${appPort}`;
  const undo: (() => Promise<void>)[] = [() => rm(dataFolder, { recursive: true, force: true })];
  const stop = async () => {
    for (const step of undo.reverse()) await step();
  };
  try {
    undo.push(async () => {
      const admin = openAdmin(databaseServer);
      await dropDatabase(admin, name);
      await admin.end();
    });
    await prepareDatabase(databaseServer, name);
    const mail = await startMailCatcher({ dataFolder, smtpPort, pagePort });
    undo.push(mail.stop);
    if (withDemo) await seedDemoOnce(databaseServer, { databaseName: name, publicAddress: address }, () => {});
    const printed: string[] = [];
    const server = await startAppServer({
      dataFolder,
      port: appPort,
      publicAddress: address,
      database: { port: databaseServer.port, ...databaseServer.app, name },
      smtpPort,
      sessionSecret: randomBytes(32).toString('hex'),
      mode: 'production',
      say: (line) => printed.push(line),
    });
    undo.push(server.stop);
    return { address, mailAddress: mail.address, printed, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}
