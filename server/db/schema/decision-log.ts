import { bigint, customType, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core';
import { identifier } from '../identifier.ts';

const hash = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'binary(32)' });
/** Bytes that are hashed as they are: no collation may change or compare them loosely. */
const payloadText = customType<{ data: string }>({
  dataType: () => 'longtext character set utf8mb4 collate utf8mb4_nopad_bin',
});
/** As text: reading microseconds through a Date would lose them. */
const microseconds = customType<{ data: string }>({ dataType: () => 'datetime(6)' });

/** The last entry of each chain: one chain per study and one named `system`. */
export const auditHead = mysqlTable('audit_head', {
  chain: identifier('chain').primaryKey(),
  seq: bigint('seq', { mode: 'number' }).notNull(),
  hash: hash('hash').notNull(),
});

/**
 * The decision log. Sequence, time and hashes are written by a trigger with a locked definer; the server's account
 * may insert and select, nothing else. No foreign keys: a cascade would delete past triggers and grants.
 */
export const auditEntry = mysqlTable(
  'audit_entry',
  {
    chain: identifier('chain').notNull(),
    seq: bigint('seq', { mode: 'number' }).notNull(),
    at: microseconds('at').notNull(),
    actorId: identifier('actor_id').notNull(),
    /** The event's name, to filter by. */
    kind: varchar('kind', { length: 60 }).notNull(),
    payload: payloadText('payload').notNull(),
    payloadHash: hash('payload_hash').notNull(),
    prevHash: hash('prev_hash').notNull(),
    hash: hash('hash').notNull(),
  },
  (table) => [primaryKey({ columns: [table.chain, table.seq] })],
);
