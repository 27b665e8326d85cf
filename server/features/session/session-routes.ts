import { count, eq } from 'drizzle-orm';
import { type RequestHandler, Router } from 'express';
import type * as z from 'zod';
import {
  type actorSchema,
  getSession,
  requestPasswordLink,
  setPassword,
  setUpAdministrator,
  signIn,
  signOut,
} from '../../../shared/api/session.ts';
import { loadActor, type SignedInActor } from '../../db/actor.ts';
import type { Database } from '../../db/database.ts';
import { linkLifetimes, makeLink } from '../../db/make-link.ts';
import { Problem } from '../../db/problem.ts';
import { people } from '../../db/schema/people.ts';
import type { Services } from '../../http/handler.ts';
import { addRoute, parsePart, requireActor } from '../../http/mount.ts';
import { hashPassword } from '../../http/password.ts';
import { inTransaction, recordChange } from '../../http/run-handler.ts';
import { normaliseEmail, wrongCredentials } from '../../http/session.ts';
import { endSessionsOf } from '../../http/session-store.ts';
import type { Throttle } from '../../http/throttle.ts';
import { requireLink, useLink } from './one-time-links.ts';

/** What the client learns of the person who is signed in. */
function describe(actor: SignedInActor): z.input<typeof actorSchema> {
  const { ability: _onlyHere, ...facts } = actor;
  return facts;
}

async function hasPeople(db: Pick<Database, 'select'>): Promise<boolean> {
  const [row] = await db.select({ count: count() }).from(people);
  return (row?.count ?? 0) > 0;
}

/** Calls that open, end or prepare a session. Written against Express, since they change the session itself. */
export function sessionRouter(options: {
  readonly db: Database;
  readonly services: Services;
  readonly authenticate: RequestHandler;
  readonly linkThrottles: { readonly account: Throttle; readonly address: Throttle };
}): Router {
  const { db, services, authenticate } = options;
  const router = Router();

  addRoute(router, getSession, async (request, response) => {
    const actor = request.user ? await loadActor(db, request.user.personId) : null;
    const needsSetup = !actor && !(await hasPeople(db));
    response.json(getSession.reply.parse({ actor: actor && describe(actor), needsSetup }));
  });

  const requireCredentials: RequestHandler = (request, _response, next) => {
    const { email, password } = parsePart(signIn.body, request.body, 'body');
    if (email.trim() === '' || password === '') throw new Problem('signed out', wrongCredentials);
    next();
  };
  addRoute(router, signIn, requireCredentials, authenticate, async (request, response) => {
    request.session.openedAt = services.now().getTime();
    const actor = await requireActor(request, db);
    await inTransaction(db, (tx) =>
      recordChange(tx, services, actor, {
        audit: [{ chain: 'system', event: { event: 'person.signed-in', personId: actor.personId } }],
        notices: [],
      }),
    );
    response.json(signIn.reply.parse({ actor: describe(actor) }));
  });

  addRoute(router, signOut, async (request, response) => {
    await new Promise<void>((resolve, reject) => {
      request.session.destroy((error: unknown) => (error ? reject(error) : resolve()));
    });
    response.json({});
  });

  addRoute(router, setUpAdministrator, async (request, response) => {
    const body = parsePart(setUpAdministrator.body, request.body, 'body');
    // Before hashing: whoever has no link must not make the server work.
    await requireLink(db, body.token, 'setup', services.now());
    const passwordHash = await hashPassword(body.password);
    const personId = services.newId();
    await inTransaction(db, async (tx) => {
      const now = services.now();
      await useLink(tx, body.token, 'setup', now);
      if (await hasPeople(tx)) throw new Problem('invalid', 'Stemma is set up already. Sign in instead.');
      const email = normaliseEmail(body.email);
      await tx.insert(people).values({
        id: personId,
        email,
        name: body.name,
        passwordHash,
        isAdministrator: true,
        isAuditor: false,
        isActive: true,
        createdAt: now,
      });
      await recordChange(
        tx,
        services,
        { personId, name: body.name },
        {
          audit: [{ chain: 'system', event: { event: 'administrator.set-up', personId, name: body.name, email } }],
          notices: [],
        },
      );
    });
    await new Promise<void>((resolve, reject) => {
      request.logIn({ personId }, (error: unknown) => (error ? reject(error) : resolve()));
    });
    request.session.openedAt = services.now().getTime();
    response.json(setUpAdministrator.reply.parse({ actor: describe(await requireActor(request, db)) }));
  });

  addRoute(router, requestPasswordLink, async (request, response) => {
    const email = normaliseEmail(parsePart(requestPasswordLink.body, request.body, 'body').email);
    await options.linkThrottles.address.take(request.ip ?? '');
    await options.linkThrottles.account.take(email);
    const [person] = await db.select().from(people).where(eq(people.email, email));
    if (person?.isActive) {
      const token = services.newToken();
      await inTransaction(db, async (tx) => {
        const expiresAt = new Date(services.now().getTime() + linkLifetimes.forgotten);
        await makeLink(tx, { token, personId: person.id, purpose: 'password', expiresAt });
        await recordChange(
          tx,
          services,
          { personId: person.id, name: person.name },
          {
            audit: [],
            notices: [{ kind: 'password-link', recipientId: person.id, payload: { token } }],
          },
        );
      });
    }
    response.json({});
  });

  addRoute(router, setPassword, async (request, response) => {
    const body = parsePart(setPassword.body, request.body, 'body');
    await requireLink(db, body.token, 'password', services.now());
    const passwordHash = await hashPassword(body.password);
    const email = await inTransaction(db, async (tx) => {
      const { personId } = await useLink(tx, body.token, 'password', services.now());
      const [person] = await tx
        .select()
        .from(people)
        .where(eq(people.id, personId ?? ''));
      if (!person?.isActive) throw new Problem('invalid', 'This account is deactivated. Ask an administrator.');
      await tx.update(people).set({ passwordHash }).where(eq(people.id, person.id));
      await endSessionsOf(tx, person.id);
      await recordChange(
        tx,
        services,
        { personId: person.id, name: person.name },
        {
          audit: [{ chain: 'system', event: { event: 'password.set', personId: person.id } }],
          notices: [],
        },
      );
      return person.email;
    });
    response.json(setPassword.reply.parse({ email }));
  });

  return router;
}
