import { and, eq } from 'drizzle-orm';
import type { ChainEdit } from '../../shared/api/studies.ts';
import { type Test, testSchema } from '../../shared/engine/model/study-model.ts';
import { summariseReadings } from '../../shared/engine/reductions/steady-heating.ts';
import { canonicalJson } from './canonical-json.ts';
import type { Reader } from './database.ts';
import { Problem } from './problem.ts';
import { files, testReadings } from './schema/files.ts';

async function isAsMeasured(reader: Reader, studyId: string, test: Test): Promise<boolean> {
  const [stored] = await reader
    .select({ readings: testReadings.readings })
    .from(testReadings)
    .where(and(eq(testReadings.studyId, studyId), eq(testReadings.testId, test.id)));
  const [file] = await reader
    .select({ id: files.id, name: files.name, sha256: files.sha256, bytes: files.bytes })
    .from(files)
    .where(and(eq(files.studyId, studyId), eq(files.id, test.file.id)));
  if (!stored || !file) return false;
  const measured = { file, summary: summariseReadings(stored.readings) };
  return canonicalJson(measured) === canonicalJson({ file: test.file, summary: test.reduction.summary });
}

/**
 * An edit may change how a test is reduced, never what was measured: means, covariances and the file's facts are the
 * ones that follow from the upload.
 *
 * @throws Problem `invalid`, naming the test.
 */
export async function requireAsMeasured(reader: Reader, studyId: string, edits: readonly ChainEdit[]): Promise<void> {
  for (const { id, kind, body } of edits) {
    if (kind !== 'test' || body === null) continue;
    const test = testSchema.safeParse(body);
    if (!test.success || (await isAsMeasured(reader, studyId, { ...test.data, id }))) continue;
    const sentence = `The readings of “${test.data.name}” and their file stay as they were uploaded. Add a test with another file instead.`;
    throw new Problem('invalid', sentence, { fields: { [id]: sentence } });
  }
}
