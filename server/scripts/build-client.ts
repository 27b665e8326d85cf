import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const root = join(import.meta.dirname, '../..');
// Inside the build: Vite empties the folder before it writes, so a build that failed leaves no stamp. The server does
// not serve files that start with a dot.
const stampFile = join(root, 'dist/.inputs');

function hashOfInputs(): string {
  const files = ['index.html', 'vite.config.ts', 'tsconfig.json', 'package-lock.json'];
  for (const folder of ['src', 'shared']) {
    if (!existsSync(join(root, folder))) continue;
    const found = readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' });
    files.push(...found.sort().map((file) => join(folder, file)));
  }
  const hash = createHash('sha256');
  for (const file of files) {
    const path = join(root, file);
    if (!existsSync(path) || !statSync(path).isFile()) continue;
    hash.update(`${file}\0`).update(readFileSync(path)).update('\0');
  }
  return hash.digest('hex');
}

/**
 * Builds the client into `dist/` unless it was built from these very inputs.
 *
 * @throws Error with what the build said.
 */
export function buildClient(say: (line: string) => void = () => {}): void {
  const inputs = hashOfInputs();
  if (existsSync(stampFile) && readFileSync(stampFile, 'utf8') === inputs) return;
  say('Building the pages.');
  const result = spawnSync(process.execPath, [join(root, 'node_modules/vite/bin/vite.js'), 'build'], {
    cwd: root,
    encoding: 'utf8',
  });
  if (result.status !== 0) throw new Error(`The pages could not be built:\n${result.stdout}${result.stderr}`);
  writeFileSync(stampFile, inputs);
}
