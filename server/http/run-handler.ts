import type * as z from 'zod';
import type { Endpoint } from '../../shared/api/endpoint.ts';
import type { SignedInActor } from '../db/actor.ts';
import { appendEntry } from '../db/append-entry.ts';
import type { Database, Transaction } from '../db/database.ts';
import { isContention } from '../db/database-error.ts';
import { outbox } from '../db/schema/outbox.ts';
import type { Notice } from '../notices/notice.ts';
import type { AuditRecord, CommandHandler, CommandResult, Services, UploadedFile } from './handler.ts';

const mostTries = 4;
/** Later than this no try is begun, so that even one that waits for locks ends within ten seconds. */
const lastStartMs = 4000;

/** Runs `work` in one transaction, again from the start when others were in its way. */
export async function inTransaction<Result>(db: Database, work: (tx: Transaction) => Promise<Result>): Promise<Result> {
  const begun = performance.now();
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await db.transaction(work);
    } catch (error) {
      const mayTryAgain = attempt < mostTries && performance.now() - begun < lastStartMs;
      if (!mayTryAgain || !isContention(error)) throw error;
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
