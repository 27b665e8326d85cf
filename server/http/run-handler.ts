import type * as z from 'zod';
import type { Endpoint } from '../../shared/api/endpoint.ts';
import type { SignedInActor } from '../db/actor.ts';
import { appendEntry } from '../db/append-entry.ts';
import type { Database, Transaction } from '../db/database.ts';
import { outbox } from '../db/schema/outbox.ts';
import type { Notice } from '../notices/notice.ts';
import type { AuditRecord, CommandHandler, CommandResult, Services, UploadedFile } from './handler.ts';

/** What MariaDB rolls back whole and a second try may well do: deadlock, snapshot conflict, lock wait. */
const worthAnotherTry = new Set([1213, 1020, 1205]);
const mostTries = 4;

function errnoOf(error: unknown): number | null {
  if (typeof error !== 'object' || error === null) return null;
  if ('errno' in error && typeof error.errno === 'number') return error.errno;
  return 'cause' in error ? errnoOf(error.cause) : null;
}

/** Runs `work` in one transaction, again from the start when the database asks for it. */
export async function inTransaction<Result>(db: Database, work: (tx: Transaction) => Promise<Result>): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await db.transaction(work);
    } catch (error) {
      if (attempt === mostTries || !worthAnotherTry.has(errnoOf(error) ?? 0)) throw error;
    }
  }
}

/** Writes what a change owes, in its transaction: mails into the outbox, then the log entries, whose head locks last. */
export async function recordChange(
  tx: Transaction,
  services: Services,
  who: { readonly personId: string; readonly name: string },
  owed: { readonly audit: readonly AuditRecord[]; readonly notices: readonly Notice[] },
): Promise<void> {
  if (owed.notices.length > 0) {
    const now = services.now();
    await tx.insert(outbox).values(
      owed.notices.map((notice) => ({
        id: services.newId(),
        kind: notice.kind,
        recipientId: notice.recipientId,
        payload: { ...notice.payload },
        createdAt: now,
        dueAt: now,
        attempts: 0,
      })),
    );
  }
  for (const { chain, event } of owed.audit) {
    await appendEntry(tx, {
      chain,
      event,
      actorId: who.personId,
      actorName: who.name,
      salt: services.newToken().slice(0, 32),
    });
  }
}

/** One command, whole or not at all: the change, its log entries and the mails it owes commit together. */
export async function runCommand<E extends Endpoint>(
  handler: CommandHandler<E>,
  db: Database,
  services: Services,
  given: {
    readonly actor: SignedInActor;
    readonly params: z.output<E['params']>;
    readonly query: z.output<E['query']>;
    readonly body: z.output<E['body']>;
    readonly file: UploadedFile | null;
  },
): Promise<CommandResult<E>['reply']> {
  return inTransaction(db, async (tx) => {
    const result = await handler.run({ ...given, services, tx });
    await recordChange(tx, services, given.actor, result);
    return result.reply;
  });
}
