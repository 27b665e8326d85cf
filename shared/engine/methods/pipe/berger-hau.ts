import { defineMethod } from '../method.ts';

/** Mass transfer from the wall of a smooth tube in developed turbulent flow, from electrochemical data. */
export const bergerHau = defineMethod({
  id: 'berger-hau',
  version: 1,
  kind: 'correlation',
  title: 'Berger-Hau, smooth tube wall',
  summary: 'Mass transfer from the wall of a smooth tube in developed turbulent flow, from electrochemical data.',
  family: ['tube'],
  transport: 'mass',
  gives: 'Sh',
  expression: '0.0165 * Re^0.86 * Sc^0.33',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 8000, max: 200000, basis: 'sourced' },
    { group: 'Sc', min: 1000, max: 6000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.05,
    reading: 'about ±7 to 10 % quoted, the larger read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'Its range of Sc excludes use for heat.',
  source: 'Berger F.P., Hau K.-F.F.-L., Int. J. Heat Mass Transfer 20 (1977) 1185-1194',
  year: 1977,
  status: 'from memory',
  pitfalls: ['The exponent is printed as 0.33; 1/3 would give 2.3 to 2.9 % more.'],
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
      given: { Re: 8890, Sc: 4830 },
      gives: 674.90401505,
      relativeTolerance: 1e-6,
    },
  ],
});
