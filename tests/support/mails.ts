import * as z from 'zod';
import { waitUntil } from '../../server/scripts/wait-until.ts';

const mailSchema = z.object({
  id: z.string(),
  subject: z.string(),
  text: z.string(),
  html: z.string().optional(),
  to: z.array(z.object({ address: z.string() })),
});
export type CaughtMail = z.infer<typeof mailSchema>;

/** Every mail that the catcher holds, oldest first. */
export async function caughtMails(mailAddress: string): Promise<CaughtMail[]> {
  const reply = await fetch(`${mailAddress}/api/email`);
  const body: unknown = await reply.json();
  const list = Array.isArray(body) ? body : z.object({ emails: z.array(z.unknown()) }).parse(body).emails;
  return list.map((mail) => mailSchema.parse(mail));
}

/** Waits for a mail to an address whose subject holds the words. */
export async function awaitMail(mailAddress: string, to: string, words: string): Promise<CaughtMail> {
  let found: CaughtMail | undefined;
  await waitUntil(
    async () => {
      found = (await caughtMails(mailAddress)).findLast(
        (mail) => mail.subject.includes(words) && mail.to.some((one) => one.address === to),
      );
      return found !== undefined;
    },
    { timeoutMs: 20_000, tooLate: () => `No mail to ${to} about "${words}" arrived.` },
  );
  if (!found) throw new Error('The mail vanished.');
  return found;
}

/** The path of the app that a mail leads to. */
export function pathIn(mail: CaughtMail): string {
  const [link] = /https?:\/\/\S+/.exec(mail.text) ?? [];
  if (!link) throw new Error(`There is no link in "${mail.subject}".`);
  return new URL(link).pathname;
}
