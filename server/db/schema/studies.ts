import { char, datetime, index, int, mysqlTable, primaryKey, text, varchar } from 'drizzle-orm/mysql-core';
import * as z from 'zod';
import { studyRoles } from '../../../shared/domain/ability.ts';
import { chainItemKinds } from '../../../shared/domain/audit-events.ts';
import { routeStatuses } from '../../../shared/domain/route-lifecycle.ts';
import { jsonColumn } from '../json-column.ts';

export const studies = mysqlTable('studies', {
  id: char('id', { length: 36 }).primaryKey(),
  title: varchar('title', { length: 200 }).notNull(),
  question: text('question').notNull(),
  /** Raised by every change; the row is locked first by every command on the study. */
  revision: int('revision').notNull(),
  createdAt: datetime('created_at', { fsp: 3 }).notNull(),
  changedAt: datetime('changed_at', { fsp: 3 }).notNull(),
});

export const memberships = mysqlTable(
  'memberships',
  {
    studyId: char('study_id', { length: 36 }).notNull(),
    personId: char('person_id', { length: 36 }).notNull(),
    role: varchar('role', { length: 20, enum: studyRoles }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.studyId, table.personId] }),
    // Every request asks for the studies of one person.
    index('memberships_by_person').on(table.personId),
  ],
);

/** Operating points, quantities, routes, tests and input correlations: one row each, read with one select. */
export const chainItems = mysqlTable(
  'chain_items',
  {
    studyId: char('study_id', { length: 36 }).notNull(),
    id: char('id', { length: 36 }).notNull(),
    kind: varchar('kind', { length: 20, enum: chainItemKinds }).notNull(),
    /** Order of creation within the study, so that lists keep their order. */
    position: int('position').notNull(),
    revision: int('revision').notNull(),
    /** Validated by the kind's schema where the model is put together. */
    body: jsonColumn('body', z.unknown()).notNull(),
    lastEditedBy: char('last_edited_by', { length: 36 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.id] })],
);

export const routeStates = mysqlTable(
  'route_states',
  {
    studyId: char('study_id', { length: 36 }).notNull(),
    routeId: char('route_id', { length: 36 }).notNull(),
    status: varchar('status', { length: 20, enum: routeStatuses }).notNull(),
    revision: int('revision').notNull(),
    submissionId: char('submission_id', { length: 36 }),
    /** Hash of everything upstream at approval; differs from now: basis changed. */
    signedBasisHash: char('signed_basis_hash', { length: 64 }),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.routeId] })],
);

/** Where the nodes stand. Layout is not record: no log entry, last writer wins. */
export const layouts = mysqlTable('layouts', {
  studyId: char('study_id', { length: 36 }).primaryKey(),
  positions: jsonColumn('positions', z.record(z.string(), z.object({ x: z.number(), y: z.number() }))).notNull(),
});
