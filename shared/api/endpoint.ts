import * as z from 'zod';

/** One call, defined once: the address, what goes in and what comes out. Both sides import it. */
export type Endpoint<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Reply extends z.ZodType = z.ZodType,
> = {
  readonly method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  /** Express notation: `/api/studies/:studyId`. */
  readonly path: string;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  readonly reply: Reply;
  /** The body arrives as the JSON field `body` of a multipart form next to one file named `file`. */
  readonly upload: { readonly maxBytes: number } | null;
  /** `public`: answers without a session. */
  readonly access: 'public' | 'signed in';
};

const nothing = z.undefined();
export type Nothing = typeof nothing;

export function defineEndpoint<
  Reply extends z.ZodType,
  Params extends z.ZodType = Nothing,
  Query extends z.ZodType = Nothing,
  Body extends z.ZodType = Nothing,
>(definition: {
  readonly method: Endpoint['method'];
  readonly path: string;
  readonly params?: Params;
  readonly query?: Query;
  readonly body?: Body;
  readonly reply: Reply;
  readonly upload?: { readonly maxBytes: number };
  readonly access?: Endpoint['access'];
}): Endpoint<Params, Query, Body, Reply> {
  return {
    method: definition.method,
    path: definition.path,
    params: definition.params ?? (nothing as unknown as Params),
    query: definition.query ?? (nothing as unknown as Query),
    body: definition.body ?? (nothing as unknown as Body),
    reply: definition.reply,
    upload: definition.upload ?? null,
    access: definition.access ?? 'signed in',
  };
}

/** What a caller hands over. Parts that the endpoint does not take are `undefined`. */
export type Input<E extends Endpoint> = {
  readonly params: z.input<E['params']>;
  readonly query: z.input<E['query']>;
  readonly body: z.input<E['body']>;
};
export type Reply<E extends Endpoint> = z.output<E['reply']>;
