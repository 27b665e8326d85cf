import * as z from 'zod';

/** Which column of the file is what, and in which unit its numbers are. Columns by their place, from 0. */
const columnSchema = z.object({ column: z.int().nonnegative(), unit: z.string().trim().min(1).max(40) });

export const readingsMappingSchema = z.object({
  delimiter: z.enum([',', ';', '\t']),
  decimal: z.enum(['.', ',']),
  /** Rows before the first reading: the header, and a row of units if there is one. */
  headerRows: z.int().min(0).max(20),
  time: columnSchema.nullable(),
  power: columnSchema,
  wallTemperature: columnSchema,
  bulkTemperature: columnSchema,
  flow: columnSchema,
});
export type ReadingsMapping = z.infer<typeof readingsMappingSchema>;

/** One steady reading in coherent SI; `row` is the row number that a spreadsheet shows. */
export const readingSchema = z.object({
  row: z.int(),
  time: z.number().nullable(),
  power: z.number(),
  wallTemperature: z.number(),
  bulkTemperature: z.number(),
  flow: z.number(),
});
export type Reading = z.infer<typeof readingSchema>;
