import { findCycle } from '../../../shared/engine/evaluate/find-cycle.ts';
import { findMethod } from '../../../shared/engine/methods/catalogue.ts';
import type { Quantity, Route, StudyModel } from '../../../shared/engine/model/study-model.ts';
import type { ItemEdit } from './chain-edits.ts';
import { newBalance, newHeatAnalogue } from './new-items.ts';

export type ConnectChoice = {
  readonly key: string;
  readonly words: string;
  /** What the port takes now and would no longer take, by name. */
  readonly replaces: string | null;
  readonly routeId: string;
  readonly edits: readonly ItemEdit[];
  readonly summary: string;
};

function quantityName(model: StudyModel, id: string | null): string | null {
  return model.quantities.find((quantity) => quantity.id === id)?.name ?? null;
}

function boundName(model: StudyModel, route: Route, variable: string): string | null {
  if (route.kind !== 'balance' && route.kind !== 'correlation') return null;
  const binding = route.bindings[variable];
  return binding?.from === 'quantity' ? quantityName(model, binding.quantityId) : null;
}

function choicesOfRoute(model: StudyModel, route: Route, source: Quantity): ConnectChoice[] {
  const feeds = (variable: string, next: Route, replaces: string | null): ConnectChoice => ({
    key: `${route.id}:${variable}`,
    words: `${variable} of ${route.name}`,
    replaces: replaces === source.name ? null : replaces,
    routeId: route.id,
    edits: [{ kind: 'route', id: route.id, body: next }],
    summary: `Linked ${source.name} to ${variable} of ${route.name}`,
  });
  const binding = { from: 'quantity' as const, quantityId: source.id };
  switch (route.kind) {
    case 'heat-analogue':
      return [
        feeds(
          'the heat-transfer coefficient',
          { ...route, sourceQuantityId: source.id },
          quantityName(model, route.sourceQuantityId),
        ),
      ];
    case 'balance':
      return Object.keys(route.bindings).map((variable) =>
        feeds(
          variable,
          { ...route, bindings: { ...route.bindings, [variable]: binding } },
          boundName(model, route, variable),
        ),
      );
    case 'correlation':
      return Object.keys(findMethod(route.methodId)?.variables ?? {}).map((variable) =>
        feeds(
          variable,
          { ...route, bindings: { ...route.bindings, [variable]: binding } },
          boundName(model, route, variable),
        ),
      );
    default:
      return [];
  }
}

/** Letters that a formula can hold, from a symbol such as `k_w` or `ρ`. */
function formulaName(symbol: string): string {
  const letters = symbol.replace(/[^A-Za-z0-9_]/g, '');
  return /^[A-Za-z]/.test(letters) ? letters : 'x';
}

/** Everything a link from `source` to `target` could mean: a port of a route that exists, or a new route. */
export function connectChoices(
  model: StudyModel,
  source: Quantity,
  target: Quantity,
  newId: () => string,
): readonly ConnectChoice[] {
  const existing = model.routes
    .filter((route) => route.quantityId === target.id)
    .flatMap((route) => choicesOfRoute(model, route, source));
  const analogue = newHeatAnalogue(newId(), target.id, source.id);
  const variable = formulaName(source.symbol);
  const balance = newBalance(newId(), target.id, variable, { [variable]: { from: 'quantity', quantityId: source.id } });
  const fresh = (route: Route, words: string): ConnectChoice => ({
    key: `new:${route.kind}`,
    words,
    replaces: null,
    routeId: route.id,
    edits: [{ kind: 'route', id: route.id, body: route }],
    summary: `Added ${words.toLowerCase()} from ${source.name} to ${target.name}`,
  });
  return [
    ...existing,
    fresh(analogue, 'A new heat analogue'),
    fresh(balance, `A new balance ${target.symbol} = ${variable}`),
  ];
}

/** The loop that a link would close, in words; null where there is none. */
export function loopOf(model: StudyModel, sourceId: string, targetId: string): string | null {
  const probe = newBalance('00000000-0000-4000-8000-000000000000', targetId, 'x', {
    x: { from: 'quantity', quantityId: sourceId },
  });
  const loop = findCycle({ ...model, routes: [...model.routes, probe] });
  if (!loop) return null;
  return `That link would close a loop: ${[...loop, loop[0]].join(' → ')}. A number cannot rest on itself.`;
}
