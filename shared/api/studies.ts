import * as z from 'zod';
import { studyRoles } from '../domain/ability.ts';
import { chainItemKinds, chainItemSchema } from '../domain/audit-events.ts';
import { routeStatuses, submissionStatuses } from '../domain/route-lifecycle.ts';
import { studyModelSchema } from '../engine/model/study-model.ts';
import { defineEndpoint } from './endpoint.ts';

const studyParams = z.object({ studyId: z.uuid() });

export const studySummarySchema = z.object({
  id: z.string(),
  title: z.string(),
  question: z.string(),
  myRole: z.enum(studyRoles).nullable(),
  quantityCount: z.int(),
  approvedCount: z.int(),
  inReviewCount: z.int(),
  changedAt: z.iso.datetime(),
});
export type StudySummary = z.infer<typeof studySummarySchema>;

export const listStudies = defineEndpoint({
  method: 'GET',
  path: '/api/studies',
  reply: z.object({ studies: z.array(studySummarySchema) }),
});

export const createStudy = defineEndpoint({
  method: 'POST',
  path: '/api/studies',
  body: z.object({ title: z.string().trim().min(1).max(200), question: z.string().trim().max(4000) }),
  reply: studySummarySchema,
});

export const routeStateSchema = z.object({
  status: z.enum(routeStatuses),
  /** 1, 2, 3 …: raised each time an approved route is opened again. */
  revision: z.int(),
  /** The submission that the status comes from. */
  submissionId: z.string().nullable(),
  /** Approved, but something upstream is no longer what was signed. */
  basisChanged: z.boolean(),
});
export type RouteState = z.infer<typeof routeStateSchema>;

export const studySchema = z.object({
  id: z.string(),
  title: z.string(),
  question: z.string(),
  /** Raised by every change to the study. */
  revision: z.int(),
  model: studyModelSchema,
  /** By item id: the revision to send back with an edit. */
  itemRevisions: z.record(z.string(), z.int()),
  routeStates: z.record(z.string(), routeStateSchema),
  /** By quantity id: where the node stands on the canvas. Layout, not record. */
  layout: z.record(z.string(), z.object({ x: z.number(), y: z.number() })),
  members: z.array(z.object({ personId: z.string(), name: z.string(), role: z.enum(studyRoles) })),
  submissions: z.array(
    z.object({
      id: z.string(),
      targetQuantityId: z.string(),
      targetName: z.string(),
      status: z.enum(submissionStatuses),
      submittedByName: z.string(),
      submittedAt: z.iso.datetime(),
    }),
  ),
});
export type Study = z.infer<typeof studySchema>;

export const getStudy = defineEndpoint({
  method: 'GET',
  path: '/api/studies/:studyId',
  params: studyParams,
  reply: studySchema,
});

export const chainEditSchema = z.object({
  kind: z.enum(chainItemKinds),
  id: z.uuid(),
  /** Zero: the item must not exist yet. */
  expectedRevision: z.int().nonnegative(),
  /** The whole item as it shall be; null removes it. Its `id` equals the edit's. */
  body: z.union(chainItemSchema.options.map((option) => option.shape.body)).nullable(),
});
export type ChainEdit = z.infer<typeof chainEditSchema>;

/**
 * The one way to change a chain: all edits or none. Refused with 409 and both versions when an item moved
 * meanwhile; with 400 when the chain would have a cycle, a dangling reference or an inhomogeneous balance;
 * with 403 when an item is in review. A test is added with `addTest`, and may be changed or removed here.
 */
export const editChain = defineEndpoint({
  method: 'POST',
  path: '/api/studies/:studyId/edits',
  params: studyParams,
  body: z.object({
    /** What the person did, in words, for the log. */
    summary: z.string().trim().min(1).max(300),
    /** Needed when an approved route changes. */
    reason: z.string().trim().max(2000),
    edits: z.array(chainEditSchema).min(1).max(500),
  }),
  reply: z.object({
    revision: z.int(),
    itemRevisions: z.record(z.string(), z.int()),
    routeStates: z.record(z.string(), routeStateSchema),
  }),
});

export const saveLayout = defineEndpoint({
  method: 'PUT',
  path: '/api/studies/:studyId/layout',
  params: studyParams,
  body: z.object({ layout: studySchema.shape.layout }),
  reply: z.object({}),
});

export const addMember = defineEndpoint({
  method: 'POST',
  path: '/api/studies/:studyId/members',
  params: studyParams,
  body: z.object({ personId: z.uuid(), role: z.enum(studyRoles) }),
  reply: z.object({ members: studySchema.shape.members }),
});

export const removeMember = defineEndpoint({
  method: 'DELETE',
  path: '/api/studies/:studyId/members/:personId',
  params: z.object({ studyId: z.uuid(), personId: z.uuid() }),
  reply: z.object({ members: studySchema.shape.members }),
});
