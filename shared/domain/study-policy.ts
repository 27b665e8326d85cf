import { type Ability, type Actor, roleNames, type StudyAction, studySubject } from './ability.ts';
import { allowed, type Decision, denied } from './decision.ts';

export type Asking = Actor & { readonly ability: Ability };

/** How the person stands to the study, for a sentence: "you are its auditor". */
function standing(actor: Asking, studyId: string): string {
  const role = actor.memberships[studyId];
  if (role) return `you are its ${roleNames[role]}`;
  return actor.isAuditor ? 'you are an auditor' : 'you are not a member of it';
}

function requires(action: StudyAction, who: string, what: string) {
  return (actor: Asking, studyId: string): Decision =>
    actor.ability.can(action, studySubject(studyId))
      ? allowed
      : denied(`Only ${who} of this study may ${what}; ${standing(actor, studyId)}.`);
}

export const canRead = requires('read', 'a member', 'read it');
export const canEdit = requires('edit', 'a scale-up engineer', 'change the chain');
export const canManageMembers = requires('manage-members', 'a scale-up engineer', 'choose its members');
export const canVerify = requires('verify', 'an auditor', 'verify the decision log');

export function canCreateStudy(actor: Asking): Decision {
  return actor.ability.can('create', 'Study')
    ? allowed
    : denied('An auditor of the installation reads studies and creates none.');
}
