import type { RowDataPacket } from 'mysql2';
import type { Database } from './database.ts';

type Rule = { readonly is: (value: string) => boolean; readonly wanted: string; readonly why: string };
const exactly = (wanted: string, why: string): Rule => ({ is: (value) => value === wanted, wanted, why });

/** What the promises about the record rest on. */
const rules: Readonly<Record<string, Rule>> = {
  innodb_flush_log_at_trx_commit: exactly('1', 'a power cut would lose changes that were confirmed'),
  innodb_doublewrite: exactly('ON', 'a power cut could tear a page'),
  secure_timestamp: exactly('YES', 'a session could choose the time that the decision log records'),
  sql_mode: {
    is: (value) => value.includes('STRICT_TRANS_TABLES'),
    wanted: 'STRICT_TRANS_TABLES among others',
    why: 'text that does not fit would be cut without an error',
  },
  local_infile: exactly('OFF', 'a client could read files of the machine'),
  innodb_rollback_on_timeout: exactly('ON', 'a lock that was waited for too long would leave half a change'),
  innodb_snapshot_isolation: exactly('ON', 'a change could overwrite one that it never saw'),
  innodb_lock_wait_timeout: { is: (value) => Number(value) <= 10, wanted: '10 or less', why: 'requests would hang' },
  idle_write_transaction_timeout: {
    is: (value) => Number(value) > 0 && Number(value) <= 60,
    wanted: '1 to 60',
    why: 'a client that died would hold its locks',
  },
  character_set_server: exactly('utf8mb4', 'Greek letters and superscripts would be lost'),
};

/** One sentence for each setting of the database that the record cannot rely on; empty when all is well. */
export async function unsafeSettings(db: Pick<Database, '$client'>): Promise<string[]> {
  const names = [...Object.keys(rules), 'log_bin', 'sync_binlog'];
  const [rows] = await db.$client.query<RowDataPacket[]>(
    `SHOW GLOBAL VARIABLES WHERE Variable_name IN (${names.map(() => '?').join(', ')})`,
    names,
  );
  const values = new Map(rows.map((row) => [String(row.Variable_name).toLowerCase(), String(row.Value)]));
  const sentences: string[] = [];
  for (const [name, rule] of Object.entries(rules)) {
    const value = values.get(name) ?? '';
    if (!rule.is(value))
      sentences.push(`MariaDB's ${name} is ${value || 'not known'}; it must be ${rule.wanted}, or ${rule.why}.`);
  }
  if (values.get('log_bin') === 'ON' && values.get('sync_binlog') !== '1') {
    sentences.push(
      "MariaDB's sync_binlog must be 1 while its binary log is on, or a power cut would lose confirmed changes.",
    );
  }
  return sentences;
}
