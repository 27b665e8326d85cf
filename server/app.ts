import compression from 'compression';
import express, { type Express, type RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import type { Database } from './db/database.ts';
import { Problem } from './db/problem.ts';
import { decisionLogRoutes } from './features/decision-log/decision-log-routes.ts';
import { fileRouter } from './features/files/download-file.ts';
import { peopleRoutes } from './features/people/people-routes.ts';
import { sessionRouter } from './features/session/session-routes.ts';
import { studyRoutes } from './features/studies/study-routes.ts';
import { submissionRoutes } from './features/submissions/submission-routes.ts';
import { testRoutes } from './features/tests/test-routes.ts';
import { workListRoutes } from './features/work-list/get-work-list.ts';
import { answerProblems } from './http/answer-problem.ts';
import type { Handler, Services } from './http/handler.ts';
import { mountHandlers } from './http/mount.ts';
import { requireSameOrigin } from './http/origin-check.ts';
import { safeHeaders, servePages } from './http/pages.ts';
import { createSessions } from './http/session.ts';
import { createThrottle } from './http/throttle.ts';

/** Every call that is a query or a command; sessions and downloads have routers of their own. */
export const handlers: readonly Handler[] = [
  ...peopleRoutes,
  ...studyRoutes,
  ...testRoutes,
  ...submissionRoutes,
  ...workListRoutes,
  ...decisionLogRoutes,
];

/** Every address the server answers, in one list. */
export function createApp(options: {
  readonly db: Database;
  readonly services: Services;
  readonly log: Logger;
  readonly sessionSecret: string;
  /** The built pages; null serves the API alone. */
  readonly clientFolder: string | null;
}): Express {
  const { db, services, log } = options;
  const isHttps = services.publicAddress.startsWith('https:');
  const sessions = createSessions({
    db,
    now: services.now,
    secret: options.sessionSecret,
    isHttps,
    throttles: {
      account: createThrottle({ tries: 10, perSeconds: 900, what: 'this account' }),
      address: createThrottle({ tries: 50, perSeconds: 900, what: 'one network address' }),
    },
  });

  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.use(...safeHeaders(isHttps), compression());

  app.get('/healthz', (_request, response) => {
    response.json({ alive: true });
  });
  app.get('/readyz', async (_request, response) => {
    await db.$client.query('SELECT 1');
    response.json({ ready: true });
  });

  app.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  app.use(
    '/api',
    pinoHttp({
      logger: log,
      autoLogging: true,
      // Addresses may hold one-time tokens only in bodies, which are never logged; headers hold cookies, so neither are they.
      serializers: {
        req: (request: { method: string; url: string }) => ({ method: request.method, url: request.url }),
        res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      },
    }),
    requireSameOrigin(services.publicAddress),
    ...sessions.middleware,
  );
  app.use(
    sessionRouter({
      db,
      services,
      authenticate: sessions.authenticate,
      linkThrottles: {
        account: createThrottle({ tries: 5, perSeconds: 3600, of: 'password links', what: 'this account' }),
        address: createThrottle({ tries: 30, perSeconds: 3600, of: 'password links', what: 'one network address' }),
      },
    }),
    fileRouter(db),
    mountHandlers(handlers, { db, services }),
  );
  const nothingHere: RequestHandler = () => {
    throw new Problem('not found', 'There is nothing at this address.');
  };
  app.use('/api', nothingHere);
  if (options.clientFolder !== null) app.use(servePages(options.clientFolder));
  app.use(nothingHere);
  app.use(answerProblems(log));
  return app;
}
