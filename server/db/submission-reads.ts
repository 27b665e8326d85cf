import { and, desc, eq, lte, ne } from 'drizzle-orm';
import type { Submission } from '../../shared/api/submissions.ts';
import type { SubmissionFacts } from '../../shared/domain/submission-policy.ts';
import type { SignedInActor } from './actor.ts';
import { canonicalJson } from './canonical-json.ts';
import type { Reader, Transaction } from './database.ts';
import { Problem } from './problem.ts';
import { people } from './schema/people.ts';
import { rulings, signatures, submissionAuthors, submissions } from './schema/submissions.ts';
import { lockStudy, readItems, requireReadable, type StudyRow } from './study-reads.ts';

export type SubmissionRow = typeof submissions.$inferSelect;

function noSuchSubmission(): Problem {
  return new Problem('not found', 'There is no such submission, or you are not a member of its study.');
}

async function findReadable(reader: Reader, actor: SignedInActor, submissionId: string): Promise<SubmissionRow> {
  const [row] = await reader.select().from(submissions).where(eq(submissions.id, submissionId));
  if (!row) throw noSuchSubmission();
  try {
    requireReadable(actor, row.studyId);
  } catch {
    throw noSuchSubmission();
  }
  return row;
}

/** Locks the study of a submission, then reads the submission as it is now: one verdict at a time. */
export async function lockSubmission(
  tx: Transaction,
  actor: SignedInActor,
  submissionId: string,
): Promise<{ study: StudyRow; row: SubmissionRow }> {
  const { studyId } = await findReadable(tx, actor, submissionId);
  const study = await lockStudy(tx, studyId);
  const [row] = await tx.select().from(submissions).where(eq(submissions.id, submissionId)).for('update');
  if (!row) throw noSuchSubmission();
  return { study, row };
}

async function nameOfPerson(reader: Reader, personId: string | null): Promise<string> {
  if (personId === null) return '';
  const [person] = await reader.select({ name: people.name }).from(people).where(eq(people.id, personId));
  return person?.name ?? 'somebody';
}

/** What in the package is no longer as it was when it was submitted, by name. */
async function movedSince(reader: Reader, row: SubmissionRow): Promise<string[]> {
  const items = new Map((await readItems(reader, row.studyId)).map((item) => [item.id, item.body]));
  const { operatingPoints, quantities, routes, tests } = row.snapshot.model;
  return [...operatingPoints, ...quantities, ...routes, ...tests].flatMap((item) => {
    const now = items.get(item.id);
    if (now === undefined) return [`${item.name} (removed)`];
    return canonicalJson(now) === canonicalJson(item) ? [] : [item.name];
  });
}

/** The whole submission as the API hands it out. */
export async function describeSubmission(reader: Reader, row: SubmissionRow): Promise<Submission> {
  const ruled = await reader
    .select({
      routeId: rulings.routeId,
      assumptionKey: rulings.assumptionKey,
      ruling: rulings.ruling,
      byName: people.name,
      at: rulings.at,
    })
    .from(rulings)
    .innerJoin(people, eq(people.id, rulings.byPerson))
    .where(eq(rulings.submissionId, row.id));
  const signed = await reader.select().from(signatures).where(eq(signatures.submissionId, row.id));
  const authors = await reader.select().from(submissionAuthors).where(eq(submissionAuthors.submissionId, row.id));
  const [before] = await reader
    .select({ snapshot: submissions.snapshot })
    .from(submissions)
    .where(
      and(
        eq(submissions.studyId, row.studyId),
        eq(submissions.targetQuantityId, row.targetQuantityId),
        eq(submissions.status, 'signed'),
        ne(submissions.id, row.id),
        lte(submissions.submittedAt, row.submittedAt),
      ),
    )
    .orderBy(desc(submissions.submittedAt))
    .limit(1);
  const { outcomeAt } = row;
  return {
    id: row.id,
    studyId: row.studyId,
    studyTitle: row.snapshot.studyTitle,
    status: row.status,
    note: row.note,
    submittedById: row.submittedBy,
    submittedByName: await nameOfPerson(reader, row.submittedBy),
    submittedAt: row.submittedAt.toISOString(),
    snapshot: row.snapshot,
    snapshotHash: row.snapshotHash,
    signedBefore: before?.snapshot ?? null,
    movedSince: await movedSince(reader, row),
    authorIds: authors.map((author) => author.personId),
    rulings: ruled.map((one) => ({ ...one, at: one.at.toISOString() })),
    signatures: signed.map((one) => ({ ...one, signedAt: one.signedAt.toISOString() })),
    outcome: outcomeAt && {
      byName: await nameOfPerson(reader, row.outcomeBy),
      at: outcomeAt.toISOString(),
      comments: row.outcomeComments ?? '',
    },
  };
}

export async function readSubmission(reader: Reader, actor: SignedInActor, submissionId: string): Promise<Submission> {
  return describeSubmission(reader, await findReadable(reader, actor, submissionId));
}

/** What the policies ask of a submission: every assumption of the routes in its package, and what was ruled. */
export function factsOf(submission: Submission): SubmissionFacts {
  return {
    studyId: submission.studyId,
    status: submission.status,
    submittedById: submission.submittedById,
    authorIds: submission.authorIds,
    assumptions: submission.snapshot.routeIds.flatMap((routeId) =>
      (submission.snapshot.evaluation.routes[routeId]?.assumptions ?? []).map(({ key }) => ({
        routeId,
        assumptionKey: key,
      })),
    ),
    rulings: submission.rulings,
  };
}
