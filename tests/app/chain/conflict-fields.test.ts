import { expect, it } from 'vitest';
import type { OperatingPoint, PointEntry } from '../../../shared/engine/model/study-model.ts';
import type { Conflict } from '../../../src/chain/editing/chain-document.ts';
import { conflictFields, fieldWords, mergeConflict, valueWords } from '../../../src/chain/editing/conflict-fields.ts';

function entry(key: PointEntry['key'], text: string, value: number): PointEntry {
  return {
    key,
    source: {
      from: 'entered',
      value: { text, value, unit: 'm', uncertaintyText: '2 %', uncertainty: { form: 'relative', fraction: 0.02 } },
    },
  };
}

const point: OperatingPoint = {
  id: '00000000-0000-4000-8000-000000000001',
  name: 'Guard bed',
  scale: 'plant',
  geometry: { family: 'packed bed', description: '', ratios: [{ name: 'bed/d', value: 180 }] },
  fluid: 'gas',
  entries: [entry('L', '5 mm', 0.005), entry('u', '0.32 m/s', 0.32)],
};
const conflict = {
  kind: 'operating-point',
  id: point.id,
  yours: { ...point, entries: [entry('L', '5 mm', 0.005), entry('u', '0.30 m/s', 0.3)] },
  theirs: {
    ...point,
    geometry: { ...point.geometry, family: 'tube' },
    entries: [entry('u', '0.35 m/s', 0.35), entry('D', '4e-6 m2/s', 4e-6)],
  },
} as unknown as Conflict;

it('names what differs entry by entry, in the words of the panel', () => {
  const fields = conflictFields(conflict);

  expect(fields.map(({ field }) => fieldWords(field)).sort()).toEqual([
    'D, diffusion coefficient',
    'L, characteristic length',
    'family',
    'u, velocity',
  ]);
  const velocity = fields.find(({ field }) => field === 'entries/u');
  expect(valueWords(velocity?.yours)).toBe('0.30 m/s, uncertainty 2 %');
  expect(valueWords(velocity?.theirs)).toBe('0.35 m/s, uncertainty 2 %');
});

it('makes one point out of both, each entry from the side that was chosen', () => {
  const merged = mergeConflict(conflict, {
    'entries/u': 'yours',
    'entries/D': 'theirs',
    'entries/L': 'yours',
    'geometry/family': 'theirs',
  }) as OperatingPoint;

  const texts = Object.fromEntries(
    merged.entries.map((one) => [one.key, one.source.from === 'entered' ? one.source.value.text : '']),
  );
  expect(texts).toEqual({ u: '0.30 m/s', D: '4e-6 m2/s', L: '5 mm' });
  expect(merged.geometry).toEqual({ ...point.geometry, family: 'tube' });
});

it('takes out what you took out, when that is chosen', () => {
  const merged = mergeConflict(conflict, { 'entries/D': 'yours' }) as OperatingPoint;

  expect(merged.entries.map((one) => one.key)).not.toContain('D');
});
