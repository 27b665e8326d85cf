import type { Place } from '../lanes.ts';

export type Direction = 'ArrowLeft' | 'ArrowRight' | 'ArrowUp' | 'ArrowDown';

/** The node that an arrow key leads to: the nearest one in that direction, straying sideways counted double. */
export function nearestNode(places: ReadonlyMap<string, Place>, from: string, direction: Direction): string | null {
  const origin = places.get(from);
  if (!origin) return null;
  let best: { id: string; cost: number } | null = null;
  for (const [id, place] of places) {
    if (id === from) continue;
    const dx = place.x - origin.x;
    const dy = place.y - origin.y;
    const horizontal = direction === 'ArrowLeft' || direction === 'ArrowRight';
    const ahead = horizontal ? (direction === 'ArrowRight' ? dx : -dx) : direction === 'ArrowDown' ? dy : -dy;
    const aside = Math.abs(horizontal ? dy : dx);
    if (ahead <= 1) continue;
    const cost = ahead + 2 * aside;
    if (best === null || cost < best.cost) best = { id, cost };
  }
  return best?.id ?? null;
}
