import express, { type Request, type RequestHandler, Router } from 'express';
import multer from 'multer';
import type * as z from 'zod';
import type { Endpoint } from '../../shared/api/endpoint.ts';
import { loadActor, type SignedInActor } from '../db/actor.ts';
import type { Database } from '../db/database.ts';
import { Problem } from '../db/problem.ts';
import { invalidInput, tooLarge } from './answer-problem.ts';
import type { Handler, Services, UploadedFile } from './handler.ts';
import { inTransaction, runCommand } from './run-handler.ts';

type Context = { readonly db: Database; readonly services: Services };

/** Who is asking, with the roles held at this moment. */
export async function requireActor(request: Request, db: Database): Promise<SignedInActor> {
  const actor = request.user ? await loadActor(db, request.user.personId) : null;
  if (!actor) throw signedOut();
  return actor;
}

export function parsePart<Shape extends z.ZodType>(
  shape: Shape,
  value: unknown,
  part: 'params' | 'query' | 'body',
): z.output<Shape> {
  const parsed = shape.safeParse(value);
  if (!parsed.success) throw invalidInput(parsed.error, part);
  return parsed.data;
}

/** Express hands over `{}` where there is nothing; an endpoint that takes nothing says `undefined`. */
function partOf(shape: z.ZodType, value: unknown): unknown {
  return shape.def.type === 'undefined' ? undefined : value;
}

function readsUpload(maxBytes: number): RequestHandler {
  const read = multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: maxBytes, files: 1, fields: 1, fieldSize: 200_000 },
    defParamCharset: 'utf8',
  }).single('file');
  return (request, response, next) => {
    read(request, response, (error: unknown) => {
      next(error instanceof multer.MulterError && error.code === 'LIMIT_FILE_SIZE' ? tooLarge(maxBytes) : error);
    });
  };
}

function uploadedBody(request: Request): { body: unknown; file: UploadedFile } {
  if (!request.file) throw new Problem('invalid', 'Choose a file to upload.', { fields: { file: 'Choose a file.' } });
  const text: unknown = request.body?.body;
  try {
    if (typeof text !== 'string') throw new Error('no text');
    return { body: JSON.parse(text), file: { name: request.file.originalname, content: request.file.buffer } };
  } catch {
    throw new Problem('invalid', 'The form field "body" is not readable JSON.');
  }
}

/** Each handler's own endpoint parsed these; the list forgets which shape belongs to which handler. */
type Parsed = {
  readonly actor: SignedInActor;
  // biome-ignore lint/suspicious/noExplicitAny: see above.
  readonly params: any;
  // biome-ignore lint/suspicious/noExplicitAny: see above.
  readonly query: any;
  // biome-ignore lint/suspicious/noExplicitAny: see above.
  readonly body: any;
};

const expressMethod = { GET: 'get', POST: 'post', PUT: 'put', DELETE: 'delete' } as const;

/** The address and the steps of one endpoint before its handler. */
export function addRoute(router: Router, endpoint: Endpoint, ...steps: RequestHandler[]): void {
  const reading: RequestHandler = endpoint.upload
    ? readsUpload(endpoint.upload.maxBytes)
    : express.json({ limit: '2mb', strict: true });
  const first = endpoint.access === 'signed in' ? [requireSession, reading] : [reading];
  router[expressMethod[endpoint.method]](endpoint.path, ...first, ...steps);
}

/** Before anything is read: whoever is not signed in must not make the server take in a body. */
const requireSession: RequestHandler = (request, _response, next) => {
  if (!request.user) throw signedOut();
  next();
};

function signedOut(): Problem {
  return new Problem('signed out', 'Sign in to go on.');
}

/** Mounts a list of handlers: identify, parse, run, and pass the reply through its schema, which drops the rest. */
export function mountHandlers(handlers: readonly Handler[], { db, services }: Context): Router {
  const router = Router();
  const answer = (handler: Handler, given: Parsed, file: UploadedFile | null) => {
    switch (handler.type) {
      case 'query':
        return handler.run({ ...given, services, reader: db });
      case 'command':
        return runCommand(handler, db, services, { ...given, file });
      case 'unrecorded':
        return inTransaction(db, (tx) => handler.run({ ...given, services, tx }));
    }
  };
  for (const handler of handlers) {
    const { endpoint } = handler;
    addRoute(router, endpoint, async (request, response) => {
      const actor = await requireActor(request, db);
      const upload = endpoint.upload ? uploadedBody(request) : { body: request.body, file: null };
      const given = {
        actor,
        params: parsePart(endpoint.params, partOf(endpoint.params, request.params), 'params'),
        query: parsePart(endpoint.query, partOf(endpoint.query, request.query), 'query'),
        body: parsePart(endpoint.body, partOf(endpoint.body, upload.body), 'body'),
      };
      response.json(endpoint.reply.parse(await answer(handler, given, upload.file)));
    });
  }
  return router;
}
