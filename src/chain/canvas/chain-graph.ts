import type { ChainLink } from '../../../shared/engine/evaluate/chain-links.ts';
import { routeInForce } from '../../../shared/engine/evaluate/upstream.ts';
import type { StudyEvaluation, Verdict } from '../../../shared/engine/model/evaluation.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import { type Layout, nodeHeight, nodeWidth, scaleOf } from '../lanes.ts';
import { type Origin, originOf } from '../origin.ts';
import { verdictTag } from '../verdict-words.ts';
import { type Box, type Point, routeLink } from './link-path.ts';

/** Where things are inside a node, so that links meet their ports without measuring the page. */
export const portsTop = 118;
export const portHeight = 28;
export const outletY = 58;

export type LinkDrawing = {
  readonly id: string;
  readonly link: ChainLink;
  readonly points: readonly Point[];
  readonly origin: Origin;
  readonly adopted: boolean;
  readonly crossesLanes: boolean;
  readonly tag: { readonly verdict: Verdict; readonly words: string } | null;
  /** Where its tag stands, as a part of its longest stretch: neighbours from one source stand apart. */
  readonly tagAt: number;
  /** The link in a whole sentence. */
  readonly words: string;
};

export function portY(index: number): number {
  return portsTop + portHeight * index + portHeight / 2;
}

export function boxOf(model: StudyModel, layout: Layout, quantityId: string): Box {
  const place = layout[quantityId] ?? { x: 0, y: 0 };
  const count = model.routes.filter((route) => route.quantityId === quantityId).length;
  return { ...place, width: nodeWidth, height: nodeHeight(count) };
}

/** Every link with its corners, its line type and what its checks say. */
export function drawLinks(
  model: StudyModel,
  layout: Layout,
  evaluation: StudyEvaluation,
  links: readonly ChainLink[],
): readonly LinkDrawing[] {
  const boxes = model.quantities.map((quantity) => boxOf(model, layout, quantity.id));
  return links.flatMap((link, rank) => {
    const source = model.quantities.find((quantity) => quantity.id === link.sourceQuantityId);
    const target = model.quantities.find((quantity) => quantity.id === link.targetQuantityId);
    const route = model.routes.find((one) => one.id === link.routeId);
    if (!source || !target || !route) return [];
    const port = model.routes.filter((one) => one.quantityId === target.id).findIndex((one) => one.id === route.id);
    const from = boxOf(model, layout, source.id);
    const to = boxOf(model, layout, target.id);
    const start = { x: from.x + from.width, y: from.y + outletY };
    const end = { x: to.x, y: to.y + portY(port) };
    const tag = verdictTag(evaluation.routes[route.id]?.checks ?? []);
    const adopted = routeInForce(model, target.id)?.id === route.id;
    const crossesLanes = scaleOf(model, source.id) !== scaleOf(model, target.id);
    const verdict = tag ? `; ${tag.words}` : '';
    return [
      {
        id: link.id,
        link,
        points: routeLink(start, end, boxes, rank),
        origin: originOf(routeInForce(model, source.id)),
        adopted,
        crossesLanes,
        tag: crossesLanes || tag?.verdict === 'outside' ? tag : null,
        tagAt: 0.35 + 0.22 * (links.slice(0, rank).filter((other) => other.sourceQuantityId === source.id).length % 3),
        words: `${source.name} feeds ${link.variable} of ${target.name} through ${route.name}${adopted ? ', adopted' : ''}${verdict}`,
      },
    ];
  });
}
