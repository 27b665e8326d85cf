import { randomUUID } from 'node:crypto';
import type { Database } from '../../server/db/database.ts';
import { people } from '../../server/db/schema/people.ts';
import { hashPassword } from '../../server/http/password.ts';

/** The password of every person a test builds. */
export const testPassword = 'correct horse battery staple';
const testPasswordHash = hashPassword(testPassword);

export type BuiltPerson = typeof people.$inferSelect;

/** A valid account; a test names only what matters to it. */
export async function person(db: Database, facts: Partial<typeof people.$inferInsert> = {}): Promise<BuiltPerson> {
  const id = facts.id ?? randomUUID();
  const row = {
    id,
    email: `${id.slice(0, 8)}@example.test`,
    name: `Person ${id.slice(0, 4)}`,
    passwordHash: await testPasswordHash,
    isAdministrator: false,
    isAuditor: false,
    isActive: true,
    createdAt: new Date('2026-01-05T08:00:00.000Z'),
    ...facts,
  };
  await db.insert(people).values(row);
  return row as BuiltPerson;
}
