import { EnvironmentError } from '../environment.ts';

/** What to print about a failure: its sentences, without a stack that would say nothing to whoever started a script. */
export function sentenceOf(error: unknown): string {
  if (error instanceof EnvironmentError) return error.sentences.join('\n');
  if (!(error instanceof Error)) return String(error);
  // A failed query says which; its cause says why.
  return error.cause instanceof Error ? `${error.message}\n${error.cause.message}` : error.message;
}
