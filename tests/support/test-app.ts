import { randomBytes, randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import { createApp } from '../../server/app.ts';
import type { Database } from '../../server/db/database.ts';
import { errorForLog } from '../../server/db/database-error.ts';
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

type Options = {
  readonly now?: () => Date;
  /** A database on a server that the test may stop; else one on the server of the test run. */
  readonly on?: FreshDatabase;
  /** Where people reach it; else where it listens. */
  readonly publicAddress?: string;
  readonly clientFolder?: string;
  /** Takes the lines of the log, one JSON object each. */
  readonly writeLog?: (line: string) => void;
};

/** The whole server on a port of its own with a database of its own. */
export async function startTestApp(options: Options = {}): Promise<TestApp> {
  const fresh = options.on ?? (await freshDatabase());
  const { writeLog } = options;
  const server: Server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const services: Services = {
    now: options.now ?? (() => new Date()),
    newId: randomUUID,
    newToken: () => randomBytes(32).toString('hex'),
    publicAddress: options.publicAddress ?? address,
  };
  server.on(
    'request',
    createApp({
      db: fresh.db,
      services,
      log: writeLog ? pino({ serializers: { err: errorForLog } }, { write: writeLog }) : pino({ level: 'silent' }),
      sessionSecret: randomBytes(32).toString('hex'),
      clientFolder: options.clientFolder ?? null,
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
