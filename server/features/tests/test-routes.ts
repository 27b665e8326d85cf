import { and, eq } from 'drizzle-orm';
import { getReadings } from '../../../shared/api/tests.ts';
import { Problem } from '../../db/problem.ts';
import { testReadings } from '../../db/schema/files.ts';
import { requireReadable } from '../../db/study-reads.ts';
import { defineQuery, type Handler } from '../../http/handler.ts';
import { addTestCommand } from './add-test.ts';

const getReadingsQuery = defineQuery(getReadings, async ({ actor, params, reader }) => {
  requireReadable(actor, params.studyId);
  const [row] = await reader
    .select({ mapping: testReadings.mapping, readings: testReadings.readings })
    .from(testReadings)
    .where(and(eq(testReadings.studyId, params.studyId), eq(testReadings.testId, params.testId)));
  if (!row) throw new Problem('not found', 'There is no such test in this study.');
  return row;
});

export const testRoutes: Handler[] = [addTestCommand, getReadingsQuery];
