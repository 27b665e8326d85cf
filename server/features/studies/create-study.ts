import { createStudy } from '../../../shared/api/studies.ts';
import { canCreateStudy } from '../../../shared/domain/study-policy.ts';
import { requireAllowed } from '../../db/problem.ts';
import { memberships, studies } from '../../db/schema/studies.ts';
import { defineCommand } from '../../http/handler.ts';

/** A new study, empty; whoever creates it is its first scale-up engineer. */
export const createStudyCommand = defineCommand(createStudy, async ({ actor, body, tx, services }) => {
  requireAllowed(canCreateStudy(actor));
  const id = services.newId();
  const now = services.now();
  await tx.insert(studies).values({ id, ...body, revision: 1, createdAt: now, changedAt: now });
  await tx.insert(memberships).values({ studyId: id, personId: actor.personId, role: 'engineer' });
  return {
    reply: {
      id,
      ...body,
      myRole: 'engineer' as const,
      quantityCount: 0,
      approvedCount: 0,
      inReviewCount: 0,
      changedAt: now.toISOString(),
    },
    audit: [
      { chain: id, event: { event: 'study.created', study: body } },
      { chain: id, event: { event: 'member.added', personId: actor.personId, name: actor.name, role: 'engineer' } },
    ],
    notices: [],
  };
});
