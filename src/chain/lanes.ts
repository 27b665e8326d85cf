import { type Scale, type StudyModel, scales } from '../../shared/engine/model/study-model.ts';
import { topologicalOrder } from './topological-order.ts';

export type Place = { readonly x: number; readonly y: number };
export type Layout = Readonly<Record<string, Place>>;

/** The zones of the sheet, left to right. A link from one to another is a scale-up step. */
export const lanes: Record<Scale, { readonly from: number; readonly to: number; readonly columns: readonly number[] }> =
  {
    bench: { from: 0, to: 640, columns: [25, 350] },
    pilot: { from: 640, to: 1040, columns: [705] },
    plant: { from: 1040, to: 1760, columns: [1075, 1440] },
  };
export const nodeWidth = 270;
const firstRow = 70;
const gap = 40;

/** Height of a node on the canvas: head, value line, foot, and one row for each route. */
export function nodeHeight(routeCount: number): number {
  return 122 + 28 * Math.max(1, routeCount);
}

export function laneAt(x: number): Scale {
  const middle = x + nodeWidth / 2;
  return scales.find((scale) => middle < lanes[scale].to) ?? 'plant';
}

export function scaleOf(model: StudyModel, quantityId: string): Scale {
  const quantity = model.quantities.find((one) => one.id === quantityId);
  return model.operatingPoints.find((point) => point.id === quantity?.operatingPointId)?.scale ?? 'bench';
}

/**
 * Where each quantity stands: saved places stay as they are, new quantities take the first free row of their
 * lane. The columns of a lane fill from left to right as lineage deepens within the lane.
 */
export function placeQuantities(model: StudyModel, saved: Layout): Layout {
  const routeCount = (id: string) => model.routes.filter((route) => route.quantityId === id).length;
  const placed = new Map<string, Place>();
  for (const quantity of model.quantities) {
    const place = saved[quantity.id];
    if (place) placed.set(quantity.id, place);
  }
  for (const id of topologicalOrder(model)) {
    if (placed.has(id)) continue;
    placed.set(id, firstFreePlace(model, id, placed, routeCount));
  }
  return Object.fromEntries(placed);
}

function firstFreePlace(
  model: StudyModel,
  id: string,
  placed: ReadonlyMap<string, Place>,
  routeCount: (id: string) => number,
): Place {
  const { columns } = lanes[scaleOf(model, id)];
  const height = nodeHeight(routeCount(id));
  const x = columns[Math.min(columnFor(model, id), columns.length - 1)] ?? columns[0] ?? 0;
  let y = firstRow;
  const others = [...placed].filter(([, place]) => Math.abs(place.x - x) < nodeWidth + 10);
  for (let moved = true; moved; ) {
    moved = false;
    for (const [other, place] of others) {
      const bottom = place.y + nodeHeight(routeCount(other));
      if (y < bottom + gap && place.y < y + height + gap) {
        y = bottom + gap;
        moved = true;
      }
    }
  }
  return { x, y };
}

/** Steps of lineage that a quantity has behind it inside its own lane. */
function columnFor(model: StudyModel, id: string, seen: ReadonlySet<string> = new Set()): number {
  if (seen.has(id)) return 0;
  const scale = scaleOf(model, id);
  const sources = model.routes
    .filter((route) => route.quantityId === id)
    .flatMap((route) => ('bindings' in route ? Object.values(route.bindings) : []))
    .flatMap((binding) => (binding?.from === 'quantity' ? [binding.quantityId] : []))
    .filter((source) => scaleOf(model, source) === scale);
  return sources.length === 0
    ? 0
    : 1 + Math.max(...sources.map((source) => columnFor(model, source, new Set([...seen, id]))));
}

/** How far down the sheet reaches. */
export function sheetHeight(model: StudyModel, layout: Layout): number {
  const bottoms = model.quantities.map((quantity) => {
    const count = model.routes.filter((route) => route.quantityId === quantity.id).length;
    return (layout[quantity.id]?.y ?? 0) + nodeHeight(count);
  });
  return Math.max(640, ...bottoms.map((bottom) => bottom + 60));
}
