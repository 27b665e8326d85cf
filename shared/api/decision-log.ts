import * as z from 'zod';
import { auditEventSchema } from '../domain/audit-events.ts';
import { defineEndpoint } from './endpoint.ts';

export const logEntrySchema = z.object({
  seq: z.int(),
  /** UTC from the database's clock, microseconds: `2026-03-04 09:12:33.123456`. */
  at: z.string(),
  actorId: z.string(),
  actorName: z.string(),
  event: auditEventSchema,
  hash: z.string(),
});
export type LogEntry = z.infer<typeof logEntrySchema>;

/** Newest first, 100 a page. */
export const listLogEntries = defineEndpoint({
  method: 'GET',
  path: '/api/studies/:studyId/decision-log',
  params: z.object({ studyId: z.uuid() }),
  query: z.object({
    before: z.coerce.number().int().positive().optional(),
    actorId: z.string().max(40).optional(),
    event: z.string().max(40).optional(),
    /** Free text, found in names, summaries, reasons and values. */
    text: z.string().max(100).optional(),
  }),
  reply: z.object({ entries: z.array(logEntrySchema), total: z.int(), hasMore: z.boolean() }),
});

/** Recomputes every hash of the study's log and compares it with the head. Logged as a review of the log. */
export const verifyLog = defineEndpoint({
  method: 'POST',
  path: '/api/studies/:studyId/decision-log/verifications',
  params: z.object({ studyId: z.uuid() }),
  reply: z.object({
    whole: z.boolean(),
    entries: z.int(),
    headHash: z.string(),
    verifiedAt: z.iso.datetime(),
    /** Where it broke: the first bad entry and what is wrong with it; null when whole. */
    broken: z.object({ seq: z.int(), sentence: z.string() }).nullable(),
  }),
});
