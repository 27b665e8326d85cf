import { and, eq, inArray } from 'drizzle-orm';
import { routeMoves, type SubmissionStatus } from '../../../shared/domain/route-lifecycle.ts';
import type { Transaction } from '../../db/database.ts';
import { people } from '../../db/schema/people.ts';
import { routeStates } from '../../db/schema/studies.ts';
import { submissions } from '../../db/schema/submissions.ts';
import { raiseRevision, type StudyRow } from '../../db/study-reads.ts';
import type { SubmissionRow } from '../../db/submission-reads.ts';

const moveOfRoutes = { signed: 'approve', returned: 'return', withdrawn: 'withdraw' } as const;

/** Ends a submission: its own status, that of its routes, and the study's revision. Answers the row as it is now. */
export async function closeSubmission(
  tx: Transaction,
  study: StudyRow,
  row: SubmissionRow,
  outcome: {
    readonly status: Exclude<SubmissionStatus, 'open'>;
    readonly byPerson: string;
    readonly at: Date;
    readonly comments: string;
    /** By route id, for approved routes: the hash of what was signed. */
    readonly basisHashes: Readonly<Record<string, string>>;
  },
): Promise<SubmissionRow> {
  const change = {
    status: outcome.status,
    outcomeBy: outcome.byPerson,
    outcomeAt: outcome.at,
    outcomeComments: outcome.comments,
  };
  await tx.update(submissions).set(change).where(eq(submissions.id, row.id));
  const move = routeMoves[moveOfRoutes[outcome.status]];
  for (const routeId of row.snapshot.routeIds) {
    await tx
      .update(routeStates)
      .set({ status: move.to, signedBasisHash: outcome.basisHashes[routeId] ?? null })
      .where(
        and(
          eq(routeStates.studyId, study.id),
          eq(routeStates.routeId, routeId),
          inArray(routeStates.status, [...move.from]),
        ),
      );
  }
  await raiseRevision(tx, study, outcome.at);
  return { ...row, ...change };
}

/** Active people among the given, without the one who acts. */
export async function othersToTell(tx: Transaction, ids: readonly string[], actorId: string): Promise<string[]> {
  const wanted = ids.filter((id) => id !== actorId);
  if (wanted.length === 0) return [];
  const rows = await tx
    .select({ id: people.id })
    .from(people)
    .where(and(inArray(people.id, wanted), eq(people.isActive, true)));
  return rows.map((row) => row.id);
}
