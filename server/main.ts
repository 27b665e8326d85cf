import { randomBytes, randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import { count } from 'drizzle-orm';
import { pino } from 'pino';
import { createApp } from './app.ts';
import { unsafeSettings } from './db/check-settings.ts';
import { openDatabase } from './db/database.ts';
import { errorForLog, isDatabaseAway } from './db/database-error.ts';
import { linkLifetimes, makeLink } from './db/make-link.ts';
import { people } from './db/schema/people.ts';
import { EnvironmentError, readServerEnvironment, type ServerEnvironment } from './environment.ts';
import type { Services } from './http/handler.ts';
import { createDrain } from './notices/drain.ts';
import { createMailer } from './notices/mailer.ts';

/** Lines that are not JSON are shown to whoever started the server; see `scripts/app-server.ts`. */
function sayToPerson(line: string): void {
  process.stdout.write(`${line}\n`);
}

function sentencesOf(error: unknown): readonly string[] {
  if (error instanceof EnvironmentError) return error.sentences;
  const why = error instanceof Error ? error.message : String(error);
  if (!isDatabaseAway(error)) return [why];
  return [`The database cannot be used (${why}). Start it, or correct the variables that begin with STEMMA_DB.`];
}

async function serve(environment: ServerEnvironment): Promise<void> {
  const log = pino({ level: environment.logLevel, serializers: { err: errorForLog } });
  const db = openDatabase(environment.database);
  const services: Services = {
    now: () => new Date(),
    newId: randomUUID,
    newToken: () => randomBytes(32).toString('hex'),
    publicAddress: environment.publicAddress,
  };

  const unsafe = await unsafeSettings(db);
  if (unsafe.length > 0) throw new EnvironmentError(unsafe);

  const [known] = await db.select({ count: count() }).from(people);
  if (known?.count === 0) {
    const token = services.newToken();
    const expiresAt = new Date(services.now().getTime() + linkLifetimes.setup);
    await makeLink(db, { token, personId: null, purpose: 'setup', expiresAt });
    sayToPerson(`Nobody is set up yet. Open this link once, within a day: ${environment.publicAddress}/setup/${token}`);
  }

  const { host, port, from } = environment.smtp;
  const mailer = createMailer({ host, port, from, publicAddress: environment.publicAddress });
  const drain = createDrain({ db, mailer, now: services.now, log });
  const app = createApp({
    db,
    services,
    log,
    sessionSecret: environment.sessionSecret,
    clientFolder: environment.isProduction ? environment.clientFolder : null,
  });
  const server = createServer({ requestTimeout: 60_000, headersTimeout: 20_000 }, app);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(environment.port, environment.host, resolve);
  });
  log.info({ host: environment.host, port: environment.port }, 'listening');
  drain.start();

  const stop = async () => {
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    server.closeIdleConnections();
    await drain.stop();
    mailer.close();
    await closed;
    await db.$client.end();
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => {
      log.info({ signal }, 'stopping');
      // A connection that is kept open by the other side must not keep us from ending.
      setTimeout(() => server.closeAllConnections(), 5000).unref();
      stop().then(
        () => process.exit(0),
        (error: unknown) => {
          log.error({ err: error }, 'did not stop cleanly');
          process.exit(1);
        },
      );
    });
  }
}

try {
  await serve(readServerEnvironment());
} catch (error) {
  for (const sentence of sentencesOf(error)) sayToPerson(sentence);
  process.exit(1);
}
