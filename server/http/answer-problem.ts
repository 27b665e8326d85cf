import type { ErrorRequestHandler, Response } from 'express';
import multer from 'multer';
import type { Logger } from 'pino';
import type * as z from 'zod';
import type { ProblemBody } from '../../shared/api/problem.ts';
import { isContention, isDatabaseAway } from '../db/database-error.ts';
import { Problem } from '../db/problem.ts';

/** The refusal that zod's issues amount to, field by field: `body.title` -> sentence. */
export function invalidInput(error: z.ZodError, part: 'params' | 'query' | 'body'): Problem {
  const fields: Record<string, string> = {};
  for (const issue of error.issues) {
    const path = [part, ...issue.path.map(String)].join('.');
    fields[path] ??= issue.message;
  }
  const [first] = Object.entries(fields);
  const where = first ? ` ${first[0].replace(/^\w+\.?/, '') || part}: ${first[1]}` : '';
  return new Problem('invalid', `Something that was sent cannot be used.${where}`, { fields });
}

export function tooLarge(maxBytes: number): Problem {
  const megabytes = (maxBytes / 1e6).toLocaleString('en-GB');
  return new Problem(
    'too large',
    `The file is larger than ${megabytes} MB, the most that is taken. Split it or leave out columns that are not needed.`,
  );
}

/** Express and its parts put the status of a malformed request on their errors; null for everything else. */
function statusOf(error: unknown): number | null {
  if (typeof error !== 'object' || error === null || !('status' in error)) return null;
  const { status } = error;
  return typeof status === 'number' && status >= 400 && status < 500 ? status : null;
}

function toProblem(error: unknown, log: Logger): Problem {
  if (error instanceof Problem) return error;
  if (error instanceof multer.MulterError) {
    return new Problem('invalid', 'The upload could not be read: send one file in the field "file".');
  }
  if (typeof error === 'object' && error !== null && 'type' in error) {
    if (error.type === 'entity.too.large') {
      return new Problem('too large', 'What was sent is larger than 2 MB, the most that is taken at once.');
    }
    if (error.type === 'entity.parse.failed' || error.type === 'encoding.unsupported') {
      return new Problem('invalid', 'What was sent is not readable JSON.');
    }
  }
  const status = statusOf(error);
  if (status === 404) return new Problem('not found', 'There is nothing at this address.');
  if (status !== null)
    return new Problem('invalid', 'The request cannot be read; its address or headers are malformed.');
  if (isDatabaseAway(error)) {
    log.error({ err: error }, 'the database does not answer');
    return new Problem(
      'unavailable',
      'The database does not answer just now. What you typed is still on the screen. Try again in a moment; if you were saving, look first whether it was saved.',
    );
  }
  if (isContention(error)) {
    log.warn({ err: error }, 'gave up on a change that others were in the way of');
    return new Problem(
      'unavailable',
      'Somebody else is changing the same thing just now, so nothing was saved. What you typed is still on the screen; try again in a moment.',
    );
  }
  log.error({ err: error }, 'unexpected');
  return new Problem('unexpected', 'Something went wrong on the server. Reload to see what was saved.');
}

function send(response: Response, problem: Problem): void {
  response.status(problem.status).json(problem.body satisfies ProblemBody);
}

/** The last stop of every request that failed: a sentence for the caller, the details for the log. */
export function answerProblems(log: Logger): ErrorRequestHandler {
  return (error, _request, response, next) => {
    if (response.headersSent) return next(error);
    send(response, toProblem(error, log));
  };
}
