import { boolean, char, customType, datetime, index, mysqlTable, varchar } from 'drizzle-orm/mysql-core';
import { identifier } from '../identifier.ts';

/** Compared byte by byte after normalising, so that look-alikes are two addresses and never one person. */
const emailColumn = customType<{ data: string }>({
  dataType: () => 'varchar(254) character set utf8mb4 collate utf8mb4_nopad_bin',
});

export const people = mysqlTable('people', {
  id: identifier('id').primaryKey(),
  /** Lower case, NFKC: one person for one address. */
  email: emailColumn('email').notNull().unique(),
  name: varchar('name', { length: 120 }).notNull(),
  /** Argon2id in PHC notation; null until the invitation is answered. */
  passwordHash: varchar('password_hash', { length: 255 }),
  isAdministrator: boolean('is_administrator').notNull(),
  isAuditor: boolean('is_auditor').notNull(),
  isActive: boolean('is_active').notNull(),
  createdAt: datetime('created_at', { fsp: 3 }).notNull(),
});

/** One-time links for set-up, invitations and forgotten passwords. Only the hash of the token is kept. */
export const oneTimeLinks = mysqlTable('one_time_links', {
  tokenHash: char('token_hash', { length: 64 }).primaryKey(),
  personId: identifier('person_id'),
  purpose: varchar('purpose', { length: 20, enum: ['setup', 'password'] }).notNull(),
  expiresAt: datetime('expires_at', { fsp: 3 }).notNull(),
  usedAt: datetime('used_at', { fsp: 3 }),
});

export const sessions = mysqlTable(
  'sessions',
  {
    /** SHA-256 of the session id: a copy of the table opens no session. */
    idHash: char('id_hash', { length: 64 }).primaryKey(),
    personId: identifier('person_id'),
    data: varchar('data', { length: 4000 }).notNull(),
    expiresAt: datetime('expires_at', { fsp: 3 }).notNull(),
  },
  // Ending all sessions of a person, and sweeping the expired ones.
  (table) => [index('sessions_by_person').on(table.personId), index('sessions_by_expiry').on(table.expiresAt)],
);
