import type { MatchCheck, Verdict } from '../../shared/engine/model/evaluation.ts';
import { plainNumber } from '../charts/plain-number.ts';

const order: readonly Verdict[] = ['outside', 'near the edge', 'not evaluated', 'inside'];

export function worstVerdict(checks: readonly MatchCheck[]): Verdict | null {
  return order.find((verdict) => checks.some((check) => check.verdict === verdict)) ?? null;
}

/** How far a check misses, as a factor of at least one; null where no factor can be given. */
export function missFactor(check: MatchCheck): number | null {
  const { window, target, ratio } = check;
  if (window && target !== null && target > 0) {
    if (window.max !== null && target > window.max && window.max > 0) return target / window.max;
    if (window.min !== null && target < window.min && window.min > 0) return window.min / target;
  }
  if (ratio !== null && ratio > 0) return ratio >= 1 ? ratio : 1 / ratio;
  return null;
}

/** One short tag for a link or a port: "3 of 3 inside", "Re 1.27× outside". Null where nothing is checked. */
export function verdictTag(
  checks: readonly MatchCheck[],
): { readonly verdict: Verdict; readonly words: string } | null {
  const verdict = worstVerdict(checks);
  if (verdict === null) return null;
  if (verdict === 'outside') {
    const failed = checks.filter((check) => check.verdict === 'outside');
    const worst = failed.reduce((a, b) => ((missFactor(b) ?? 0) > (missFactor(a) ?? 0) ? b : a));
    const factor = missFactor(worst);
    const more = failed.length > 1 ? `, ${failed.length} of ${checks.length} outside` : ' outside';
    return { verdict, words: `${worst.group}${factor === null ? '' : ` ${plainNumber(factor, 2)}×`}${more}` };
  }
  const count = checks.filter((check) => check.verdict === verdict).length;
  return { verdict, words: `${count} of ${checks.length} ${verdict}` };
}
