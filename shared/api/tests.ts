import * as z from 'zod';
import { idSchema, steadyHeatingSchema, testSchema } from '../engine/model/study-model.ts';
import { readingSchema, readingsMappingSchema } from '../readings/readings.ts';
import { defineEndpoint } from './endpoint.ts';

export const maxReadingsFileBytes = 5_000_000;

/** Reads the file with the mapping, reduces it, keeps the original with its SHA-256 and adds the test to the chain. */
export const addTest = defineEndpoint({
  method: 'POST',
  path: '/api/studies/:studyId/tests',
  params: z.object({ studyId: z.uuid() }),
  upload: { maxBytes: maxReadingsFileBytes },
  body: z.object({
    id: idSchema,
    name: testSchema.shape.name,
    operatingPointId: idSchema,
    performedOn: testSchema.shape.performedOn,
    mapping: readingsMappingSchema,
    /** Everything of the reduction but the summary, which the server computes from the file. */
    reduction: steadyHeatingSchema.omit({ summary: true }),
  }),
  reply: z.object({ test: testSchema, revision: z.int(), itemRevision: z.int() }),
});

export const getReadings = defineEndpoint({
  method: 'GET',
  path: '/api/studies/:studyId/tests/:testId/readings',
  params: z.object({ studyId: z.uuid(), testId: z.uuid() }),
  reply: z.object({ mapping: readingsMappingSchema, readings: z.array(readingSchema) }),
});

/** The original file comes as an attachment from `/api/studies/:studyId/files/:fileId`. */
export function fileAddress(studyId: string, fileId: string): string {
  return `/api/studies/${studyId}/files/${fileId}`;
}
