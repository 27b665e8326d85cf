import { sql } from 'drizzle-orm';
import { type AuditEvent, auditEventSchema } from '../../shared/domain/audit-events.ts';
import { canonicalJson } from './canonical-json.ts';
import type { Transaction } from './database.ts';
import { auditEntry } from './schema/decision-log.ts';

/**
 * Appends one entry to a chain of the decision log. Called last in a transaction: it locks the chain's head until
 * commit. Sequence, time and hashes are the database's; we choose actor and payload only.
 *
 * @param salt - 16 random bytes as hex, so that a small value cannot be guessed from the hash of its payload.
 */
export async function appendEntry(
  tx: Transaction,
  entry: {
    readonly chain: string;
    readonly actorId: string;
    /** As printed at the time; a later change of name does not rewrite the log. */
    readonly actorName: string;
    readonly event: AuditEvent;
    readonly salt: string;
  },
): Promise<void> {
  const payload = canonicalJson({
    actorName: entry.actorName,
    event: auditEventSchema.parse(entry.event),
    salt: entry.salt,
  });
  const zeros = Buffer.alloc(32);
  await tx.insert(auditEntry).values({
    chain: entry.chain,
    actorId: entry.actorId,
    kind: entry.event.event,
    payload,
    // Overwritten by the trigger, which alone decides them.
    seq: 0,
    at: sql`SYSDATE(6)`,
    payloadHash: zeros,
    prevHash: zeros,
    hash: zeros,
  });
}
