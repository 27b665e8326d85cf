import * as z from 'zod';
import {
  inputCorrelationSchema,
  operatingPointSchema,
  quantitySchema,
  routeSchema,
  testSchema,
} from '../engine/model/study-model.ts';
import { studyRoles } from './ability.ts';

/** The parts a chain is made of; each is stored, edited and logged as one body. */
export const chainItemSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('operating-point'), body: operatingPointSchema }),
  z.object({ kind: z.literal('quantity'), body: quantitySchema }),
  z.object({ kind: z.literal('route'), body: routeSchema }),
  z.object({ kind: z.literal('test'), body: testSchema }),
  z.object({ kind: z.literal('input-correlation'), body: inputCorrelationSchema }),
]);
export type ChainItem = z.infer<typeof chainItemSchema>;
export const chainItemKinds = ['operating-point', 'quantity', 'route', 'test', 'input-correlation'] as const;
export type ChainItemKind = (typeof chainItemKinds)[number];

export const rulingWords = ['accepted', 'accepted on condition', 'refused'] as const;
export const rulingSchema = z.object({
  ruling: z.enum(rulingWords),
  comment: z.string().trim().max(4000),
  /** Only for 'accepted on condition'. */
  condition: z.object({ text: z.string().trim().min(1).max(1000), dueOn: z.iso.date() }).nullable(),
});
export type Ruling = z.infer<typeof rulingSchema>;

const before = <Shape extends z.ZodType>(shape: Shape) =>
  z.object({ before: shape.nullable(), after: shape.nullable() });

/** One item of the chain before and after a change; null before: added, null after: removed. */
export const chainChangeSchema = z.object({
  kind: z.enum(chainItemKinds),
  id: z.string(),
  before: z.unknown().nullable(),
  after: z.unknown().nullable(),
});
export type ChainChange = z.infer<typeof chainChangeSchema>;

export const studyFactsSchema = z.object({ title: z.string(), question: z.string() });

/**
 * Everything that is ever written to the decision log. Entries of a study go to the chain named by its id,
 * entries about the installation to the chain `system`.
 */
export const auditEventSchema = z.discriminatedUnion('event', [
  z.object({ event: z.literal('study.created'), study: studyFactsSchema }),
  z.object({ event: z.literal('study.renamed'), ...before(studyFactsSchema).shape }),
  z.object({ event: z.literal('member.added'), personId: z.string(), name: z.string(), role: z.enum(studyRoles) }),
  z.object({ event: z.literal('member.removed'), personId: z.string(), name: z.string(), role: z.enum(studyRoles) }),
  z.object({
    event: z.literal('chain.edited'),
    /** What the person did, in words: "Adopted the heat analogue for k_w". */
    summary: z.string(),
    /** Mandatory when an approved route changes; else empty. */
    reason: z.string(),
    changes: z.array(chainChangeSchema),
  }),
  z.object({
    event: z.literal('submission.opened'),
    submissionId: z.string(),
    targetQuantityId: z.string(),
    targetName: z.string(),
    routeIds: z.array(z.string()),
    snapshotHash: z.string(),
    note: z.string(),
  }),
  z.object({
    event: z.literal('assumption.ruled'),
    submissionId: z.string(),
    routeId: z.string(),
    assumptionKey: z.string(),
    statement: z.string(),
    ...before(rulingSchema).shape,
  }),
  z.object({
    event: z.literal('submission.signed'),
    submissionId: z.string(),
    targetName: z.string(),
    routeIds: z.array(z.string()),
    snapshotHash: z.string(),
    signerName: z.string(),
    meaning: z.string(),
  }),
  z.object({
    event: z.literal('submission.returned'),
    submissionId: z.string(),
    targetName: z.string(),
    routeIds: z.array(z.string()),
    comments: z.string(),
  }),
  z.object({
    event: z.literal('submission.withdrawn'),
    submissionId: z.string(),
    targetName: z.string(),
    routeIds: z.array(z.string()),
    reason: z.string(),
  }),
  z.object({ event: z.literal('log.verified'), entries: z.int(), headHash: z.string(), whole: z.boolean() }),
  z.object({ event: z.literal('administrator.set-up'), personId: z.string(), name: z.string(), email: z.string() }),
  z.object({
    event: z.literal('person.invited'),
    personId: z.string(),
    name: z.string(),
    email: z.string(),
    isAdministrator: z.boolean(),
    isAuditor: z.boolean(),
  }),
  z.object({
    event: z.literal('person.changed'),
    personId: z.string(),
    ...before(
      z.object({ name: z.string(), isAdministrator: z.boolean(), isAuditor: z.boolean(), isActive: z.boolean() }),
    ).shape,
  }),
  z.object({ event: z.literal('person.signed-in'), personId: z.string() }),
  z.object({ event: z.literal('password.set'), personId: z.string() }),
]);
export type AuditEvent = z.infer<typeof auditEventSchema>;
