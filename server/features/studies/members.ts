import { and, eq } from 'drizzle-orm';
import { addMember, removeMember } from '../../../shared/api/studies.ts';
import { roleNames } from '../../../shared/domain/ability.ts';
import { canManageMembers } from '../../../shared/domain/study-policy.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { people } from '../../db/schema/people.ts';
import { memberships } from '../../db/schema/studies.ts';
import { lockStudy, raiseRevision, readMembers, requireReadable } from '../../db/study-reads.ts';
import { defineCommand } from '../../http/handler.ts';

export const addMemberCommand = defineCommand(addMember, async ({ actor, params, body, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canManageMembers(actor, params.studyId));
  const study = await lockStudy(tx, params.studyId);
  const [person] = await tx.select().from(people).where(eq(people.id, body.personId));
  if (!person?.isActive) throw new Problem('not found', 'There is no such person, or the account is deactivated.');
  const members = await readMembers(tx, study.id);
  const known = members.find((member) => member.personId === person.id);
  if (known) {
    throw new Problem(
      'invalid',
      `${person.name} is ${roleNames[known.role]} of this study already. Remove that role first.`,
    );
  }
  await tx.insert(memberships).values({ studyId: study.id, personId: person.id, role: body.role });
  await raiseRevision(tx, study, services.now());
  return {
    reply: { members: await readMembers(tx, study.id) },
    audit: [
      { chain: study.id, event: { event: 'member.added', personId: person.id, name: person.name, role: body.role } },
    ],
    notices: [],
  };
});

export const removeMemberCommand = defineCommand(removeMember, async ({ actor, params, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canManageMembers(actor, params.studyId));
  const study = await lockStudy(tx, params.studyId);
  const members = await readMembers(tx, study.id);
  const member = members.find((one) => one.personId === params.personId);
  if (!member) throw new Problem('not found', 'This person is not a member of the study.');
  if (member.role === 'engineer' && members.filter((one) => one.role === 'engineer').length === 1) {
    throw new Problem('invalid', 'The last scale-up engineer has to stay. Add another one first.');
  }
  await tx.delete(memberships).where(and(eq(memberships.studyId, study.id), eq(memberships.personId, member.personId)));
  await raiseRevision(tx, study, services.now());
  return {
    reply: { members: members.filter((one) => one !== member) },
    audit: [{ chain: study.id, event: { event: 'member.removed', ...member } }],
    notices: [],
  };
});
