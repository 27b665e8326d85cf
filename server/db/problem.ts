import { type ProblemBody, type ProblemCode, problemStatus } from '../../shared/api/problem.ts';
import type { Decision } from '../../shared/domain/decision.ts';

/** A refusal that the caller may read: thrown anywhere in a handler, answered as JSON with its status. */
export class Problem extends Error {
  readonly body: ProblemBody;

  constructor(code: ProblemCode, sentence: string, more: Omit<ProblemBody, 'code' | 'sentence'> = {}) {
    super(sentence);
    this.name = 'Problem';
    this.body = { code, sentence, ...more };
  }

  get status(): number {
    return problemStatus[this.body.code];
  }
}

export function requireAllowed(decision: Decision): void {
  if (!decision.allowed) throw new Problem('not allowed', decision.reason);
}
