import { and, eq, gt, isNull } from 'drizzle-orm';
import { sha256 } from '../../db/canonical-json.ts';
import type { Reader, Transaction } from '../../db/database.ts';
import { Problem } from '../../db/problem.ts';
import { oneTimeLinks } from '../../db/schema/people.ts';

type Purpose = typeof oneTimeLinks.$inferSelect.purpose;

function usable(token: string, purpose: Purpose, now: Date) {
  return and(
    eq(oneTimeLinks.tokenHash, sha256(token)),
    eq(oneTimeLinks.purpose, purpose),
    isNull(oneTimeLinks.usedAt),
    gt(oneTimeLinks.expiresAt, now),
  );
}

function refusal(purpose: Purpose): Problem {
  const remedy =
    purpose === 'setup' ? 'Start the server again; it prints a new one.' : 'Ask for a new one on the sign-in page.';
  return new Problem('invalid', `This link was used already or has run out. ${remedy}`);
}

/** @throws Problem when the token cannot be used; uses nothing up. */
export async function requireLink(reader: Reader, token: string, purpose: Purpose, now: Date): Promise<void> {
  const [link] = await reader
    .select()
    .from(oneTimeLinks)
    .where(usable(token, purpose, now));
  if (!link) throw refusal(purpose);
}

/**
 * Uses up a one-time token, and with it every other one for the same person and purpose: each start of the server
 * prints one for set-up, and an older mail must not undo a newer password.
 *
 * @throws Problem when the token cannot be used.
 */
export async function useLink(
  tx: Transaction,
  token: string,
  purpose: Purpose,
  now: Date,
): Promise<{ personId: string | null }> {
  const [link] = await tx
    .select()
    .from(oneTimeLinks)
    .where(usable(token, purpose, now))
    .for('update');
  if (!link) throw refusal(purpose);
  const { personId } = link;
  const samePerson = personId === null ? isNull(oneTimeLinks.personId) : eq(oneTimeLinks.personId, personId);
  await tx
    .update(oneTimeLinks)
    .set({ usedAt: now })
    .where(and(samePerson, eq(oneTimeLinks.purpose, purpose), isNull(oneTimeLinks.usedAt)));
  return { personId };
}
