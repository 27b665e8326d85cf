import { and, eq, sql } from 'drizzle-orm';
import * as z from 'zod';
import type { ChainEdit } from '../../shared/api/studies.ts';
import { type ChainChange, chainItemSchema } from '../../shared/domain/audit-events.ts';
import { mayMove, routeMoves } from '../../shared/domain/route-lifecycle.ts';
import { checkModel } from '../../shared/engine/evaluate/check-model.ts';
import { upstreamOf } from '../../shared/engine/evaluate/upstream.ts';
import type { StudyModel } from '../../shared/engine/model/study-model.ts';
import type { Reader, Transaction } from './database.ts';
import { Problem } from './problem.ts';
import { auditEntry } from './schema/decision-log.ts';
import { chainItems, routeStates } from './schema/studies.ts';
import { submissions } from './schema/submissions.ts';
import { assembleModel, type ItemRow, type RouteStateRow, readItems, readRouteStates } from './study-reads.ts';

type Edited = {
  readonly model: StudyModel;
  readonly changes: readonly ChainChange[];
  readonly itemRevisions: Readonly<Record<string, number>>;
};

/** An edit names what it saw; anything newer on the server means the person must look again. */
function requireUnmoved(items: readonly ItemRow[], edits: readonly ChainEdit[]): void {
  const conflicts = edits.flatMap((edit) => {
    const stored = items.find((item) => item.id === edit.id);
    const revision = stored?.revision ?? 0;
    if (revision === edit.expectedRevision && (!stored || stored.kind === edit.kind)) return [];
    return [{ id: edit.id, yours: edit.body, theirs: stored?.body ?? null, theirRevision: revision }];
  });
  if (conflicts.length > 0) {
    const sentence =
      conflicts.length === 1
        ? 'Somebody else changed this meanwhile. Compare both versions and choose.'
        : `Somebody else changed ${conflicts.length} of these meanwhile. Compare both versions and choose.`;
    throw new Problem('stale', sentence, { conflicts });
  }
}

function requireWellFormed(edits: readonly ChainEdit[]): void {
  const seen = new Set<string>();
  for (const edit of edits) {
    if (seen.has(edit.id)) throw new Problem('invalid', 'The same item stands twice in one change.');
    seen.add(edit.id);
    if (edit.body === null) continue;
    const parsed = chainItemSchema.safeParse({ kind: edit.kind, body: edit.body });
    if (!parsed.success || parsed.data.body.id !== edit.id) {
      const issue = parsed.success ? 'its id is not the one of the change' : parsed.error.issues[0]?.message;
      throw new Problem('invalid', `This ${edit.kind} cannot be stored: ${issue}.`, {
        fields: { [edit.id]: String(issue) },
      });
    }
  }
}

/** What lies in a package that is being reviewed stays as it is until the review ends. */
async function requireNotInReview(tx: Transaction, studyId: string, model: StudyModel, edits: readonly ChainEdit[]) {
  const open = await tx
    .select({ targetName: submissions.targetName, snapshot: submissions.snapshot })
    .from(submissions)
    .where(and(eq(submissions.studyId, studyId), eq(submissions.status, 'open')));
  for (const { targetName, snapshot } of open) {
    const upstream = upstreamOf(snapshot.model, snapshot.targetQuantityId);
    const frozen = new Set([
      ...upstream.quantityIds,
      ...upstream.routeIds,
      ...upstream.operatingPointIds,
      ...upstream.testIds,
      ...snapshot.model.inputCorrelations.map((correlation) => correlation.id),
    ]);
    const touched = edits.find((edit) => frozen.has(edit.id));
    if (touched) {
      throw new Problem(
        'not allowed',
        `${nameOf(model, touched)} is part of the submission of ${targetName}, which is in review. Withdraw the submission to change it, or wait for the review.`,
      );
    }
  }
}

function nameOf(model: StudyModel, edit: ChainEdit): string {
  const named = [...model.operatingPoints, ...model.quantities, ...model.routes, ...model.tests];
  return `"${named.find((one) => one.id === edit.id)?.name ?? edit.kind}"`;
}

