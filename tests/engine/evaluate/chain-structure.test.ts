import { describe, expect, it } from 'vitest';
import { chainLinks } from '../../../shared/engine/evaluate/chain-links.ts';
import { checkModel } from '../../../shared/engine/evaluate/check-model.ts';
import { evaluateStudy } from '../../../shared/engine/evaluate/evaluate-study.ts';
import { findCycle } from '../../../shared/engine/evaluate/find-cycle.ts';
import { sliceModel, upstreamOf } from '../../../shared/engine/evaluate/upstream.ts';
import { analogueChain, analogueChainIds as ids } from '../../reference/analogue-chain.ts';
import { ChainBuilder, measured, readOf } from './chain-builder.ts';

const nowhere = '99999999-9999-4999-8999-999999999999';
const sentencesOf = (chain: ChainBuilder) =>
  checkModel(chain.model)
    .map((error) => error.sentence)
    .join('\n');

/** a → b → c → a, with d beside. */
function loop(): ChainBuilder {
  const chain = new ChainBuilder();
  const [a, b, c] = [chain.quantity('a'), chain.quantity('b'), chain.quantity('c')];
  chain.route('balance', b, { expression: '2 * a', bindings: { a: readOf(a) } });
  chain.route('balance', c, { expression: '2 * b', bindings: { b: readOf(b) } });
  chain.route('balance', a, { expression: '2 * c', bindings: { c: readOf(c) } });
  chain.balance('d', '2 * a', [a]);
  return chain;
}

describe('the links of a chain', () => {
  it('lead from source quantity to the variable of a route', () => {
    const links = chainLinks(analogueChain());

    expect(links.filter((link) => link.targetQuantityId === ids.massTransferCoefficient)).toEqual([
      {
        id: `${ids.analogueRoute}:h`,
        sourceQuantityId: ids.heatTransferCoefficient,
        targetQuantityId: ids.massTransferCoefficient,
        routeId: ids.analogueRoute,
        variable: 'h',
      },
    ]);
    const intoTime = links.filter((link) => link.targetQuantityId === ids.dissolutionTime);
    expect(intoTime.map((link) => link.variable)).toEqual(['rho_s', 'layer', 'dc', 'k']);
  });
});

describe('loops', () => {
  it('are named by the quantities around them', () => {
    expect(findCycle(loop().model)?.toSorted()).toEqual(['a', 'b', 'c']);
    expect(findCycle(analogueChain())).toBeNull();
  });

  it('are refused, and give findings instead of values where they are there all the same', () => {
    const chain = loop();

    const evaluation = evaluateStudy(chain.model);

    expect(sentencesOf(chain)).toContain('rest on each other in a loop');
    expect(evaluation.findings[0]).toMatchObject({ severity: 'stops' });
    expect(evaluation.findings.map((finding) => finding.code)).toContain('loop');
    expect(Object.values(evaluation.quantities).map(({ result }) => result)).toEqual([null, null, null, null]);
  });

  it('are found through a route that is not adopted, since it may be adopted later', () => {
    const chain = new ChainBuilder();
    const a = chain.stated('a', 1, 0);
    const b = chain.balance('b', '2 * a', [a]);
    chain.route('balance', a, { expression: '3 * b', bindings: { b: readOf(b) } });

    expect(findCycle(chain.model)?.toSorted()).toEqual(['a', 'b']);
  });

  it('do not overflow on a chain of ten thousand', () => {
    const chain = new ChainBuilder();
    let last = chain.stated('x', 1, 0);
    const quantities = [last];
    for (let place = 0; place < 10_000; place += 1) {
      const next = { ...chain.quantity(`y${place}`), inputId: '' };
      chain.route('balance', next, { expression: '2 * x', bindings: { x: readOf(last) } });
      quantities.push(next);
      last = next;
    }

    expect(findCycle(chain.model)).toBeNull();
  });
});

