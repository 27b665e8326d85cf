import type { WorkItem } from '../../../shared/api/work-list.ts';
import { paths } from '../../api/paths.ts';

type Described = { readonly what: string; readonly why: string; readonly path: string };

/** What a work item asks, why, and where to do it. */
export function describeWork(item: WorkItem): Described {
  switch (item.kind) {
    case 'submission waits for you':
      return {
        what: `Review ${item.targetName}`,
        why: `Submitted by ${item.byName}. ${outsideWords(item.outsideWindows)}`,
        path: paths.submission(item.submissionId),
      };
    case 'your submission waits':
      return {
        what: `${item.targetName} is in review`,
        why: 'Your submission waits for a technical manager; you can withdraw it.',
        path: paths.submission(item.submissionId),
      };
    case 'returned to you':
      return {
        what: `Rework ${item.targetName}`,
        why: `Returned by ${item.byName}: ${item.comments}`,
        path: paths.submission(item.submissionId),
      };
    case 'draft':
      return {
        what: item.draftCount === 1 ? 'Finish 1 draft route' : `Finish ${item.draftCount} draft routes`,
        why: 'Not submitted for review yet.',
        path: paths.study(item.studyId),
      };
    case 'basis changed':
      return {
        what: `Submit ${item.quantityName} again`,
        why: 'Something it rests on is no longer what was signed.',
        path: paths.study(item.studyId),
      };
    case 'condition':
      return {
        what: item.text,
        why: `Condition of an accepted assumption, due on ${item.dueOn}.`,
        path: paths.submission(item.submissionId),
      };
    case 'latest signature':
      return {
        what: `${item.targetName} was signed`,
        why: `Signed by ${item.byName}.`,
        path: paths.submission(item.submissionId),
      };
  }
}

function outsideWords(count: number): string {
  if (count === 0) return 'No check lies outside its window.';
  return count === 1 ? 'One check lies outside its window.' : `${count} checks lie outside their windows.`;
}

const groups: readonly { readonly title: string; readonly kinds: readonly WorkItem['kind'][] }[] = [
  { title: 'Waiting for your review', kinds: ['submission waits for you'] },
  { title: 'Returned to you', kinds: ['returned to you'] },
  { title: 'Basis changed', kinds: ['basis changed'] },
  { title: 'Conditions', kinds: ['condition'] },
  { title: 'Drafts', kinds: ['draft'] },
  { title: 'In review', kinds: ['your submission waits'] },
  { title: 'Latest signatures', kinds: ['latest signature'] },
];

/** The groups that have something in them, most pressing first. */
export function groupsOfWork(items: readonly WorkItem[]) {
  return groups
    .map(({ title, kinds }) => ({ title, items: items.filter((item) => kinds.includes(item.kind)) }))
    .filter((group) => group.items.length > 0);
}
