import { char, datetime, index, int, mysqlTable, primaryKey, text, varchar } from 'drizzle-orm/mysql-core';
import * as z from 'zod';
import { studyRoles } from '../../../shared/domain/ability.ts';
import { chainItemKinds } from '../../../shared/domain/audit-events.ts';
import { routeStatuses } from '../../../shared/domain/route-lifecycle.ts';
import { identifier } from '../identifier.ts';
import { jsonColumn } from '../json-column.ts';

export const studies = mysqlTable('studies', {
  id: identifier('id').primaryKey(),
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
    studyId: identifier('study_id').notNull(),
    personId: identifier('person_id').notNull(),
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
    studyId: identifier('study_id').notNull(),
    id: identifier('id').notNull(),
    kind: varchar('kind', { length: 20, enum: chainItemKinds }).notNull(),
    /** Order of creation within the study, so that lists keep their order. */
    position: int('position').notNull(),
    revision: int('revision').notNull(),
    /** Validated by the kind's schema where the model is put together. */
    body: jsonColumn('body', z.unknown()).notNull(),
    lastEditedBy: identifier('last_edited_by').notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.id] })],
);

export const routeStates = mysqlTable(
  'route_states',
  {
    studyId: identifier('study_id').notNull(),
    routeId: identifier('route_id').notNull(),
    status: varchar('status', { length: 20, enum: routeStatuses }).notNull(),
    revision: int('revision').notNull(),
    submissionId: identifier('submission_id'),
    /** Hash of everything upstream at approval; differs from now: basis changed. */
    signedBasisHash: char('signed_basis_hash', { length: 64 }),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.routeId] })],
);

/** Where the nodes stand. Layout is not record: no log entry, last writer wins. */
export const layouts = mysqlTable('layouts', {
  studyId: identifier('study_id').primaryKey(),
  positions: jsonColumn('positions', z.record(z.string(), z.object({ x: z.number(), y: z.number() }))).notNull(),
});
