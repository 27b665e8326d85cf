import { resolve } from 'node:path';
import * as z from 'zod';

/** Thrown with one sentence for each value that cannot be used; the scripts print them and stop. */
export class EnvironmentError extends Error {
  readonly sentences: readonly string[];

  constructor(sentences: readonly string[]) {
    super(sentences.join('\n'));
    this.name = 'EnvironmentError';
    this.sentences = sentences;
  }
}

const port = (otherwise: number) =>
  z
    .string()
    .regex(/^\d{1,5}$/, 'must be a port number from 1 to 65535')
    .transform(Number)
    .refine((value) => value >= 1 && value <= 65535, 'must be a port number from 1 to 65535')
    .prefault(String(otherwise));

const yesOrNo = (otherwise: 'yes' | 'no') =>
  z
    .enum(['yes', 'no'], 'must be yes or no')
    .prefault(otherwise)
    .transform((value) => value === 'yes');

/** A name that is safe inside quotes in a GRANT, and that the accounts' rights (`stemma%`) cover. */
const databaseName = z.string().regex(/^stemma[a-z0-9_]{0,50}$/, 'must start with stemma and hold only a-z, 0-9 and _');

const variables = z.object({
  STEMMA_PORT: port(4780),
  STEMMA_DB_PORT: port(4781),
  STEMMA_SMTP_PORT: port(4782),
  STEMMA_MAIL_PORT: port(4783),
  /** Where the server listens. Loopback unless somebody decides otherwise. */
  STEMMA_HOST: z.union([z.ipv4(), z.ipv6()], 'must be an IP address such as 127.0.0.1').prefault('127.0.0.1'),
  STEMMA_PUBLIC_ADDRESS: z
    .url({ protocol: /^https?$/, error: 'must be an address such as https://stemma.example.test' })
    .transform((address) => address.replace(/\/+$/, ''))
    .optional(),
  STEMMA_DATA: z.string().prefault('.stemma'),
  STEMMA_DEMO: yesOrNo('yes'),
  STEMMA_LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent'], 'must be fatal, error, warn, info, debug or silent')
    .prefault('info'),
  STEMMA_CLIENT: z.string().prefault('dist'),
  STEMMA_DB_HOST: z.string().prefault('127.0.0.1'),
  STEMMA_DB_NAME: databaseName.prefault('stemma'),
  STEMMA_DB_USER: z.string().prefault('stemma_app'),
  STEMMA_DB_PASSWORD: z.string().optional(),
  STEMMA_SMTP_HOST: z.string().prefault('127.0.0.1'),
  STEMMA_MAIL_FROM: z.string().prefault('Stemma <stemma@example.test>'),
  STEMMA_SESSION_SECRET: z.string().min(32, 'must be at least 32 characters long').optional(),
  NODE_ENV: z.enum(['production', 'development', 'test']).catch('development').prefault('development'),
});

const portPurposes = {
  STEMMA_PORT: 'the app',
  STEMMA_DB_PORT: 'the database',
  STEMMA_SMTP_PORT: 'incoming mail',
  STEMMA_MAIL_PORT: 'the mail page',
} as const;

function read(source: NodeJS.ProcessEnv): z.output<typeof variables> {
  // An empty value in a shell means "not set".
  const given = Object.fromEntries(Object.entries(source).filter(([, value]) => value !== ''));
  const unknown = Object.keys(given).filter((name) => name.startsWith('STEMMA_') && !(name in variables.shape));
  const sentences = unknown.map((name) => `${name} is not a variable that Stemma knows; see the table in README.md.`);

  const parsed = variables.safeParse(given);
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      const name = String(issue.path[0]);
      const shown = /PASSWORD|SECRET/.test(name) ? '' : `, but it is "${given[name]}"`;
      sentences.push(`${name} ${issue.message}${shown}.`);
    }
    throw new EnvironmentError(sentences);
  }

  const takenBy = new Map<number, keyof typeof portPurposes>();
  for (const name of Object.keys(portPurposes) as (keyof typeof portPurposes)[]) {
    const other = takenBy.get(parsed.data[name]);
    if (other) {
      sentences.push(
        `${name} (${portPurposes[name]}) and ${other} (${portPurposes[other]}) are both ${parsed.data[name]}; give each its own port.`,
      );
    }
    takenBy.set(parsed.data[name], name);
  }
  if (sentences.length > 0) throw new EnvironmentError(sentences);
  return parsed.data;
}

