import type { Assumption, Finding, MatchCheck, RouteResult } from '../model/evaluation.ts';
import type { Route } from '../model/study-model.ts';
import { formatNumber } from '../quantity/format-measured.ts';
import type { Answer } from './sensitivity-graph.ts';

/** What the engineer must know about a route: why it has no value, and what its checks ask for. */
export function routeFindings(
  route: Route,
  answer: Answer,
  result: Omit<RouteResult, 'routeId' | 'quantityId'>,
): Finding[] {
  const subject = { kind: 'route', id: route.id } as const;
  const findings: Finding[] = answer.ok
    ? []
    : answer.reasons.map((sentence) => ({ code: 'no-value', severity: 'stops', subject, sentence }));
  for (const assumption of result.assumptions) {
    if (!assumption.needsJustification || (route.justifications[assumption.key] ?? '').trim() !== '') continue;
    const sentence = `Say why this holds: ${assumption.statement} ${worstSentence(assumption, result.checks)}`;
    findings.push({ code: 'needs-justification', severity: 'warns', subject, sentence });
  }
  const allowance = 'extrapolationAllowance' in route ? route.extrapolationAllowance : null;
  for (const check of result.checks) {
    if (check.verdict !== 'outside' || allowance === null) continue;
    const sentence = `${check.sentence} An extrapolation allowance of ${formatNumber(allowance * 100, 2)} % is set for it.`;
    findings.push({ code: 'extrapolated', severity: 'tells', subject, sentence });
  }
  if (route.kind === 'stated-value' && route.evidence.trim() === '') {
    const sentence = `No evidence is given for “${route.name}”: name the data sheet, handbook or person it comes from.`;
    findings.push({ code: 'no-evidence', severity: 'warns', subject, sentence });
  }
  if (answer.ok && answer.term.restsOnUncertainty && result.result?.u === 0) {
    const sentence =
      `The uncertainty of “${route.name}” comes out as zero although its inputs have one: they cancel, or its slope vanishes ` +
      'just at this point. To first order nothing is known about it here; look at it away from this point.';
    findings.push({ code: 'sensitivity-vanishes', severity: 'warns', subject, sentence });
  }
  return findings;
}

function worstSentence(assumption: Assumption, checks: readonly MatchCheck[]): string {
  return checks
    .filter((check) => assumption.checkKeys.includes(check.key) && check.verdict !== 'inside')
    .map((check) => check.sentence)
    .join(' ');
}
