import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { runTests } from './run-tests.ts';
import { sentenceOf } from './sentence-of.ts';

const root = join(import.meta.dirname, '../..');
const program = (path: string) => join(root, 'node_modules', path);

// In the order in which they fail fastest.
const steps = [
  { what: 'Format and lint', program: program('@biomejs/biome/bin/biome'), args: ['check', '.'] },
  { what: 'Types', program: program('typescript/bin/tsc'), args: ['--noEmit'] },
  { what: 'Dead code', program: program('knip/bin/knip.js'), args: [] },
] as const;
const build = { what: 'Build', program: program('vite/bin/vite.js'), args: ['build'] } as const;

function passes(step: { readonly what: string; readonly program: string; readonly args: readonly string[] }): boolean {
  process.stdout.write(`\n${step.what}\n`);
  return spawnSync(process.execPath, [step.program, ...step.args], { cwd: root, stdio: 'inherit' }).status === 0;
}

async function check(): Promise<number> {
  for (const step of steps) if (!passes(step)) return 1;
  process.stdout.write('\nTests\n');
  const code = await runTests(process.argv.slice(2));
  if (code !== 0) return code;
  return passes(build) ? 0 : 1;
}

process.exitCode = await check().catch((error: unknown) => {
  process.stderr.write(`${sentenceOf(error)}\n`);
  return 1;
});
