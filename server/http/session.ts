import { eq } from 'drizzle-orm';
import type { RequestHandler } from 'express';
import expressSession from 'express-session';
import passportModule from 'passport';
import { Strategy as LocalStrategy } from 'passport-local';
import type { Database } from '../db/database.ts';
import { Problem } from '../db/problem.ts';
import { people } from '../db/schema/people.ts';
import { passwordMatches } from './password.ts';
import { DatabaseSessionStore, idleMs } from './session-store.ts';
import type { Throttle } from './throttle.ts';
import './express-user.ts';

export const wrongCredentials = 'The address or the password is not right. Check both, or ask for a new password.';

/** One address, one spelling. */
export function normaliseEmail(email: string): string {
  return email.normalize('NFKC').trim().toLowerCase();
}

/** Sessions in the database and passport's local strategy, with an instance of our own instead of the global one. */
export function createSessions(options: {
  readonly db: Database;
  readonly now: () => Date;
  readonly secret: string;
  readonly isHttps: boolean;
  /** Of each account and, wider, of each network address, behind which there may be a whole office. */
  readonly throttles: { readonly account: Throttle; readonly address: Throttle };
}): {
  readonly middleware: RequestHandler[];
  readonly authenticate: RequestHandler;
  readonly store: DatabaseSessionStore;
} {
  const { db, throttles } = options;
  const store = new DatabaseSessionStore(db, options.now);
  const passport = new passportModule.Passport();

  passport.serializeUser((user, done) => done(null, user.personId));
  passport.deserializeUser((personId: string, done) => done(null, { personId }));
  passport.use(
    new LocalStrategy({ usernameField: 'email', passReqToCallback: true }, async (request, email, password, done) => {
      try {
        const account = normaliseEmail(email);
        const address = request.ip ?? '';
        await throttles.address.take(address);
        await throttles.account.take(account);
        const [person] = await db.select().from(people).where(eq(people.email, account));
        const matches = await passwordMatches(person?.passwordHash ?? null, password);
        if (!person || !matches || !person.isActive) throw new Problem('signed out', wrongCredentials);
        await throttles.account.forgive(account);
        await throttles.address.giveBack(address);
        done(null, { personId: person.id });
      } catch (error) {
        done(error);
      }
    }),
  );

  return {
    store,
    middleware: [
      expressSession({
        store,
        secret: options.secret,
        // The prefix makes browsers insist on https, no domain and the whole site.
        name: options.isHttps ? '__Host-stemma' : 'stemma',
        resave: false,
        saveUninitialized: false,
        rolling: true,
        cookie: { httpOnly: true, sameSite: 'lax', secure: options.isHttps, path: '/', maxAge: idleMs },
      }),
      passport.session(),
    ],
    // `logIn` inside regenerates the session, so an id from before sign-in is worth nothing after it.
    authenticate: passport.authenticate('local'),
  };
}
