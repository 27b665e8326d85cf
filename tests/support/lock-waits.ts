import type { Pool, RowDataPacket } from 'mysql2/promise';
import { onTestFinished } from 'vitest';
import { waitUntil } from '../../server/scripts/wait-until.ts';

/** Locks the row of a study as a command would, until the answered function is called or the test ends. */
export async function holdStudy(admin: Pool, studyId: string): Promise<() => Promise<void>> {
  const connection = await admin.getConnection();
  await connection.beginTransaction();
  await connection.query('SELECT id FROM studies WHERE id = ? FOR UPDATE', [studyId]);
  let isHeld = true;
  const release = async () => {
    if (!isHeld) return;
    isHeld = false;
    await connection.rollback();
    connection.release();
  };
  onTestFinished(release);
  return release;
}

/** Waits until as many transactions of this database stand in a queue for a lock. */
export async function waitForLockWaits(admin: Pool, count: number): Promise<void> {
  let waiting = 0;
  await waitUntil(
    async () => {
      const [rows] = await admin.query<RowDataPacket[]>(
        `SELECT COUNT(*) AS waiting FROM information_schema.innodb_trx AS trx
         JOIN information_schema.processlist AS process ON process.id = trx.trx_mysql_thread_id
         WHERE trx.trx_state = 'LOCK WAIT' AND process.db = DATABASE()`,
      );
      waiting = Number(rows[0]?.waiting);
      return waiting >= count;
    },
    // InnoDB refreshes this table only when nobody has read it for 100 ms.
    { everyMs: 150, timeoutMs: 8_000, tooLate: () => `Only ${waiting} of ${count} wait for a lock.` },
  );
}
