import { and, asc, eq, isNotNull, lte } from 'drizzle-orm';
import type { Logger } from 'pino';
import type { Database } from '../db/database.ts';
import { outbox } from '../db/schema/outbox.ts';
import { people } from '../db/schema/people.ts';
import { mailCatalogue } from './catalogue.ts';
import type { Mailer } from './mailer.ts';

/** After so many tries a mail is left with its last error for somebody to look at. */
const mostAttempts = 12;
/** Longer than any attempt takes, so that no second worker sends the same mail meanwhile. */
const leaseMs = 60_000;
const pauseMs = 1000;

/** 2 s, 4 s, 8 s … at most an hour between tries. */
function delayMs(attempts: number): number {
  return Math.min(2 ** attempts * 1000, 3_600_000);
}

type Drain = {
  /** Sends everything that is due; answers how many mails left. */
  readonly sendDue: () => Promise<number>;
  readonly start: () => void;
  /** Waits for the mail in hand. */
  readonly stop: () => Promise<void>;
};

/**
 * Sends what is owed. One row is claimed at a time and leased, so several servers may drain one outbox; a mail is
 * marked only after the mail server took it, so a crash between the two sends a second copy with the same Message-ID.
 */
export function createDrain(options: {
  readonly db: Database;
  readonly mailer: Mailer;
  readonly now: () => Date;
  readonly log: Logger;
}): Drain {
  const { db, mailer, now, log } = options;
  let stopping = false;
  let loop: Promise<void> | null = null;
  let wake: (() => void) | null = null;

  function claim() {
    return db.transaction(async (tx) => {
      const [row] = await tx
        .select()
        .from(outbox)
        .where(and(isNotNull(outbox.dueAt), lte(outbox.dueAt, now())))
        .orderBy(asc(outbox.dueAt))
        .limit(1)
        .for('update', { skipLocked: true });
      if (!row) return null;
      const claimed = { attempts: row.attempts + 1, dueAt: new Date(now().getTime() + leaseMs) };
      await tx.update(outbox).set(claimed).where(eq(outbox.id, row.id));
      return { ...row, ...claimed };
    });
  }

  async function sendOne(row: typeof outbox.$inferSelect): Promise<boolean> {
    try {
      const write = mailCatalogue[row.kind];
      if (!write) throw new Error(`There is no mail of the kind ${row.kind}.`);
      const [recipient] = await db.select().from(people).where(eq(people.id, row.recipientId));
      if (!recipient) throw new Error('The recipient is gone.');
      await mailer.send(write(row.payload, recipient), { id: row.id, address: recipient.email });
      // A one-time token must not stay behind once it is in the mail.
      await db
        .update(outbox)
        .set({ sentAt: now(), dueAt: null, lastError: null, payload: {} })
        .where(eq(outbox.id, row.id));
      return true;
    } catch (error) {
      const lastError = error instanceof Error ? error.message : String(error);
      log.warn({ mail: row.id, kind: row.kind, attempts: row.attempts, lastError }, 'a mail was not sent');
      const dueAt = row.attempts >= mostAttempts ? null : new Date(now().getTime() + delayMs(row.attempts));
      await db
        .update(outbox)
        .set({ dueAt, lastError: lastError.slice(0, 2000) })
        .where(eq(outbox.id, row.id));
      return false;
    }
  }

  async function sendDue(): Promise<number> {
    let sent = 0;
    for (let row = await claim(); row && !stopping; row = await claim()) if (await sendOne(row)) sent += 1;
    return sent;
  }

  async function run(): Promise<void> {
    while (!stopping) {
      await sendDue().catch((error: unknown) => log.warn({ err: error }, 'the outbox could not be read'));
      if (stopping) return;
      await new Promise<void>((resolve) => {
        const timer = setTimeout(resolve, pauseMs);
        wake = () => {
          clearTimeout(timer);
          resolve();
        };
      });
    }
  }

  return {
    sendDue,
    start: () => {
      loop ??= run();
    },
    stop: async () => {
      stopping = true;
      wake?.();
      await loop;
    },
  };
}
