import { char, customType, datetime, int, mysqlTable, primaryKey, varchar } from 'drizzle-orm/mysql-core';
import * as z from 'zod';
import { readingSchema, readingsMappingSchema } from '../../../shared/readings/readings.ts';
import { identifier } from '../identifier.ts';
import { jsonColumn } from '../json-column.ts';

const longBlob = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'longblob' });

/** Uploaded originals, byte for byte. In the database so that file and record commit together. */
export const files = mysqlTable('files', {
  id: identifier('id').primaryKey(),
  studyId: identifier('study_id').notNull(),
  name: varchar('name', { length: 200 }).notNull(),
  sha256: char('sha256', { length: 64 }).notNull(),
  bytes: int('bytes').notNull(),
  content: longBlob('content').notNull(),
  uploadedBy: identifier('uploaded_by').notNull(),
  uploadedAt: datetime('uploaded_at', { fsp: 3 }).notNull(),
});

export const testReadings = mysqlTable(
  'test_readings',
  {
    studyId: identifier('study_id').notNull(),
    testId: identifier('test_id').notNull(),
    mapping: jsonColumn('mapping', readingsMappingSchema).notNull(),
    readings: jsonColumn('readings', z.array(readingSchema)).notNull(),
  },
  (table) => [primaryKey({ columns: [table.studyId, table.testId] })],
);
