import { and, count, desc, eq, lt, sql } from 'drizzle-orm';
import * as z from 'zod';
import { listLogEntries, verifyLog } from '../../../shared/api/decision-log.ts';
import { auditEventSchema } from '../../../shared/domain/audit-events.ts';
import { canVerify } from '../../../shared/domain/study-policy.ts';
import { requireAllowed } from '../../db/problem.ts';
import { auditEntry } from '../../db/schema/decision-log.ts';
import { requireReadable } from '../../db/study-reads.ts';
import { verifyChain } from '../../db/verify-chain.ts';
import { defineCommand, defineQuery, type Handler } from '../../http/handler.ts';

const pageSize = 100;
const payloadSchema = z.object({ actorName: z.string(), event: auditEventSchema });

/** LIKE takes % and _ for wildcards; the reader means the characters. */
function literally(text: string): string {
  return `%${text.replace(/[\\%_]/g, (character) => `\\${character}`)}%`;
}

const listEntriesQuery = defineQuery(listLogEntries, async ({ actor, params, query, reader }) => {
  requireReadable(actor, params.studyId);
  const wanted = and(
    eq(auditEntry.chain, params.studyId),
    query.actorId ? eq(auditEntry.actorId, query.actorId) : undefined,
    query.event ? eq(auditEntry.kind, query.event) : undefined,
    query.text ? sql`${auditEntry.payload} COLLATE utf8mb4_unicode_ci LIKE ${literally(query.text)}` : undefined,
  );
  const [counted] = await reader.select({ total: count() }).from(auditEntry).where(wanted);
  const rows = await reader
    .select({
      seq: auditEntry.seq,
      at: sql<string>`CAST(${auditEntry.at} AS CHAR)`,
      actorId: auditEntry.actorId,
      payload: auditEntry.payload,
      hash: auditEntry.hash,
    })
    .from(auditEntry)
    .where(and(wanted, query.before ? lt(auditEntry.seq, query.before) : undefined))
    .orderBy(desc(auditEntry.seq))
    .limit(pageSize + 1);
  return {
    entries: rows.slice(0, pageSize).map((row) => {
      const { actorName, event } = payloadSchema.parse(JSON.parse(row.payload));
      return { seq: row.seq, at: row.at, actorId: row.actorId, actorName, event, hash: row.hash.toString('hex') };
    }),
    total: counted?.total ?? 0,
    hasMore: rows.length > pageSize,
  };
});

const verifyLogCommand = defineCommand(verifyLog, async ({ actor, params, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canVerify(actor, params.studyId));
  const { entries, headHash, broken } = await verifyChain(tx, params.studyId);
  return {
    reply: { whole: broken === null, entries, headHash, broken, verifiedAt: services.now().toISOString() },
    audit: [{ chain: params.studyId, event: { event: 'log.verified', entries, headHash, whole: broken === null } }],
    notices: [],
  };
});

export const decisionLogRoutes: Handler[] = [listEntriesQuery, verifyLogCommand];
