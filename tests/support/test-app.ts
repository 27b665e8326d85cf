import { randomBytes, randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import { createApp } from '../../server/app.ts';
import type { Database } from '../../server/db/database.ts';
import type { Services } from '../../server/http/handler.ts';
import { type Caller, callerAt, cookieOf } from '../../server/scripts/api-caller.ts';
import { signIn } from '../../shared/api/session.ts';
import { testPassword } from './builders.ts';
import { type FreshDatabase, freshDatabase } from './test-database.ts';

export type TestApp = {
  readonly db: Database;
  readonly fresh: FreshDatabase;
  readonly services: Services;
  readonly address: string;
  readonly anonymous: Caller;
  /** Signs the person in through HTTP and calls as that person. */
  readonly as: (person: { readonly email: string }) => Promise<Caller>;
  readonly stop: () => Promise<void>;
};

/** The whole server on a port of its own with a database of its own; only the clock can be set. */
export async function startTestApp(options: { readonly now?: () => Date } = {}): Promise<TestApp> {
  const fresh = await freshDatabase();
  const server: Server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const services: Services = {
    now: options.now ?? (() => new Date()),
    newId: randomUUID,
    newToken: () => randomBytes(32).toString('hex'),
    publicAddress: address,
  };
  server.on(
    'request',
    createApp({
      db: fresh.db,
      services,
      log: pino({ level: 'silent' }),
      sessionSecret: randomBytes(32).toString('hex'),
      clientFolder: null,
    }),
  );
  const anonymous = callerAt(address, '');
  return {
    db: fresh.db,
    fresh,
    services,
    address,
    anonymous,
    as: async (person) => {
      const reply = await anonymous.call(signIn, { body: { email: person.email, password: testPassword } });
      if (reply.status !== 200) throw new Error(`Signing in failed: ${reply.problem.sentence}`);
      return callerAt(address, cookieOf(reply.headers));
    },
    stop: async () => {
      server.closeAllConnections();
      await new Promise<void>((resolve) => server.close(() => resolve()));
      await fresh.drop();
    },
  };
}
