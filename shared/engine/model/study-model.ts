import * as z from 'zod';

/**
 * The study model: everything the engine needs to compute a study, as plain JSON.
 * Numbers are in coherent SI (kelvin for temperatures) next to the text and unit that a person typed.
 */

export const idSchema = z.uuid();
export const finite = z.number();
const positive = z.number().positive();
const shortText = z.string().trim().max(200);
const longText = z.string().trim().max(4000);

/** How an uncertainty was stated (JCGM 100:2008, 4.3). Amounts in coherent SI; `fraction` is relative to the value. */
export const uncertaintySchema = z.discriminatedUnion('form', [
  z.object({ form: z.literal('exact') }),
  z.object({ form: z.literal('standard'), u: z.number().nonnegative() }),
  z.object({ form: z.literal('expanded'), U: z.number().nonnegative(), k: positive }),
  z.object({ form: z.literal('relative'), fraction: z.number().nonnegative() }),
  z.object({
    form: z.literal('half-width'),
    halfWidth: z.number().nonnegative(),
    distribution: z.enum(['rectangular', 'triangular']),
  }),
]);
export type Uncertainty = z.infer<typeof uncertaintySchema>;

/** A value somebody entered, with the text it was typed as. */
export const measuredValueSchema = z.object({
  text: shortText,
  value: finite,
  unit: z.string().max(60),
  uncertaintyText: shortText,
  uncertainty: uncertaintySchema,
});
export type MeasuredValue = z.infer<typeof measuredValueSchema>;

/** An exponent or factor with its standard uncertainty, both dimensionless. */
export const dimensionlessSchema = z.object({ value: finite, u: z.number().nonnegative() });

export const scales = ['bench', 'pilot', 'plant'] as const;
export type Scale = (typeof scales)[number];

/** What may be entered at an operating point. Units and meanings: `point-variables.ts`. */
export const pointVariableKeys = [
  'L',
  'u',
  'T',
  'rho',
  'mu',
  'nu',
  'cp',
  'lambda',
  'D',
  'beta',
  'dT',
  'Re',
  'Pr',
  'Sc',
] as const;
export type PointVariableKey = (typeof pointVariableKeys)[number];
/** Everything that can be read from an operating point: entered variables and the groups that follow from them. */
export const pointGroupKeys = ['nu', 'Re', 'Pr', 'Sc', 'Gr', 'GrRe2'] as const;
export const pointReadingKeys = [...new Set([...pointVariableKeys, ...pointGroupKeys])] as [string, ...string[]];

export const geometryFamilies = [
  'tube',
  'cylinder in crossflow',
  'flat plate',
  'sphere',
  'packed bed',
  'stirred vessel',
  'rotating cylinder',
  'other',
] as const;
export type GeometryFamily = (typeof geometryFamilies)[number];

export const pointEntrySchema = z.object({
  key: z.enum(pointVariableKeys),
  source: z.discriminatedUnion('from', [
    z.object({ from: z.literal('entered'), value: measuredValueSchema }),
    /** The velocity that a test measured; only for key `u`. */
    z.object({ from: z.literal('test'), testId: idSchema }),
  ]),
});
export type PointEntry = z.infer<typeof pointEntrySchema>;

export const operatingPointSchema = z.object({
  id: idSchema,
  name: shortText.min(1),
  scale: z.enum(scales),
  geometry: z.object({
    family: z.enum(geometryFamilies),
    description: longText,
    /** Length ratios that must be equal for geometric similarity, e.g. { name: 'L/d', value: 120 }. */
    ratios: z.array(z.object({ name: shortText.min(1), value: positive })).max(20),
  }),
  fluid: shortText,
  entries: z.array(pointEntrySchema).max(40),
});
export type OperatingPoint = z.infer<typeof operatingPointSchema>;

export const acceptanceLimitSchema = z.object({
  side: z.enum(['at least', 'at most']),
  value: finite,
  text: shortText,
});

export const quantitySchema = z.object({
  id: idSchema,
  symbol: shortText.min(1).max(40),
  name: shortText.min(1),
  /** The unit results are shown in; the engine computes in coherent SI. */
  unit: z.string().max(60),
  operatingPointId: idSchema,
  adoptedRouteId: idSchema.nullable(),
  limit: acceptanceLimitSchema.nullable(),
  unsafeSide: z.enum(['low', 'high']).nullable(),
  note: longText,
});
export type Quantity = z.infer<typeof quantitySchema>;

/** Where a variable of a route takes its value from. */
export const bindingSchema = z.discriminatedUnion('from', [
  z.object({ from: z.literal('quantity'), quantityId: idSchema }),
  z.object({ from: z.literal('point'), operatingPointId: idSchema, key: z.enum(pointReadingKeys) }),
]);
export type Binding = z.infer<typeof bindingSchema>;

