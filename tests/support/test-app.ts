import { randomBytes, randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import type * as z from 'zod';
import { createApp } from '../../server/app.ts';
import type { Database } from '../../server/db/database.ts';
import type { Services } from '../../server/http/handler.ts';
import type { Endpoint, Input } from '../../shared/api/endpoint.ts';
import { signIn } from '../../shared/api/session.ts';
import { testPassword } from './builders.ts';
import { type FreshDatabase, freshDatabase } from './test-database.ts';

export type TestReply<E extends Endpoint> = {
  readonly status: number;
  /** The reply, or the problem; which one the status tells. */
  readonly body: z.output<E['reply']>;
  readonly problem: { readonly code: string; readonly sentence: string; readonly [more: string]: unknown };
  readonly headers: Headers;
};

export type Caller = {
  readonly cookie: string;
  readonly call: <E extends Endpoint>(
    endpoint: E,
    input?: Partial<Input<E>> & { readonly file?: { readonly name: string; readonly content: string | Uint8Array } },
  ) => Promise<TestReply<E>>;
  readonly fetch: (path: string, init?: RequestInit) => Promise<Response>;
};

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

function addressOf(endpoint: Endpoint, params: unknown, query: unknown): string {
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) =>
    encodeURIComponent(String((params as Record<string, unknown>)[name])),
  );
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries((query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined) search.set(name, String(value));
  }
  return search.size > 0 ? `${path}?${search}` : path;
}

function callerAt(address: string, cookie: string): Caller {
  const send = (path: string, init: RequestInit = {}) =>
    fetch(`${address}${path}`, {
      ...init,
      headers: { ...(cookie ? { cookie } : {}), ...init.headers },
      redirect: 'manual',
    });
  return {
    cookie,
    fetch: send,
    call: async (endpoint, input = {}) => {
      const init: RequestInit = { method: endpoint.method };
      if (endpoint.upload) {
        const form = new FormData();
        form.set('body', JSON.stringify(input.body));
        if (input.file) form.set('file', new Blob([input.file.content as BlobPart]), input.file.name);
        init.body = form;
      } else if (input.body !== undefined) {
        init.body = JSON.stringify(input.body);
        init.headers = { 'content-type': 'application/json' };
      }
      const response = await send(addressOf(endpoint, input.params, input.query), init);
      const body = await response.json();
      return { status: response.status, body, problem: body, headers: response.headers } as never;
    },
  };
}

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
      return callerAt(address, (reply.headers.get('set-cookie') ?? '').split(';')[0] ?? '');
    },
    stop: async () => {
      server.closeAllConnections();
      await new Promise<void>((resolve) => server.close(() => resolve()));
      await fresh.drop();
    },
  };
}
