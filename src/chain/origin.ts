import type { Route, RouteKind } from '../../shared/engine/model/study-model.ts';

export type Origin = 'measured' | 'correlation' | 'given' | 'computed' | 'open';

/** Where a number comes from, said by the type of line as on a drawing. */
export const originLines: Record<
  Origin,
  { readonly dash: string | undefined; readonly width: number; readonly words: string }
> = {
  measured: { dash: undefined, width: 2.2, words: 'Measured, or carried over from a measurement' },
  correlation: { dash: '11 5', width: 1.6, words: 'Correlation' },
  given: { dash: '2 4', width: 1.6, words: 'Stated value' },
  computed: { dash: undefined, width: 1.1, words: 'Computed by a balance' },
  open: { dash: '6 6', width: 1.1, words: 'No route yet' },
};

const originOfKind: Record<RouteKind, Origin> = {
  'stated-value': 'given',
  'test-result': 'measured',
  'heat-analogue': 'measured',
  correlation: 'correlation',
  balance: 'computed',
};

export const routeKindWords: Record<RouteKind, string> = {
  'stated-value': 'Stated value',
  'test-result': 'Test result',
  'heat-analogue': 'Heat analogue',
  correlation: 'Correlation',
  balance: 'Balance',
};

export function originOf(route: Route | null): Origin {
  return route ? originOfKind[route.kind] : 'open';
}
