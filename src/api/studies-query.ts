import { queryOptions } from '@tanstack/react-query';
import { listStudies } from '../../shared/api/studies.ts';
import { call } from './call.ts';

/** The studies that whoever is signed in can read, without their chains. */
export const studiesQuery = queryOptions({
  queryKey: ['studies'],
  queryFn: ({ signal }) => call(listStudies, {}, signal),
});
