import type * as z from 'zod';
import type { Endpoint, Input } from '../../shared/api/endpoint.ts';

export type CallReply<E extends Endpoint> = {
  readonly status: number;
  /** The reply, or the problem; which one the status tells. */
  readonly body: z.output<E['reply']>;
  readonly problem: { readonly code: string; readonly sentence: string; readonly [more: string]: unknown };
  readonly headers: Headers;
};

export type Caller = {
  readonly cookie: string;
  readonly call: <E extends Endpoint>(
    endpoint: E,
    input?: Partial<Input<E>> & { readonly file?: { readonly name: string; readonly content: string | Uint8Array } },
  ) => Promise<CallReply<E>>;
  readonly fetch: (path: string, init?: RequestInit) => Promise<Response>;
};

function pathOf(endpoint: Endpoint, params: unknown, query: unknown): string {
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) =>
    encodeURIComponent(String((params as Record<string, unknown>)[name])),
  );
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries((query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined) search.set(name, String(value));
  }
  return search.size > 0 ? `${path}?${search}` : path;
}

/** Calls a running server as the holder of a session cookie; an empty cookie calls as nobody. */
export function callerAt(address: string, cookie: string): Caller {
  const send = (path: string, init: RequestInit = {}) =>
    fetch(`${address}${path}`, {
      ...init,
      headers: { ...(cookie ? { cookie } : {}), ...(init.headers as Record<string, string> | undefined) },
      redirect: 'manual',
    });
  return {
    cookie,
    fetch: send,
    call: async (endpoint, input = {}) => {
      const init: RequestInit = { method: endpoint.method };
      if (endpoint.upload) {
        const form = new FormData();
        form.set('body', JSON.stringify(input.body));
        if (input.file) form.set('file', new Blob([input.file.content as BlobPart]), input.file.name);
        init.body = form;
      } else if (input.body !== undefined) {
        init.body = JSON.stringify(input.body);
        init.headers = { 'content-type': 'application/json' };
      }
      const response = await send(pathOf(endpoint, input.params, input.query), init);
      const body = await response.json();
      return { status: response.status, body, problem: body, headers: response.headers } as never;
    },
  };
}

/** The session cookie that a reply sets. */
export function cookieOf(headers: Headers): string {
  return (headers.get('set-cookie') ?? '').split(';')[0] ?? '';
}