/** What the scripts need: ports, folders and whether to start with the demo. Nothing secret. */
export type LauncherEnvironment = {
  readonly appPort: number;
  readonly databasePort: number;
  readonly smtpPort: number;
  readonly mailPagePort: number;
  /** Absolute. Holds the private database, the mails caught and the stamps. */
  readonly dataFolder: string;
  readonly databaseName: string;
  readonly withDemo: boolean;
  readonly publicAddress: string;
};

/** @throws EnvironmentError with a sentence for each wrong value. */
export function readLauncherEnvironment(source: NodeJS.ProcessEnv = process.env): LauncherEnvironment {
  const values = read(source);
  return {
    appPort: values.STEMMA_PORT,
    databasePort: values.STEMMA_DB_PORT,
    smtpPort: values.STEMMA_SMTP_PORT,
    mailPagePort: values.STEMMA_MAIL_PORT,
    dataFolder: resolve(values.STEMMA_DATA),
    databaseName: values.STEMMA_DB_NAME,
    withDemo: values.STEMMA_DEMO,
    publicAddress: values.STEMMA_PUBLIC_ADDRESS ?? `http://127.0.0.1:${values.STEMMA_PORT}`,
  };
}

/** What `server/main.ts` needs to listen. */
export type ServerEnvironment = {
  readonly host: string;
  readonly port: number;
  /** How people reach the app; stands in mails. Without a slash at the end. */
  readonly publicAddress: string;
  readonly database: {
    readonly host: string;
    readonly port: number;
    readonly user: string;
    readonly password: string;
    readonly database: string;
  };
  readonly smtp: { readonly host: string; readonly port: number; readonly from: string };
  readonly sessionSecret: string;
  /** Absolute path of the built client. */
  readonly clientFolder: string;
  readonly logLevel: 'fatal' | 'error' | 'warn' | 'info' | 'debug' | 'silent';
  readonly isProduction: boolean;
};

/** @throws EnvironmentError with a sentence for each wrong or missing value. */
export function readServerEnvironment(source: NodeJS.ProcessEnv = process.env): ServerEnvironment {
  const values = read(source);
  const sentences: string[] = [];
  const secret = (name: 'STEMMA_DB_PASSWORD' | 'STEMMA_SESSION_SECRET') => {
    const value = values[name];
    if (value === undefined) sentences.push(`${name} is missing; npm start sets it, or set it yourself.`);
    return value ?? '';
  };
  const password = secret('STEMMA_DB_PASSWORD');
  const sessionSecret = secret('STEMMA_SESSION_SECRET');
  if (sentences.length > 0) throw new EnvironmentError(sentences);
  return {
    host: values.STEMMA_HOST,
    port: values.STEMMA_PORT,
    publicAddress: values.STEMMA_PUBLIC_ADDRESS ?? `http://127.0.0.1:${values.STEMMA_PORT}`,
    database: {
      host: values.STEMMA_DB_HOST,
      port: values.STEMMA_DB_PORT,
      user: values.STEMMA_DB_USER,
      password,
      database: values.STEMMA_DB_NAME,
    },
    smtp: { host: values.STEMMA_SMTP_HOST, port: values.STEMMA_SMTP_PORT, from: values.STEMMA_MAIL_FROM },
    sessionSecret,
    clientFolder: resolve(values.STEMMA_CLIENT),
    logLevel: values.STEMMA_LOG_LEVEL,
    isProduction: values.NODE_ENV === 'production',
  };
}

/** The environment that a child process inherits, with the given variables on top. */
export function inheritedEnvironment(extra: Readonly<Record<string, string>> = {}): NodeJS.ProcessEnv {
  return { ...process.env, ...extra };
}
