import { and, eq, inArray } from 'drizzle-orm';
import { openSubmission, type Snapshot } from '../../../shared/api/submissions.ts';
import { routeMoves } from '../../../shared/domain/route-lifecycle.ts';
import { canSubmit } from '../../../shared/domain/submission-policy.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { sliceModel, upstreamOf } from '../../../shared/engine/evaluate/upstream.ts';
import type { StudyEvaluation } from '../../../shared/engine/model/evaluation.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import { canonicalJson, sha256 } from '../../db/canonical-json.ts';
import { editorsOf } from '../../db/edit-items.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { routeStates } from '../../db/schema/studies.ts';
import { submissionAuthors, submissionRoutes, submissions } from '../../db/schema/submissions.ts';
import {
  assembleModel,
  describeRouteStates,
  lockStudy,
  managersOf,
  raiseRevision,
  readItems,
  readRouteStates,
  requireReadable,
} from '../../db/study-reads.ts';
import { describeSubmission } from '../../db/submission-reads.ts';
import { defineCommand } from '../../http/handler.ts';

type Reason = { readonly sentence: string; readonly subject: { readonly kind: string; readonly id: string } };

/** What keeps a package from being reviewed, each with where to mend it. */
export function missingFor(slice: StudyModel, evaluation: StudyEvaluation, routeIds: readonly string[]): Reason[] {
  const reasons: Reason[] = evaluation.findings
    .filter((finding) => finding.severity === 'stops')
    .map(({ sentence, subject }) => ({ sentence, subject }));
  for (const quantity of slice.quantities) {
    if (evaluation.quantities[quantity.id]?.result) continue;
    const subject = { kind: 'quantity', id: quantity.id };
    if (reasons.some((reason) => reason.subject.id === quantity.id)) continue;
    reasons.push({
      sentence: `${quantity.name} has no value yet. Give it a route, or adopt one of its routes.`,
      subject,
    });
  }
  for (const route of slice.routes.filter((one) => routeIds.includes(one.id))) {
    for (const assumption of evaluation.routes[route.id]?.assumptions ?? []) {
      if (!assumption.needsJustification || route.justifications[assumption.key]?.trim()) continue;
      reasons.push({
        sentence: `"${route.name}": write why this holds (${assumption.verdict}): ${assumption.statement}`,
        subject: { kind: 'route', id: route.id },
      });
    }
  }
  return reasons;
}

export const openSubmissionCommand = defineCommand(openSubmission, async ({ actor, params, body, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canSubmit(actor, params.studyId));
  const study = await lockStudy(tx, params.studyId);
  if (study.revision !== body.revision) {
    throw new Problem('stale', 'The study changed since you looked at it. Look at the values once more, then submit.');
  }
  const model = assembleModel(await readItems(tx, study.id));
  const target = model.quantities.find((quantity) => quantity.id === body.targetQuantityId);
  if (!target) throw new Problem('not found', 'There is no such quantity in this study.');

  const upstream = upstreamOf(model, target.id);
  const states = describeRouteStates(model, await readRouteStates(tx, study.id));
  const routeIds = upstream.routeIds.filter((id) => states[id]?.status !== 'approved' || states[id]?.basisChanged);
  const slice = sliceModel(model, target.id);
  const evaluation = evaluateStudy(slice);

  const reasons = missingFor(slice, evaluation, routeIds);
  for (const id of routeIds.filter((one) => states[one]?.status === 'in review')) {
    const name = model.routes.find((route) => route.id === id)?.name;
    reasons.push({ sentence: `"${name}" is in review in another submission.`, subject: { kind: 'route', id } });
  }
  if (routeIds.length === 0 && reasons.length === 0) {
    const sentence = `Everything that ${target.name} rests on is approved already; there is nothing to review.`;
    reasons.push({ sentence, subject: { kind: 'quantity', id: target.id } });
  }
  const managers = await managersOf(tx, study.id);
  if (managers.length === 0) {
    const sentence = 'The study has no technical manager to review it. Add one on the page Members.';
    reasons.push({ sentence, subject: { kind: 'study', id: study.id } });
  }
  if (reasons.length > 0) throw new Problem('not ready', `Not ready for review: ${reasons[0]?.sentence}`, { reasons });

  const snapshot: Snapshot = {
    format: 'stemma-snapshot',
    version: 1,
    studyId: study.id,
    studyTitle: study.title,
    targetQuantityId: target.id,
    routeIds,
    model: slice,
    evaluation,
  };
  const row = {
    id: services.newId(),
    studyId: study.id,
    targetQuantityId: target.id,
    targetName: target.name,
    status: 'open' as const,
    note: body.note,
    submittedBy: actor.personId,
    submittedAt: services.now(),
    snapshot,
    snapshotHash: sha256(canonicalJson(snapshot)),
    outcomeBy: null,
    outcomeAt: null,
    outcomeComments: null,
  };
  await tx.insert(submissions).values(row);
  await tx.insert(submissionRoutes).values(routeIds.map((routeId) => ({ submissionId: row.id, routeId })));
  const parts = [slice.operatingPoints, slice.quantities, slice.tests, slice.inputCorrelations].flat();
  const editors = await editorsOf(tx, study.id, [...routeIds, ...parts.map((part) => part.id)]);
  const authors = [...new Set([actor.personId, ...editors])];
  await tx.insert(submissionAuthors).values(authors.map((personId) => ({ submissionId: row.id, personId })));
  await tx
    .update(routeStates)
    .set({ status: routeMoves.submit.to, submissionId: row.id })
    .where(and(eq(routeStates.studyId, study.id), inArray(routeStates.routeId, routeIds)));
  await raiseRevision(tx, study, services.now());

  const facts = { submissionId: row.id, targetName: target.name };
  return {
    reply: await describeSubmission(tx, row),
    audit: [
      {
        chain: study.id,
        event: {
          event: 'submission.opened',
          ...facts,
          targetQuantityId: target.id,
          routeIds,
          snapshotHash: row.snapshotHash,
          note: body.note,
        },
      },
    ],
    notices: managers.map((manager) => ({
      kind: 'submission-waits',
      recipientId: manager.personId,
      payload: { ...facts, studyTitle: study.title, byName: actor.name, note: body.note },
    })),
  };
});
