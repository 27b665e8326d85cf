import type { Child } from './child.ts';
import { sentenceOf } from './sentence-of.ts';

/** Something that runs beside the script until it is stopped. */
export type Part = { readonly child?: Child; readonly stop: () => Promise<void> };

export type Launch = {
  /** Prints one line about the step that follows; ends the launch here when somebody asked for that meanwhile. */
  readonly say: (line: string) => void;
  /** Has the part watched from now on, and stopped at the end: last started, first stopped. */
  readonly keep: <P extends Part>(name: string, part: P) => P;
};

class AskedToStop extends Error {}

/**
 * Runs `launch`, then waits for Ctrl-C, for a signal, or for one of the parts to end by itself; stops all parts in the
 * reverse order of their start. Sets the exit code: 0 when asked to stop, 1 when something went wrong.
 */
export async function runUntilStopped(launch: (launch: Launch) => Promise<void>): Promise<void> {
  const print = (line: string) => process.stdout.write(`${line}\n`);
  const parts: Part[] = [];
  let isAsked = false;
  let endOfWait: (failure: string | null) => void = () => {};
  const wait = new Promise<string | null>((resolve) => {
    endOfWait = resolve;
  });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
    process.on(signal, () => {
      if (!isAsked) print('Stopping.');
      isAsked = true;
      endOfWait(null);
    });
  }

  const say = (line: string) => {
    if (isAsked) throw new AskedToStop();
    print(line);
  };
  const keep: Launch['keep'] = (name, part) => {
    parts.push(part);
    const child = part.child;
    void child?.ended.then(() => endOfWait(`${name} ended by itself. Its log ends with:\n${child.logTail()}`));
    return part;
  };

  let failure: string | null = null;
  try {
    await launch({ say, keep });
    failure = await wait;
  } catch (error) {
    if (!(error instanceof AskedToStop)) failure = sentenceOf(error);
  }
  if (failure !== null) {
    process.stderr.write(`\n${failure}\n`);
    process.exitCode = 1;
  }
  for (const part of parts.reverse()) await part.stop();
  // A handle that a library left open must not keep a stopped product in the terminal.
  process.exit();
}
