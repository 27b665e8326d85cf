import { parseFormula } from '../formula/parse-formula.ts';
import { findMethod } from '../methods/catalogue.ts';
import type { Method } from '../methods/method.ts';
import { findPointVariable } from '../model/point-variables.ts';
import type { Quantity } from '../model/study-model.ts';
import { describeDimension, sameDimension } from '../quantity/parse-unit.ts';
import { dimensionOfBinding, dimensionOfUnit } from './bound-dimensions.ts';
import { readBinding } from './follow-balance.ts';
import { hasDimensionOf, heatTransferCoefficientUnit, massTransferCoefficientUnit } from './follow-heat-analogue.ts';
import type { Answer, Term } from './sensitivity-graph.ts';
import {
  allOf,
  extrapolationFactor,
  noValue,
  type RouteAnswer,
  type RouteOf,
  type Step,
  type Workings,
} from './workings.ts';

/** A variable of a method with where it is read. */
export type BoundVariable = { readonly answer: Answer; readonly place: string };

/**
 * Where each variable of a method takes its value from: its binding; else the quantity's own operating point, by the
 * same key, or by the name of a length ratio ("L_over_d" reads the ratio L/d).
 */
export function boundVariables(
  workings: Workings,
  route: RouteOf<'correlation'>,
  method: Method,
  quantity: Quantity,
): Record<string, BoundVariable> {
  return Object.fromEntries(
    Object.keys(method.variables).map((variable): [string, BoundVariable] => {
      const binding = Object.hasOwn(route.bindings, variable) ? route.bindings[variable] : undefined;
      if (!binding) return [variable, readAtOwnPoint(workings, variable, quantity, method)];
      const place =
        binding.from === 'quantity'
          ? `“${workings.quantity(binding.quantityId)?.name ?? ''}”`
          : workings.points.nameOf(binding.operatingPointId);
      const wanted = dimensionOfUnit(method.variables[variable]?.unit ?? '1');
      const given = dimensionOfBinding(workings.model, binding);
      if (wanted && given && !sameDimension(wanted, given)) {
        const reason =
          `${variable} of ${method.title} is ${describeDimension(wanted)}, but in “${route.name}” it takes its value ` +
          `from ${place}, which is ${describeDimension(given)}.`;
        return [variable, { answer: { ok: false, reasons: [reason] }, place }];
      }
      return [variable, { answer: readBinding(workings, binding), place }];
    }),
  );
}

/** What a name means at an operating point: a variable or group, or one of its length ratios. */
export function readAtOwnPoint(workings: Workings, name: string, quantity: Quantity, method: Method): BoundVariable {
  const { points, graph } = workings;
  const place = points.nameOf(quantity.operatingPointId);
  if (findPointVariable(name)) return { answer: points.read(quantity.operatingPointId, name), place };
  const ratio = points
    .point(quantity.operatingPointId)
    ?.geometry.ratios.find((one) => plainRatioName(one.name) === plainRatioName(name));
  if (ratio) return { answer: { ok: true, term: graph.constant(ratio.value) }, place };
  const meaning = method.variables[name]?.meaning;
  const reason =
    `${name}${meaning ? ` (${meaning})` : ''}, asked for by ${method.title}, is not bound: bind it to a quantity, or enter ` +
    `the length ratio ${name.replaceAll('_over_', '/')} at ${place}.`;
  return { answer: { ok: false, reasons: [reason] }, place };
}

function plainRatioName(name: string): string {
  return name.replaceAll('_over_', '/').replaceAll(/\s/g, '').toLowerCase();
}

