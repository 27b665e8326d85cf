import { addTest } from '../../../shared/api/tests.ts';
import { canEdit } from '../../../shared/domain/study-policy.ts';
import type { Test } from '../../../shared/engine/model/study-model.ts';
import { summariseReadings } from '../../../shared/engine/reductions/steady-heating.ts';
import { flowOf, readReadings } from '../../../shared/readings/read-readings.ts';
import { sha256 } from '../../db/canonical-json.ts';
import { editItems } from '../../db/edit-items.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { files, testReadings } from '../../db/schema/files.ts';
import { lockStudy, raiseRevision, requireReadable } from '../../db/study-reads.ts';
import { defineCommand } from '../../http/handler.ts';

/** UTF-8, or Latin-1 as older loggers write it (the degree sign is the usual giveaway). */
function decode(content: Buffer): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(content);
  } catch {
    return new TextDecoder('windows-1252').decode(content);
  }
}

export const addTestCommand = defineCommand(addTest, async ({ actor, params, body, file, tx, services }) => {
  requireReadable(actor, params.studyId);
  requireAllowed(canEdit(actor, params.studyId));
  if (!file) throw new Problem('invalid', 'Choose the file with the readings.', { fields: { file: 'Choose a file.' } });

  const read = readReadings(decode(file.content), body.mapping);
  if (!read.ok) {
    const [first] = read.problems;
    const more = read.problems.length > 1 ? ` There are ${read.problems.length - 1} more.` : '';
    throw new Problem('invalid', `${first?.sentence ?? 'The file cannot be read.'}${more}`, {
      fields: Object.fromEntries(
        read.problems.map(({ row, column, sentence }) => [`row ${row ?? '-'}, ${column ?? 'file'}`, sentence]),
      ),
    });
  }
  if (flowOf(body.mapping) !== body.reduction.flowIs) {
    const sentence = `The flow column is in ${body.mapping.flow.unit}, which is not a ${body.reduction.flowIs}. Change the unit or what the flow is.`;
    throw new Problem('invalid', sentence, { fields: { 'body.reduction.flowIs': sentence } });
  }

  const study = await lockStudy(tx, params.studyId);
  const fileId = services.newId();
  const name = file.name.slice(0, 200) || 'readings.csv';
  const facts = { id: fileId, name, sha256: sha256(file.content), bytes: file.content.length };
  const test: Test = {
    id: body.id,
    name: body.name,
    operatingPointId: body.operatingPointId,
    performedOn: body.performedOn,
    reduction: { ...body.reduction, summary: summariseReadings(read.readings) },
    file: facts,
  };
  const { changes, itemRevisions } = await editItems(
    tx,
    study.id,
    [{ kind: 'test', id: test.id, expectedRevision: 0, body: test }],
    { personId: actor.personId, reason: '' },
  );
  await tx.insert(files).values({
    ...facts,
    studyId: study.id,
    content: file.content,
    uploadedBy: actor.personId,
    uploadedAt: services.now(),
  });
  await tx
    .insert(testReadings)
    .values({ studyId: study.id, testId: test.id, mapping: body.mapping, readings: read.readings });
  const revision = await raiseRevision(tx, study, services.now());
  return {
    reply: { test, revision, itemRevision: itemRevisions[test.id] ?? 1 },
    audit: [
      {
        chain: study.id,
        event: {
          event: 'chain.edited',
          summary: `Added the test "${test.name}" with ${read.readings.length} readings from ${name}`,
          reason: '',
          changes: [...changes],
        },
      },
    ],
    notices: [],
  };
});
