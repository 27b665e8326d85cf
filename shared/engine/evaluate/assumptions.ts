import type { Method } from '../methods/method.ts';
import type { Assumption, MatchCheck } from '../model/evaluation.ts';
import type { Route } from '../model/study-model.ts';
import { groupBy } from './group-by.ts';
import { worstVerdict } from './judge-window.ts';

type Judgement = { readonly key: string; readonly statement: string; readonly ifItFails: string };

const statedValue: readonly Judgement[] = [
  {
    key: 'evidence',
    statement: 'The evidence supports both the value and its uncertainty, at this operating point.',
    ifItFails: 'Find better evidence, widen the uncertainty, or measure it.',
  },
];
const balance: readonly Judgement[] = [
  {
    key: 'complete',
    statement: 'The balance is complete: nothing else enters, leaves or accumulates.',
    ifItFails: 'Add the missing term to the balance.',
  },
];
const steadyHeating: readonly Judgement[] = [
  {
    key: 'steady-state',
    statement: 'The rig was at steady state while the readings were taken.',
    ifItFails: 'Wait for steady temperatures and repeat the readings.',
  },
  {
    key: 'losses-known',
    statement: 'The heat loss is known within its stated uncertainty.',
    ifItFails: 'Measure the loss with guard heaters or at several temperature differences.',
  },
  {
    key: 'radiation-small',
    statement: 'Radiation carries no share of the heat that the loss does not hold already.',
    ifItFails: 'Subtract 4 ε σ T³ from the coefficient, with an uncertainty of its own.',
  },
  {
    key: 'wall-uniform',
    statement: 'The measured wall temperature stands for the whole heated surface.',
    ifItFails: 'Measure the wall at several places and take the mean with its scatter.',
  },
  {
    key: 'dissipation-small',
    statement: 'Viscous dissipation does not warm the fluid at the wall.',
    ifItFails: 'Refer the temperature difference to the adiabatic wall temperature.',
  },
];

const ofKind: Readonly<Partial<Record<Route['kind'], readonly Judgement[]>>> = {
  'stated-value': statedValue,
  balance,
  'test-result': steadyHeating,
};

/**
 * What a route rests on. Assumptions of a method are backed by its match checks; what no check can speak to is ruled on
 * by judgement. Checks that no assumption of the method names get one of their own, so that none goes unanswered.
 */
export function assumptionsOf(route: Route, method: Method | undefined, checks: readonly MatchCheck[]): Assumption[] {
  const byJudgement = (ofKind[route.kind] ?? []).map((one) => judgement(one));
  if (!method) return byJudgement;
  const isAnswered = new Set<string>();
  const fromMethod = method.assumptions.map((assumption) => {
    const backing = checks.filter((check) => assumption.checkGroups.some((group) => speaksOf(check, group)));
    for (const check of backing) isAnswered.add(check.key);
    return backing.length === 0 ? judgement(assumption) : checked(assumption, backing, route);
  });
  const left = groupBy(
    checks.filter((check) => !isAnswered.has(check.key)),
    (check) => (check.kind === 'geometry' ? 'geometry' : check.group),
  );
  const ofItsOwn = [...left].map(([group, backing]) => checked(ownAssumption(group, backing), backing, route));
  return [...fromMethod, ...ofItsOwn, ...byJudgement];
}

function speaksOf(check: MatchCheck, group: string): boolean {
  return check.group === group || check.kind === group || check.key === group;
}

function judgement({ key, statement, ifItFails }: Judgement): Assumption {
  return {
    key,
    statement,
    ifItFails,
    backing: 'judgement',
    checkKeys: [],
    verdict: 'by judgement',
    needsJustification: false,
  };
}

function checked({ key, statement, ifItFails }: Judgement, checks: readonly MatchCheck[], route: Route): Assumption {
  const verdict = worstVerdict(checks.map((check) => check.verdict));
  const isCovered = 'extrapolationAllowance' in route && route.extrapolationAllowance !== null;
  // An allowance pays for use outside a window; what is near an edge or unknown needs words all the same.
  const unsettled = checks.some((check) => check.verdict === 'near the edge' || check.verdict === 'not evaluated');
  const isOutside = verdict === 'outside';
  return {
    key,
    statement,
    ifItFails,
    backing: 'checks',
    checkKeys: checks.map((check) => check.key),
    verdict,
    needsJustification: unsettled || (isOutside && !isCovered),
  };
}

function ownAssumption(group: string, checks: readonly MatchCheck[]): Judgement {
  if (group === 'geometry') {
    return {
      key: 'geometry',
      statement: 'The geometry is the one that the numbers come from.',
      ifItFails: 'No transfer holds: use a method for this geometry.',
    };
  }
  if (checks.some((check) => check.kind === 'regime')) {
    return {
      key: `regime:${group}`,
      statement: 'Both ends of the link flow in the same regime.',
      ifItFails: 'Repeat the test in the regime of the target.',
    };
  }
  if (checks.some((check) => check.kind === 'match')) {
    return {
      key: `match:${group}`,
      statement: `${group} is the same at both ends of the link.`,
      ifItFails:
        'Correct with the exponent of the flow regime and its uncertainty, or repeat the test at the matching value.',
    };
  }
  if (group === 'Gr/Re²') {
    return {
      key: 'free-convection',
      statement: 'Free convection carries no share of the transport at either end.',
      ifItFails:
        'Lower the temperature difference, or combine free and forced convection; then no clean analogy holds.',
    };
  }
  return {
    key: `window:${group}`,
    statement: `${group} lies in the range that the method was tested in.`,
    ifItFails: 'Use a method for this range, or set an extrapolation allowance.',
  };
}
