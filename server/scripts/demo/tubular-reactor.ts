import { randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { saveLayout } from '../../../shared/api/studies.ts';
import {
  openSubmission,
  returnSubmission,
  ruleOnAssumption,
  type Submission,
  signatureMeanings,
  signSubmission,
} from '../../../shared/api/submissions.ts';
import { addTest } from '../../../shared/api/tests.ts';
import type { OperatingPoint, Route } from '../../../shared/engine/model/study-model.ts';
import { openStudy, type Worker } from './demo-session.ts';
import { entry, put, quantity, routeFor, statedValue, typed } from './items.ts';
import { demoPassword } from './people.ts';

type People = { readonly engineer: Worker; readonly manager: Worker };

/** Accepts every assumption of an open submission, with a comment on those that a check did not settle. */
async function acceptAll(manager: Worker, submission: Submission): Promise<void> {
  for (const routeId of submission.snapshot.routeIds) {
    const route = submission.snapshot.model.routes.find((one) => one.id === routeId);
    for (const assumption of submission.snapshot.evaluation.routes[routeId]?.assumptions ?? []) {
      const isDiffusivity = assumption.key === 'diffusivity';
      const comment = route?.justifications[assumption.key] ? 'The justification is convincing.' : '';
      await manager.does(ruleOnAssumption, {
        params: { submissionId: submission.id },
        body: {
          routeId,
          assumptionKey: assumption.key,
          ruling: isDiffusivity
            ? {
                ruling: 'accepted on condition',
                comment: 'The estimate carries the budget.',
                condition: { text: 'Measure the diffusivity in the process liquid at 60 °C', dueOn: '2027-02-26' },
              }
            : { ruling: 'accepted', comment, condition: null },
        },
      });
    }
  }
}

/** From a heated-wall rig to the coated length of a tubular reactor: signed once, then opened again and returned. */
export async function makeTubularReactor(people: People, memberIds: Parameters<typeof openStudy>[2]): Promise<void> {
  const { engineer, manager } = people;
  const studyId = await openStudy(
    engineer,
    {
      title: 'Scavenger tube, wall mass transfer',
      question:
        'How long must the coated section of the 40 mm scavenger tube be, so that one pass removes 20 % of the trace poison?',
    },
    memberIds,
  );

  const bench: OperatingPoint = {
    id: randomUUID(),
    name: 'Heated-wall rig, run 7',
    scale: 'bench',
    geometry: {
      family: 'tube',
      description: 'Drawn steel tube, electrically heated over 1.20 m behind an unheated inlet run of 0.80 m.',
      ratios: [
        { name: 'inlet run/d', value: 40 },
        { name: 'roughness/d', value: 0.0001 },
      ],
    },
    fluid: 'water at 35 °C',
    entries: [
      entry('L', '20.00 mm', '0.05 mm'),
      entry('T', '35.0 °C', '0.1 °C'),
      entry('rho', '994.0 kg/m3', '0.1 %'),
      entry('mu', '0.719 mPa s', '1 %'),
      entry('cp', '4178 J/(kg K)', '0.2 %'),
      entry('lambda', '0.6205 W/(m K)', '1 %'),
      entry('beta', '3.5e-4 1/K', '3 %'),
      entry('dT', '6.0 K', '0.2 K'),
    ],
  };
  const plant: OperatingPoint = {
    id: randomUUID(),
    name: 'Scavenger tube, design rate',
    scale: 'plant',
    geometry: {
      family: 'tube',
      description: 'Drawn tube DN 40, coated inside, behind a straight run of 1.6 m.',
      ratios: [
        { name: 'inlet run/d', value: 40 },
        { name: 'roughness/d', value: 0.0001 },
      ],
    },
    fluid: 'process liquid at 60 °C',
    entries: [
      entry('L', '40.0 mm', '0.1 mm'),
      entry('u', '0.460 m/s', '1.5 %'),
      entry('T', '60 °C', '1 °C'),
      entry('nu', '6.8e-7 m2/s', '2 %'),
      entry('D', '6.5e-10 m2/s', '7 %'),
    ],
  };
  await engineer.edits(studyId, 'Added the operating points of the rig and of the plant', [
    put('operating-point', bench),
    put('operating-point', plant),
  ]);

  const { test } = await engineer.does(addTest, {
    params: { studyId },
    file: {
      name: 'heated-wall-run-7.csv',
      content: readFileSync(join(import.meta.dirname, 'heated-wall-run-7.csv'), 'utf8'),
    },
    body: {
      id: randomUUID(),
      name: 'Heated-wall run 7',
      operatingPointId: bench.id,
      performedOn: '2026-10-14',
      mapping: {
        delimiter: ',',
        decimal: '.',
        headerRows: 1,
        time: { column: 0, unit: 's' },
        power: { column: 1, unit: 'W' },
        wallTemperature: { column: 2, unit: '°C' },
        bulkTemperature: { column: 3, unit: '°C' },
        flow: { column: 4, unit: 'L/min' },
      },
      reduction: {
        kind: 'steady-heating',
        instruments: {
          power: { form: 'relative', fraction: 0.004 },
          wallTemperature: { form: 'standard', u: 0.1 },
          bulkTemperature: { form: 'standard', u: 0.08 },
          flow: { form: 'relative', fraction: 0.01 },
        },
        flowIs: 'volume flow in a tube',
        heatLoss: typed('26 W', '8 W'),
        surface: { shape: 'cylinder', length: typed('1.200 m', '2 mm') },
      },
    },
  });
  await engineer.edits(studyId, 'Took the velocity at the rig from run 7', [
    put(
      'operating-point',
      { ...bench, entries: [...bench.entries, { key: 'u', source: { from: 'test', testId: test.id } }] },
      1,
    ),
  ]);

  const heat = quantity({
    symbol: 'h_rig',
    name: 'Wall heat-transfer coefficient',
    unit: 'W/(m2 K)',
    operatingPointId: bench.id,
  });
  const mass = quantity({
    symbol: 'k_w',
    name: 'Wall mass-transfer coefficient',
    unit: 'm/s',
    operatingPointId: plant.id,
    unsafeSide: 'high',
  });
  const inlet = quantity({ symbol: 'c_in', name: 'Poison at the inlet', unit: 'mol/m3', operatingPointId: plant.id });
  const outlet = quantity({
    symbol: 'c_out',
    name: 'Poison at the outlet',
    unit: 'mol/m3',
    operatingPointId: plant.id,
  });
  const length = quantity({
    symbol: 'L_c',
    name: 'Coated length for one pass',
    unit: 'm',
    operatingPointId: plant.id,
    limit: { side: 'at most', value: 90, text: '90 m' },
    note: 'The pipe rack has room for 90 m.',
  });
  const measured: Route = {
    ...routeFor(heat, 'Run 7, steady heating', 'Forty steady readings over twenty minutes.'),
    kind: 'test-result',
    testId: test.id,
  };
  const analogue: Route = {
    ...routeFor(
      mass,
      'Heat analogue of run 7',
      'Same shape, same roughness and inlet run; Re of the rig set as close to the plant as the pump allowed.',
      {
        reynolds:
          'The pump of the rig ends at 17 L/min. The difference of 8 % is corrected with the exponent 0.83 ± 0.03, measured on the same rig in runs 3 to 9.',
        'free-convection':
          'At the plant the density difference of the poison is below 0.01 %, so Gr/Re² stays below 0.001.',
      },
    ),
    kind: 'heat-analogue',
    sourceQuantityId: heat.id,
    reynoldsExponent: { value: 0.83, u: 0.03 },
    schmidtExponent: { value: 1 / 3, u: 0.01 },
    scatter: 0.08,
    extrapolationAllowance: null,
  };
  const correlation: Route = {
    ...routeFor(mass, 'Linton-Sherwood', 'Published data on dissolving tubes, as a second opinion.', {
      Sc: 'Sc lies at the lower end of the tested range; the exponent 1/3 holds well below it.',
    }),
    kind: 'correlation',
    methodId: 'linton-sherwood',
    bindings: {},
    scatter: null,
    ownScatter: false,
    extrapolationAllowance: null,
  };
  const balance: Route = {
    ...routeFor(
      length,
      'Plug flow with wall transfer',
      'Wall concentration zero: the coating takes up everything that arrives.',
    ),
    kind: 'balance',
    expression: 'd * u / (4 * k) * log(c_in / c_out)',
    bindings: {
      d: { from: 'point', operatingPointId: plant.id, key: 'L' },
      u: { from: 'point', operatingPointId: plant.id, key: 'u' },
      k: { from: 'quantity', quantityId: mass.id },
      c_in: { from: 'quantity', quantityId: inlet.id },
      c_out: { from: 'quantity', quantityId: outlet.id },
    },
  };
  const inletValue = statedValue(inlet, typed('12.0 mol/m3', '1 %'), 'Feed specification FS-118, mean of 2026.');
  const outletValue = statedValue(
    outlet,
    typed('9.6 mol/m3', '0.5 %'),
    'Required by the catalyst supplier, letter of 3 September 2026.',
  );
  await engineer.edits(studyId, 'Added the wall heat-transfer coefficient from run 7', [
    put('quantity', heat),
    put('route', measured),
  ]);
  await engineer.edits(studyId, 'Added the wall mass-transfer coefficient with two routes', [
    put('quantity', mass),
    put('route', analogue),
    put('route', correlation),
  ]);
  await engineer.edits(studyId, 'Adopted the heat analogue for k_w', [
    put('quantity', { ...mass, adoptedRouteId: analogue.id }, 1),
  ]);
  await engineer.edits(studyId, 'Added the coated length and what it follows from', [
    put('quantity', inlet),
    put('route', inletValue),
    put('quantity', outlet),
    put('route', outletValue),
    put('quantity', length),
    put('route', balance),
  ]);
  await engineer.does(saveLayout, {
    params: { studyId },
    body: {
      layout: {
        [heat.id]: { x: 190, y: 130 },
        [mass.id]: { x: 1090, y: 90 },
        [inlet.id]: { x: 1090, y: 330 },
        [outlet.id]: { x: 1090, y: 530 },
        [length.id]: { x: 1450, y: 250 },
      },
    },
  });

  const submit = async (note: string) =>
    engineer.does(openSubmission, {
      params: { studyId },
      body: { targetQuantityId: length.id, revision: (await engineer.sees(studyId)).revision, note },
    });
  const first = await submit('For the layout of the pipe rack.');
  await acceptAll(manager, first);
  await manager.does(signSubmission, {
    params: { submissionId: first.id },
    body: { password: demoPassword, meaning: signatureMeanings[0], snapshotHash: first.snapshotHash },
  });

  // The plant asks for a higher rate: what rests on it must be reviewed again.
  const faster: OperatingPoint = {
    ...plant,
    name: 'Scavenger tube, raised rate',
    entries: plant.entries.map((one) => (one.key === 'u' ? entry('u', '0.520 m/s', '1.5 %') : one)),
  };
  await engineer.edits(studyId, 'Raised the velocity at the plant from 0.460 to 0.520 m/s', [
    put('operating-point', faster, 1),
  ]);
  await engineer.edits(
    studyId,
    'Wrote why the larger difference in Re is acceptable',
    [
      put(
        'route',
        {
          ...analogue,
          justifications: {
            ...analogue.justifications,
            reynolds: 'The rig cannot go faster. The difference of 22 % is corrected with the exponent 0.83 ± 0.03.',
          },
        },
        1,
      ),
    ],
    'The plant velocity was raised, so the difference in Re grew.',
  );
  const second = await submit('Design rate raised by 13 %.');
  await manager.does(returnSubmission, {
    params: { submissionId: second.id },
    body: {
      comments:
        'The difference in Re is now 22 %. Please repeat the run with the larger pump, or add an extrapolation allowance, before I rule on it.',
    },
  });
}
