import { randomUUID } from 'node:crypto';
import { saveLayout } from '../../../shared/api/studies.ts';
import type { OperatingPoint, Route } from '../../../shared/engine/model/study-model.ts';
import { openStudy, type Worker } from './demo-session.ts';
import { entry, put, quantity, routeFor, statedValue, typed } from './items.ts';

/** External mass transfer in a bed of pellets by correlation, still in draft with a route that lacks its link. */
export async function makePelletBed(engineer: Worker, memberIds: Parameters<typeof openStudy>[2]): Promise<void> {
  const studyId = await openStudy(
    engineer,
    {
      title: 'Guard bed, external film',
      question: 'Does the film round the pellets limit the guard bed at turndown, and how deep must the bed be?',
    },
    memberIds,
  );
  const plant: OperatingPoint = {
    id: randomUUID(),
    name: 'Guard bed at turndown',
    scale: 'plant',
    geometry: {
      family: 'packed bed',
      description: 'Spheres of 5 mm, voidage 0.40, dumped.',
      ratios: [{ name: 'bed/d', value: 180 }],
    },
    fluid: 'hydrogen-rich gas at 18 bar, 320 °C',
    entries: [
      entry('L', '5.0 mm', '2 %'),
      entry('u', '0.32 m/s', '3 %'),
      entry('nu', '4.1e-6 m2/s', '3 %'),
      entry('D', '4.6e-6 m2/s', '10 %'),
    ],
  };
  const film = quantity({
    symbol: 'k_g',
    name: 'Film coefficient of the pellets',
    unit: 'm/s',
    operatingPointId: plant.id,
  });
  const area = quantity({ symbol: 'a_p', name: 'Pellet area per bed volume', unit: '1/m', operatingPointId: plant.id });
  const ratio = quantity({
    symbol: 'y_r',
    name: 'Wanted ratio of inlet to outlet',
    unit: '1',
    operatingPointId: plant.id,
  });
  const depth = quantity({
    symbol: 'H',
    name: 'Bed depth',
    unit: 'm',
    operatingPointId: plant.id,
    limit: { side: 'at most', value: 0.9, text: '0.9 m' },
  });
  const byWakao: Route = {
    ...routeFor(film, 'Wakao-Funazkri', 'Covers gases at this Re.'),
    kind: 'correlation',
    methodId: 'wakao-funazkri',
    bindings: {},
    scatter: null,
    ownScatter: false,
    extrapolationAllowance: null,
  };
  const byDepth: Route = {
    ...routeFor(depth, 'Plug flow through the bed'),
    kind: 'balance',
    expression: 'u / (k * a) * log(r)',
    bindings: {
      u: { from: 'point', operatingPointId: plant.id, key: 'u' },
      k: { from: 'quantity', quantityId: film.id },
      a: { from: 'quantity', quantityId: area.id },
      r: null,
    },
  };
  await engineer.edits(studyId, 'Added the guard bed with its film coefficient', [
    put('operating-point', plant),
    put('quantity', film),
    put('route', byWakao),
  ]);
  await engineer.edits(studyId, 'Added the bed depth; the wanted ratio is not linked yet', [
    put('quantity', area),
    put('route', statedValue(area, typed('720 1/m', '4 %'), '6 (1 − voidage)/d with voidage 0.40 ± 0.02.')),
    put('quantity', ratio),
    put('route', statedValue(ratio, typed('200'), 'Guard specification GS-07.')),
    put('quantity', depth),
    put('route', byDepth),
  ]);
  await engineer.does(saveLayout, {
    params: { studyId },
    body: {
      layout: {
        [film.id]: { x: 1090, y: 90 },
        [area.id]: { x: 1090, y: 290 },
        [ratio.id]: { x: 1090, y: 490 },
        [depth.id]: { x: 1450, y: 250 },
      },
    },
  });
}
