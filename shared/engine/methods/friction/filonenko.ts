import { defineMethod } from '../method.ts';

/** Fanning friction factor of a smooth tube in turbulent flow. */
export const filonenko = defineMethod({
  id: 'filonenko',
  version: 1,
  kind: 'correlation',
  title: 'Filonenko, smooth tube friction',
  summary: 'Fanning friction factor of a smooth tube in turbulent flow.',
  family: ['tube'],
  transport: 'momentum',
  gives: 'f',
  expression: '(0.790*log(Re) - 1.64)^(-2) / 4',
  variables: { Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' } },
  result: { symbol: 'f', meaning: 'Fanning friction factor', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: 3000, max: 5000000, basis: 'sourced' }],
  scatter: { relative: 0.01, reading: '±2 %, read as two standard deviations', from: 'common practice, no source' },
  carriesTo: 'j = f/2 where there is no form drag.',
  source: 'Filonenko G.K., Teploenergetika 1(4) (1954) 40-44',
  year: 1954,
  status: 'from memory',
  pitfalls: ['The bracket gives the Darcy factor; a quarter of it is the Fanning factor.'],
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
      given: { Re: 6450 },
      gives: 0.00893448900082,
      relativeTolerance: 1e-6,
    },
  ],
});
