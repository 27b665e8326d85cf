import { char, datetime, index, mysqlTable, primaryKey, text, varchar } from 'drizzle-orm/mysql-core';
import { snapshotSchema } from '../../../shared/api/submissions.ts';
import { rulingSchema } from '../../../shared/domain/audit-events.ts';
import { submissionStatuses } from '../../../shared/domain/route-lifecycle.ts';
import { jsonColumn } from '../json-column.ts';

export const submissions = mysqlTable(
  'submissions',
  {
    id: char('id', { length: 36 }).primaryKey(),
    studyId: char('study_id', { length: 36 }).notNull(),
    targetQuantityId: char('target_quantity_id', { length: 36 }).notNull(),
    targetName: varchar('target_name', { length: 200 }).notNull(),
    status: varchar('status', { length: 20, enum: submissionStatuses }).notNull(),
    note: text('note').notNull(),
    submittedBy: char('submitted_by', { length: 36 }).notNull(),
    submittedAt: datetime('submitted_at', { fsp: 3 }).notNull(),
    /** Canonical JSON (RFC 8785): the very bytes that were hashed. */
    snapshot: jsonColumn('snapshot', snapshotSchema).notNull(),
    snapshotHash: char('snapshot_hash', { length: 64 }).notNull(),
    outcomeBy: char('outcome_by', { length: 36 }),
    outcomeAt: datetime('outcome_at', { fsp: 3 }),
    outcomeComments: text('outcome_comments'),
  },
  // The study page and the work list ask for the submissions of a study.
  (table) => [index('submissions_by_study').on(table.studyId, table.status)],
);

export const submissionRoutes = mysqlTable(
  'submission_routes',
  {
    submissionId: char('submission_id', { length: 36 }).notNull(),
    routeId: char('route_id', { length: 36 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.routeId] })],
);

/** Who edited something in the package since it was last signed: none of them may sign. */
export const submissionAuthors = mysqlTable(
  'submission_authors',
  {
    submissionId: char('submission_id', { length: 36 }).notNull(),
    personId: char('person_id', { length: 36 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.personId] })],
);

export const rulings = mysqlTable(
  'rulings',
  {
    submissionId: char('submission_id', { length: 36 }).notNull(),
    routeId: char('route_id', { length: 36 }).notNull(),
    assumptionKey: varchar('assumption_key', { length: 80 }).notNull(),
    ruling: jsonColumn('ruling', rulingSchema).notNull(),
    byPerson: char('by_person', { length: 36 }).notNull(),
    at: datetime('at', { fsp: 3 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.routeId, table.assumptionKey] })],
);

/** Signed verdicts. INSERT only, by grant and by trigger. The name is frozen as at signing. */
export const signatures = mysqlTable(
  'signatures',
  {
    submissionId: char('submission_id', { length: 36 }).notNull(),
    signerId: char('signer_id', { length: 36 }).notNull(),
    signerName: varchar('signer_name', { length: 120 }).notNull(),
    meaning: varchar('meaning', { length: 300 }).notNull(),
    snapshotHash: char('snapshot_hash', { length: 64 }).notNull(),
    signedAt: datetime('signed_at', { fsp: 3 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.signerId] })],
);
