import { randomUUID } from 'node:crypto';
import type { RowDataPacket } from 'mysql2';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { appendEntry } from '../../../server/db/append-entry.ts';
import { type FreshDatabase, freshDatabase } from '../../support/test-database.ts';

let fresh: FreshDatabase;
const actorId = randomUUID();

beforeAll(async () => {
  fresh = await freshDatabase();
  for (let count = 0; count < 3; count += 1) {
    await fresh.db.transaction((tx) =>
      appendEntry(tx, {
        chain: 'system',
        actorId,
        actorName: 'Ada Voss',
        event: { event: 'person.signed-in', personId: actorId },
        salt: '00'.repeat(16),
      }),
    );
  }
});

afterAll(() => fresh.drop());

async function entries() {
  const [rows] = await fresh.admin.query<RowDataPacket[]>(
    'SELECT chain, seq, CAST(at AS CHAR) AS at, payload, HEX(prev_hash) AS prev, HEX(hash) AS hash FROM audit_entry ORDER BY chain, seq',
  );
  return rows;
}

it('numbers the entries and chains each to the one before', async () => {
  const [first, second, third] = await entries();

  expect([first?.seq, second?.seq, third?.seq]).toEqual([1, 2, 3]);
  expect(first?.prev).toBe('00'.repeat(32));
  expect(second?.prev).toBe(first?.hash);
  expect(third?.prev).toBe(second?.hash);
});

const forbidden = [
  'UPDATE audit_entry SET payload = "{}"',
  'DELETE FROM audit_entry',
  'REPLACE INTO audit_entry SELECT * FROM audit_entry',
  'INSERT INTO audit_entry SELECT * FROM audit_entry ON DUPLICATE KEY UPDATE payload = "{}"',
  'TRUNCATE TABLE audit_entry',
  'ALTER TABLE audit_entry DROP COLUMN payload',
  'DROP TABLE audit_entry',
  'DROP TRIGGER audit_entry_keep',
  'RENAME TABLE audit_entry TO elsewhere',
  'LOCK TABLES audit_entry WRITE',
  'UPDATE audit_head SET seq = 0',
  'DELETE FROM audit_head',
  'INSERT INTO audit_head VALUES ("x", 0, UNHEX(REPEAT("00", 32)))',
  'UPDATE signatures SET meaning = ""',
  'DELETE FROM signatures',
  'TRUNCATE TABLE signatures',
  'SET timestamp = 1',
  'SET GLOBAL general_log = 1',
];

it.each(forbidden)('refuses the account of the server: %s', async (statement) => {
  const before = await entries();

  await expect(fresh.db.$client.query(statement)).rejects.toThrow();

  expect(await entries()).toEqual(before);
});

it('refuses a change even to the root of the database while the triggers stand', async () => {
  await expect(fresh.admin.query('UPDATE audit_entry SET payload = "{}"')).rejects.toThrow('never changed');
  await expect(fresh.admin.query('DELETE FROM audit_entry')).rejects.toThrow('never removed');
});

it('overwrites a sequence, time and hash that somebody chose', async () => {
  await fresh.db.$client.query(
    `INSERT INTO audit_entry VALUES ('system', 77, '1999-01-01', '${actorId}', 'forged', '{}', REPEAT('x', 32), REPEAT('x', 32), REPEAT('x', 32))`,
  );

  const last = (await entries()).at(-1);
  expect(last?.seq).toBe(4);
  expect(last?.at).not.toMatch(/^1999/);
});

it('refuses a chain that no study has', async () => {
  const insert = `INSERT INTO audit_entry VALUES ('${randomUUID()}', 1, NOW(6), '${actorId}', 'forged', '{}', REPEAT('x', 32), REPEAT('x', 32), REPEAT('x', 32))`;

  await expect(fresh.db.$client.query(insert)).rejects.toThrow('no such chain');
});
