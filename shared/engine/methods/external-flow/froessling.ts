import { defineMethod } from '../method.ts';

/** Mean mass transfer of a single evaporating drop or sphere. */
export const froessling = defineMethod({
  id: 'froessling',
  version: 1,
  kind: 'correlation',
  title: 'Frössling, sphere',
  summary: 'Mean mass transfer of a single evaporating drop or sphere.',
  family: ['sphere'],
  transport: 'mass',
  gives: 'Sh',
  expression: '2 * (1 + 0.276 * Re^(1/2) * Sc^(1/3))',
  variables: {
    Re: { meaning: 'Reynolds number on the diameter, slip velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the diameter', unit: '1' },
  length: 'sphere diameter',
  temperature: 'film temperature, mean film composition',
  window: [
    { group: 'Re', min: 2, max: 800, basis: 'sourced' },
    { group: 'Sc', min: 0.6, max: 2.7, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.12,
    reading: '±20 to 30 % in general use; ±25 % read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Heat with Pr in place of Sc.',
  source: 'Frössling N., Gerlands Beiträge zur Geophysik 52 (1938) 170-216',
  year: 1938,
  status: 'from memory',
  pitfalls: ['0.276 stands inside the bracket behind the 2; written out it is 0.552.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 2.51, Sc: 0.626 },
      gives: 2.74811331232,
      relativeTolerance: 1e-6,
    },
  ],
});
