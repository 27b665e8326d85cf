import type { Endpoint, Input, Reply } from '../../shared/api/endpoint.ts';
import { problemSchema } from '../../shared/api/problem.ts';
import { CallError } from './call-error.ts';

/** Told when a call is refused because nobody is signed in any more. */
let whenSignedOut: () => void = () => {};
export function onSignedOut(listener: () => void): void {
  whenSignedOut = listener;
}

function addressOf(endpoint: Endpoint, input: { readonly params?: unknown; readonly query?: unknown }): string {
  const params = (input.params ?? {}) as Record<string, unknown>;
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(String(params[name])));
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries((input.query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined && value !== '') search.set(name, String(value));
  }
  return search.size > 0 ? `${path}?${search}` : path;
}

function bodyOf(endpoint: Endpoint, body: unknown, file: File | undefined): Pick<RequestInit, 'body' | 'headers'> {
  if (endpoint.upload) {
    const form = new FormData();
    form.set('body', JSON.stringify(body));
    if (file) form.set('file', file);
    return { body: form };
  }
  if (body === undefined) return {};
  return { body: JSON.stringify(body), headers: { 'content-type': 'application/json' } };
}

/**
 * Calls the server at an endpoint and checks the reply against its shape.
 *
 * @throws CallError with the server's problem, or with null where no usable answer came.
 */
export async function call<E extends Endpoint>(
  endpoint: E,
  input: Partial<Input<E>> & { readonly file?: File },
  signal?: AbortSignal,
): Promise<Reply<E>> {
  let response: Response;
  let body: unknown;
  try {
    response = await fetch(addressOf(endpoint, input), {
      method: endpoint.method,
      ...bodyOf(endpoint, input.body, input.file),
      ...(signal ? { signal } : {}),
    });
    body = await response.json();
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new CallError(null);
  }
  if (!response.ok) {
    const problem = problemSchema.safeParse(body);
    if (problem.data?.code === 'signed out' && endpoint.access === 'signed in') whenSignedOut();
    throw new CallError(problem.success ? problem.data : null);
  }
  return endpoint.reply.parse(body) as Reply<E>;
}
