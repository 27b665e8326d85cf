import type { KeyboardEvent } from 'react';
import type { ChainLink } from '../../../shared/engine/evaluate/chain-links.ts';
import type { Layout, Place } from '../lanes.ts';
import { type Direction, nearestNode } from './nearest-node.ts';

export type CanvasKeys = {
  readonly layout: Layout;
  readonly links: readonly ChainLink[];
  readonly goTo: (id: string) => void;
  readonly announce: (sentence: string) => void;
  readonly open: (id: string) => void;
  readonly close: () => void;
  readonly listLinks: (id: string) => void;
  readonly connect: (id: string) => void;
  readonly remove: (id: string) => void;
  readonly nudge: (id: string, by: Place) => void;
  readonly fit: (what: 'all' | 'selection') => void;
};

const arrows: readonly string[] = ['ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown'];
const nudges: Record<string, Place> = {
  ArrowLeft: { x: -20, y: 0 },
  ArrowRight: { x: 20, y: 0 },
  ArrowUp: { x: 0, y: -20 },
  ArrowDown: { x: 0, y: 20 },
};

/**
 * The keys of a focused node: arrows to the nearest, Alt with left or right along the lineage, Shift with an arrow
 * moves it, Enter opens, L lists links, C connects, Delete removes, Escape closes, 1 and 2 fit. Returns whether the
 * key meant something here.
 */
export function handleCanvasKey(event: KeyboardEvent, id: string, keys: CanvasKeys): boolean {
  const { key } = event;
  if (event.ctrlKey || event.metaKey) return false;
  if (arrows.includes(key)) {
    if (event.altKey) follow(key, id, keys);
    else if (event.shiftKey) keys.nudge(id, nudges[key] as Place);
    else {
      const next = nearestNode(new Map(Object.entries(keys.layout)), id, key as Direction);
      if (next) keys.goTo(next);
      else keys.announce('Nothing further in that direction.');
    }
    return true;
  }
  switch (key) {
    case 'Enter':
    case ' ':
      keys.open(id);
      return true;
    case 'Escape':
      keys.close();
      return true;
    case 'l':
    case 'L':
      keys.listLinks(id);
      return true;
    case 'c':
    case 'C':
      keys.connect(id);
      return true;
    case 'Delete':
    case 'Backspace':
      keys.remove(id);
      return true;
    case '1':
      keys.fit('all');
      return true;
    case '2':
      keys.fit('selection');
      return true;
    default:
      return false;
  }
}

function follow(key: string, id: string, keys: CanvasKeys): void {
  if (key !== 'ArrowLeft' && key !== 'ArrowRight') return;
  const upstream = key === 'ArrowLeft';
  const ids = keys.links.flatMap((link) =>
    upstream
      ? link.targetQuantityId === id
        ? [link.sourceQuantityId]
        : []
      : link.sourceQuantityId === id
        ? [link.targetQuantityId]
        : [],
  );
  const next = ids[0];
  if (next) keys.goTo(next);
  else keys.announce(upstream ? 'This quantity has no inputs.' : 'Nothing is computed from this quantity.');
}
