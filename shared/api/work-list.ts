import * as z from 'zod';
import { defineEndpoint } from './endpoint.ts';

const taskBase = { studyId: z.string(), studyTitle: z.string(), since: z.iso.datetime() };

/** What the person must do now. Built from the studies they can read. */
export const workItemSchema = z.discriminatedUnion('kind', [
  z.object({
    ...taskBase,
    kind: z.literal('submission waits for you'),
    submissionId: z.string(),
    targetName: z.string(),
    byName: z.string(),
    outsideWindows: z.int(),
  }),
  z.object({ ...taskBase, kind: z.literal('your submission waits'), submissionId: z.string(), targetName: z.string() }),
  z.object({
    ...taskBase,
    kind: z.literal('returned to you'),
    submissionId: z.string(),
    targetName: z.string(),
    byName: z.string(),
    comments: z.string(),
  }),
  z.object({ ...taskBase, kind: z.literal('draft'), draftCount: z.int() }),
  z.object({ ...taskBase, kind: z.literal('basis changed'), quantityName: z.string() }),
  z.object({
    ...taskBase,
    kind: z.literal('condition'),
    submissionId: z.string(),
    text: z.string(),
    dueOn: z.iso.date(),
  }),
  z.object({
    ...taskBase,
    kind: z.literal('latest signature'),
    submissionId: z.string(),
    targetName: z.string(),
    byName: z.string(),
  }),
]);
export type WorkItem = z.infer<typeof workItemSchema>;

export const getWorkList = defineEndpoint({
  method: 'GET',
  path: '/api/work-list',
  reply: z.object({ items: z.array(workItemSchema) }),
});
