import { spawn } from 'node:child_process';
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { startOfProcess } from './process-identity.ts';
import { waitUntil } from './wait-until.ts';

/** A program that we started and have to stop. */
export type Child = {
  readonly pid: number;
  /** Settles when the process ends, whoever ended it. */
  readonly ended: Promise<void>;
  readonly hasEnded: () => boolean;
  /** The last lines that it wrote since this start, for the sentence that says why it stopped. */
  readonly logTail: () => string;
  /** Asks it to end, insists after `patienceMs`, and returns when it is gone. */
  readonly stop: () => Promise<void>;
};

type Options = {
  /** For sentences and for the names of its two files, `NAME.log` and `NAME.process`. */
  readonly name: string;
  /** Where those files are kept. */
  readonly folder: string;
  readonly command: string;
  readonly args: readonly string[];
  readonly env?: NodeJS.ProcessEnv;
  /** Milliseconds between asking and insisting. */
  readonly patienceMs?: number;
  /** Given each line of its output instead of the log; says whether the line belongs in the log after all. */
  readonly onLine?: (line: string) => boolean;
};

const recordOf = (folder: string, name: string) => join(folder, `${name}.process`);

/** Starts a program in a process group of its own, so that Ctrl-C in the terminal reaches it through us, in order. */
export function startChild({ name, folder, command, args, env, patienceMs = 15_000, onLine }: Options): Child {
  mkdirSync(folder, { recursive: true });
  const log = join(folder, `${name}.log`);
  const offset = existsSync(log) ? statSync(log).size : 0;
  const output = openSync(log, 'a', 0o600);
  const child = spawn(command, args, {
    detached: true,
    stdio: ['ignore', onLine ? 'pipe' : output, output],
    ...(env ? { env } : {}),
  });
  if (onLine && child.stdout) {
    createInterface({ input: child.stdout }).on('line', (line) => {
      if (onLine(line)) writeFileSync(log, `${line}\n`, { flag: 'a' });
    });
  }
  closeSync(output);

  let hasEnded = false;
  const ended = new Promise<void>((resolve) => {
    const end = () => {
      hasEnded = true;
      rmSync(recordOf(folder, name), { force: true });
      resolve();
    };
    child.once('exit', end);
    child.once('error', (error) => {
      writeFileSync(log, `${error.message}\n`, { flag: 'a' });
      end();
    });
  });
  const pid = child.pid ?? 0;
  if (pid > 0) {
    const owner = `${process.pid} ${startOfProcess(process.pid)}`;
    writeFileSync(recordOf(folder, name), `${pid} ${startOfProcess(pid)} ${owner}\n`);
  }

  // The whole group: a program that runs another (tsx watch) must not leave that one behind.
  const signal = (name: NodeJS.Signals) => {
    try {
      if (pid > 0) process.kill(-pid, name);
    } catch {
      // Nobody is left in the group.
    }
  };

  return {
    pid,
    ended,
    hasEnded: () => hasEnded,
    logTail: () => {
      const written = readFileSync(log).subarray(offset).toString('utf8').trim();
      return written === '' ? '(nothing was logged)' : written.split('\n').slice(-12).join('\n');
    },
    stop: async () => {
      if (hasEnded) return;
      signal('SIGTERM');
      const insist = setTimeout(() => signal('SIGKILL'), patienceMs);
      await ended;
      clearTimeout(insist);
      signal('SIGKILL');
    },
  };
}

/**
 * Deals with a program of an earlier start, known by its number and its starting time together. One whose starter
 * lives is left alone and named; one that outlived its starter is stopped.
 *
 * @throws Error when it is in use or does not stop.
 */
export async function settleEarlierChild(
  folder: string,
  name: string,
  what: string,
  say: (line: string) => void,
): Promise<void> {
  const record = recordOf(folder, name);
  if (!existsSync(record)) return;
  const [pid, start, ownerPid, ownerStart] = readFileSync(record, 'utf8').trim().split(' ');
  if (pid && start && startOfProcess(Number(pid)) === start) {
    if (ownerPid && startOfProcess(Number(ownerPid)) === ownerStart) {
      throw new Error(
        `${what} of this folder already runs (process ${pid}), started by process ${ownerPid}. ` +
          'Stop that one first (Ctrl-C where it runs), or use another folder with STEMMA_DATA=….',
      );
    }
    say(`${what} of an earlier start was left running (process ${pid}); stopping it.`);
    process.kill(Number(pid), 'SIGTERM');
    await waitUntil(() => startOfProcess(Number(pid)) !== start, {
      timeoutMs: 60_000,
      tooLate: () => `${what} left over from an earlier start (process ${pid}) does not stop. Stop it yourself.`,
    });
  }
  rmSync(record, { force: true });
}
