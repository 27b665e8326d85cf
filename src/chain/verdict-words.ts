import type { MatchCheck, Verdict } from '../../shared/engine/model/evaluation.ts';
import { plainNumber } from '../charts/plain-number.ts';

const order: readonly Verdict[] = ['outside', 'near the edge', 'not evaluated', 'inside'];

export function worstVerdict(checks: readonly MatchCheck[]): Verdict | null {
  return order.find((verdict) => checks.some((check) => check.verdict === verdict)) ?? null;
}

/** How far a check misses, as a factor of at least one; null where no factor can be given. */
export function missFactor(check: MatchCheck): number | null {
  const { window, ratio } = check;
  // Where both ends are compared the window is one of their ratio.
  if (check.kind === 'match' || check.kind === 'geometry') {
    return ratio !== null && ratio > 0 ? Math.max(ratio, 1 / ratio) : null;
  }
  const at = check.target ?? check.source;
  if (!window || at === null || at <= 0) return null;
  if (window.max !== null && at > window.max && window.max > 0) return at / window.max;
  if (window.min !== null && at < window.min) return window.min / at;
  return null;
}

/** One short tag for a link or a port: "3 of 3 inside", "Re 1.27× outside". Null where nothing is checked. */
export function verdictTag(
  checks: readonly MatchCheck[],
): { readonly verdict: Verdict; readonly words: string; readonly short: string } | null {
  const verdict = worstVerdict(checks);
  if (verdict === null) return null;
  if (verdict === 'outside') {
    const failed = checks.filter((check) => check.verdict === 'outside');
    const worst = failed.reduce((a, b) => ((missFactor(b) ?? 0) > (missFactor(a) ?? 0) ? b : a));
    const factor = missFactor(worst);
    const name = `${worst.group}${factor === null ? '' : ` ${plainNumber(factor, 2)}×`}`;
    if (failed.length === 1) return { verdict, words: `${name} outside`, short: `${name} outside` };
    const counted = `${failed.length} of ${checks.length} outside`;
    return { verdict, words: `${name}, ${counted}`, short: counted };
  }
  const count = checks.filter((check) => check.verdict === verdict).length;
  const words = `${count} of ${checks.length} ${verdict}`;
  return { verdict, words, short: words };
}
