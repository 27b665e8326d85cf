import { describe, expect, it } from 'vitest';
import { type Actor, abilityOf, type StudyRole } from '../../shared/domain/ability.ts';
import type { Ruling } from '../../shared/domain/audit-events.ts';
import type { Decision } from '../../shared/domain/decision.ts';
import { submissionStatuses } from '../../shared/domain/route-lifecycle.ts';
import type { Asking } from '../../shared/domain/study-policy.ts';
import {
  canReturn,
  canRule,
  canSign,
  canSubmit,
  canWithdraw,
  countRulings,
  type SubmissionFacts,
} from '../../shared/domain/submission-policy.ts';

const studyId = '11111111-1111-4111-8111-111111111111';

function asking(personId: string, role: StudyRole | null, facts: Partial<Actor> = {}): Asking {
  const memberships = role ? { [studyId]: role } : {};
  const actor: Actor = { personId, name: personId, isAdministrator: false, isAuditor: false, memberships, ...facts };
  return { ...actor, ability: abilityOf(actor) };
}

const people = {
  submitter: asking('submitter', 'engineer'),
  'another engineer': asking('another engineer', 'engineer'),
  manager: asking('manager', 'manager'),
  'manager who edited': asking('editor', 'manager'),
  'manager who submitted': asking('submitter', 'manager'),
  'auditor who submitted': asking('submitter', 'auditor'),
  'auditor of the study': asking('study auditor', 'auditor'),
  'auditor of the installation': asking('auditor', null, { isAuditor: true }),
  administrator: asking('administrator', null, { isAdministrator: true }),
  outsider: asking('outsider', null),
} as const;
type Who = keyof typeof people;

const accepted: Ruling = { ruling: 'accepted', comment: '', condition: null };
const one = { routeId: 'r1', assumptionKey: 'complete' };
const two = { routeId: 'r2', assumptionKey: 'complete' };
const ready: SubmissionFacts = {
  studyId,
  status: 'open',
  submittedById: 'submitter',
  authorIds: ['submitter', 'editor'],
  assumptions: [one, two],
  rulings: [
    { ...one, ruling: accepted },
    {
      ...two,
      ruling: {
        ruling: 'accepted on condition',
        comment: '',
        condition: { text: 'Measure again', dueOn: '2027-01-31' },
      },
    },
  ],
};

const moves: Readonly<Record<string, (actor: Asking) => Decision>> = {
  submit: (actor) => canSubmit(actor, studyId),
  rule: (actor) => canRule(actor, ready),
  sign: (actor) => canSign(actor, ready),
  return: (actor) => canReturn(actor, ready),
  withdraw: (actor) => canWithdraw(actor, ready),
};

// One row for each person, one column for each move.
const table: Readonly<Record<Who, readonly string[]>> = {
  submitter: ['submit', 'withdraw'],
  'another engineer': ['submit'],
  manager: ['rule', 'sign', 'return'],
  'manager who edited': ['return'],
  'manager who submitted': ['return', 'withdraw'],
  'auditor who submitted': [],
  'auditor of the study': [],
  'auditor of the installation': [],
  administrator: [],
  outsider: [],
};

const rows = (Object.keys(people) as Who[]).flatMap((who) =>
  Object.keys(moves).map((move) => ({ who, move, may: table[who].includes(move) })),
);

const sentenceOf = (decision: Decision) => (decision.allowed ? null : decision.reason);

describe('who may do what with a submission', () => {
  it.each(rows)('$who, $move: $may', ({ who, move, may }) => {
    const decision = moves[move]?.(people[who]);

    expect(decision?.allowed).toBe(may);
    if (decision && !decision.allowed) expect(decision.reason).toMatch(/^[A-Z].*\.$/);
  });

  it('tells an engineer who may sign, and who she is', () => {
    expect(sentenceOf(canSign(people.submitter, ready))).toBe(
      'Only a technical manager of this study may sign; you are its scale-up engineer.',
    );
  });

  it.each(['manager who edited', 'manager who submitted'] as const)(
    'tells the %s that somebody else must sign',
    (who) => {
      expect(sentenceOf(canSign(people[who], ready))).toBe(
        'You worked on this package, so somebody else must sign it.',
      );
    },
  );
});

describe('when a submission may be signed', () => {
  const manager = people.manager;

  it.each(submissionStatuses.filter((status) => status !== 'open'))('ends every move once it is %s', (status) => {
    const closed = { ...ready, status };

    for (const decision of [
      canRule(manager, closed),
      canSign(manager, closed),
      canReturn(manager, closed),
      canWithdraw(people.submitter, closed),
    ]) {
      expect(sentenceOf(decision)).toBe(`This submission is ${status} already.`);
    }
  });

  it('wants a ruling on every assumption and counts what is left', () => {
    const half = { ...ready, rulings: ready.rulings.slice(0, 1) };

    expect(sentenceOf(canSign(manager, half))).toBe('Rule on every assumption first: 1 of 2 have a ruling.');
  });

  it('does not count rulings on what the package does not hold', () => {
    const astray = { ...ready, rulings: [{ routeId: 'r9', assumptionKey: 'complete', ruling: accepted }] };

    expect(countRulings(astray)).toEqual({ ruled: 0, of: 2 });
  });

  it('does not go with a refused assumption', () => {
    const refused: Ruling = { ruling: 'refused', comment: 'Not this bed.', condition: null };
    const facts = { ...ready, rulings: [{ ...one, ruling: refused }, ...ready.rulings.slice(1)] };

    expect(sentenceOf(canSign(manager, facts))).toBe(
      'An assumption is refused. Return the submission with comments, or change the ruling.',
    );
  });
});
