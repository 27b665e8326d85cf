import type { Child } from './child.ts';
import { sentenceOf } from './sentence-of.ts';

/** Something that runs beside the script until it is stopped. */
export type Part = { readonly child?: Child; readonly stop: () => Promise<void> };

export type Launch = {
  /** Prints one line about the step that follows; ends the launch here when somebody asked for that meanwhile. */
  readonly say: (line: string) => void;
  /**
   * Starts a part, starts it again when it ends by itself, and stops it at the end: last started, first stopped.
   * What is returned stays good over such a restart as far as addresses and accounts go.
   */
  readonly keep: <P extends Part>(name: string, start: () => Promise<P>) => Promise<P>;
};

class AskedToStop extends Error {}

// A part that ends again so soon has a reason that another start does not remove.
const SHORTEST_LIFE_MS = 30_000;

/**
 * Runs `launch`, then waits for Ctrl-C, for a signal, or for a part that cannot be kept running; stops all parts in the
 * reverse order of their start. Exits with 0 when asked to stop, with 1 when something went wrong.
 */
export async function runUntilStopped(launch: (launch: Launch) => Promise<void>): Promise<void> {
  const print = (line: string) => process.stdout.write(`${line}\n`);
  const parts: { current: Part }[] = [];
  let isStopping = false;
  let endWait: (failure: string | null) => void = () => {};
  const wait = new Promise<string | null>((resolve) => {
    endWait = resolve;
  });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
    process.on(signal, () => {
      if (!isStopping) print('Stopping.');
      isStopping = true;
      endWait(null);
    });
  }

  const say = (line: string) => {
    if (isStopping) throw new AskedToStop();
    print(line);
  };
  const keep: Launch['keep'] = async (name, start) => {
    const part = await start();
    const kept: { current: Part } = { current: part };
    parts.push(kept);

    const watch = (child: Child | undefined, since: number) => {
      void child?.ended.then(async () => {
        if (isStopping) return;
        const ending = `${name} ended by itself. Its log ends with:\n${child.logTail()}`;
        if (Date.now() - since < SHORTEST_LIFE_MS) {
          endWait(ending);
          return;
        }
        print(`${ending}\nStarting it again.`);
        try {
          kept.current = await start();
          print(`${name} runs again.`);
          watch(kept.current.child, Date.now());
        } catch (error) {
          endWait(sentenceOf(error));
        }
      });
    };
    // The first end is forgiven, however soon.
    watch(part.child, 0);
    return part;
  };

  let failure: string | null = null;
  try {
    await launch({ say, keep });
    failure = await wait;
  } catch (error) {
    if (!(error instanceof AskedToStop)) failure = sentenceOf(error);
  }
  isStopping = true;
  if (failure !== null) {
    process.stderr.write(`\n${failure}\n`);
    process.exitCode = 1;
  }
  for (const part of parts.reverse()) await part.current.stop();
  // A handle that a library left open must not keep a stopped product in the terminal.
  process.exit();
}
