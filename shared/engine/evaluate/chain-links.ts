import type { Route, StudyModel } from '../model/study-model.ts';

/** One edge of the chain: a source quantity feeds a variable of a route of the target quantity. */
export type ChainLink = {
  readonly id: string;
  readonly sourceQuantityId: string;
  readonly targetQuantityId: string;
  readonly routeId: string;
  readonly variable: string;
};

/** Every link of the study, in the order of its routes and their variables; dangling ones included. */
export function chainLinks(model: StudyModel): ChainLink[] {
  return model.routes.flatMap((route) =>
    linkedQuantities(route).map(({ variable, quantityId }) => ({
      id: `${route.id}:${variable}`,
      sourceQuantityId: quantityId,
      targetQuantityId: route.quantityId,
      routeId: route.id,
      variable,
    })),
  );
}

/** The quantities that a route reads, by the variable they feed; `h` for the source of a heat analogue. */
export function linkedQuantities(route: Route): { variable: string; quantityId: string }[] {
  switch (route.kind) {
    case 'heat-analogue':
      return route.sourceQuantityId === null ? [] : [{ variable: 'h', quantityId: route.sourceQuantityId }];
    case 'correlation':
    case 'balance':
      return Object.entries(route.bindings).flatMap(([variable, binding]) =>
        binding?.from === 'quantity' ? [{ variable, quantityId: binding.quantityId }] : [],
      );
    case 'stated-value':
    case 'test-result':
      return [];
  }
}
