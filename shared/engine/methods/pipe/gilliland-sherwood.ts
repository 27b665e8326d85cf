import { defineMethod } from '../method.ts';

/** Gas-side mass transfer at the wetted wall of a column in turbulent flow. */
export const gillilandSherwood = defineMethod({
  id: 'gilliland-sherwood',
  version: 1,
  kind: 'correlation',
  title: 'Gilliland-Sherwood, wetted wall',
  summary: 'Gas-side mass transfer at the wetted wall of a column in turbulent flow.',
  family: ['tube'],
  transport: 'mass',
  gives: 'Sh',
  expression: '0.023 * Re^0.83 * Sc^0.44 / pBM_over_P',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity of the gas', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
    pBM_over_P: { meaning: 'logarithmic mean partial pressure of the inert gas over total pressure', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the inner diameter', unit: '1' },
  length: 'inner diameter of the column',
  temperature: 'mean gas temperature',
  window: [
    { group: 'Re', min: 2000, max: 35000, basis: 'sourced' },
    { group: 'Sc', min: 0.6, max: 2.5, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: '±10 % quoted against ±20 % of the data; 10 % read as one standard deviation',
    from: 'from memory of the paper',
  },
  carriesTo: 'No heat form with this exponent.',
  source: 'Gilliland E.R., Sherwood T.K., Ind. Eng. Chem. 26 (1934) 516-523',
  year: 1934,
  status: 'from memory',
  pitfalls: ['Leaving out p_BM/P is wrong at high vapour fractions.', 'Not for liquids: the exponent is 0.44.'],
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
      given: { Re: 3070, Sc: 1.33, pBM_over_P: 0.931 },
      gives: 21.9582501712,
      relativeTolerance: 1e-6,
    },
  ],
});
