import * as z from 'zod';
import { studyRoles } from '../domain/ability.ts';
import { defineEndpoint } from './endpoint.ts';

export const actorSchema = z.object({
  personId: z.string(),
  name: z.string(),
  email: z.string(),
  isAdministrator: z.boolean(),
  isAuditor: z.boolean(),
  memberships: z.record(z.string(), z.enum(studyRoles)),
});

/** Fifteen characters because the password is the only factor (NIST SP 800-63B-4). */
export const passwordSchema = z
  .string()
  .min(15, 'Use at least 15 characters; a sentence of a few words is easy to remember.')
  .max(200, 'Use at most 200 characters.');
export const emailSchema = z.email('Enter one address such as name@example.test.').max(254);

export const getSession = defineEndpoint({
  method: 'GET',
  path: '/api/session',
  access: 'public',
  reply: z.object({
    actor: actorSchema.nullable(),
    /** No administrator exists yet: the one-time link that the server printed leads to set-up. */
    needsSetup: z.boolean(),
  }),
});

export const signIn = defineEndpoint({
  method: 'POST',
  path: '/api/session',
  access: 'public',
  body: z.object({ email: z.string().max(254), password: z.string().max(200) }),
  reply: z.object({ actor: actorSchema }),
});

export const signOut = defineEndpoint({ method: 'DELETE', path: '/api/session', reply: z.object({}) });

export const setUpAdministrator = defineEndpoint({
  method: 'POST',
  path: '/api/setup',
  access: 'public',
  body: z.object({
    token: z.string().max(200),
    name: z.string().trim().min(1).max(120),
    email: emailSchema,
    password: passwordSchema,
  }),
  reply: z.object({ actor: actorSchema }),
});

/** Always answers the same, whether the address is known or not. */
export const requestPasswordLink = defineEndpoint({
  method: 'POST',
  path: '/api/password-links',
  access: 'public',
  body: z.object({ email: emailSchema }),
  reply: z.object({}),
});

/** Sets the password with the one-time token of an invitation or of a password link. */
export const setPassword = defineEndpoint({
  method: 'POST',
  path: '/api/passwords',
  access: 'public',
  body: z.object({ token: z.string().max(200), password: passwordSchema }),
  reply: z.object({ email: z.string() }),
});
