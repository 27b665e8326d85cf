import { defineMethod } from '../method.ts';

/** Fanning friction factor of a rough or smooth tube, explicit. */
export const haaland = defineMethod({
  id: 'haaland',
  version: 1,
  kind: 'correlation',
  title: 'Haaland, rough tube',
  summary: 'Fanning friction factor of a rough or smooth tube, explicit.',
  family: ['tube'],
  transport: 'momentum',
  gives: 'f',
  expression: '(-1.8 * log10((eD/3.7)^1.11 + 6.9/Re))^(-2) / 4',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    eD: { meaning: 'roughness over inner diameter', unit: '1' },
  },
  result: { symbol: 'f', meaning: 'Fanning friction factor', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 4000, max: 100000000, basis: 'sourced' },
    { group: 'eD', min: null, max: 0.05, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.06,
    reading: '±10 to 15 % of data, the larger about two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'j = f/2 on smooth walls only.',
  source: 'Haaland S.E., J. Fluids Eng. 105 (1983) 89-90',
  year: 1983,
  status: 'library-checked',
  pitfalls: ['The bracket gives the Darcy factor.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 372000, eD: 2.03e-6 },
      gives: 0.00345019260678,
      relativeTolerance: 1e-6,
    },
  ],
});
