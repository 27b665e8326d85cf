import * as z from 'zod';
import { defineEndpoint } from './endpoint.ts';
import { emailSchema } from './session.ts';

export const personSchema = z.object({
  id: z.string(),
  name: z.string(),
  email: z.string(),
  isAdministrator: z.boolean(),
  isAuditor: z.boolean(),
  isActive: z.boolean(),
  /** False until the person has set a password with the link of the invitation. */
  hasPassword: z.boolean(),
});
export type Person = z.infer<typeof personSchema>;

/** Everybody signed in may see names, to choose members and to read the log. */
export const listPeople = defineEndpoint({
  method: 'GET',
  path: '/api/people',
  reply: z.object({ people: z.array(personSchema) }),
});

export const invitePerson = defineEndpoint({
  method: 'POST',
  path: '/api/people',
  body: z.object({
    name: z.string().trim().min(1).max(120),
    email: emailSchema,
    isAdministrator: z.boolean(),
    isAuditor: z.boolean(),
  }),
  reply: personSchema,
});

export const changePerson = defineEndpoint({
  method: 'PUT',
  path: '/api/people/:personId',
  params: z.object({ personId: z.uuid() }),
  body: z.object({
    name: z.string().trim().min(1).max(120),
    isAdministrator: z.boolean(),
    isAuditor: z.boolean(),
    isActive: z.boolean(),
  }),
  reply: personSchema,
});
