import { parseFormula } from '../formula/parse-formula.ts';
import type { Binding } from '../model/study-model.ts';
import { balanceError } from './check-model.ts';
import type { Answer } from './sensitivity-graph.ts';
import { allOf, noValue, type RouteAnswer, type RouteOf, type Workings } from './workings.ts';

/** A conservation law or definition over other quantities and what is read at operating points. */
export function followBalance(workings: Workings, route: RouteOf<'balance'>): RouteAnswer {
  const { graph } = workings;
  if (route.expression === '') return noValue(`The balance “${route.name}” has no expression yet.`);
  const error = balanceError(workings.model, route, workings.quantity(route.quantityId));
  if (error) return noValue(error);
  const parsed = parseFormula(route.expression);
  if (!parsed.ok) return noValue(parsed.reason);
  const { formula } = parsed;
  const read = allOf(
    Object.fromEntries(
      formula.variables.map((variable): [string, Answer] => {
        const binding = Object.hasOwn(route.bindings, variable) ? route.bindings[variable] : null;
        if (!binding) {
          return [variable, { ok: false, reasons: [`${variable} in “${route.name}” is not bound to anything yet.`] }];
        }
        return [variable, readBinding(workings, binding)];
      }),
    ),
  );
  if (!read.ok) return noValue(...read.reasons);
  const terms = formula.variables.map((variable) => read.terms[variable] ?? graph.constant(Number.NaN));
  const term = graph.formula(formula, terms);
  if (term) return { answer: { ok: true, term }, steps: [] };
  return noValue(
    `The balance “${route.expression}” has no finite value at these numbers: look for a division by zero or the root or ` +
      'logarithm of a negative number.',
  );
}

export function readBinding(workings: Workings, binding: Binding): Answer {
  return binding.from === 'quantity'
    ? workings.quantityValue(binding.quantityId)
    : workings.points.read(binding.operatingPointId, binding.key);
}
