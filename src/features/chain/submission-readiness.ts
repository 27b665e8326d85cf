import { upstreamOf } from '../../../shared/engine/evaluate/upstream.ts';
import type { StudyEvaluation } from '../../../shared/engine/model/evaluation.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import type { ChainState } from '../../chain/editing/chain-document.ts';

export type Obstacle = { readonly sentence: string; readonly subjectId: string };
export type Readiness = {
  /** Routes that are judged, upstream first: all that are not approved on the basis they have now. */
  readonly routeIds: readonly string[];
  readonly obstacles: readonly Obstacle[];
};

/** What a submission of the target would hold, and what must be mended first, each with its place. */
export function submissionReadiness(
  model: StudyModel,
  evaluation: StudyEvaluation,
  routeStates: ChainState['routeStates'],
  targetId: string,
): Readiness {
  const upstream = upstreamOf(model, targetId);
  const covered = new Set(
    upstream.routeIds.filter((id) => routeStates[id]?.status !== 'approved' || routeStates[id]?.basisChanged),
  );
  const subjects = new Set([
    ...upstream.quantityIds,
    ...upstream.routeIds,
    ...upstream.operatingPointIds,
    ...upstream.testIds,
  ]);
  const obstacles: Obstacle[] = [];
  const say = (subjectId: string, sentence: string) => {
    if (!obstacles.some((one) => one.subjectId === subjectId && one.sentence === sentence))
      obstacles.push({ subjectId, sentence });
  };

  for (const finding of evaluation.findings) {
    if (finding.severity === 'stops' && subjects.has(finding.subject.id)) say(finding.subject.id, finding.sentence);
  }
  for (const id of upstream.quantityIds) {
    const quantity = model.quantities.find((one) => one.id === id);
    const result = evaluation.quantities[id];
    if (quantity && !result?.result && !obstacles.some((one) => one.subjectId === id)) {
      say(id, `${quantity.name} has no value: adopt a route that gives one.`);
    }
  }
  for (const route of model.routes) {
    if (!covered.has(route.id)) continue;
    if (routeStates[route.id]?.status === 'in review') say(route.id, `${route.name} is already in review.`);
    for (const assumption of evaluation.routes[route.id]?.assumptions ?? []) {
      if (assumption.needsJustification && !route.justifications[assumption.key]?.trim()) {
        say(route.id, `${route.name}: write why this holds: ${assumption.statement}`);
      }
    }
  }
  return { routeIds: [...covered].reverse(), obstacles };
}