describe('what a quantity rests on', () => {
  it('is everything behind it through the routes in force, and nothing else', () => {
    const model = analogueChain();

    const upstream = upstreamOf(model, ids.heatTransferCoefficient);

    expect(upstream.quantityIds).toContain(ids.heatTransferCoefficient);
    expect(upstream.quantityIds).not.toContain(ids.massTransferCoefficient);
    expect(upstream.operatingPointIds).toEqual([ids.bench]);
    expect(upstream.routeIds).toHaveLength(6);
  });

  it('holds the test behind a velocity and the point that test was run at', () => {
    const chain = new ChainBuilder();
    const rig = chain.point('Rig', { L: 0.02 });
    const test = chain.test(rig);
    const other = chain.point('Other', { u: { testId: test.id } });
    const k = chain.quantity('k', '1', other);

    expect(upstreamOf(chain.model, k.id)).toMatchObject({
      testIds: [test.id],
      operatingPointIds: expect.arrayContaining([rig.id, other.id]),
    });
  });

  it('gives the same result alone as within the study, its correlations included', () => {
    const model = analogueChain();
    const whole = evaluateStudy(model).quantities[ids.heatTransferCoefficient];

    const slice = sliceModel(model, ids.heatTransferCoefficient);
    const alone = evaluateStudy(slice).quantities[ids.heatTransferCoefficient];

    expect(slice.quantities.length).toBeLessThan(model.quantities.length);
    expect(alone?.result?.u).toBe(whole?.result?.u);
    expect(alone?.result?.correlatedShare).not.toBe(0);
  });

  it('leaves out routes that are not adopted', () => {
    const chain = new ChainBuilder();
    const a = chain.stated('a', 1, 0);
    const second = chain.route('stated-value', a, { value: measured(2, 0), evidence: 'note' });
    chain.model.quantities.splice(0, 1, { ...a, adoptedRouteId: second.id });

    expect(upstreamOf(chain.model, a.id).routeIds).toEqual([second.id]);
    expect(evaluateStudy(chain.model).quantities[a.id]?.result?.value).toBe(2);
  });
});

describe('structural errors', () => {
  it.each<[string, (chain: ChainBuilder) => void, string]>([
    [
      'a quantity at no operating point',
      (chain) => chain.model.quantities.push({ ...chain.quantity('a'), id: chain.id(), operatingPointId: nowhere }),
      'stands at an operating point that is not in the study',
    ],
    [
      'an adopted route of another quantity',
      (chain) => {
        const a = chain.stated('a', 1, 0);
        const b = chain.quantity('b');
        b.adoptedRouteId = a.inputId.replace('route:', '');
      },
      'leads to another quantity',
    ],
    [
      'a link from a quantity that is gone',
      (chain) => {
        chain.route('balance', chain.quantity('y'), {
          expression: '2 * x',
          bindings: { x: { from: 'quantity', quantityId: nowhere } },
        });
      },
      'takes its value from something that is not in the study',
    ],
    [
      'a balance that cannot be read',
      (chain) => {
        chain.route('balance', chain.quantity('y'), { expression: '2 *', bindings: {} });
      },
      'cannot be read',
    ],
    [
      'a test that is gone',
      (chain) => {
        chain.route('test-result', chain.quantity('h', 'W/(m² K)'), { testId: nowhere });
      },
      'names a test that is not in the study',
    ],
    [
      'a method that the library does not hold',
      (chain) => {
        chain.route('correlation', chain.quantity('k', 'm/s'), { methodId: 'no-such-method' });
      },
      'which the library does not hold',
    ],
    [
      'a temperature below absolute zero',
      (chain) => {
        chain.point('Rig', { T: -5 });
      },
      'a temperature lies above absolute zero',
    ],
    [
      'a negative length',
      (chain) => {
        chain.point('Rig', { L: -0.02 });
      },
      'the characteristic length is above zero',
    ],
    [
      'an id that is used twice',
      (chain) => {
        chain.model.quantities.push(chain.quantity('a'));
      },
      'is used twice',
    ],
  ])('name %s', (_, spoil, words) => {
    const chain = new ChainBuilder();

    spoil(chain);

    expect(sentencesOf(chain)).toContain(words);
  });

  it('refuse a balance whose result does not fit the unit of its quantity', () => {
    const chain = new ChainBuilder();
    const length = chain.stated('x', 2, 0, 'm');
    chain.balance('y', '2 * x', [length], 's');

    expect(sentencesOf(chain)).toContain('“y” is in s');
  });

  it('leave alone what is only unfinished', () => {
    const chain = new ChainBuilder();
    chain.route('balance', chain.quantity('y'), { expression: 'a * b', bindings: { a: null } });
    chain.route('heat-analogue', chain.quantity('k', 'm/s'));
    chain.route('test-result', chain.quantity('h', 'W/(m² K)'));

    expect(checkModel(chain.model)).toEqual([]);
  });
});
