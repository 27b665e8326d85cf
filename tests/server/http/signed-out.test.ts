import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { handlers } from '../../../server/app.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

// Read from the app itself, so that an address added later is covered without a thought.
const addresses = handlers.map(({ endpoint }) => [endpoint.method as string, endpoint.path as string] as const);

it.each([...addresses, ['GET', '/api/studies/:studyId/files/:fileId'] as const])(
  'is refused to whoever is not signed in: %s %s',
  async (method, path) => {
    const reply = await app.anonymous.fetch(
      path.replace(/:\w+/g, () => randomUUID()),
      { method },
    );

    expect(reply.status).toBe(401);
    expect(await reply.json()).toEqual({ code: 'signed out', sentence: 'Sign in to go on.' });
  },
);
