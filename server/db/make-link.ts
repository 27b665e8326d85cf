import { sha256 } from './canonical-json.ts';
import type { Database, Transaction } from './database.ts';
import { oneTimeLinks } from './schema/people.ts';

const hour = 3_600_000;

/** How long a link may be used, by what it is for. */
export const linkLifetimes = { setup: 24 * hour, invitation: 7 * 24 * hour, forgotten: 2 * hour } as const;

/** Keeps the hash of a fresh one-time token; the token itself goes into the mail or onto the console only. */
export async function makeLink(
  db: Database | Transaction,
  link: {
    readonly token: string;
    readonly personId: string | null;
    readonly purpose: 'setup' | 'password';
    readonly expiresAt: Date;
  },
): Promise<void> {
  const { token, ...rest } = link;
  await db.insert(oneTimeLinks).values({ tokenHash: sha256(token), ...rest });
}
