import { datetime, index, int, mysqlTable, text, varchar } from 'drizzle-orm/mysql-core';
import * as z from 'zod';
import { identifier } from '../identifier.ts';
import { jsonColumn } from '../json-column.ts';

/** Mails that are owed. Written in the transaction of the change; sent, retried and marked by the drain. */
export const outbox = mysqlTable(
  'outbox',
  {
    /** Also the local part of the Message-ID, so that a second copy can be recognised. */
    id: identifier('id').primaryKey(),
    kind: varchar('kind', { length: 60 }).notNull(),
    recipientId: identifier('recipient_id').notNull(),
    payload: jsonColumn('payload', z.record(z.string(), z.unknown())).notNull(),
    createdAt: datetime('created_at', { fsp: 3 }).notNull(),
    /** Null once sent or given up. */
    dueAt: datetime('due_at', { fsp: 3 }),
    attempts: int('attempts').notNull(),
    sentAt: datetime('sent_at', { fsp: 3 }),
    lastError: text('last_error'),
  },
  // The drain asks for due rows in order; without this it would read every row ever sent.
  (table) => [index('outbox_due').on(table.dueAt)],
);
