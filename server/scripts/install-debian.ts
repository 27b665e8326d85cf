import { spawnSync } from 'node:child_process';
import { userInfo } from 'node:os';
import { inheritedEnvironment } from '../environment.ts';
import { findProgram } from './database.ts';

/** A Debian package and the program by which we know that it is there. */
export type SystemPackage = { readonly name: string; readonly program: string };

export const mariadbServer: SystemPackage = { name: 'mariadb-server', program: 'mariadbd' };
/** For the browser tests only. */
export const chromium: SystemPackage = { name: 'chromium', program: 'chromium' };

function run(command: string, args: readonly string[]): { readonly ok: boolean; readonly output: string } {
  const result = spawnSync(command, args, {
    encoding: 'utf8',
    // Asks the package not to start a service of its own: we start the program ourselves, on our own folder.
    env: inheritedEnvironment({ DEBIAN_FRONTEND: 'noninteractive', RUNLEVEL: '1' }),
    maxBuffer: 64 * 1024 * 1024,
  });
  return { ok: result.status === 0, output: `${result.stdout ?? ''}${result.stderr ?? ''}` };
}

/**
 * Installs what is missing: as root with apt-get, as anybody else through sudo where that asks for no password.
 *
 * @throws Error with the one command to run by hand when neither is possible.
 */
export function installMissing(packages: readonly SystemPackage[], say: (line: string) => void): void {
  const names = packages.filter(({ program }) => !findProgram(program)).map(({ name }) => name);
  if (names.length === 0) return;

  const isRoot = userInfo().uid === 0;
  const byHand = `${isRoot ? '' : 'sudo '}apt-get install --no-install-recommends ${names.join(' ')}`;
  const list = names.join(' and ');
  if (!findProgram('apt-get')) {
    throw new Error(`${list} is needed and this machine has no apt-get. Install it in this system's own way.`);
  }
  const prefix = isRoot ? [] : ['sudo', '-n'];
  if (!isRoot && !run('sudo', ['-n', 'true']).ok) {
    throw new Error(
      `${list} is needed and only an administrator can install it. Run this once, then start again:\n  ${byHand}`,
    );
  }

  const apt = (args: readonly string[]) => {
    const [command, ...rest] = [...prefix, 'apt-get', '-o', 'DPkg::Lock::Timeout=300', ...args];
    return run(command as string, rest);
  };
  const install = () => apt(['install', '-y', '--no-install-recommends', ...names]);
  say(`Installing ${list} with apt-get (about half a minute).`);
  let result = install();
  if (!result.ok) {
    say('Updating the list of packages first.');
    apt(['update']);
    result = install();
  }
  const stillMissing = packages.filter(({ program }) => !findProgram(program)).map(({ name }) => name);
  if (!result.ok || stillMissing.length > 0) {
    const end = result.output.trim().split('\n').slice(-8).join('\n');
    throw new Error(
      `${list} could not be installed. Run this yourself and start again:\n  ${byHand}\napt-get said:\n${end}`,
    );
  }
}
