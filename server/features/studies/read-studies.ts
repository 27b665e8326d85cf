import { desc, eq, inArray } from 'drizzle-orm';
import { getStudy, listStudies, type Study } from '../../../shared/api/studies.ts';
import { studySubject } from '../../../shared/domain/ability.ts';
import { people } from '../../db/schema/people.ts';
import { chainItems, layouts, routeStates, studies } from '../../db/schema/studies.ts';
import { submissions } from '../../db/schema/submissions.ts';
import {
  assembleModel,
  countStates,
  describeRouteStates,
  readItems,
  readMembers,
  readRouteStates,
  readStudyRow,
  requireReadable,
} from '../../db/study-reads.ts';
import { defineQuery } from '../../http/handler.ts';

export const listStudiesQuery = defineQuery(listStudies, async ({ actor, reader }) => {
  const all = await reader.select().from(studies).orderBy(desc(studies.changedAt));
  const mine = all.filter((study) => actor.ability.can('read', studySubject(study.id)));
  const ids = mine.map((study) => study.id);
  if (ids.length === 0) return { studies: [] };
  const items = await reader
    .select()
    .from(chainItems)
    .where(inArray(chainItems.studyId, ids))
    .orderBy(chainItems.position);
  const states = await reader.select().from(routeStates).where(inArray(routeStates.studyId, ids));
  return {
    studies: mine.map((study) => {
      const model = assembleModel(items.filter((item) => item.studyId === study.id));
      const own = states.filter((state) => state.studyId === study.id);
      return {
        id: study.id,
        title: study.title,
        question: study.question,
        myRole: actor.memberships[study.id] ?? null,
        ...countStates(model, describeRouteStates(model, own)),
        changedAt: study.changedAt.toISOString(),
      };
    }),
  };
});

export const getStudyQuery = defineQuery(getStudy, async ({ actor, params, reader }): Promise<Study> => {
  requireReadable(actor, params.studyId);
  const study = await readStudyRow(reader, params.studyId);
  const items = await readItems(reader, study.id);
  const model = assembleModel(items);
  const states = await readRouteStates(reader, study.id);
  const [layout] = await reader.select().from(layouts).where(eq(layouts.studyId, study.id));
  const submitted = await reader
    .select({
      id: submissions.id,
      targetQuantityId: submissions.targetQuantityId,
      targetName: submissions.targetName,
      status: submissions.status,
      submittedByName: people.name,
      submittedAt: submissions.submittedAt,
    })
    .from(submissions)
    .innerJoin(people, eq(people.id, submissions.submittedBy))
    .where(eq(submissions.studyId, study.id))
    .orderBy(desc(submissions.submittedAt));
  return {
    id: study.id,
    title: study.title,
    question: study.question,
    revision: study.revision,
    model,
    itemRevisions: Object.fromEntries(items.map((item) => [item.id, item.revision])),
    routeStates: describeRouteStates(model, states),
    layout: layout?.positions ?? {},
    members: await readMembers(reader, study.id),
    submissions: submitted.map((one) => ({ ...one, submittedAt: one.submittedAt.toISOString() })),
  };
});
