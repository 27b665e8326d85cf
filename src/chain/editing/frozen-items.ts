import type { Study } from '../../../shared/api/studies.ts';
import { upstreamOf } from '../../../shared/engine/evaluate/upstream.ts';

/** Everything that an open submission rests on, by id, with the name of the submission's target. */
export function frozenItems(study: Pick<Study, 'model' | 'submissions'>): ReadonlyMap<string, string> {
  const frozen = new Map<string, string>();
  for (const submission of study.submissions) {
    if (submission.status !== 'open') continue;
    const upstream = upstreamOf(study.model, submission.targetQuantityId);
    const ids = [...upstream.quantityIds, ...upstream.routeIds, ...upstream.operatingPointIds, ...upstream.testIds];
    for (const id of ids) frozen.set(id, submission.targetName);
  }
  return frozen;
}
