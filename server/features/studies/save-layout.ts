import { saveLayout } from '../../../shared/api/studies.ts';
import { canEdit } from '../../../shared/domain/study-policy.ts';
import { requireAllowed } from '../../db/problem.ts';
import { layouts } from '../../db/schema/studies.ts';
import { readStudyRow, requireReadable } from '../../db/study-reads.ts';
import { defineUnrecorded } from '../../http/handler.ts';

export const saveLayoutHandler = defineUnrecorded(
  saveLayout,
  'Where a node stands is layout: it changes no number and must not make a signed one look changed.',
  async ({ actor, params, body, tx }) => {
    requireReadable(actor, params.studyId);
    requireAllowed(canEdit(actor, params.studyId));
    const study = await readStudyRow(tx, params.studyId);
    const row = { studyId: study.id, positions: body.layout };
    await tx
      .insert(layouts)
      .values(row)
      .onDuplicateKeyUpdate({ set: { positions: body.layout } });
    return {};
  },
);
