import * as z from 'zod';
import { rulingSchema } from '../domain/audit-events.ts';
import { submissionStatuses } from '../domain/route-lifecycle.ts';
import { studyEvaluationSchema } from '../engine/model/evaluation.ts';
import { studyModelSchema } from '../engine/model/study-model.ts';
import { defineEndpoint } from './endpoint.ts';

const submissionParams = z.object({ submissionId: z.uuid() });

/** What is frozen and signed: the upstream part of the model, and what the engine made of it. */
export const snapshotSchema = z.object({
  format: z.literal('stemma-snapshot'),
  version: z.literal(1),
  studyId: z.string(),
  studyTitle: z.string(),
  targetQuantityId: z.string(),
  routeIds: z.array(z.string()),
  model: studyModelSchema,
  evaluation: studyEvaluationSchema,
});
export type Snapshot = z.infer<typeof snapshotSchema>;

/** The meanings a signature may have (pattern: 21 CFR 11.50). */
export const signatureMeanings = [
  'I reviewed the assumptions and approve these numbers for design.',
  'I reviewed the assumptions and approve these numbers for the stated purpose only.',
] as const;

export const submissionSchema = z.object({
  id: z.string(),
  studyId: z.string(),
  studyTitle: z.string(),
  status: z.enum(submissionStatuses),
  note: z.string(),
  submittedById: z.string(),
  submittedByName: z.string(),
  submittedAt: z.iso.datetime(),
  snapshot: snapshotSchema,
  /** SHA-256 of the canonical snapshot (RFC 8785), hex. What a signature is bound to. */
  snapshotHash: z.string(),
  /** The snapshot of the last signed submission of the same target, to compare with. */
  signedBefore: snapshotSchema.nullable(),
  /** The chain moved after submission: names of what differs now. */
  movedSince: z.array(z.string()),
  /** Everybody who ever edited something in the package, and who submitted it; none of them may sign. */
  authorIds: z.array(z.string()),
  rulings: z.array(
    z.object({
      routeId: z.string(),
      assumptionKey: z.string(),
      ruling: rulingSchema,
      byName: z.string(),
      at: z.iso.datetime(),
    }),
  ),
  signatures: z.array(
    z.object({ signerName: z.string(), meaning: z.string(), signedAt: z.iso.datetime(), snapshotHash: z.string() }),
  ),
  outcome: z.object({ byName: z.string(), at: z.iso.datetime(), comments: z.string() }).nullable(),
});
export type Submission = z.infer<typeof submissionSchema>;

/** Refused with 422 and the list of what is missing when something is not ready. */
export const openSubmission = defineEndpoint({
  method: 'POST',
  path: '/api/studies/:studyId/submissions',
  params: z.object({ studyId: z.uuid() }),
  body: z.object({
    targetQuantityId: z.uuid(),
    /** The study revision on screen. */
    revision: z.int(),
    note: z.string().trim().max(4000),
  }),
  reply: submissionSchema,
});

export const getSubmission = defineEndpoint({
  method: 'GET',
  path: '/api/submissions/:submissionId',
  params: submissionParams,
  reply: submissionSchema,
});

export const ruleOnAssumption = defineEndpoint({
  method: 'PUT',
  path: '/api/submissions/:submissionId/rulings',
  params: submissionParams,
  body: z.object({ routeId: z.uuid(), assumptionKey: z.string().max(80), ruling: rulingSchema }),
  reply: submissionSchema,
});

export const signSubmission = defineEndpoint({
  method: 'POST',
  path: '/api/submissions/:submissionId/signatures',
  params: submissionParams,
  body: z.object({
    password: z.string().max(200),
    meaning: z.enum(signatureMeanings),
    /** The hash of exactly what was on screen. */
    snapshotHash: z.string().length(64),
  }),
  reply: submissionSchema,
});

export const returnSubmission = defineEndpoint({
  method: 'POST',
  path: '/api/submissions/:submissionId/returns',
  params: submissionParams,
  body: z.object({ comments: z.string().trim().min(1, 'Say what must change before you return it.').max(4000) }),
  reply: submissionSchema,
});

export const withdrawSubmission = defineEndpoint({
  method: 'POST',
  path: '/api/submissions/:submissionId/withdrawals',
  params: submissionParams,
  body: z.object({ reason: z.string().trim().min(1, 'Say why you withdraw it.').max(4000) }),
  reply: submissionSchema,
});
