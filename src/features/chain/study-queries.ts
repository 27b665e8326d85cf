import { queryOptions } from '@tanstack/react-query';
import type { ProblemBody } from '../../../shared/api/problem.ts';
import { getStudy } from '../../../shared/api/studies.ts';
import { call } from '../../api/call.ts';
import { CallError } from '../../api/call-error.ts';
import type { Sent } from '../../chain/editing/document-ports.ts';

/** Never from the cache of an earlier visit: the document on screen would start from old revisions. */
export const studyQuery = (studyId: string) =>
  queryOptions({
    queryKey: ['study', studyId],
    queryFn: ({ signal }) => call(getStudy, { params: { studyId }, query: undefined, body: undefined }, signal),
    gcTime: 0,
  });

/** The problem behind a failed call; null where no answer came. */
export function problemOf(error: unknown): ProblemBody | null {
  return error instanceof CallError ? error.problem : null;
}

export async function sent<T>(calling: Promise<T>): Promise<Sent<T>> {
  try {
    return { ok: true, reply: await calling };
  } catch (error) {
    return { ok: false, problem: problemOf(error) };
  }
}
