import { roleNames, studySubject } from './ability.ts';
import type { Ruling } from './audit-events.ts';
import { allowed, type Decision, denied } from './decision.ts';
import { mayMove, type SubmissionStatus, submissionMoves } from './route-lifecycle.ts';
import type { Asking } from './study-policy.ts';

/** What the policies need to know of a submission. */
export type SubmissionFacts = {
  readonly studyId: string;
  readonly status: SubmissionStatus;
  readonly submittedById: string;
  readonly authorIds: readonly string[];
  /** Every assumption of every route in the package. */
  readonly assumptions: readonly { readonly routeId: string; readonly assumptionKey: string }[];
  readonly rulings: readonly { readonly routeId: string; readonly assumptionKey: string; readonly ruling: Ruling }[];
};

function onlyManager(actor: Asking, studyId: string, what: string): Decision {
  const role = actor.memberships[studyId];
  const standing = role ? `you are its ${roleNames[role]}` : 'you have no role in it';
  return denied(`Only a technical manager of this study may ${what}; ${standing}.`);
}

function requireOpen(submission: SubmissionFacts): Decision {
  return submission.status === 'open' ? allowed : denied(`This submission is ${submission.status} already.`);
}

/** How many assumptions have a ruling, out of how many. */
export function countRulings(submission: SubmissionFacts): { readonly ruled: number; readonly of: number } {
  const ruled = new Set(submission.rulings.map((ruling) => `${ruling.routeId} ${ruling.assumptionKey}`));
  const wanted = submission.assumptions.map((assumption) => `${assumption.routeId} ${assumption.assumptionKey}`);
  return { ruled: wanted.filter((key) => ruled.has(key)).length, of: wanted.length };
}

export function canSubmit(actor: Asking, studyId: string): Decision {
  if (actor.ability.can('submit', studySubject(studyId))) return allowed;
  const role = actor.memberships[studyId];
  const standing = role ? `you are its ${roleNames[role]}` : 'you have no role in it';
  return denied(`Only a scale-up engineer of this study may submit; ${standing}.`);
}

export function canRule(actor: Asking, submission: SubmissionFacts): Decision {
  if (actor.ability.cannot('rule', studySubject(submission.studyId))) {
    return onlyManager(actor, submission.studyId, 'rule on assumptions');
  }
  if (isOwnWork(actor, submission)) return denied('You worked on this package, so somebody else must rule on it.');
  return requireOpen(submission);
}

function isOwnWork(actor: Asking, submission: SubmissionFacts): boolean {
  return submission.submittedById === actor.personId || submission.authorIds.includes(actor.personId);
}

export function canSign(actor: Asking, submission: SubmissionFacts): Decision {
  if (actor.ability.cannot('sign', studySubject(submission.studyId))) {
    return onlyManager(actor, submission.studyId, 'sign');
  }
  if (isOwnWork(actor, submission)) return denied('You worked on this package, so somebody else must sign it.');
  if (!mayMove(submissionMoves.sign, submission.status)) return requireOpen(submission);
  const { ruled, of } = countRulings(submission);
  if (ruled < of) return denied(`Rule on every assumption first: ${ruled} of ${of} have a ruling.`);
  if (submission.rulings.some(({ ruling }) => ruling.ruling === 'refused')) {
    return denied('An assumption is refused. Return the submission with comments, or change the ruling.');
  }
  return allowed;
}

export function canReturn(actor: Asking, submission: SubmissionFacts): Decision {
  if (actor.ability.cannot('rule', studySubject(submission.studyId))) {
    return onlyManager(actor, submission.studyId, 'return a submission');
  }
  return requireOpen(submission);
}

export function canWithdraw(actor: Asking, submission: SubmissionFacts): Decision {
  if (submission.submittedById !== actor.personId) return denied('Only the person who submitted it may withdraw it.');
  // Who left the study, or reads it as its auditor now, changes nothing in it any more.
  if (actor.ability.cannot('comment', studySubject(submission.studyId))) {
    const role = actor.memberships[submission.studyId];
    return denied(
      `You may no longer withdraw it; ${role ? `you are its ${roleNames[role]}` : 'you have no role in it'}.`,
    );
  }
  return requireOpen(submission);
}
