export type Point = { readonly x: number; readonly y: number };
export type Box = { readonly x: number; readonly y: number; readonly width: number; readonly height: number };

const chamfer = 9;
const stub = 26;

function crossings(points: readonly Point[], boxes: readonly Box[]): number {
  let count = 0;
  for (let i = 1; i < points.length; i += 1) {
    const a = points[i - 1] as Point;
    const b = points[i] as Point;
    const [left, right] = [Math.min(a.x, b.x), Math.max(a.x, b.x)];
    const [top, bottom] = [Math.min(a.y, b.y), Math.max(a.y, b.y)];
    for (const box of boxes) {
      if (right > box.x - 4 && left < box.x + box.width + 4 && bottom > box.y - 4 && top < box.y + box.height + 4)
        count += 1;
    }
  }
  return count;
}

function lengthOf(points: readonly Point[]): number {
  return points.slice(1).reduce((sum, point, i) => {
    const before = points[i] as Point;
    return sum + Math.abs(point.x - before.x) + Math.abs(point.y - before.y);
  }, 0);
}

/**
 * Corners of a right-angled link from a port on the right of its source to one on the left of its target. It goes
 * where it crosses the fewest other nodes, then where it is shortest. `rank` sets neighbouring links apart.
 */
export function routeLink(source: Point, target: Point, boxes: readonly Box[], rank = 0): readonly Point[] {
  const shift = (rank % 5) * 8;
  const out = source.x + stub + shift;
  const back = target.x - stub - shift;
  const candidates: Point[][] = [];
  if (target.x - source.x >= 28) {
    for (const x of back >= out ? [out, back, (out + back) / 2] : [(source.x + target.x) / 2]) {
      candidates.push([source, { x, y: source.y }, { x, y: target.y }, target]);
    }
  }
  const channels = boxes.flatMap((box) => [box.y - 14 - shift / 2, box.y + box.height + 14 + shift / 2]);
  for (const y of [(source.y + target.y) / 2, ...channels]) {
    candidates.push([source, { x: out, y: source.y }, { x: out, y }, { x: back, y }, { x: back, y: target.y }, target]);
  }
  // A link touches its own two nodes at their ports; a few pixels further on, what it meets stands in its way.
  const free = (points: Point[]) => [
    { x: source.x + 6, y: source.y },
    ...points.slice(1, -1),
    { x: target.x - 6, y: target.y },
  ];
  const cost = (points: Point[]) => crossings(free(points), boxes) * 10_000 + lengthOf(points) + points.length * 20;
  return candidates.reduce((best, next) => (cost(next) < cost(best) ? next : best));
}

/** SVG path along the corners, each cut at 45°. */
export function chamferedPath(points: readonly Point[]): string {
  const first = points[0];
  const last = points.at(-1);
  if (!first || !last) return '';
  let path = `M${first.x} ${first.y}`;
  for (let i = 1; i < points.length - 1; i += 1) {
    const corner = points[i] as Point;
    const cut = (other: Point): Point => {
      const length = Math.hypot(other.x - corner.x, other.y - corner.y);
      if (length === 0) return corner;
      const step = Math.min(chamfer, length / 2);
      return {
        x: corner.x + ((other.x - corner.x) / length) * step,
        y: corner.y + ((other.y - corner.y) / length) * step,
      };
    };
    const before = cut(points[i - 1] as Point);
    const after = cut(points[i + 1] as Point);
    path += ` L${before.x} ${before.y} L${after.x} ${after.y}`;
  }
  return `${path} L${last.x} ${last.y}`;
}

/** A point on the longest stretch, `part` of its way along, where a tag or a break stands. */
export function pointAlong(points: readonly Point[], part: number): Point & { readonly upright: boolean } {
  let best = { x: 0, y: 0, upright: false, length: -1 };
  for (let i = 1; i < points.length; i += 1) {
    const a = points[i - 1] as Point;
    const b = points[i] as Point;
    const length = Math.abs(a.x - b.x) + Math.abs(a.y - b.y);
    if (length > best.length)
      best = { x: a.x + (b.x - a.x) * part, y: a.y + (b.y - a.y) * part, upright: a.x === b.x, length };
  }
  return best;
}
