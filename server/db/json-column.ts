import { customType } from 'drizzle-orm/mysql-core';
import type * as z from 'zod';

/**
 * A JSON column that is parsed and validated on the way out. MariaDB stores JSON as text, and whether the driver
 * decodes it changed between driver versions, so the pool hands over strings (`jsonStrings`) and we parse here.
 */
export function jsonColumn<Shape extends z.ZodType>(name: string, shape: Shape) {
  return customType<{ data: z.output<Shape>; driverData: string }>({
    dataType: () => 'longtext',
    toDriver: (value) => JSON.stringify(value),
    fromDriver: (text) => shape.parse(JSON.parse(text)),
  })(name);
}
