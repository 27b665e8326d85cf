import type { Route, StudyModel } from '../../shared/engine/model/study-model.ts';

/** Ids of the quantities that feed a route. */
export function sourcesOf(route: Route): readonly string[] {
  switch (route.kind) {
    case 'heat-analogue':
      return route.sourceQuantityId === null ? [] : [route.sourceQuantityId];
    case 'correlation':
    case 'balance':
      return Object.values(route.bindings).flatMap((binding) =>
        binding?.from === 'quantity' ? [binding.quantityId] : [],
      );
    default:
      return [];
  }
}

/** By quantity id: the quantities that any of its routes reads, each once. */
export function inputsByQuantity(model: StudyModel): ReadonlyMap<string, readonly string[]> {
  return new Map(
    model.quantities.map((quantity) => [
      quantity.id,
      [...new Set(model.routes.filter((route) => route.quantityId === quantity.id).flatMap(sourcesOf))],
    ]),
  );
}

/** How many links lie between a quantity and the furthest fact behind it; a loop counts as one step. */
export function depths(model: StudyModel): ReadonlyMap<string, number> {
  const inputs = inputsByQuantity(model);
  const found = new Map<string, number>();
  const visiting = new Set<string>();
  function depthOf(id: string): number {
    const known = found.get(id);
    if (known !== undefined) return known;
    if (visiting.has(id)) return 0;
    visiting.add(id);
    const depth = Math.max(-1, ...(inputs.get(id) ?? []).map(depthOf)) + 1;
    visiting.delete(id);
    found.set(id, depth);
    return depth;
  }
  for (const quantity of model.quantities) depthOf(quantity.id);
  return found;
}

/** Quantity ids so that every quantity comes after all it rests on; otherwise as the study lists them. */
export function topologicalOrder(model: StudyModel): readonly string[] {
  const depth = depths(model);
  const place = new Map(model.quantities.map((quantity, index) => [quantity.id, index]));
  return model.quantities
    .map((quantity) => quantity.id)
    .sort((a, b) => (depth.get(a) ?? 0) - (depth.get(b) ?? 0) || (place.get(a) ?? 0) - (place.get(b) ?? 0));
}
