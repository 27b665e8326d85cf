import { roleNames } from '../../../shared/domain/ability.ts';
import type { AuditEvent } from '../../../shared/domain/audit-events.ts';

/** What happened, as the second half of a sentence that begins with the person's name. */
export function entrySentence(event: AuditEvent): string {
  switch (event.event) {
    case 'study.created':
      return `created the study "${event.study.title}"`;
    case 'study.renamed':
      return `renamed the study to "${event.after?.title ?? ''}"`;
    case 'member.added':
      return `made ${event.name} ${roleNames[event.role]} of the study`;
    case 'member.removed':
      return `removed ${event.name}, ${roleNames[event.role]}, from the study`;
    case 'chain.edited':
      return `${lowerFirst(event.summary)}${event.reason ? `, because: ${event.reason}` : ''}`;
    case 'submission.opened':
      return `submitted ${event.targetName} for review (${routes(event.routeIds.length)})`;
    case 'assumption.ruled':
      return `ruled "${event.after?.ruling ?? 'nothing'}" on: ${event.statement}`;
    case 'submission.signed':
      return `signed ${event.targetName}: ${event.meaning}`;
    case 'submission.returned':
      return `returned ${event.targetName}: ${event.comments}`;
    case 'submission.withdrawn':
      return `withdrew the submission of ${event.targetName}: ${event.reason}`;
    case 'log.verified':
      return event.whole
        ? `verified the decision log: ${event.entries} entries, whole`
        : 'verified the decision log and found it broken';
    case 'administrator.set-up':
      return `set up Stemma as administrator ${event.name}`;
    case 'person.invited':
      return `invited ${event.name} (${event.email})`;
    case 'person.changed':
      return `changed the account of ${event.after?.name ?? event.before?.name ?? ''}`;
    case 'person.signed-in':
      return 'signed in';
    case 'password.set':
      return 'set a new password';
  }
}

function routes(count: number): string {
  return count === 1 ? '1 route' : `${count} routes`;
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

/** The kinds of entry a study's log can hold, in the words of the filter. */
export const studyEventNames: Readonly<Record<string, string>> = {
  'study.created': 'Study created',
  'member.added': 'Member added',
  'member.removed': 'Member removed',
  'chain.edited': 'Chain edited',
  'submission.opened': 'Submitted',
  'assumption.ruled': 'Ruling',
  'submission.signed': 'Signed',
  'submission.returned': 'Returned',
  'submission.withdrawn': 'Withdrawn',
  'log.verified': 'Log verified',
};
