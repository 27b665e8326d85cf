import { queryOptions } from '@tanstack/react-query';
import { getStudy } from '../../../shared/api/studies.ts';
import { getReadings } from '../../../shared/api/tests.ts';
import { call } from '../../api/call.ts';

export const studyOfTestQuery = (studyId: string) =>
  queryOptions({
    queryKey: ['study-of-test', studyId],
    queryFn: ({ signal }) => call(getStudy, { params: { studyId }, query: undefined, body: undefined }, signal),
    // A form is being filled on top of it: what is on screen must not change underneath.
    refetchOnWindowFocus: false,
    gcTime: 0,
  });

export const readingsQuery = (studyId: string, testId: string) =>
  queryOptions({
    queryKey: ['readings', studyId, testId],
    queryFn: ({ signal }) =>
      call(getReadings, { params: { studyId, testId }, query: undefined, body: undefined }, signal),
  });
