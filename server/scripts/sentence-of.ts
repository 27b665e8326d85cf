import { EnvironmentError } from '../environment.ts';

/** What to print about a failure: its sentences, without a stack that would say nothing to whoever started a script. */
export function sentenceOf(error: unknown): string {
  if (error instanceof EnvironmentError) return error.sentences.join('\n');
  return error instanceof Error ? error.message : String(error);
}
