import { defineMethod } from '../method.ts';

/** Fanning friction factor of a smooth tube at moderate Re. */
export const blasius = defineMethod({
  id: 'blasius',
  version: 1,
  kind: 'correlation',
  title: 'Blasius, smooth tube friction',
  summary: 'Fanning friction factor of a smooth tube at moderate Re.',
  family: ['tube'],
  transport: 'momentum',
  gives: 'f',
  expression: '0.0791 * Re^(-1/4)',
  variables: { Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' } },
  result: { symbol: 'f', meaning: 'Fanning friction factor', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: 3000, max: 100000, basis: 'sourced' }],
  scatter: {
    relative: 0.02,
    reading: '±2 to 5 %, the larger read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'j = f/2 where there is no form drag.',
  source: 'Blasius H., VDI Forschungsheft 131 (1913)',
  year: 1913,
  status: 'library-checked',
  pitfalls: ['0.0791 is for the Fanning factor; the Darcy factor has 0.3164.'],
  assumptions: [
    {
      key: 'smooth',
      statement: 'The wall is smooth and stays so.',
      ifItFails: 'A rough wall transfers more; measure, or use a relation for rough walls.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 5080 },
      gives: 0.00936937357441,
      relativeTolerance: 1e-6,
    },
  ],
});
