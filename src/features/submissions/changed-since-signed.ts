import type { Snapshot } from '../../../shared/api/submissions.ts';
import type { ChainItemKind } from '../../../shared/domain/audit-events.ts';
import type { MeasuredResult } from '../../../shared/engine/model/evaluation.ts';
import type { Quantity, StudyModel } from '../../../shared/engine/model/study-model.ts';
import { type ChangedItem, describeChange } from '../../ui/changed-items.ts';

export type ChangedNumber = {
  readonly quantity: Quantity;
  readonly was: MeasuredResult | null;
  readonly now: MeasuredResult | null;
};

function isSameResult(was: MeasuredResult | null, now: MeasuredResult | null): boolean {
  if (!was || !now) return was === now;
  return Math.abs(now.value - was.value) <= 1e-12 * Math.abs(was.value) && now.u === was.u;
}

/** Every number that differs from what was signed last, also those that are new or no longer in the package. */
export function changedNumbers(signed: Snapshot, now: Snapshot): ChangedNumber[] {
  const known = new Set(now.model.quantities.map((quantity) => quantity.id));
  const gone = signed.model.quantities.filter((quantity) => !known.has(quantity.id));
  return [...now.model.quantities, ...gone]
    .map((quantity) => ({
      quantity,
      was: signed.evaluation.quantities[quantity.id]?.result ?? null,
      now: now.evaluation.quantities[quantity.id]?.result ?? null,
    }))
    .filter((one) => !isSameResult(one.was, one.now));
}

const itemsOf: Record<ChainItemKind, (model: StudyModel) => readonly { readonly id: string }[]> = {
  quantity: (model) => model.quantities,
  route: (model) => model.routes,
  'operating-point': (model) => model.operatingPoints,
  test: (model) => model.tests,
  'input-correlation': (model) => model.inputCorrelations,
};

/** Every item of the chain that differs, field by field, also where no number moved: a justification, a source. */
export function changedItems(signed: StudyModel, now: StudyModel): ChangedItem[] {
  const quantityNames = new Map([...signed.quantities, ...now.quantities].map(({ id, name }) => [id, name]));
  const routeOwners = new Map(
    [...signed.routes, ...now.routes].map(({ id, quantityId }) => [id, quantityNames.get(quantityId)]),
  );
  return Object.entries(itemsOf).flatMap(([kind, select]) => {
    const [before, after] = [signed, now].map((model) => new Map(select(model).map((item) => [item.id, item])));
    const ids = new Set([...(before?.keys() ?? []), ...(after?.keys() ?? [])]);
    return [...ids]
      .map((id) =>
        describeChange(
          { kind: kind as ChainItemKind, id, before: before?.get(id) ?? null, after: after?.get(id) ?? null },
          routeOwners.get(id),
        ),
      )
      .filter((item) => item.fields.length > 0);
  });
}
