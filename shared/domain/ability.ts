import { AbilityBuilder, createMongoAbility, type ForcedSubject, type MongoAbility } from '@casl/ability';

export const studyRoles = ['engineer', 'manager', 'auditor'] as const;
export type StudyRole = (typeof studyRoles)[number];

export const roleNames: Record<StudyRole, string> = {
  engineer: 'scale-up engineer',
  manager: 'technical manager',
  auditor: 'auditor',
};

/** Who is asking. `memberships` maps a study id to the role held in it. */
export type Actor = {
  readonly personId: string;
  readonly name: string;
  readonly isAdministrator: boolean;
  /** Reads and verifies every study of the installation. */
  readonly isAuditor: boolean;
  readonly memberships: Readonly<Record<string, StudyRole>>;
};

type Subjects = 'Installation' | 'People' | 'Study' | (ForcedSubject<'Study'> & { readonly id: string });
export type StudyAction = 'read' | 'edit' | 'submit' | 'rule' | 'sign' | 'comment' | 'verify' | 'manage-members';
type Actions = StudyAction | 'create' | 'manage-people';

export type Ability = MongoAbility<[Actions, Subjects]>;

const roleMay: Record<StudyRole, readonly StudyAction[]> = {
  engineer: ['read', 'edit', 'submit', 'comment', 'manage-members'],
  manager: ['read', 'rule', 'sign', 'comment'],
  auditor: ['read', 'verify'],
};

/** The one place where roles become permissions; the server enforces it, the client only hides with it. */
export function abilityOf(actor: Actor): Ability {
  const { can, build } = new AbilityBuilder<Ability>(createMongoAbility);
  for (const [studyId, role] of Object.entries(actor.memberships)) {
    can([...roleMay[role]], 'Study', { id: studyId } as never);
  }
  if (actor.isAuditor) can(['read', 'verify'], 'Study');
  if (actor.isAdministrator) can('manage-people', 'People');
  if (!actor.isAuditor) can('create', 'Study');
  return build();
}

/** The subject that `abilityOf` rules on for one study. */
export function studySubject(studyId: string) {
  return { id: studyId, __caslSubjectType__: 'Study' } as const;
}
