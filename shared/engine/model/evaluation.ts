import * as z from 'zod';

/**
 * What the engine answers for a study. Values in coherent SI.
 *
 * Input ids name every independent source of uncertainty:
 * `point:<operatingPointId>:<key>`, `route:<routeId>` (a stated value), `route:<routeId>:m`, `route:<routeId>:n`,
 * `method:<methodId>` (scatter shared by every route of that method), `route:<routeId>:scatter`,
 * `route:<routeId>:extrapolation`, `test:<testId>:<name>`.
 */

export const verdicts = ['inside', 'near the edge', 'outside', 'not evaluated'] as const;
export type Verdict = (typeof verdicts)[number];

export const budgetLineSchema = z.object({
  inputId: z.string(),
  label: z.string(),
  /** Standard uncertainty of the input. */
  u: z.number(),
  /** Partial derivative of the result with respect to the input, SI over SI. */
  sensitivity: z.number(),
  /** |sensitivity| · u, in the unit of the result. */
  contribution: z.number(),
  /** Share of the variance; the lines and the correlated part sum to one. */
  share: z.number(),
});
export type BudgetLine = z.infer<typeof budgetLineSchema>;

export const measuredResultSchema = z.object({
  value: z.number(),
  u: z.number(),
  /** Welch-Satterthwaite effective degrees of freedom; null where every input's are infinite. */
  degreesOfFreedom: z.number().nullable(),
  /** Largest first. */
  budget: z.array(budgetLineSchema),
  /** Share of the variance that comes from correlation terms; may be negative. */
  correlatedShare: z.number(),
});
export type MeasuredResult = z.infer<typeof measuredResultSchema>;

export const matchCheckSchema = z.object({
  /** Unique within its route, e.g. `match:Re`, `window:Sc`, `geometry:L/d`. */
  key: z.string(),
  kind: z.enum(['match', 'window', 'geometry', 'regime']),
  /** As written: Re, Pr, Sc, Gr/Re², L/d. */
  group: z.string(),
  source: z.number().nullable(),
  target: z.number().nullable(),
  /** target over source. */
  ratio: z.number().nullable(),
  window: z
    .object({ min: z.number().nullable(), max: z.number().nullable(), basis: z.enum(['sourced', 'indicative']) })
    .nullable(),
  verdict: z.enum(verdicts),
  /** A whole sentence with the numbers: what is compared, with what, and how far off. */
  sentence: z.string(),
});
export type MatchCheck = z.infer<typeof matchCheckSchema>;

export const assumptionSchema = z.object({
  key: z.string(),
  statement: z.string(),
  /** What to do when it fails. */
  ifItFails: z.string(),
  backing: z.enum(['checks', 'judgement']),
  checkKeys: z.array(z.string()),
  verdict: z.enum([...verdicts, 'by judgement']),
  /** True where the engineer must write why it holds before submitting. */
  needsJustification: z.boolean(),
});
export type Assumption = z.infer<typeof assumptionSchema>;

export const findingSchema = z.object({
  code: z.string(),
  /** `stops`: no value, or it cannot be submitted. `warns`: needs a justification or an allowance. `tells`: worth knowing. */
  severity: z.enum(['stops', 'warns', 'tells']),
  subject: z.object({ kind: z.enum(['operating-point', 'quantity', 'route', 'test', 'study']), id: z.string() }),
  sentence: z.string(),
});
export type Finding = z.infer<typeof findingSchema>;

export const routeResultSchema = z.object({
  routeId: z.string(),
  quantityId: z.string(),
  /** Null where something stops it; the findings say what. */
  result: measuredResultSchema.nullable(),
  /** Named steps between the inputs and the result, e.g. Nu, Re, Sc, Sh. */
  steps: z.array(
    z.object({ symbol: z.string(), meaning: z.string(), value: z.number(), u: z.number(), unit: z.string() }),
  ),
  checks: z.array(matchCheckSchema),
  assumptions: z.array(assumptionSchema),
});
export type RouteResult = z.infer<typeof routeResultSchema>;

export const pointReadingSchema = z.object({
  key: z.string(),
  value: z.number(),
  u: z.number(),
  /** `entered`, `test`, or the formula it follows from, e.g. `u L / nu`. */
  origin: z.string(),
});

export const studyEvaluationSchema = z.object({
  engineVersion: z.string(),
  /** By quantity id: the adopted route's result; with one route and nothing adopted, that route's; else null. */
  quantities: z.record(
    z.string(),
    z.object({ routeId: z.string().nullable(), result: measuredResultSchema.nullable() }),
  ),
  routes: z.record(z.string(), routeResultSchema),
  points: z.record(z.string(), z.array(pointReadingSchema)),
  tests: z.record(
    z.string(),
    z.object({
      heatTransferCoefficient: measuredResultSchema.nullable(),
      velocity: measuredResultSchema.nullable(),
      /** Square root of the variance from scatter alone and from instruments alone, W/(m² K). */
      typeA: z.number().nullable(),
      typeB: z.number().nullable(),
    }),
  ),
  findings: z.array(findingSchema),
  /** Id and version of each method that a route used. */
  methodVersions: z.record(z.string(), z.number()),
});
export type StudyEvaluation = z.infer<typeof studyEvaluationSchema>;