const routeBase = {
  id: idSchema,
  quantityId: idSchema,
  name: shortText.min(1),
  /** Why this route, in the engineer's words. */
  rationale: longText,
  /** By assumption key: why it holds although a check is near the edge, outside or not evaluated. */
  justifications: z.record(z.string().max(80), longText),
};
/** The relative standard uncertainty added for use outside a window; its own line in the budget. */
const extrapolationAllowance = z.number().nonnegative().max(5).nullable();

export const routeSchema = z.discriminatedUnion('kind', [
  z.object({ ...routeBase, kind: z.literal('stated-value'), value: measuredValueSchema, evidence: longText }),
  z.object({ ...routeBase, kind: z.literal('test-result'), testId: idSchema.nullable() }),
  z.object({
    ...routeBase,
    kind: z.literal('heat-analogue'),
    /** The measured heat-transfer coefficient; null while not linked yet. */
    sourceQuantityId: idSchema.nullable(),
    reynoldsExponent: dimensionlessSchema,
    schmidtExponent: dimensionlessSchema,
    /** Relative standard uncertainty of the analogy itself. */
    scatter: z.number().nonnegative().max(2),
    extrapolationAllowance,
  }),
  z.object({
    ...routeBase,
    kind: z.literal('correlation'),
    methodId: z.string().max(80),
    /** By variable of the method; a variable not named here is read from the quantity's own operating point. */
    bindings: z.record(z.string().max(40), bindingSchema),
    /** Relative standard uncertainty of the method; null takes the library's. */
    scatter: z.number().nonnegative().max(2).nullable(),
    /** Routes that use the same method share its error unless this says otherwise. */
    ownScatter: z.boolean(),
    extrapolationAllowance,
  }),
  z.object({
    ...routeBase,
    kind: z.literal('balance'),
    expression: z.string().trim().max(500),
    bindings: z.record(z.string().max(40), bindingSchema.nullable()),
  }),
]);
export type Route = z.infer<typeof routeSchema>;
export type RouteKind = Route['kind'];

/** What steady readings from a heated rig boil down to. Order of columns: power, wall, bulk, flow. SI. */
export const readingsSummarySchema = z.object({
  count: z.int().min(2),
  means: z.tuple([finite, finite, finite, finite]),
  /** Covariance matrix of the means: s_ij / n. */
  covarianceOfMeans: z.array(z.array(finite).length(4)).length(4),
});
export type ReadingsSummary = z.infer<typeof readingsSummarySchema>;

export const steadyHeatingSchema = z.object({
  kind: z.literal('steady-heating'),
  summary: readingsSummarySchema,
  /** Type B standard uncertainties of the instruments, SI. */
  instruments: z.object({
    power: uncertaintySchema,
    wallTemperature: uncertaintySchema,
    bulkTemperature: uncertaintySchema,
    flow: uncertaintySchema,
  }),
  flowIs: z.enum(['velocity', 'volume flow in a tube']),
  heatLoss: measuredValueSchema,
  surface: z.discriminatedUnion('shape', [
    /** Area = π · (characteristic length of the operating point) · length. */
    z.object({ shape: z.literal('cylinder'), length: measuredValueSchema }),
    z.object({ shape: z.literal('stated area'), area: measuredValueSchema }),
  ]),
});

export const testSchema = z.object({
  id: idSchema,
  name: shortText.min(1),
  operatingPointId: idSchema,
  performedOn: z.iso.date().nullable(),
  reduction: steadyHeatingSchema,
  file: z.object({ id: idSchema, name: shortText, sha256: z.string().length(64), bytes: z.int() }),
});
export type Test = z.infer<typeof testSchema>;

/** A correlation coefficient between two inputs, named by input id (see `evaluation.ts`). */
export const inputCorrelationSchema = z.object({
  id: idSchema,
  a: z.string().max(160),
  b: z.string().max(160),
  r: z.number().min(-1).max(1),
  reason: longText,
});
export type InputCorrelation = z.infer<typeof inputCorrelationSchema>;

export const studyModelSchema = z.object({
  format: z.literal('stemma-study'),
  version: z.literal(1),
  operatingPoints: z.array(operatingPointSchema),
  quantities: z.array(quantitySchema),
  routes: z.array(routeSchema),
  tests: z.array(testSchema),
  inputCorrelations: z.array(inputCorrelationSchema),
});
export type StudyModel = z.infer<typeof studyModelSchema>;

export const emptyStudyModel: StudyModel = {
  format: 'stemma-study',
  version: 1,
  operatingPoints: [],
  quantities: [],
  routes: [],
  tests: [],
  inputCorrelations: [],
};
