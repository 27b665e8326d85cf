import { createHash } from 'node:crypto';
import { and, asc, eq, gt, sql } from 'drizzle-orm';
import type { Reader } from './database.ts';
import { auditEntry, auditHead } from './schema/decision-log.ts';

export type StoredEntry = {
  readonly chain: string;
  readonly seq: number;
  /** `2026-03-04 09:12:33.123456`, UTC. */
  readonly at: string;
  readonly actorId: string;
  readonly kind: string;
  readonly payload: string;
  readonly payloadHash: Buffer;
  readonly prevHash: Buffer;
  readonly hash: Buffer;
};

/** The hash an entry must have, from its parts at their fixed widths; the layout is in docs/decisions/0002. */
export function entryHash(entry: Omit<StoredEntry, 'payload' | 'hash'>): Buffer {
  return createHash('sha256')
    .update(
      [
        'stemma-log-1\n',
        entry.chain.padEnd(36),
        entry.prevHash.toString('hex'),
        String(entry.seq).padStart(20, '0'),
        entry.at,
        entry.actorId.padEnd(36),
        entry.kind.padEnd(60),
        entry.payloadHash.toString('hex'),
      ].join(''),
    )
    .digest();
}

/** What is wrong with an entry that should follow `previous`, in a sentence; null when nothing is. */
export function faultOf(entry: StoredEntry, previous: { readonly seq: number; readonly hash: Buffer }): string | null {
  if (entry.seq !== previous.seq + 1)
    return `Entry ${previous.seq + 1} is missing: entry ${entry.seq} comes after ${previous.seq}.`;
  if (!entry.prevHash.equals(previous.hash)) return `Entry ${entry.seq} does not follow from the entry before it.`;
  const payloadHash = createHash('sha256').update(entry.payload).digest();
  if (!payloadHash.equals(entry.payloadHash)) return `What entry ${entry.seq} says is not what was written.`;
  if (!entryHash(entry).equals(entry.hash)) return `Who, when or what kind entry ${entry.seq} is was changed.`;
  return null;
}

const pageSize = 1000;

export type ChainVerdict = {
  readonly entries: number;
  readonly headHash: string;
  readonly broken: { readonly seq: number; readonly sentence: string } | null;
};

/** Recomputes every hash of a chain in order and compares its end with the head. */
export async function verifyChain(reader: Reader, chain: string): Promise<ChainVerdict> {
  const [head] = await reader.select().from(auditHead).where(eq(auditHead.chain, chain));
  let previous: { readonly seq: number; readonly hash: Buffer } = { seq: 0, hash: Buffer.alloc(32) };
  const verdict = (broken: ChainVerdict['broken']): ChainVerdict => ({
    entries: previous.seq,
    headHash: previous.hash.toString('hex'),
    broken,
  });
  for (;;) {
    const page = await reader
      .select({
        chain: auditEntry.chain,
        seq: auditEntry.seq,
        at: sql<string>`CAST(${auditEntry.at} AS CHAR)`,
        actorId: auditEntry.actorId,
        kind: auditEntry.kind,
        payload: auditEntry.payload,
        payloadHash: auditEntry.payloadHash,
        prevHash: auditEntry.prevHash,
        hash: auditEntry.hash,
      })
      .from(auditEntry)
      .where(and(eq(auditEntry.chain, chain), gt(auditEntry.seq, previous.seq)))
      .orderBy(asc(auditEntry.seq))
      .limit(pageSize);
    for (const entry of page) {
      // Entries written after the head was read belong to the next verification.
      if (head && entry.seq > head.seq) break;
      const sentence = faultOf(entry, previous);
      if (sentence) return verdict({ seq: entry.seq, sentence });
      previous = { seq: entry.seq, hash: entry.hash };
    }
    if (page.length < pageSize) break;
  }
  if (previous.seq !== (head?.seq ?? 0) || (head && !previous.hash.equals(head.hash))) {
    return verdict({
      seq: previous.seq + 1,
      sentence: `The log ends at entry ${previous.seq}, but its head says ${head?.seq ?? 0}.`,
    });
  }
  return verdict(null);
}
