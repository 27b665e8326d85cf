import { and, eq, gt, isNull } from 'drizzle-orm';
import { sha256 } from '../../db/canonical-json.ts';
import type { Transaction } from '../../db/database.ts';
import { oneTimeLinks } from '../../db/schema/people.ts';
import { Problem } from '../../http/problem.ts';

/** Marks a one-time token as used and says whom it was made for. */
export async function useLink(
  tx: Transaction,
  token: string,
  purpose: 'setup' | 'password',
  now: Date,
): Promise<{ personId: string | null }> {
  const [link] = await tx
    .select()
    .from(oneTimeLinks)
    .where(
      and(
        eq(oneTimeLinks.tokenHash, sha256(token)),
        eq(oneTimeLinks.purpose, purpose),
        isNull(oneTimeLinks.usedAt),
        gt(oneTimeLinks.expiresAt, now),
      ),
    )
    .for('update');
  if (!link) {
    const remedy =
      purpose === 'setup' ? 'Start the server again; it prints a new one.' : 'Ask for a new one on the sign-in page.';
    throw new Problem('invalid', `This link was used already or has run out. ${remedy}`);
  }
  await tx.update(oneTimeLinks).set({ usedAt: now }).where(eq(oneTimeLinks.tokenHash, link.tokenHash));
  return { personId: link.personId };
}
