import { expect, it } from 'vitest';
import { people } from '../../server/db/schema/people.ts';
import { freshDatabase } from '../support/test-database.ts';

it('a fresh database has the tables of the migrations and nobody in it', async () => {
  const { db, drop } = await freshDatabase();
  try {
    expect(await db.select().from(people)).toEqual([]);
  } finally {
    await drop();
  }
});

it('two fresh databases know nothing of each other', async () => {
  const [one, other] = await Promise.all([freshDatabase(), freshDatabase()]);
  try {
    await one.db.insert(people).values({
      id: '00000000-0000-4000-8000-000000000001',
      email: 'ada@example.test',
      name: 'Ada',
      passwordHash: null,
      isAdministrator: false,
      isAuditor: false,
      isActive: true,
      createdAt: new Date('2026-01-01T00:00:00Z'),
    });

    expect(await other.db.select().from(people)).toEqual([]);
  } finally {
    await Promise.all([one.drop(), other.drop()]);
  }
});

it.each([
  'DROP TABLE people',
  'TRUNCATE TABLE people',
  'ALTER TABLE people ADD COLUMN extra INT',
  'CREATE TABLE extra (id INT)',
  'DROP TRIGGER audit_entry_append',
  'SELECT * FROM mysql.global_priv',
])("refuses the server's account: %s", async (statement) => {
  const { db, drop } = await freshDatabase();
  try {
    // Denied on a table, on a database, or for want of a right.
    await expect(db.$client.query(statement)).rejects.toMatchObject({
      errno: expect.toBeOneOf([1142, 1044, 1227]),
    });
  } finally {
    await drop();
  }
});