/** The groups of the target point into the method; Sh times D/L gives k, Nu times λ/L gives h. */
export function followCorrelation(workings: Workings, route: RouteOf<'correlation'>): RouteAnswer {
  const { graph, points } = workings;
  const quantity = workings.quantity(route.quantityId);
  const method = findMethod(route.methodId);
  if (!quantity) return noValue(`The route “${route.name}” leads to a quantity that is not in the study.`);
  if (route.methodId === '') return noValue(`No method is chosen for the route “${route.name}” yet.`);
  if (!method) return noValue(`The method “${route.methodId}” of “${route.name}” is not in the library.`);
  const parsed = parseFormula(method.expression);
  if (!parsed.ok) return noValue(`The formula of ${method.title} cannot be read: ${parsed.reason}`);

  const variables = boundVariables(workings, route, method, quantity);
  const read = allOf(Object.fromEntries(Object.entries(variables).map(([name, { answer }]) => [name, answer])));
  const scale = scaleToUnit(method, quantity);
  if (!scale.ok) return noValue(scale.reason, ...(read.ok ? [] : read.reasons));
  const scaleTerms = allOf(
    Object.fromEntries(scale.keys.map((key) => [key, points.read(quantity.operatingPointId, key)])),
  );
  if (!read.ok || !scaleTerms.ok) {
    const reasons = [read, scaleTerms].flatMap((one) => (one.ok ? [] : one.reasons));
    return noValue(...new Set(reasons));
  }

  const terms = parsed.formula.variables.map((name) => read.terms[name] ?? graph.constant(Number.NaN));
  const bare = graph.formula(parsed.formula, terms);
  if (!bare) return noValue(`${method.title} has no finite value at the numbers of “${route.name}”.`);
  const result = graph.product(1, [bare, workings.scatterFactor(route), extrapolationFactor(graph, route)]);
  const term = scaled(workings, result, scale.expression, scaleTerms.terms);
  if (!term) return noValue(`The route “${route.name}” has no finite value at these numbers.`);
  return { answer: { ok: true, term }, steps: stepsOf(method, variables, read.terms, result) };
}

function stepsOf(
  method: Method,
  variables: Readonly<Record<string, BoundVariable>>,
  terms: Readonly<Record<string, Term>>,
  result: Term,
): Step[] {
  const read = Object.entries(variables).flatMap(([symbol, { place }]): Step[] => {
    const term = terms[symbol];
    const { meaning = symbol, unit = '1' } = method.variables[symbol] ?? {};
    return term ? [{ symbol, meaning: `${meaning}, at ${place}`, unit, term }] : [];
  });
  const { symbol, meaning, unit } = method.result;
  return [...read, { symbol, meaning, unit, term: result }];
}

type Scale =
  | { readonly ok: true; readonly expression: string | null; readonly keys: readonly string[] }
  | { readonly ok: false; readonly reason: string };

/** How the result of a method becomes the quantity, by the unit of the quantity. */
function scaleToUnit(method: Method, quantity: Quantity): Scale {
  if (hasDimensionOf(quantity.unit, method.result.unit)) return { ok: true, expression: null, keys: [] };
  const { symbol } = method.result;
  if (method.gives === 'Sh' && hasDimensionOf(quantity.unit, massTransferCoefficientUnit)) {
    return { ok: true, expression: 'result * D / L', keys: ['D', 'L'] };
  }
  if (method.gives === 'Nu' && hasDimensionOf(quantity.unit, heatTransferCoefficientUnit)) {
    return { ok: true, expression: 'result * lambda / L', keys: ['lambda', 'L'] };
  }
  const follows: Record<string, string> = {
    Sh: ' and from it a mass-transfer coefficient in m/s',
    Nu: ' and from it a heat-transfer coefficient in W/(m² K)',
  };
  return {
    ok: false,
    reason:
      `${method.title} gives ${symbol} in ${method.result.unit}${follows[method.gives] ?? ''}, but “${quantity.name}” is ` +
      `in ${quantity.unit || '1'}.`,
  };
}

function scaled(
  workings: Workings,
  result: Term,
  expression: string | null,
  terms: Readonly<Record<string, Term>>,
): Term | null {
  return expression === null ? result : workings.graph.expression(expression, { ...terms, result });
}
