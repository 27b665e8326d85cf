import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applyEdits, changedItems, type ItemEdit, invertEdits } from '../../../src/chain/editing/chain-edits.ts';
import { removeQuantity, removeRoute, usersOfPoint } from '../../../src/chain/editing/remove-items.ts';
import { analogueChain, ids } from './analogue-chain.ts';

describe('edits of a chain', () => {
  it('come back to a deep-equal model when their inverses are applied, order included', () => {
    const { edits } = removeQuantity(analogueChain, ids.h);

    const inverse = invertEdits(analogueChain, edits);
    const after = applyEdits(analogueChain, edits);

    expect(after).not.toEqual(analogueChain);
    expect(applyEdits(after, inverse)).toEqual(analogueChain);
  });

  it('come back whatever is added, changed and removed in whatever order', () => {
    const items = [
      ...analogueChain.quantities.map((body) => ({ kind: 'quantity' as const, body })),
      ...analogueChain.routes.map((body) => ({ kind: 'route' as const, body })),
    ];
    const anEdit = fc
      .record({
        index: fc.nat(items.length - 1),
        act: fc.constantFrom('remove', 'put', 'rename'),
        name: fc.string({ minLength: 1 }),
      })
      .map(({ index, act, name }): ItemEdit => {
        const item = items[index] as (typeof items)[number];
        const body = act === 'remove' ? null : act === 'put' ? item.body : { ...item.body, name };
        return { kind: item.kind, id: item.body.id, body };
      });

    fc.assert(
      fc.property(fc.array(anEdit, { maxLength: 12 }), (edits) => {
        const inverse = invertEdits(analogueChain, edits);
        expect(applyEdits(applyEdits(analogueChain, edits), inverse)).toEqual(analogueChain);
      }),
    );
  });

  it('are found again from the two models, so that one save carries exactly what differs', () => {
    const { edits } = removeRoute(analogueChain, ids.areaRoute);
    const after = applyEdits(analogueChain, edits);

    expect(changedItems(analogueChain, after)).toEqual([{ kind: 'route', id: ids.areaRoute, body: null }]);
    expect(changedItems(analogueChain, structuredClone(analogueChain))).toEqual([]);
  });
});

describe('removing', () => {
  it('a quantity names who loses a link and leaves the rest of their routes', () => {
    const removal = removeQuantity(analogueChain, ids.h);

    const after = applyEdits(analogueChain, removal.edits);

    expect(removal.dependants).toEqual([
      'Wall mass-transfer coefficient (Heat analogue)',
      'Time to dissolve (Balance)',
    ]);
    expect(after.routes.find((route) => route.id === ids.kRoute)).toMatchObject({
      sourceQuantityId: null,
      scatter: 0.05,
    });
    expect(after.routes.find((route) => route.id === ids.timeRoute)).toMatchObject({
      expression: 'A / (k * h)',
      bindings: { h: null, k: { quantityId: ids.k } },
    });
    expect(after.routes.some((route) => route.id === ids.hRoute)).toBe(false);
  });

  it('an adopted route leaves its quantity with none adopted', () => {
    const quantities = analogueChain.quantities.map((one) =>
      one.id === ids.k ? { ...one, adoptedRouteId: ids.kRoute } : one,
    );
    const model = { ...analogueChain, quantities };

    const after = applyEdits(model, removeRoute(model, ids.kRoute).edits);

    expect(after.quantities.find((one) => one.id === ids.k)?.adoptedRouteId).toBeNull();
  });

  it('an operating point in use is refused by naming its users', () => {
    expect(usersOfPoint(analogueChain, ids.rig)).toEqual(['Heat-transfer coefficient']);
  });
});
