import { describe, expect, it } from 'vitest';
import type { MeasuredResult, StudyEvaluation } from '../../../shared/engine/model/evaluation.ts';
import { submissionReadiness } from '../../../src/features/chain/submission-readiness.ts';
import { analogueChain, ids, studyOf } from './analogue-chain.ts';

const result: MeasuredResult = { value: 1, u: 0.1, degreesOfFreedom: null, budget: [], correlatedShare: 0 };

function evaluation(change: Partial<StudyEvaluation> = {}): StudyEvaluation {
  return {
    engineVersion: 'test',
    quantities: Object.fromEntries(analogueChain.quantities.map(({ id }) => [id, { routeId: null, result }])),
    routes: Object.fromEntries(
      analogueChain.routes.map(({ id, quantityId }) => [
        id,
        { routeId: id, quantityId, result, steps: [], checks: [], assumptions: [] },
      ]),
    ),
    points: {},
    tests: {},
    findings: [],
    methodVersions: {},
    ...change,
  };
}
const states = studyOf(analogueChain).routeStates;

describe('what a submission would hold', () => {
  it('is every route behind the target that is not approved on its present basis, and nothing beside', () => {
    const approved = { status: 'approved' as const, revision: 1, submissionId: null, basisChanged: false };

    const fresh = submissionReadiness(analogueChain, evaluation(), states, ids.k);
    const partly = submissionReadiness(analogueChain, evaluation(), { ...states, [ids.hRoute]: approved }, ids.k);
    const moved = submissionReadiness(
      analogueChain,
      evaluation(),
      { ...states, [ids.hRoute]: { ...approved, basisChanged: true } },
      ids.k,
    );

    expect(fresh.routeIds).toEqual([ids.hRoute, ids.kRoute]);
    expect(partly.routeIds).toEqual([ids.kRoute]);
    expect(moved.routeIds).toEqual([ids.hRoute, ids.kRoute]);
    expect(fresh.obstacles).toEqual([]);
  });

  it('names each thing that is missing where it is mended: a value, a justification, a stopping finding upstream', () => {
    const base = evaluation();
    const assumption = {
      key: 'same-geometry',
      statement: 'Same geometry at both ends',
      ifItFails: 'Use a correlation.',
      backing: 'judgement' as const,
      checkKeys: [],
      verdict: 'by judgement' as const,
      needsJustification: true,
    };
    const kRoute = base.routes[ids.kRoute];
    if (!kRoute) throw new Error('the chain has no route for k');
    const lacking = evaluation({
      quantities: { ...base.quantities, [ids.h]: { routeId: null, result: null } },
      routes: { ...base.routes, [ids.kRoute]: { ...kRoute, assumptions: [assumption] } },
      findings: [
        {
          code: 'x',
          severity: 'stops',
          subject: { kind: 'operating-point', id: ids.rig },
          sentence: 'The rig has no length.',
        },
        { code: 'y', severity: 'stops', subject: { kind: 'quantity', id: ids.time }, sentence: 'Not upstream of k.' },
      ],
    });

    const { obstacles } = submissionReadiness(analogueChain, lacking, states, ids.k);

    expect(obstacles.map(({ subjectId }) => subjectId)).toEqual([ids.rig, ids.h, ids.kRoute]);
    expect(obstacles[2]?.sentence).toContain('Same geometry at both ends');
  });
});
