import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import * as z from 'zod';
import { inheritedEnvironment, readLauncherEnvironment } from '../environment.ts';
import { chromium, installMissing, mariadbServer } from './install-debian.ts';

const root = join(import.meta.dirname, '../..');

const resultsSchema = z.object({
  success: z.boolean(),
  numPassedTests: z.int(),
  numFailedTests: z.int(),
  numPendingTests: z.int(),
  testResults: z.array(z.object({ status: z.string(), assertionResults: z.array(z.unknown()) })),
});

/**
 * Counts a run as `N passed, N failed`. A file that could not even be loaded counts as one failure, and so does a run
 * that ended badly with no test to blame or without any result.
 */
export function summarise(results: unknown, exitCode: number): { readonly passed: number; readonly failed: number } {
  const parsed = resultsSchema.safeParse(results);
  if (!parsed.success) return { passed: 0, failed: 1 };
  const { numPassedTests, numFailedTests, success, testResults } = parsed.data;
  const unloaded = testResults.filter((file) => file.status === 'failed' && file.assertionResults.length === 0).length;
  const failed = numFailedTests + unloaded;
  const isBad = !success || exitCode !== 0;
  return { passed: numPassedTests, failed: isBad && failed === 0 ? 1 : failed };
}

/** Installs what the tests need, runs all of them and prints the count last. Returns the exit code. */
export async function runTests(args: readonly string[]): Promise<number> {
  const folder = join(readLauncherEnvironment().dataFolder, 'test');
  mkdirSync(folder, { recursive: true });
  const resultsFile = join(folder, 'results.json');
  rmSync(resultsFile, { force: true });
  installMissing([mariadbServer, chromium], (line) => process.stdout.write(`${line}\n`));

  const vitest = spawn(
    process.execPath,
    [
      join(root, 'node_modules/vitest/vitest.mjs'),
      'run',
      ...['--reporter=default', '--reporter=json', `--outputFile.json=${resultsFile}`],
      ...args,
    ],
    { cwd: root, stdio: 'inherit', env: inheritedEnvironment({ NODE_ENV: 'test' }) },
  );
  // Vitest gets Ctrl-C from the terminal itself and stops what it started; we only wait for it.
  process.on('SIGINT', () => {});
  process.on('SIGTERM', () => vitest.kill('SIGTERM'));
  const exitCode = await new Promise<number>((resolve) => {
    vitest.once('error', () => resolve(1));
    vitest.once('exit', (code) => resolve(code ?? 1));
  });

  const results: unknown = existsSync(resultsFile) ? JSON.parse(readFileSync(resultsFile, 'utf8')) : null;
  const { passed, failed } = summarise(results, exitCode);
  const line = `${passed} passed, ${failed} failed`;
  writeFileSync(join(folder, 'summary'), `${line}\n`);
  process.stdout.write(`${line}\n`);
  return failed > 0 || exitCode !== 0 ? 1 : 0;
}
