import type { BudgetLine, MeasuredResult } from '../model/evaluation.ts';
import type { Covariance } from './covariance.ts';
import type { Input, Term } from './sensitivity-graph.ts';

/** Variances below this share of the sum of squares are what rounding leaves of a complete cancellation. */
const rounding = 1e-13;

/**
 * The variance of a term, c V cᵀ (JCGM 100:2008, equation 16), in its unit squared.
 *
 * @param counts - Which inputs to count; all where not given.
 */
export function varianceOf(
  term: Term,
  inputs: readonly Input[],
  covariances: readonly Covariance[],
  counts: (input: Input) => boolean = () => true,
): number {
  let squares = 0;
  for (let place = 0; place < term.row.length; place += 1) {
    const input = inputs[place];
    const sensitivity = term.row[place] ?? 0;
    if (!input || sensitivity === 0 || !counts(input)) continue;
    squares += (sensitivity * input.u) ** 2;
  }
  let products = 0;
  for (const { a, b, value } of covariances) {
    const by = (term.row[a] ?? 0) * (term.row[b] ?? 0);
    const [first, second] = [inputs[a], inputs[b]];
    if (by === 0 || !first || !second || !counts(first) || !counts(second)) continue;
    products += 2 * by * value;
  }
  const variance = squares + products;
  return variance <= rounding * squares ? 0 : variance;
}

export function standardUncertaintyOf(
  term: Term,
  inputs: readonly Input[],
  covariances: readonly Covariance[],
): number {
  return Math.sqrt(varianceOf(term, inputs, covariances));
}

/**
 * The result of a term: value, standard uncertainty, degrees of freedom and budget. Where the uncertainty is zero
 * the shares are zero too.
 */
export function measuredResult(
  term: Term,
  inputs: readonly Input[],
  covariances: readonly Covariance[],
): MeasuredResult {
  const variance = varianceOf(term, inputs, covariances);
  const budget: BudgetLine[] = [];
  let squares = 0;
  for (let place = 0; place < term.row.length; place += 1) {
    const input = inputs[place];
    const sensitivity = term.row[place] ?? 0;
    if (!input || input.u === 0 || sensitivity === 0) continue;
    const contribution = Math.abs(sensitivity) * input.u;
    // An input that cancels leaves about 1e-16 of itself behind; it is no part of the budget.
    if (contribution ** 2 < rounding * rounding * variance) continue;
    squares += contribution ** 2;
    const share = variance > 0 ? contribution ** 2 / variance : 0;
    budget.push({ inputId: input.id, label: input.label, u: input.u, sensitivity, contribution, share });
  }
  budget.sort((one, other) => other.contribution - one.contribution);
  return {
    value: term.value,
    u: Math.sqrt(variance),
    degreesOfFreedom: variance > 0 ? effectiveDegreesOfFreedom(term, inputs, covariances, variance) : null,
    budget,
    correlatedShare: variance > 0 ? (variance - squares) / variance : 0,
  };
}

/**
 * Welch-Satterthwaite (JCGM 100:2008, G.4.1). Means of the same readings are one estimate with one number of degrees
 * of freedom, their covariances included; the formula does not hold for correlated inputs taken one by one.
 */
function effectiveDegreesOfFreedom(
  term: Term,
  inputs: readonly Input[],
  covariances: readonly Covariance[],
  variance: number,
): number | null {
  const groups = new Map<string, number>();
  for (let place = 0; place < term.row.length; place += 1) {
    const input = inputs[place];
    if (input?.degreesOfFreedom && term.row[place] !== 0) groups.set(input.group, input.degreesOfFreedom);
  }
  let sum = 0;
  for (const [group, degreesOfFreedom] of groups) {
    const part = varianceOf(term, inputs, covariances, (input) => input.group === group);
    sum += (part * part) / degreesOfFreedom;
  }
  return sum > 0 ? (variance * variance) / sum : null;
}
