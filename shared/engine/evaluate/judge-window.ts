import type { MatchCheck, Verdict } from '../model/evaluation.ts';
import { formatNumber } from '../quantity/format-measured.ts';

// The thresholds and why they are where they are: docs/decisions/0003-match-verdicts.md.
const edgeMargin = 0.05;
export const reynoldsMatch = { min: 0.8, max: 1.25, basis: 'indicative' as const };
const reynoldsClose = 0.05;
const ratioEqual = 0.05;
const ratioNear = 0.2;
export const freeConvection = { min: null, max: 0.1, basis: 'indicative' as const };
const freeConvectionDominates = 10;

type Window = NonNullable<MatchCheck['window']>;

/**
 * Where a value lies against a window. Near the edge: inside, but closer to a limit than its own expanded relative
 * uncertainty or 5 %; or beyond a limit by at most 5 %.
 *
 * @param expanded - U (k = 2) of the value, in its unit.
 */
export function judgeWindow(value: number, expanded: number, window: Window): Verdict {
  const inner = Math.max(edgeMargin, value === 0 ? 0 : expanded / Math.abs(value));
  const factors = [
    ...(window.min === null || window.min <= 0 ? [] : [value / window.min]),
    ...(window.max === null || window.max <= 0 ? [] : [window.max / value]),
  ];
  if (window.min !== null && window.min <= 0 && value < window.min) return 'outside';
  if (window.max !== null && window.max <= 0 && value > window.max) return 'outside';
  if (factors.some((factor) => factor < 1 / (1 + edgeMargin))) return 'outside';
  return factors.some((factor) => factor < 1 + inner) ? 'near the edge' : 'inside';
}

/** How a value stands to a window, in words: "Re 1.27 times above the tested range". */
export function windowSentence(symbol: string, place: string, value: number, window: Window, verdict: Verdict): string {
  const range = rangeWords(window);
  const stands = `${symbol} is ${formatNumber(value)} at ${place}`;
  const basis = window.basis === 'sourced' ? 'tested range' : 'indicative range';
  if (window.max !== null && value > window.max && window.max > 0) {
    return `${stands}: ${formatNumber(value / window.max, 3)} times above the ${basis} (${range}).`;
  }
  if (window.min !== null && value < window.min && value > 0) {
    return `${stands}: ${formatNumber(window.min / value, 3)} times below the ${basis} (${range}).`;
  }
  if (verdict === 'outside') return `${stands}: outside the ${basis} (${range}).`;
  return verdict === 'inside'
    ? `${stands}, inside the ${basis} (${range}).`
    : `${stands}: inside the ${basis} (${range}), but close to its edge.`;
}

function rangeWords(window: Window): string {
  const { min, max } = window;
  if (min === null && max === null) return 'no limits stated';
  if (min === null) return `up to ${formatNumber(max ?? 0)}`;
  return max === null ? `from ${formatNumber(min)}` : `${formatNumber(min)} to ${formatNumber(max)}`;
}

/**
 * Whether two Reynolds numbers are the same: inside within 5 %, or where they differ by no more than the expanded
 * uncertainty of their ratio; outside beyond 0.8 to 1.25, whatever the uncertainty.
 */
export function judgeReynoldsMatch(ratio: number, expandedRelative: number): Verdict {
  if (ratio < reynoldsMatch.min || ratio > reynoldsMatch.max) return 'outside';
  const isClose = ratio >= 1 - reynoldsClose && ratio <= 1 + reynoldsClose;
  return isClose || Math.abs(Math.log(ratio)) <= expandedRelative ? 'inside' : 'near the edge';
}

/** Whether two length ratios are the same: inside within 5 %, near the edge within 20 %. */
export function judgeLengthRatio(source: number, target: number): Verdict {
  const apart = Math.max(source, target) / Math.min(source, target) - 1;
  // 1.05 / 1 − 1 is 0.05 and a little more in binary; a limit that is stated as 5 % includes 5 %.
  const rounding = 1e-9;
  if (apart <= ratioEqual + rounding) return 'inside';
  return apart <= ratioNear + rounding ? 'near the edge' : 'outside';
}

/** Gr/Re²: forced convection alone below 0.1, mixed up to 10, free convection beyond. */
export function judgeFreeConvection(value: number): Verdict {
  if (value < freeConvection.max) return 'inside';
  return value <= freeConvectionDominates ? 'near the edge' : 'outside';
}

/** From worst to best. */
const order: readonly Verdict[] = ['outside', 'not evaluated', 'near the edge', 'inside'];

export function worstVerdict(verdicts: readonly Verdict[]): Verdict {
  return order.find((verdict) => verdicts.includes(verdict)) ?? 'not evaluated';
}
