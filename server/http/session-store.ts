import { eq, lt } from 'drizzle-orm';
import { type SessionData, Store } from 'express-session';
import { sha256 } from '../db/canonical-json.ts';
import type { Database } from '../db/database.ts';
import { sessions } from '../db/schema/people.ts';

export const idleMs = 8 * 3_600_000;
export const longestMs = 24 * 3_600_000;

declare module 'express-session' {
  interface SessionData {
    /** When it was opened, ms since 1970: a session ends a day later however busy it is. */
    openedAt?: number;
    passport?: { user?: string };
  }
}

/** Sessions in MariaDB, so that a restart signs nobody out. Kept under the hash of their id. */
export class DatabaseSessionStore extends Store {
  readonly #db: Database;
  readonly #now: () => Date;

  constructor(db: Database, now: () => Date) {
    super();
    this.#db = db;
    this.#now = now;
  }

  override get(id: string, done: (error: unknown, session?: SessionData | null) => void): void {
    this.#read(id).then((session) => done(null, session), done);
  }

  override set(id: string, session: SessionData, done?: (error?: unknown) => void): void {
    this.#write(id, session).then(() => done?.(), done);
  }

  override destroy(id: string, done?: (error?: unknown) => void): void {
    this.#db
      .delete(sessions)
      .where(eq(sessions.idHash, sha256(id)))
      .then(() => done?.(), done);
  }

  override touch(id: string, _session: SessionData, done?: () => void): void {
    this.#db
      .update(sessions)
      .set({ expiresAt: new Date(this.#now().getTime() + idleMs) })
      .where(eq(sessions.idHash, sha256(id)))
      .then(() => done?.(), done);
  }

  /** Removes what has run out; called now and then. */
  async sweep(): Promise<void> {
    await this.#db.delete(sessions).where(lt(sessions.expiresAt, this.#now()));
  }

  async #read(id: string): Promise<SessionData | null> {
    const [row] = await this.#db
      .select()
      .from(sessions)
      .where(eq(sessions.idHash, sha256(id)));
    if (!row || row.expiresAt <= this.#now()) return null;
    const session = JSON.parse(row.data) as SessionData;
    if ((session.openedAt ?? 0) + longestMs <= this.#now().getTime()) return null;
    return session;
  }

  async #write(id: string, session: SessionData): Promise<void> {
    const row = {
      idHash: sha256(id),
      personId: session.passport?.user ?? null,
      data: JSON.stringify(session),
      expiresAt: new Date(this.#now().getTime() + idleMs),
    };
    await this.#db.insert(sessions).values(row).onDuplicateKeyUpdate({ set: row });
  }
}

/** Ends every session of a person, at once: after a new password or a deactivation. */
export async function endSessionsOf(db: Pick<Database, 'delete'>, personId: string): Promise<void> {
  await db.delete(sessions).where(eq(sessions.personId, personId));
}
