import { spawnSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { join, relative } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';

const root = join(import.meta.dirname, '../..');
let copy: string;

beforeEach(() => {
  // Inside the project: the tool takes its folder relative to it.
  mkdirSync(join(root, '.stemma'), { recursive: true });
  copy = mkdtempSync(join(root, '.stemma/migrations-'));
});

afterEach(() => rmSync(copy, { recursive: true, force: true }));

it('the migrations say all that the schema says: generating finds nothing to add', () => {
  cpSync(join(root, 'migrations'), copy, { recursive: true });
  const before = readdirSync(copy).sort();

  const result = spawnSync(
    process.execPath,
    [
      join(root, 'node_modules/drizzle-kit/bin.cjs'),
      'generate',
      '--dialect=mysql',
      '--schema=./server/db/schema/*.ts',
      `--out=./${relative(root, copy)}`,
    ],
    { cwd: root, encoding: 'utf8' },
  );

  expect(result.stdout).toContain('No schema changes');
  expect(readdirSync(copy).sort()).toEqual(before);
});
