import { customType } from 'drizzle-orm/mysql-core';

/**
 * A UUID or the name of a log chain, compared byte by byte: the database's default collation would take `A` for `a`.
 */
export const identifier = customType<{ data: string }>({
  dataType: () => 'char(36) character set ascii collate ascii_nopad_bin',
});
