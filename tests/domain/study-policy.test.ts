import { describe, expect, it } from 'vitest';
import { type Actor, abilityOf, type StudyRole } from '../../shared/domain/ability.ts';
import type { Decision } from '../../shared/domain/decision.ts';
import {
  type Asking,
  canCreateStudy,
  canEdit,
  canManageMembers,
  canRead,
  canVerify,
} from '../../shared/domain/study-policy.ts';

const studyId = '11111111-1111-4111-8111-111111111111';
const otherStudyId = '22222222-2222-4222-8222-222222222222';

function asking(facts: Partial<Actor> = {}): Asking {
  const actor: Actor = {
    personId: 'p',
    name: 'Ada',
    isAdministrator: false,
    isAuditor: false,
    memberships: {},
    ...facts,
  };
  return { ...actor, ability: abilityOf(actor) };
}
const member = (role: StudyRole) => asking({ memberships: { [studyId]: role } });

const people = {
  engineer: member('engineer'),
  manager: member('manager'),
  'auditor of the study': member('auditor'),
  'auditor of the installation': asking({ isAuditor: true }),
  administrator: asking({ isAdministrator: true }),
  'engineer of another study': asking({ memberships: { [otherStudyId]: 'engineer' } }),
  outsider: asking(),
} as const;

const moves: Readonly<Record<string, (actor: Asking, studyId: string) => Decision>> = {
  read: canRead,
  edit: canEdit,
  'choose members': canManageMembers,
  verify: canVerify,
};

// One row for each person, one column for each move.
const table: Readonly<Record<keyof typeof people, readonly string[]>> = {
  engineer: ['read', 'edit', 'choose members'],
  manager: ['read'],
  'auditor of the study': ['read', 'verify'],
  'auditor of the installation': ['read', 'verify'],
  administrator: [],
  'engineer of another study': [],
  outsider: [],
};

const rows = (Object.keys(people) as (keyof typeof people)[]).flatMap((who) =>
  Object.keys(moves).map((move) => ({ who, move, may: table[who].includes(move) })),
);

describe('what the people round a study may do', () => {
  it.each(rows)('$who, $move: $may', ({ who, move, may }) => {
    const decision = moves[move]?.(people[who], studyId);

    expect(decision?.allowed).toBe(may);
  });

  it.each([
    [
      canEdit(people.manager, studyId),
      'Only a scale-up engineer of this study may change the chain; you are its technical manager.',
    ],
    [
      canEdit(people['auditor of the study'], studyId),
      'Only a scale-up engineer of this study may change the chain; you are its auditor.',
    ],
    [
      canVerify(people.engineer, studyId),
      'Only an auditor of this study may verify the decision log; you are its scale-up engineer.',
    ],
    [
      canManageMembers(people['auditor of the installation'], studyId),
      'Only a scale-up engineer of this study may choose its members; you are an auditor.',
    ],
    [canRead(people.outsider, studyId), 'Only a member of this study may read it; you are not a member of it.'],
    [
      canCreateStudy(people['auditor of the installation']),
      'An auditor of the installation reads studies and creates none.',
    ],
  ])('refuses with a sentence: %o', (decision, sentence) => {
    expect(decision).toEqual({ allowed: false, reason: sentence });
  });

  it('lets everybody but an auditor of the installation create a study', () => {
    const may = Object.entries(people).filter(([, actor]) => canCreateStudy(actor).allowed);

    expect(may.map(([who]) => who)).toEqual(Object.keys(people).filter((who) => who !== 'auditor of the installation'));
  });
});
