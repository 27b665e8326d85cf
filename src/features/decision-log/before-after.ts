import type { AuditEvent, ChainChange } from '../../../shared/domain/audit-events.ts';

export type ChangedField = { readonly field: string; readonly before: string; readonly after: string };
export type ChangedItem = { readonly title: string; readonly fields: readonly ChangedField[] };

const kindNames: Record<ChainChange['kind'], string> = {
  'operating-point': 'Operating point',
  quantity: 'Quantity',
  route: 'Route',
  test: 'Test',
  'input-correlation': 'Correlation of inputs',
};

/** Every leaf of a body by its path, as text. A list of named things is read by name, not by place. */
function leaves(value: unknown, path: string, into: Map<string, string>): void {
  if (Array.isArray(value)) {
    value.forEach((item: unknown, index) => {
      leaves(item, `${path}${path ? ' ' : ''}${nameOf(item) ?? index + 1}`, into);
    });
    return;
  }
  if (typeof value === 'object' && value !== null) {
    for (const [key, part] of Object.entries(value)) {
      if (key === 'id') continue;
      leaves(part, path ? `${path} ${key}` : key, into);
    }
    return;
  }
  into.set(path, value === null || value === '' ? '–' : String(value));
}

function nameOf(item: unknown): string | null {
  if (typeof item !== 'object' || item === null) return null;
  if ('key' in item && typeof item.key === 'string') return item.key;
  return 'name' in item && typeof item.name === 'string' ? item.name : null;
}

function fieldsOf(before: unknown, after: unknown): ChangedField[] {
  const [was, is] = [new Map<string, string>(), new Map<string, string>()];
  leaves(before ?? {}, '', was);
  leaves(after ?? {}, '', is);
  return [...new Set([...was.keys(), ...is.keys()])]
    .map((field) => ({ field, before: was.get(field) ?? '–', after: is.get(field) ?? '–' }))
    .filter((one) => one.before !== one.after);
}

function titleOf({ kind, before, after }: ChainChange): string {
  const name = nameOf(after ?? before);
  const what = before === null ? 'added' : after === null ? 'removed' : 'changed';
  return `${kindNames[kind]}${name ? ` "${name}"` : ''} ${what}`;
}

/** Before and after of everything an entry changed; empty where it changed nothing of its own. */
export function beforeAndAfter(event: AuditEvent): ChangedItem[] {
  switch (event.event) {
    case 'chain.edited':
      return event.changes.map((change) => ({ title: titleOf(change), fields: fieldsOf(change.before, change.after) }));
    case 'assumption.ruled':
      return [{ title: 'Ruling', fields: fieldsOf(event.before, event.after) }];
    case 'study.renamed':
    case 'person.changed':
      return [{ title: 'Changed', fields: fieldsOf(event.before, event.after) }];
    case 'study.created':
      return [{ title: 'Study', fields: fieldsOf(null, event.study) }];
    case 'submission.opened':
      return [
        { title: 'Submission', fields: fieldsOf(null, { note: event.note, 'snapshot SHA-256': event.snapshotHash }) },
      ];
    case 'submission.signed':
      return [
        {
          title: 'Signature',
          fields: fieldsOf(null, {
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
