import { getTableName, is } from 'drizzle-orm';
import { MySqlTable } from 'drizzle-orm/mysql-core';
import type { Pool } from 'mysql2/promise';
import * as decisionLog from './schema/decision-log.ts';
import * as files from './schema/files.ts';
import * as outbox from './schema/outbox.ts';
import * as people from './schema/people.ts';
import * as studies from './schema/studies.ts';
import * as submissions from './schema/submissions.ts';

const app = "'stemma_app'@'127.0.0.1'";
const definer = "'stemma_definer'@'127.0.0.1'";

/** What may only grow, and what only the log's trigger writes. Every other table may be read and written. */
const narrower = new Map<MySqlTable, string>([
  [decisionLog.auditEntry, 'SELECT, INSERT'],
  [decisionLog.auditHead, 'SELECT'],
  [submissions.signatures, 'SELECT, INSERT'],
  [files.files, 'SELECT, INSERT'],
]);

export const allTables: readonly MySqlTable[] = [decisionLog, files, outbox, people, studies, submissions]
  .flatMap((module) => Object.values(module))
  .filter((entry) => is(entry, MySqlTable));

/** The statements that give the server's account its rights on each table, and the triggers' owner its own. */
export function grantStatements(database: string): string[] {
  const on = (table: MySqlTable) => `\`${database}\`.\`${getTableName(table)}\``;
  return [
    ...allTables.map(
      (table) => `GRANT ${narrower.get(table) ?? 'SELECT, INSERT, UPDATE, DELETE'} ON ${on(table)} TO ${app}`,
    ),
    // To set columns of a new row a trigger's owner needs UPDATE on the table; the account is locked.
    `GRANT SELECT, INSERT, UPDATE, TRIGGER ON ${on(decisionLog.auditEntry)} TO ${definer}`,
    `GRANT SELECT, INSERT, UPDATE ON ${on(decisionLog.auditHead)} TO ${definer}`,
    `GRANT SELECT ON ${on(studies.studies)} TO ${definer}`,
    `GRANT TRIGGER ON ${on(submissions.signatures)} TO ${definer}`,
  ];
}

/** Applies the rights; the pool is signed in as the database's root. Repeating it changes nothing. */
export async function applyGrants(admin: Pool, database: string): Promise<void> {
  for (const statement of grantStatements(database)) await admin.query(statement);
}
