import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import * as z from 'zod';

const secretsSchema = z.object({
  migratePassword: z.string().regex(/^[0-9a-f]{48}$/),
  appPassword: z.string().regex(/^[0-9a-f]{48}$/),
  sessionSecret: z.string().min(32),
});
/** Made once for an installation and kept with its data. The passwords are plain hex, so they need no quoting in SQL. */
export type Secrets = z.output<typeof secretsSchema>;

/**
 * Reads the secrets of a data folder, or makes them. Only the owner may read the file.
 *
 * @throws Error when the file is there but cannot be understood; it is never overwritten.
 */
export function secretsOf(dataFolder: string): Secrets {
  const file = join(dataFolder, 'secrets.json');
  if (existsSync(file)) {
    try {
      return secretsSchema.parse(JSON.parse(readFileSync(file, 'utf8')));
    } catch {
      throw new Error(
        `${file} is damaged. Delete it to have new passwords made; everybody then has to sign in again, nothing else is lost.`,
      );
    }
  }
  const secrets: Secrets = {
    migratePassword: randomBytes(24).toString('hex'),
    appPassword: randomBytes(24).toString('hex'),
    sessionSecret: randomBytes(32).toString('hex'),
  };
  mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
  chmodSync(dataFolder, 0o700);
  writeFileSync(file, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
  return secrets;
}
