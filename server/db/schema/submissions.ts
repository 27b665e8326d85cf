import { char, datetime, index, mysqlTable, primaryKey, text, varchar } from 'drizzle-orm/mysql-core';
import { snapshotSchema } from '../../../shared/api/submissions.ts';
import { rulingSchema } from '../../../shared/domain/audit-events.ts';
import { submissionStatuses } from '../../../shared/domain/route-lifecycle.ts';
import { identifier } from '../identifier.ts';
import { jsonColumn } from '../json-column.ts';

export const submissions = mysqlTable(
  'submissions',
  {
    id: identifier('id').primaryKey(),
    studyId: identifier('study_id').notNull(),
    targetQuantityId: identifier('target_quantity_id').notNull(),
    targetName: varchar('target_name', { length: 200 }).notNull(),
    status: varchar('status', { length: 20, enum: submissionStatuses }).notNull(),
    note: text('note').notNull(),
    submittedBy: identifier('submitted_by').notNull(),
    submittedAt: datetime('submitted_at', { fsp: 3 }).notNull(),
    /** Hashed in its canonical form (RFC 8785), so the hash can be computed again from what is stored. */
    snapshot: jsonColumn('snapshot', snapshotSchema).notNull(),
    snapshotHash: char('snapshot_hash', { length: 64 }).notNull(),
    outcomeBy: identifier('outcome_by'),
    outcomeAt: datetime('outcome_at', { fsp: 3 }),
    outcomeComments: text('outcome_comments'),
  },
  // The study page and the work list ask for the submissions of a study.
  (table) => [index('submissions_by_study').on(table.studyId, table.status)],
);

export const submissionRoutes = mysqlTable(
  'submission_routes',
  {
    submissionId: identifier('submission_id').notNull(),
    routeId: identifier('route_id').notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.routeId] })],
);

/** Who ever edited something in the package, and who submitted it: none of them may sign. */
export const submissionAuthors = mysqlTable(
  'submission_authors',
  {
    submissionId: identifier('submission_id').notNull(),
    personId: identifier('person_id').notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.personId] })],
);

export const rulings = mysqlTable(
  'rulings',
  {
    submissionId: identifier('submission_id').notNull(),
    routeId: identifier('route_id').notNull(),
    assumptionKey: varchar('assumption_key', { length: 80 }).notNull(),
    ruling: jsonColumn('ruling', rulingSchema).notNull(),
    byPerson: identifier('by_person').notNull(),
    at: datetime('at', { fsp: 3 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.routeId, table.assumptionKey] })],
);

/** Signed verdicts. INSERT only, by grant and by trigger. The name is frozen as at signing. */
export const signatures = mysqlTable(
  'signatures',
  {
    submissionId: identifier('submission_id').notNull(),
    signerId: identifier('signer_id').notNull(),
    signerName: varchar('signer_name', { length: 120 }).notNull(),
    meaning: varchar('meaning', { length: 300 }).notNull(),
    snapshotHash: char('snapshot_hash', { length: 64 }).notNull(),
    signedAt: datetime('signed_at', { fsp: 3 }).notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.signerId] })],
);
