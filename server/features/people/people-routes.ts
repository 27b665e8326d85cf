import { and, asc, count, eq, ne } from 'drizzle-orm';
import { changePerson, invitePerson, listPeople, type Person } from '../../../shared/api/people.ts';
import { allowed, type Decision, denied } from '../../../shared/domain/decision.ts';
import type { SignedInActor } from '../../db/actor.ts';
import { isDuplicate } from '../../db/database-error.ts';
import { linkLifetimes, makeLink } from '../../db/make-link.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { people } from '../../db/schema/people.ts';
import { defineCommand, defineQuery, type Handler } from '../../http/handler.ts';
import { normaliseEmail } from '../../http/session.ts';
import { endSessionsOf } from '../../http/session-store.ts';

function canManagePeople(actor: SignedInActor): Decision {
  return actor.ability.can('manage-people', 'People') ? allowed : denied('Only an administrator may do this.');
}

function toPerson(row: typeof people.$inferSelect): Person {
  return { ...row, hasPassword: row.passwordHash !== null };
}

function addressTaken(email: string, owner: string): Problem {
  const sentence = `${email} belongs to ${owner} already. Every person has an address of their own.`;
  return new Problem('invalid', sentence, { fields: { 'body.email': sentence } });
}

const listPeopleQuery = defineQuery(listPeople, async ({ reader }) => ({
  people: (await reader.select().from(people).orderBy(asc(people.name))).map(toPerson),
}));

const invitePersonCommand = defineCommand(invitePerson, async ({ actor, body, tx, services }) => {
  requireAllowed(canManagePeople(actor));
  const email = normaliseEmail(body.email);
  const [known] = await tx.select({ name: people.name }).from(people).where(eq(people.email, email));
  if (known) throw addressTaken(email, known.name);
  const id = services.newId();
  const now = services.now();
  const { name, isAdministrator, isAuditor } = body;
  const row = { id, email, name, isAdministrator, isAuditor, isActive: true, passwordHash: null, createdAt: now };
  await tx
    .insert(people)
    .values(row)
    .catch((error: unknown) => {
      // Somebody else invited the same address between our look and this.
      throw isDuplicate(error) ? addressTaken(email, 'somebody') : error;
    });
  const token = services.newToken();
  const expiresAt = new Date(now.getTime() + linkLifetimes.invitation);
  await makeLink(tx, { token, personId: id, purpose: 'password', expiresAt });
  return {
    reply: toPerson(row),
    audit: [
      { chain: 'system', event: { event: 'person.invited', personId: id, name, email, isAdministrator, isAuditor } },
    ],
    notices: [{ kind: 'person-invited', recipientId: id, payload: { token, byName: actor.name } }],
  };
});

const changePersonCommand = defineCommand(changePerson, async ({ actor, params, body, tx }) => {
  requireAllowed(canManagePeople(actor));
  const [before] = await tx.select().from(people).where(eq(people.id, params.personId)).for('update');
  if (!before) throw new Problem('not found', 'There is no such person.');
  if (before.isAdministrator && before.isActive && !(body.isAdministrator && body.isActive)) {
    // Locks the other administrators, so that two cannot step down at once.
    const [others] = await tx
      .select({ count: count() })
      .from(people)
      .where(and(eq(people.isAdministrator, true), eq(people.isActive, true), ne(people.id, before.id)))
      .for('update');
    if ((others?.count ?? 0) === 0) {
      throw new Problem('invalid', 'The last administrator has to stay. Make somebody else administrator first.');
    }
  }
  await tx.update(people).set(body).where(eq(people.id, before.id));
  if (!body.isActive) await endSessionsOf(tx, before.id);
  const facts = ({ name, isAdministrator, isAuditor, isActive }: typeof body) => ({
    name,
    isAdministrator,
    isAuditor,
    isActive,
  });
  return {
    reply: toPerson({ ...before, ...body }),
    audit: [
      {
        chain: 'system',
        event: { event: 'person.changed', personId: before.id, before: facts(before), after: facts(body) },
      },
    ],
    notices: [],
  };
});

export const peopleRoutes: Handler[] = [listPeopleQuery, invitePersonCommand, changePersonCommand];
