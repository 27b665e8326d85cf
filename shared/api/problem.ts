import * as z from 'zod';

export const problemStatus = {
  invalid: 400,
  'signed out': 401,
  'not allowed': 403,
  'not found': 404,
  stale: 409,
  'too large': 413,
  'not ready': 422,
  'too many': 429,
  unexpected: 500,
  unavailable: 503,
} as const;
export type ProblemCode = keyof typeof problemStatus;

/** A refusal: one of ten codes and a sentence that says what is wrong, what is allowed and what to do. */
export const problemSchema = z.object({
  code: z.enum(Object.keys(problemStatus) as [ProblemCode, ...ProblemCode[]]),
  sentence: z.string(),
  /** For `invalid`: by path of the field, e.g. `body.title`. */
  fields: z.record(z.string(), z.string()).optional(),
  /** For `stale`: what was sent and what is stored now, by item. `theirs` null: it was removed meanwhile. */
  conflicts: z
    .array(z.object({ id: z.string(), yours: z.unknown(), theirs: z.unknown(), theirRevision: z.int() }))
    .optional(),
  /** For `not ready`: each thing that is missing, with where to mend it. */
  reasons: z
    .array(z.object({ sentence: z.string(), subject: z.object({ kind: z.string(), id: z.string() }) }))
    .optional(),
});
export type ProblemBody = z.infer<typeof problemSchema>;
