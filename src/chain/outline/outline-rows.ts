import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import { inputsByQuantity, topologicalOrder } from '../topological-order.ts';

export type OutlineRow = {
  /** Unique in the outline: the path from the target. */
  readonly key: string;
  readonly quantityId: string;
  readonly level: number;
  /** Place among its siblings, from 1. */
  readonly place: number;
  readonly siblings: number;
  readonly hasInputs: boolean;
  /** Shown in full further up; here only the pointer to it. */
  readonly seeAbove: string | null;
  readonly parentKey: string | null;
};

/**
 * The lineage of a quantity as rows: what it comes from under it. A quantity that feeds several appears once in
 * full and after that as a pointer. Rows under a collapsed key are left out.
 */
export function outlineRows(
  model: StudyModel,
  targetId: string,
  collapsed: ReadonlySet<string>,
): readonly OutlineRow[] {
  const inputs = inputsByQuantity(model);
  const shown = new Map<string, string>();
  const rows: OutlineRow[] = [];

  function add(id: string, level: number, place: number, siblings: number, parentKey: string | null): void {
    const key = parentKey === null ? id : `${parentKey}/${id}`;
    const above = shown.get(id) ?? null;
    const children = above === null ? (inputs.get(id) ?? []) : [];
    rows.push({
      key,
      quantityId: id,
      level,
      place,
      siblings,
      hasInputs: children.length > 0,
      seeAbove: above,
      parentKey,
    });
    if (above === null) shown.set(id, key);
    if (collapsed.has(key)) return;
    children.forEach((child, index) => {
      add(child, level + 1, index + 1, children.length, key);
    });
  }

  add(targetId, 1, 1, 1, null);
  return rows;
}

/** The quantities that nothing else is computed from: what the study is for. */
export function targets(model: StudyModel): readonly string[] {
  const used = new Set([...inputsByQuantity(model).values()].flat());
  const ends = topologicalOrder(model).filter((id) => !used.has(id));
  return ends.length > 0 ? ends.reverse() : topologicalOrder(model);
}
