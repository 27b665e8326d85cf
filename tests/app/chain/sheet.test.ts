import { describe, expect, it } from 'vitest';
import type { MatchCheck } from '../../../shared/engine/model/evaluation.ts';
import { chamferedPath, routeLink } from '../../../src/chain/canvas/link-path.ts';
import { nearestNode } from '../../../src/chain/canvas/nearest-node.ts';
import { laneAt, lanes, nodeHeight, placeQuantities } from '../../../src/chain/lanes.ts';
import { outlineRows, targets } from '../../../src/chain/outline/outline-rows.ts';
import { topologicalOrder } from '../../../src/chain/topological-order.ts';
import { verdictTag } from '../../../src/chain/verdict-words.ts';
import { analogueChain, ids } from './analogue-chain.ts';

describe('the sheet', () => {
  it('puts every quantity without a place into the lane of its scale, none on another', () => {
    const layout = placeQuantities(analogueChain, {});

    const places = Object.values(layout);
    expect(laneAt(layout[ids.h]?.x ?? -1)).toBe('bench');
    expect(laneAt(layout[ids.k]?.x ?? -1)).toBe('plant');
    expect(new Set(places.map(({ x, y }) => `${x} ${y}`)).size).toBe(places.length);
    const column = places
      .filter(({ x }) => x === lanes.plant.columns[0])
      .map(({ y }) => y)
      .sort((a, b) => a - b);
    for (const [index, y] of column.slice(1).entries()) expect(y - (column[index] ?? 0)).toBeGreaterThan(nodeHeight(1));
  });

  it('leaves arranged quantities where they are when another is added', () => {
    const saved = { [ids.k]: { x: 1200, y: 333 } };

    expect(placeQuantities(analogueChain, saved)[ids.k]).toEqual({ x: 1200, y: 333 });
  });

  it('orders quantities so that each comes after all it rests on', () => {
    const order = topologicalOrder(analogueChain);

    expect(order.indexOf(ids.h)).toBeLessThan(order.indexOf(ids.k));
    expect(order.indexOf(ids.k)).toBeLessThan(order.indexOf(ids.time));
    expect(order.indexOf(ids.area)).toBeLessThan(order.indexOf(ids.time));
    expect(new Set(order).size).toBe(4);
  });

  it('goes with an arrow key to the nearest quantity in that direction, or nowhere', () => {
    const places = new Map([
      ['a', { x: 0, y: 0 }],
      ['b', { x: 300, y: 20 }],
      ['c', { x: 310, y: 400 }],
      ['d', { x: 900, y: 0 }],
    ]);

    expect(nearestNode(places, 'a', 'ArrowRight')).toBe('b');
    expect(nearestNode(places, 'b', 'ArrowDown')).toBe('c');
    expect(nearestNode(places, 'a', 'ArrowLeft')).toBeNull();
  });

  it('leads a link around a quantity that stands in its way, with cut corners', () => {
    const wall = { x: 300, y: -50, width: 250, height: 400 };

    const points = routeLink({ x: 200, y: 100 }, { x: 700, y: 120 }, [wall]);

    const through = points.slice(1).some((b, i) => {
      const a = points[i] ?? b;
      return (
        Math.max(a.x, b.x) > wall.x &&
        Math.min(a.x, b.x) < wall.x + wall.width &&
        Math.max(a.y, b.y) > wall.y &&
        Math.min(a.y, b.y) < wall.y + wall.height
      );
    });
    expect(through).toBe(false);
    expect(
      chamferedPath([
        { x: 0, y: 0 },
        { x: 100, y: 0 },
        { x: 100, y: 100 },
      ]),
    ).toBe('M0 0 L91 0 L100 9 L100 100');
  });
});

describe('the outline', () => {
  it('shows a quantity that feeds several once in full and then as a pointer to that row', () => {
    const rows = outlineRows(analogueChain, ids.time, new Set());

    const ofH = rows.filter((row) => row.quantityId === ids.h);
    expect(ofH).toHaveLength(2);
    expect(ofH[0]).toMatchObject({ seeAbove: null, level: 3 });
    expect(ofH[1]).toMatchObject({ seeAbove: ofH[0]?.key, level: 2, hasInputs: false });
  });

  it('starts from what nothing else is computed from, and hides what is under a collapsed row', () => {
    expect(targets(analogueChain)).toEqual([ids.time]);
    expect(outlineRows(analogueChain, ids.time, new Set([ids.time]))).toHaveLength(1);
  });
});

describe('the tag on a link', () => {
  const check = (part: Partial<MatchCheck>): MatchCheck => ({
    key: 'match:Re',
    kind: 'match',
    group: 'Re',
    source: 1e4,
    target: 1e4,
    ratio: 1,
    window: null,
    verdict: 'inside',
    sentence: '',
    ...part,
  });

  it('counts what is inside, and names the worst group with its factor when one is outside', () => {
    const window = { min: 2000, max: 70_000, basis: 'sourced' as const };
    const far = check({ key: 'window:Re', kind: 'window', target: 88_900, window, verdict: 'outside' });

    expect(verdictTag([check({}), check({ key: 'b' })])?.words).toBe('2 of 2 inside');
    expect(verdictTag([check({}), far])).toMatchObject({ verdict: 'outside', words: 'Re 1.27× outside' });
    const unmatched = check({
      target: 2e4,
      ratio: 2,
      window: { min: 0.8, max: 1.25, basis: 'indicative' },
      verdict: 'outside',
    });
    expect(verdictTag([unmatched, far])).toMatchObject({ words: 'Re 2×, 2 of 2 outside', short: '2 of 2 outside' });
    expect(verdictTag([])).toBeNull();
  });
});
