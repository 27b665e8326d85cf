import { editChain } from '../../../shared/api/studies.ts';
import { canEdit } from '../../../shared/domain/study-policy.ts';
import { editItems } from '../../db/edit-items.ts';
import { requireAsMeasured } from '../../db/measured-tests.ts';
import { requireAllowed } from '../../db/problem.ts';
import {
  describeRouteStates,
  lockStudy,
  raiseRevision,
  readRouteStates,
  requireReadable,
} from '../../db/study-reads.ts';
import { defineCommand } from '../../http/handler.ts';

export const editChainCommand = defineCommand(editChain, async ({ actor, params, body, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canEdit(actor, params.studyId));
  const study = await lockStudy(tx, params.studyId);
  await requireAsMeasured(tx, study.id, body.edits);
  const { model, changes, itemRevisions } = await editItems(tx, study.id, body.edits, {
    personId: actor.personId,
    reason: body.reason,
  });
  const revision = await raiseRevision(tx, study, services.now());
  return {
    reply: { revision, itemRevisions, routeStates: describeRouteStates(model, await readRouteStates(tx, study.id)) },
    audit: [
      {
        chain: study.id,
        event: { event: 'chain.edited', summary: body.summary, reason: body.reason, changes: [...changes] },
      },
    ],
    notices: [],
  };
});
