import type { ChainItem, ChainItemKind } from '../../../shared/domain/audit-events.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';

export type ItemBody = ChainItem['body'];

/** One item as it shall be; null removes it. `at` keeps the place in its list, so that undo restores the order too. */
export type ItemEdit = {
  readonly kind: ChainItemKind;
  readonly id: string;
  readonly body: ItemBody | null;
  readonly at?: number;
};

type ListName = 'operatingPoints' | 'quantities' | 'routes' | 'tests' | 'inputCorrelations';
const listOf: Record<ChainItemKind, ListName> = {
  'operating-point': 'operatingPoints',
  quantity: 'quantities',
  route: 'routes',
  test: 'tests',
  'input-correlation': 'inputCorrelations',
};
/** What others refer to comes first, so that the edits of one save read in order. */
const kindsInOrder: readonly ChainItemKind[] = ['operating-point', 'test', 'quantity', 'route', 'input-correlation'];

function itemsOf(model: StudyModel, kind: ChainItemKind): readonly ItemBody[] {
  return model[listOf[kind]];
}

export function findItem(model: StudyModel, id: string): ChainItem | null {
  for (const kind of kindsInOrder) {
    const body = itemsOf(model, kind).find((item) => item.id === id);
    if (body) return { kind, body } as ChainItem;
  }
  return null;
}

function applyEdit(model: StudyModel, edit: ItemEdit): StudyModel {
  const items = itemsOf(model, edit.kind);
  const place = items.findIndex((item) => item.id === edit.id);
  const next = [...items];
  if (edit.body === null) {
    if (place < 0) return model;
    next.splice(place, 1);
  } else if (place >= 0) {
    next[place] = edit.body;
  } else {
    next.splice(edit.at ?? next.length, 0, edit.body);
  }
  return { ...model, [listOf[edit.kind]]: next };
}

/** The model after the edits; the given model stays as it is. */
export function applyEdits(model: StudyModel, edits: readonly ItemEdit[]): StudyModel {
  return edits.reduce(applyEdit, model);
}

/** The edits that lead back: applied after `edits` they give a model deep-equal to `model`. */
export function invertEdits(model: StudyModel, edits: readonly ItemEdit[]): readonly ItemEdit[] {
  const inverse: ItemEdit[] = [];
  let current = model;
  for (const edit of edits) {
    const items = itemsOf(current, edit.kind);
    const place = items.findIndex((item) => item.id === edit.id);
    const before = items[place] ?? null;
    inverse.unshift({ kind: edit.kind, id: edit.id, body: before, ...(before ? { at: place } : {}) });
    current = applyEdit(current, edit);
  }
  return inverse;
}

/** The same content, whatever the order of keys. */
export function sameContent(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  const left = a as Record<string, unknown>;
  const right = b as Record<string, unknown>;
  const keys = Object.keys(left);
  return (
    keys.length === Object.keys(right).length && keys.every((key) => key in right && sameContent(left[key], right[key]))
  );
}

/** What must be sent so that `from` becomes `to`, item by item. */
export function changedItems(from: StudyModel, to: StudyModel): readonly ItemEdit[] {
  const edits: ItemEdit[] = [];
  for (const kind of kindsInOrder) {
    const before = new Map(itemsOf(from, kind).map((item) => [item.id, item]));
    for (const item of itemsOf(to, kind)) {
      const old = before.get(item.id);
      before.delete(item.id);
      if (old !== item && !sameContent(old, item)) edits.push({ kind, id: item.id, body: item });
    }
    for (const id of before.keys()) edits.push({ kind, id, body: null });
  }
  return edits;
}
