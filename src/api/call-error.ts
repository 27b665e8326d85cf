import type { ProblemBody } from '../../shared/api/problem.ts';

/** A call that did not succeed: the server's refusal, or null where no answer came. */
export class CallError extends Error {
  readonly problem: ProblemBody | null;

  constructor(problem: ProblemBody | null) {
    super(
      problem?.sentence ??
        'The server cannot be reached. What you typed is still here; check the connection and try again.',
    );
    this.name = 'CallError';
    this.problem = problem;
  }
}
