import { defineMethod } from '../method.ts';

/** Mean heat transfer of a single sphere in a stream. */
export const ranzMarshall = defineMethod({
  id: 'ranz-marshall',
  version: 1,
  kind: 'correlation',
  title: 'Ranz-Marshall, sphere',
  summary: 'Mean heat transfer of a single sphere in a stream.',
  family: ['sphere'],
  transport: 'heat',
  gives: 'Nu',
  expression: '2 + 0.6 * Re^(1/2) * Pr^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the diameter, slip velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the diameter', unit: '1' },
  length: 'sphere diameter',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: 2, max: 200, basis: 'sourced' },
    { group: 'Pr', min: 0.6, max: 2.7, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.12,
    reading: '±20 to 30 % in general use; ±25 % read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'The same constants with Sc for mass.',
  source: 'Ranz W.E., Marshall W.R., Chem. Eng. Progress 48 (1952) 141-146, 173-180',
  year: 1952,
  status: 'from memory',
  pitfalls: [
    'Re takes the slip velocity of the particle, not that of the stirrer or pipe.',
    'For liquids with Sc near 1000 it is an extrapolation.',
  ],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 2.25, Pr: 1.09 },
      gives: 2.92622821991,
      relativeTolerance: 1e-6,
    },
  ],
});
