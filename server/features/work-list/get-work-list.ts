import { and, desc, eq, inArray } from 'drizzle-orm';
import { getWorkList, type WorkItem } from '../../../shared/api/work-list.ts';
import { studySubject } from '../../../shared/domain/ability.ts';
import { people } from '../../db/schema/people.ts';
import { chainItems, routeStates, studies } from '../../db/schema/studies.ts';
import { rulings, signatures, submissions } from '../../db/schema/submissions.ts';
import { assembleModel, describeRouteStates } from '../../db/study-reads.ts';
import { defineQuery, type Handler } from '../../http/handler.ts';

/** How many signatures an auditor is shown. */
const latestSignatures = 10;

/** What the person must do now, from a fixed number of reads over the studies that they can see. */
const getWorkListQuery = defineQuery(getWorkList, async ({ actor, reader }) => {
  const all = await reader.select().from(studies).orderBy(desc(studies.changedAt));
  const mine = all.filter((study) => actor.ability.can('read', studySubject(study.id)));
  const ids = mine.map((study) => study.id);
  if (ids.length === 0) return { items: [] };

  const items = await reader
    .select()
    .from(chainItems)
    .where(inArray(chainItems.studyId, ids))
    .orderBy(chainItems.position);
  const states = await reader.select().from(routeStates).where(inArray(routeStates.studyId, ids));
  const names = new Map(
    (await reader.select({ id: people.id, name: people.name }).from(people)).map((one) => [one.id, one.name]),
  );
  const nameOf = (id: string | null) => names.get(id ?? '') ?? 'somebody';
  const submitted = await reader
    .select()
    .from(submissions)
    .where(inArray(submissions.studyId, ids))
    .orderBy(desc(submissions.submittedAt));
  const conditions = await reader
    .select({
      submissionId: rulings.submissionId,
      ruling: rulings.ruling,
      at: rulings.at,
      studyId: submissions.studyId,
    })
    .from(rulings)
    .innerJoin(submissions, eq(submissions.id, rulings.submissionId))
    // A condition binds once the submission is signed; one of a returned package was never met with.
    .where(and(inArray(submissions.studyId, ids), eq(submissions.status, 'signed')));
  const auditedIds = ids.filter((id) => actor.isAuditor || actor.memberships[id] === 'auditor');
  const signed =
    auditedIds.length === 0
      ? []
      : await reader
          .select({
            submissionId: signatures.submissionId,
            signerName: signatures.signerName,
            signedAt: signatures.signedAt,
            studyId: submissions.studyId,
            targetName: submissions.targetName,
          })
          .from(signatures)
          .innerJoin(submissions, eq(submissions.id, signatures.submissionId))
          .where(inArray(submissions.studyId, auditedIds))
          .orderBy(desc(signatures.signedAt))
          .limit(latestSignatures);

  const work: WorkItem[] = [];
  for (const study of mine) {
    const role = actor.memberships[study.id];
    const base = { studyId: study.id, studyTitle: study.title };
    const own = submitted.filter((submission) => submission.studyId === study.id);
    if (role === 'manager') {
      for (const submission of own.filter((one) => one.status === 'open')) {
        const { routeIds, evaluation } = submission.snapshot;
        const outsideWindows = routeIds
          .flatMap((id) => evaluation.routes[id]?.checks ?? [])
          .filter((check) => check.verdict === 'outside').length;
        work.push({
          ...base,
          kind: 'submission waits for you',
          since: submission.submittedAt.toISOString(),
          submissionId: submission.id,
          targetName: submission.targetName,
          byName: nameOf(submission.submittedBy),
          outsideWindows,
        });
      }
    }
    if (role === 'engineer') {
      const model = assembleModel(items.filter((item) => item.studyId === study.id));
      const current = describeRouteStates(
        model,
        states.filter((state) => state.studyId === study.id),
      );
      const returnedNow = own.filter(
        (submission) =>
          submission.status === 'returned' &&
          submission.snapshot.routeIds.some(
            (id) => current[id]?.status === 'returned' && current[id]?.submissionId === submission.id,
          ),
      );
      for (const submission of returnedNow) {
        work.push({
          ...base,
          kind: 'returned to you',
          since: (submission.outcomeAt ?? submission.submittedAt).toISOString(),
          submissionId: submission.id,
          targetName: submission.targetName,
          byName: nameOf(submission.outcomeBy),
          comments: submission.outcomeComments ?? '',
        });
      }
      for (const submission of own.filter((one) => one.status === 'open' && one.submittedBy === actor.personId)) {
        work.push({
          ...base,
          kind: 'your submission waits',
          since: submission.submittedAt.toISOString(),
          submissionId: submission.id,
          targetName: submission.targetName,
        });
      }
      for (const route of model.routes.filter((one) => current[one.id]?.basisChanged)) {
        const quantityName = model.quantities.find((quantity) => quantity.id === route.quantityId)?.name ?? '';
        work.push({ ...base, kind: 'basis changed', since: study.changedAt.toISOString(), quantityName });
      }
      const draftCount = model.routes.filter((route) => current[route.id]?.status === 'draft').length;
      if (draftCount > 0) work.push({ ...base, kind: 'draft', since: study.changedAt.toISOString(), draftCount });
    }
    if (role) {
      for (const { ruling, at, submissionId } of conditions.filter((one) => one.studyId === study.id)) {
        if (ruling.ruling !== 'accepted on condition' || !ruling.condition) continue;
        const { text, dueOn } = ruling.condition;
        work.push({ ...base, kind: 'condition', since: at.toISOString(), submissionId, text, dueOn });
      }
    }
  }
  for (const one of signed) {
    const study = mine.find((candidate) => candidate.id === one.studyId);
    if (!study) continue;
    work.push({
      studyId: study.id,
      studyTitle: study.title,
      kind: 'latest signature',
      since: one.signedAt.toISOString(),
      submissionId: one.submissionId,
      targetName: one.targetName,
      byName: one.signerName,
    });
  }
  return { items: work };
});

export const workListRoutes: Handler[] = [getWorkListQuery];
