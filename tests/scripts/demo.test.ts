import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { outbox } from '../../server/db/schema/outbox.ts';
import { people } from '../../server/db/schema/people.ts';
import { studies } from '../../server/db/schema/studies.ts';
import { submissions } from '../../server/db/schema/submissions.ts';
import { verifyChain } from '../../server/db/verify-chain.ts';
import { demoPassword, demoPeople } from '../../server/scripts/demo/people.ts';
import { seedDemo } from '../../server/scripts/demo/seed-demo.ts';
import { type FreshDatabase, freshDatabase } from '../support/test-database.ts';

let fresh: FreshDatabase;

beforeAll(async () => {
  fresh = await freshDatabase();
  await seedDemo(fresh.db, { publicAddress: 'http://127.0.0.1:4780' });
}, 60_000);

afterAll(() => fresh.drop());

it('has every demo person with a password', async () => {
  const known = await fresh.db.select().from(people);

  expect(known.map((person) => person.email).sort()).toEqual(
    Object.values(demoPeople)
      .map((one) => one.email)
      .sort(),
  );
  expect(known.every((person) => person.passwordHash !== null)).toBe(true);
});

it('has a signed and a returned submission, whose numbers a practitioner would believe', async () => {
  const all = await fresh.db.select().from(submissions);
  const signed = all.find((one) => one.status === 'signed');

  expect(all.map((one) => one.status).sort()).toEqual(['returned', 'signed']);
  const valueIn = (symbol: string) => {
    const quantity = signed?.snapshot.model.quantities.find((one) => one.symbol === symbol);
    return signed?.snapshot.evaluation.quantities[quantity?.id ?? '']?.result?.value ?? Number.NaN;
  };
  // Turbulent water at Re 25 000 in a 20 mm tube: Gnielinski gives 4800 W/(m² K), see tests/reference/methods.
  expect(valueIn('h_rig')).toBeGreaterThan(4500);
  expect(valueIn('h_rig')).toBeLessThan(5100);
  expect(valueIn('k_w')).toBeGreaterThan(1.2e-5);
  expect(valueIn('k_w')).toBeLessThan(2.2e-5);
  expect(valueIn('L_c')).toBeGreaterThan(40);
  expect(valueIn('L_c')).toBeLessThan(90);
});

it('leaves decision logs that verify, and mails that only wait to be sent', async () => {
  const chains = ['system', ...(await fresh.db.select({ id: studies.id }).from(studies)).map((study) => study.id)];

  expect(chains).toHaveLength(3);
  for (const chain of chains) expect((await verifyChain(fresh.db, chain)).broken).toBeNull();
  const waiting = await fresh.db.select().from(outbox).where(eq(outbox.attempts, 0));
  expect(waiting.map((mail) => mail.kind)).toContain('submission-signed');
});

it('README names every demo account and the password they share', () => {
  const readme = readFileSync(join(import.meta.dirname, '../../README.md'), 'utf8');

  expect(readme).toContain(`\`${demoPassword}\``);
  for (const { name, email } of Object.values(demoPeople)) expect(readme).toContain(`| ${name} | \`${email}\` |`);
});
