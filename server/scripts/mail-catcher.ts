import { existsSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { type Child, settleEarlierChild, startChild } from './child.ts';
import { requireFreePort } from './port.ts';
import { waitUntil } from './wait-until.ts';

const program = join(import.meta.dirname, '../../node_modules/maildev/dist/bin/maildev.js');
// Enough to read the last weeks of a demo; older mails go, with their files.
const MAILS_KEPT = 500;

export type MailCatcher = { readonly address: string; readonly child: Child; readonly stop: () => Promise<void> };

/**
 * Starts maildev on loopback: it takes every mail that the server sends and shows it on a page instead of delivering it.
 *
 * @throws Error with a sentence when a port is taken or it does not come up.
 */
export async function startMailCatcher(options: {
  readonly dataFolder: string;
  readonly smtpPort: number;
  readonly pagePort: number;
  readonly say?: (line: string) => void;
}): Promise<MailCatcher> {
  const { dataFolder, smtpPort, pagePort, say = () => {} } = options;
  if (!existsSync(program)) throw new Error('The mail catcher is not installed. Run npm ci.');
  await settleEarlierChild(dataFolder, 'mail', 'The mail catcher', say);
  await requireFreePort(smtpPort, 'incoming mail', 'STEMMA_SMTP_PORT');
  await requireFreePort(pagePort, 'the mail page', 'STEMMA_MAIL_PORT');
  const mails = join(dataFolder, 'mails');
  mkdirSync(mails, { recursive: true, mode: 0o700 });

  const child = startChild({
    name: 'mail',
    folder: dataFolder,
    command: process.execPath,
    args: [
      program,
      ...['--ip', '127.0.0.1', '--smtp', String(smtpPort)],
      ...['--web-ip', '127.0.0.1', '--web', String(pagePort)],
      ...['--mail-directory', mails, '--max-emails', String(MAILS_KEPT), '--silent'],
    ],
  });
  const address = `http://127.0.0.1:${pagePort}`;
  try {
    await waitUntil(
      async () => {
        if (child.hasEnded()) throw new Error(`The mail catcher did not start. Its log ends with:\n${child.logTail()}`);
        return fetch(`${address}/api/healthz`).then(
          (reply) => reply.ok,
          () => false,
        );
      },
      { timeoutMs: 60_000, tooLate: () => `The mail catcher does not answer. Its log ends with:\n${child.logTail()}` },
    );
  } catch (error) {
    await child.stop();
    throw error;
  }
  return { address, child, stop: child.stop };
}
