import { afterEach, describe, expect, it, vi } from 'vitest';
import * as z from 'zod';
import { defineEndpoint } from '../../shared/api/endpoint.ts';
import { call, onSignedOut } from '../../src/api/call.ts';
import { CallError } from '../../src/api/call-error.ts';
import { answerFetch, refuse } from './open-app.tsx';

afterEach(() => {
  vi.unstubAllGlobals();
  onSignedOut(() => {});
});

const readThing = defineEndpoint({
  method: 'GET',
  path: '/api/things/:name',
  params: z.object({ name: z.string() }),
  query: z.object({ text: z.string().optional(), kind: z.string().optional() }),
  reply: z.object({ size: z.number() }),
});
const enter = defineEndpoint({
  method: 'POST',
  path: '/api/enter',
  access: 'public',
  body: z.object({ word: z.string() }),
  reply: z.object({}),
});

async function failure(run: Promise<unknown>): Promise<CallError> {
  const error = await run.then(
    () => null,
    (reason: unknown) => reason,
  );
  if (!(error instanceof CallError)) throw new Error('The call did not fail with a CallError.');
  return error;
}

describe('a call', () => {
  it('puts parameters into the path and only what is given into the query', async () => {
    const asked = answerFetch({ 'GET /api/things/a%2Fb': () => ({ size: 3 }) });

    const reply = await call(readThing, { params: { name: 'a/b' }, query: { text: 'x & y', kind: undefined } });

    expect(reply).toEqual({ size: 3 });
    expect(asked).toEqual([{ method: 'GET', path: '/api/things/a%2Fb?text=x+%26+y', body: undefined }]);
  });

  it("fails with the server's own sentence, fields and code", async () => {
    const problem = { code: 'invalid', sentence: 'The word is empty.', fields: { 'body.word': 'Empty.' } } as const;
    answerFetch({ 'POST /api/enter': () => refuse(problem) });

    const error = await failure(call(enter, { body: { word: '' } }));

    expect(error.message).toBe('The word is empty.');
    expect(error.problem).toEqual(problem);
  });

  it.each<[string, () => Promise<Response>]>([
    ['no answer comes', () => Promise.reject(new TypeError('Failed to fetch'))],
    ['something between answers with a page', async () => new Response('<h1>Bad gateway</h1>', { status: 502 })],
    ['a refusal has another shape', async () => Response.json({ message: 'nope' }, { status: 400 })],
  ])('says that the server cannot be reached when %s', async (_, fetched) => {
    vi.stubGlobal('fetch', fetched);

    const error = await failure(call(enter, { body: { word: 'a' } }));

    expect(error.problem).toBeNull();
    expect(error.message).toMatch(/cannot be reached.*still here/);
  });

  it('stays a cancelled call when it was cancelled, not a failure of the server', async () => {
    const stop = new AbortController();
    stop.abort();
    vi.stubGlobal('fetch', () => Promise.reject(stop.signal.reason));

    await expect(call(enter, { body: { word: 'a' } }, stop.signal)).rejects.toBe(stop.signal.reason);
  });

  it('tells that the session ended only where a session was needed', async () => {
    const ended = vi.fn();
    onSignedOut(ended);
    const signedOut = () => refuse({ code: 'signed out', sentence: 'Sign in.' });
    answerFetch({ 'POST /api/enter': signedOut, 'GET /api/things/a': signedOut });

    await failure(call(enter, { body: { word: 'a' } }));
    expect(ended).not.toHaveBeenCalled();
    await failure(call(readThing, { params: { name: 'a' }, query: {} }));
    expect(ended).toHaveBeenCalledOnce();
  });
});
