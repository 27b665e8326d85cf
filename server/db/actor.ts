import { and, eq } from 'drizzle-orm';
import { type Ability, type Actor, abilityOf, type StudyRole } from '../../shared/domain/ability.ts';
import type { Reader } from './database.ts';
import { people } from './schema/people.ts';
import { memberships } from './schema/studies.ts';

export type SignedInActor = Actor & { readonly email: string; readonly ability: Ability };

/** Loads who is asking with the roles held at this moment; null when the account is gone or deactivated. */
export async function loadActor(reader: Reader, personId: string): Promise<SignedInActor | null> {
  const rows = await reader
    .select({
      id: people.id,
      name: people.name,
      email: people.email,
      isAdministrator: people.isAdministrator,
      isAuditor: people.isAuditor,
      studyId: memberships.studyId,
      role: memberships.role,
    })
    .from(people)
    .leftJoin(memberships, eq(memberships.personId, people.id))
    .where(and(eq(people.id, personId), eq(people.isActive, true)));
  const [person] = rows;
  if (!person) return null;
  const roles: Record<string, StudyRole> = {};
  for (const row of rows) if (row.studyId && row.role) roles[row.studyId] = row.role;
  const actor: Actor = {
    personId: person.id,
    name: person.name,
    isAdministrator: person.isAdministrator,
    isAuditor: person.isAuditor,
    memberships: roles,
  };
  return { ...actor, email: person.email, ability: abilityOf(actor) };
}