/** An approved route is opened again only with a reason; its signed snapshot stays what it is. */
async function reopenRoutes(
  tx: Transaction,
  studyId: string,
  states: readonly RouteStateRow[],
  edits: readonly ChainEdit[],
  reason: string,
): Promise<void> {
  for (const edit of edits.filter((one) => one.kind === 'route')) {
    const state = states.find((one) => one.routeId === edit.id);
    const where = and(eq(routeStates.studyId, studyId), eq(routeStates.routeId, edit.id));
    if (state && !mayMove(routeMoves.edit, state.status)) {
      throw new Problem('not allowed', 'This route is in review. Withdraw the submission to change it.');
    }
    if (state?.status === 'approved' && reason === '') {
      const sentence = 'This route is approved. Say why it has to change; the signed one stays on record.';
      throw new Problem('invalid', sentence, { fields: { 'body.reason': sentence } });
    }
    if (edit.body === null) {
      await tx.delete(routeStates).where(where);
    } else if (!state) {
      await tx.insert(routeStates).values({
        studyId,
        routeId: edit.id,
        status: 'draft',
        revision: 1,
        submissionId: null,
        signedBasisHash: null,
      });
    } else {
      const revision = state.status === 'approved' ? state.revision + 1 : state.revision;
      await tx.update(routeStates).set({ status: routeMoves.edit.to, revision, signedBasisHash: null }).where(where);
    }
  }
}

function modelAfter(items: readonly ItemRow[], edits: readonly ChainEdit[]): StudyModel {
  const byId = new Map(edits.map((edit) => [edit.id, edit]));
  const kept = items.flatMap((item) => {
    const edit = byId.get(item.id);
    if (!edit) return [item];
    byId.delete(item.id);
    return edit.body === null ? [] : [{ kind: item.kind, body: edit.body as unknown }];
  });
  const added = [...byId.values()].filter((edit) => edit.body !== null);
  return assembleModel([...kept, ...added.map(({ kind, body }) => ({ kind, body: body as unknown }))]);
}

/**
 * Carries out a list of edits on a locked study, all or none.
 *
 * @throws Problem `stale`, `not allowed` or `invalid`, each with a sentence.
 */
export async function editItems(
  tx: Transaction,
  studyId: string,
  edits: readonly ChainEdit[],
  who: { readonly personId: string; readonly reason: string },
): Promise<Edited> {
  requireWellFormed(edits);
  const items = await readItems(tx, studyId);
  requireUnmoved(items, edits);
  await requireNotInReview(tx, studyId, assembleModel(items), edits);
  const states = await readRouteStates(tx, studyId);

  const model = modelAfter(items, edits);
  const errors = checkModel(model);
  if (errors.length > 0) {
    throw new Problem('invalid', errors[0]?.sentence ?? 'The chain cannot be like this.', {
      fields: Object.fromEntries(errors.toReversed().map((error) => [error.subject.id, error.sentence])),
    });
  }
  await reopenRoutes(tx, studyId, states, edits, who.reason);

  const itemRevisions: Record<string, number> = {};
  let position = items.reduce((last, item) => Math.max(last, item.position), 0);
  const changes: ChainChange[] = [];
  for (const { id, kind, body, expectedRevision } of edits) {
    const before = items.find((item) => item.id === id);
    if (body === null) {
      if (!before) continue;
      await tx.delete(chainItems).where(and(eq(chainItems.studyId, studyId), eq(chainItems.id, id)));
    } else {
      const revision = expectedRevision + 1;
      itemRevisions[id] = revision;
      const lastEditedBy = who.personId;
      if (before) {
        await tx
          .update(chainItems)
          .set({ body, revision, lastEditedBy })
          .where(and(eq(chainItems.studyId, studyId), eq(chainItems.id, id)));
      } else {
        position += 1;
        await tx.insert(chainItems).values({ studyId, id, kind, position, revision, body, lastEditedBy });
      }
    }
    changes.push({ kind, id, before: before?.body ?? null, after: body });
  }
  if (changes.length === 0)
    throw new Problem('invalid', 'What should be removed is not in the study, so nothing was changed.');
  return { model, changes, itemRevisions };
}

const touchedSchema = z.array(z.string());

/** Everybody who ever edited one of the items, by the decision log: also those whose edit was edited over since. */
export async function editorsOf(reader: Reader, studyId: string, ids: readonly string[]): Promise<string[]> {
  const edits = await reader
    .select({
      personId: auditEntry.actorId,
      // NULL where an entry lists no change at all.
      touched: sql<string | null>`JSON_EXTRACT(${auditEntry.payload}, '$.event.changes[*].id')`,
    })
    .from(auditEntry)
    .where(and(eq(auditEntry.chain, studyId), eq(auditEntry.kind, 'chain.edited')));
  const wanted = new Set(ids);
  const editors = edits.filter(({ touched }) =>
    touchedSchema.parse(JSON.parse(touched ?? '[]')).some((id) => wanted.has(id)),
  );
  return [...new Set(editors.map((edit) => edit.personId))];
}
