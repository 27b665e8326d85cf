import { defineMethod } from '../method.ts';

/** Mass transfer from the wall of a smooth tube to a liquid in turbulent flow. */
export const lintonSherwood = defineMethod({
  id: 'linton-sherwood',
  version: 1,
  kind: 'correlation',
  title: 'Linton-Sherwood, dissolving tube wall',
  summary: 'Mass transfer from the wall of a smooth tube to a liquid in turbulent flow.',
  family: ['tube'],
  transport: 'mass',
  gives: 'Sh',
  expression: '0.023 * Re^0.83 * Sc^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 2000, max: 70000, basis: 'sourced' },
    { group: 'Sc', min: 1000, max: 2260, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: '±10 to 20 % quoted; ±20 % read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'j_D = 0.023 Re^-0.17; measured at high Sc only, so not a heat form.',
  source: 'Linton W.H., Sherwood T.K., Chem. Eng. Progress 46 (1950) 258-264',
  year: 1950,
  status: 'from memory',
  pitfalls: ['The exponent is 0.83, not 0.8.', 'Below Re 10 000 transition and entrance effects appear.'],
  assumptions: [
    {
      key: 'developed',
      statement: 'The flow is developed: the tube is long against its diameter.',
      ifItFails: 'Use an entrance form; the coefficient is higher near the inlet.',
      checkGroups: ['L/d'],
    },
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
      given: { Re: 2640, Sc: 1250 },
      gives: 171.380905449,
      relativeTolerance: 1e-6,
    },
  ],
});
