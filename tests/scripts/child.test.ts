import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { type Child, settleEarlierChild, startChild } from '../../server/scripts/child.ts';
import { startOfProcess } from '../../server/scripts/process-identity.ts';
import { waitUntil } from '../../server/scripts/wait-until.ts';

const childModule = join(import.meta.dirname, '../../server/scripts/child.ts');
let folder: string;
let child: Child | null;

function startNode(program: string, patienceMs = 5000): Child {
  child = startChild({ name: 'part', folder, command: process.execPath, args: ['-e', program], patienceMs });
  return child;
}

const logContains = (text: string) =>
  waitUntil(() => readFileSync(join(folder, 'part.log'), 'utf8').includes(text), {
    timeoutMs: 15_000,
    tooLate: () => `The log never said "${text}".`,
  });

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stemma-child-'));
  child = null;
});

afterEach(async () => {
  await child?.stop();
  rmSync(folder, { recursive: true, force: true });
});

describe('a started program', () => {
  it('is gone when stop() returns, even if it ignores being asked', async () => {
    const stubborn = startNode("process.on('SIGTERM', () => {}); console.log('up'); setInterval(() => {}, 1000)", 200);
    await logContains('up');

    await stubborn.stop();

    expect(startOfProcess(stubborn.pid)).toBeNull();
  });

  it('takes along the programs that it started itself', async () => {
    const inner = "console.log('inner ' + process.pid); setInterval(() => {}, 1000)";
    const outer = startNode(
      `require('node:child_process').spawn(process.execPath, ['-e', ${JSON.stringify(inner)}], { stdio: 'inherit' });
       setInterval(() => {}, 1000)`,
    );
    await logContains('inner ');
    const innerPid = Number(/inner (\d+)/.exec(readFileSync(join(folder, 'part.log'), 'utf8'))?.[1]);

    await outer.stop();

    await waitUntil(() => startOfProcess(innerPid) === null, { timeoutMs: 5000, tooLate: () => 'It still runs.' });
    expect(startOfProcess(innerPid)).toBeNull();
  });

  it('leaves the end of its output for the sentence about its failure', async () => {
    const failing = startNode("console.error('the disk is full'); process.exit(3)");

    await failing.ended;

    expect(failing.logTail()).toBe('the disk is full');
  });

  it('that cannot be run at all counts as ended, with the reason in its log', async () => {
    child = startChild({ name: 'part', folder, command: join(folder, 'nothing-here'), args: [] });

    await child.ended;

    expect(child.logTail()).toContain('ENOENT');
  });

  it('is stopped by the next start when it outlived its starter', async () => {
    const starter = spawn(process.execPath, [
      ...['--import', 'tsx', '--input-type=module', '-e'],
      `import { startChild } from ${JSON.stringify(childModule)};
       const program = "console.log('pid ' + process.pid); setInterval(() => {}, 1000)";
       startChild({ name: 'part', folder: ${JSON.stringify(folder)}, command: process.execPath, args: ['-e', program] });`,
    ]);
    const record = () => readFileSync(join(folder, 'part.process'), 'utf8');
    await waitUntil(
      () => {
        try {
          return record().length > 0;
        } catch {
          return false;
        }
      },
      { timeoutMs: 15_000, tooLate: () => 'The starter started nothing.' },
    );
    await logContains('pid ');
    const orphan = Number(record().split(' ')[0]);
    const starterEnded = new Promise((resolve) => starter.once('exit', resolve));
    starter.kill('SIGKILL');
    await starterEnded;
    const said: string[] = [];

    await settleEarlierChild(folder, 'part', 'The part', (line) => said.push(line));

    expect(startOfProcess(orphan)).toBeNull();
    expect(said).toEqual([`The part of an earlier start was left running (process ${orphan}); stopping it.`]);
  });

  it('is left alone by another start while its starter lives', async () => {
    const running = startNode("console.log('up'); setInterval(() => {}, 1000)");
    await logContains('up');

    await expect(settleEarlierChild(folder, 'part', 'The part', () => {})).rejects.toThrow(
      `The part of this folder already runs (process ${running.pid})`,
    );
    expect(startOfProcess(running.pid)).not.toBeNull();
  });
});
