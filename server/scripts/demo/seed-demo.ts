import { randomBytes, randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { eq } from 'drizzle-orm';
import { pino } from 'pino';
import { invitePerson } from '../../../shared/api/people.ts';
import { setPassword, setUpAdministrator } from '../../../shared/api/session.ts';
import { createApp } from '../../app.ts';
import type { Database } from '../../db/database.ts';
import { linkLifetimes, makeLink } from '../../db/make-link.ts';
import { outbox } from '../../db/schema/outbox.ts';
import type { Services } from '../../http/handler.ts';
import { callerAt } from '../api-caller.ts';
import { signInAs } from './demo-session.ts';
import { makePelletBed } from './pellet-bed.ts';
import { type DemoRole, demoPassword, demoPeople } from './people.ts';
import { makeTubularReactor } from './tubular-reactor.ts';

async function setUpPeople(db: Database, services: Services, address: string): Promise<Record<DemoRole, string>> {
  const nobody = callerAt(address, '');
  const token = services.newToken();
  const expiresAt = new Date(services.now().getTime() + linkLifetimes.setup);
  await makeLink(db, { token, personId: null, purpose: 'setup', expiresAt });
  const { name, email } = demoPeople.administrator;
  const first = await nobody.call(setUpAdministrator, { body: { token, name, email, password: demoPassword } });
  if (first.status !== 200) throw new Error(first.problem.sentence);

  const administrator = await signInAs(address, 'administrator');
  const ids: Partial<Record<DemoRole, string>> = { administrator: first.body.actor.personId };
  for (const role of Object.keys(demoPeople) as DemoRole[]) {
    if (role === 'administrator') continue;
    const person = await administrator.does(invitePerson, { body: demoPeople[role] });
    ids[role] = person.id;
    // The person opens the mail; here the link is read where the mail waits to be sent.
    const [mail] = await db.select().from(outbox).where(eq(outbox.recipientId, person.id));
    await nobody.call(setPassword, { body: { token: String(mail?.payload.token), password: demoPassword } });
  }
  // Their invitations are answered; nobody needs to get them now.
  await db.update(outbox).set({ dueAt: null, payload: {} }).where(eq(outbox.kind, 'person-invited'));
  return ids as Record<DemoRole, string>;
}

/** Fills an empty installation: the demo people sign in to a server of their own and do their work over HTTP. */
export async function seedDemo(db: Database, { publicAddress }: { readonly publicAddress: string }): Promise<void> {
  const services: Services = {
    now: () => new Date(),
    newId: randomUUID,
    newToken: () => randomBytes(32).toString('hex'),
    publicAddress,
  };
  const app = createApp({
    db,
    services,
    log: pino({ level: 'silent' }),
    sessionSecret: randomBytes(32).toString('hex'),
    clientFolder: null,
  });
  const server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  try {
    const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    const ids = await setUpPeople(db, services, address);
    const engineer = await signInAs(address, 'engineer');
    const manager = await signInAs(address, 'manager');
    await makeTubularReactor({ engineer, manager }, [
      { personId: ids.secondEngineer, role: 'engineer' },
      { personId: ids.manager, role: 'manager' },
      { personId: ids.secondManager, role: 'manager' },
    ]);
    await makePelletBed(await signInAs(address, 'secondEngineer'), [
      { personId: ids.engineer, role: 'engineer' },
      { personId: ids.secondManager, role: 'manager' },
    ]);
  } finally {
    server.closeAllConnections();
    await new Promise<void>((resolve) => server.close(() => resolve()));
  }
}
