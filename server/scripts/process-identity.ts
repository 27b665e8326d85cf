import { readFileSync } from 'node:fs';

/**
 * When a live process started, in clock ticks since boot (field 22 of /proc/PID/stat), or null when there is none.
 * Together with its number this tells a process from a later one that was given the same number.
 */
export function startOfProcess(pid: number): string | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The second field is the name in brackets and may hold spaces; count from its end.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    if (fields[0] === 'Z') return null;
    return fields[19] ?? null;
  } catch {
    return null;
  }
}
