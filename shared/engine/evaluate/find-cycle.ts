import type { StudyModel } from '../model/study-model.ts';
import { chainLinks } from './chain-links.ts';

/**
 * A loop among the links of all routes, adopted or not: adopting one later must not be able to close a loop.
 *
 * @returns The names of the quantities around the loop, each once, every one feeding the next and the last
 * feeding the first; null where there is none.
 */
export function findCycle(model: StudyModel): string[] | null {
  const feeds = new Map<string, string[]>();
  for (const link of chainLinks(model)) {
    const targets = feeds.get(link.sourceQuantityId);
    if (targets) targets.push(link.targetQuantityId);
    else feeds.set(link.sourceQuantityId, [link.targetQuantityId]);
  }
  const finished = new Set<string>();
  for (const start of feeds.keys()) {
    const loop = loopFrom(start, feeds, finished);
    if (loop) return loop.map((id) => model.quantities.find((quantity) => quantity.id === id)?.name ?? id);
  }
  return null;
}

/** Depth first with a stack of its own, so that a long chain cannot overflow the call stack. */
function loopFrom(start: string, feeds: ReadonlyMap<string, string[]>, finished: Set<string>): string[] | null {
  if (finished.has(start)) return null;
  const path = [start];
  const onPath = new Set(path);
  const nextTarget = [0];
  while (path.length > 0) {
    const depth = path.length - 1;
    const here = path[depth] ?? start;
    const place = nextTarget[depth] ?? 0;
    const target = feeds.get(here)?.[place];
    if (target === undefined) {
      finished.add(here);
      onPath.delete(here);
      path.pop();
      nextTarget.pop();
      continue;
    }
    nextTarget[depth] = place + 1;
    if (onPath.has(target)) return path.slice(path.indexOf(target));
    if (finished.has(target)) continue;
    path.push(target);
    onPath.add(target);
    nextTarget.push(0);
  }
  return null;
}
