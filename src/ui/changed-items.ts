import type { ChainChange } from '../../shared/domain/audit-events.ts';

export type ChangedField = { readonly field: string; readonly before: string; readonly after: string };
export type ChangedItem = { readonly key: string; readonly title: string; readonly fields: readonly ChangedField[] };

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

/** The fields that differ between two versions of one thing; null: it was not there. */
export function changedFields(before: unknown, after: unknown): ChangedField[] {
  const [was, is] = [new Map<string, string>(), new Map<string, string>()];
  leaves(before ?? {}, '', was);
  leaves(after ?? {}, '', is);
  return [...new Set([...was.keys(), ...is.keys()])]
    .map((field) => ({ field, before: was.get(field) ?? '–', after: is.get(field) ?? '–' }))
    .filter((one) => one.before !== one.after);
}

function titleOf({ kind, before, after }: ChainChange, owner: string | undefined): string {
  const name = nameOf(after ?? before);
  const what = before === null ? 'added' : after === null ? 'removed' : 'changed';
  return `${kindNames[kind]}${name ? ` "${name}"` : ''}${owner ? ` of ${owner}` : ''} ${what}`;
}

/** One item of a chain before and after, with its name, what it belongs to where that is known, and what was done. */
export function describeChange(change: ChainChange, owner?: string): ChangedItem {
  return {
    key: `${change.kind} ${change.id}`,
    title: titleOf(change, owner),
    fields: changedFields(change.before, change.after),
  };
}
