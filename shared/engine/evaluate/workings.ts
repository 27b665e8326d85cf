import type { Quantity, Route, StudyModel } from '../model/study-model.ts';
import type { ReducedTest } from '../reductions/steady-heating.ts';
import type { OperatingPointReadings } from './operating-point-readings.ts';
import type { Answer, SensitivityGraph, Term } from './sensitivity-graph.ts';

export type RouteOf<Kind extends Route['kind']> = Extract<Route, { kind: Kind }>;

/** What the routes of a study read while it is evaluated. */
export type Workings = {
  readonly model: StudyModel;
  readonly graph: SensitivityGraph;
  readonly points: OperatingPointReadings;
  readonly quantity: (id: string) => Quantity | undefined;
  /** The value of a quantity by its route in force. */
  readonly quantityValue: (quantityId: string) => Answer;
  readonly test: (testId: string) => ReducedTest | null;
  /** The factor of mean 1 that carries the scatter of a method; shared by its routes unless a route has its own. */
  readonly scatterFactor: (route: RouteOf<'heat-analogue' | 'correlation'>) => Term;
};

/** A named number between the inputs of a route and its result, SI. */
export type Step = { readonly symbol: string; readonly meaning: string; readonly unit: string; readonly term: Term };

export type RouteAnswer = { readonly answer: Answer; readonly steps: readonly Step[] };

export function noValue(...reasons: string[]): RouteAnswer {
  return { answer: { ok: false, reasons }, steps: [] };
}

/** The terms of all answers by name, or every reason why one is missing. */
export function allOf<Name extends string>(
  answers: Readonly<Record<Name, Answer>>,
): { ok: true; terms: Record<Name, Term> } | { ok: false; reasons: string[] } {
  const terms: Partial<Record<Name, Term>> = {};
  const reasons = new Set<string>();
  for (const name of Object.keys(answers) as Name[]) {
    const answer = answers[name];
    if (answer.ok) terms[name] = answer.term;
    else for (const reason of answer.reasons) reasons.add(reason);
  }
  return reasons.size > 0 ? { ok: false, reasons: [...reasons] } : { ok: true, terms: terms as Record<Name, Term> };
}

/** A factor of mean 1 with the relative standard uncertainty that the engineer allows for use outside a window. */
export function extrapolationFactor(graph: SensitivityGraph, route: RouteOf<'heat-analogue' | 'correlation'>): Term {
  if (route.extrapolationAllowance === null) return graph.constant(1);
  return graph.input(1, {
    id: `route:${route.id}:extrapolation`,
    label: `extrapolation allowance of “${route.name}”`,
    u: route.extrapolationAllowance,
    degreesOfFreedom: null,
  });
}
