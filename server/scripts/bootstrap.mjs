// Runs on a bare Node, before anything is installed: no dependencies and no TypeScript here.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = join(dirname(fileURLToPath(import.meta.url)), '../..');
const commands = ['start', 'dev', 'test', 'check'];

function giveUp(sentence) {
  process.stderr.write(`${sentence}\n`);
  process.exit(1);
}

/** Whether node_modules holds exactly what the lock file names. npm writes its own list last, once all is in place. */
function packagesAreInstalled() {
  const installedList = join(root, 'node_modules/.package-lock.json');
  if (!existsSync(installedList)) return false;
  const wanted = JSON.parse(readFileSync(join(root, 'package-lock.json'), 'utf8')).packages;
  const installed = JSON.parse(readFileSync(installedList, 'utf8')).packages;
  const isThere = ([path, { version, optional }]) =>
    path === '' || installed[path]?.version === version || (optional === true && !installed[path]);
  return Object.entries(wanted).every(isThere) && Object.keys(installed).every((path) => path in wanted);
}

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  giveUp(`Stemma needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
}
const [command = '', ...rest] = process.argv.slice(2);
if (!commands.includes(command)) giveUp(`"${command}" is not one of: ${commands.join(', ')}.`);

process.chdir(root);
if (!packagesAreInstalled()) {
  process.stdout.write('Installing the npm packages that package-lock.json names (about a minute).\n');
  const result = spawnSync('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], {
    stdio: 'inherit',
  });
  if (result.status !== 0) giveUp('The npm packages could not be installed; npm says why above. Then start again.');
}

// In this process, so that a signal sent to it reaches the script that has to stop what it started.
const { register } = await import('tsx/esm/api');
register();
process.argv = [process.argv[0], join(root, `server/scripts/${command}.ts`), ...rest];
await import(`./${command}.ts`);
