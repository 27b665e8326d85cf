import type { AuditEvent } from '../../../shared/domain/audit-events.ts';
import { type ChangedItem, changedFields, describeChange } from '../../ui/changed-items.ts';

/** Before and after of everything an entry changed; empty where it changed nothing of its own. */
export function beforeAndAfter(event: AuditEvent): ChangedItem[] {
  switch (event.event) {
    case 'chain.edited':
      return event.changes.map((change) => describeChange(change));
    case 'assumption.ruled':
      return [{ key: event.event, title: 'Ruling', fields: changedFields(event.before, event.after) }];
    case 'study.renamed':
    case 'person.changed':
      return [{ key: event.event, title: 'Changed', fields: changedFields(event.before, event.after) }];
    case 'study.created':
      return [{ key: event.event, title: 'Study', fields: changedFields(null, event.study) }];
    case 'submission.opened':
      return [
        {
          key: event.event,
          title: 'Submission',
          fields: changedFields(null, { note: event.note, 'snapshot SHA-256': event.snapshotHash }),
        },
      ];
    case 'submission.signed':
      return [
        {
          key: event.event,
          title: 'Signature',
          fields: changedFields(null, {
            signer: event.signerName,
            meaning: event.meaning,
            'snapshot SHA-256': event.snapshotHash,
          }),
        },
      ];
    default:
      return [];
  }
}
