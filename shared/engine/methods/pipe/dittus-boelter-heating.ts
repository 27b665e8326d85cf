import { defineMethod } from '../method.ts';

/** Heat transfer to a fluid that is heated in turbulent flow through a smooth tube. */
export const dittusBoelterHeating = defineMethod({
  id: 'dittus-boelter-heating',
  version: 1,
  kind: 'correlation',
  title: 'Dittus-Boelter, fluid heated',
  summary: 'Heat transfer to a fluid that is heated in turbulent flow through a smooth tube.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.023 * Re^0.8 * Pr^0.4',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner (hydraulic) diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 10000, max: 120000, basis: 'sourced' },
    { group: 'Pr', min: 0.7, max: 120, basis: 'sourced' },
    { group: 'L/d', min: 10, max: null, basis: 'indicative' },
  ],
  scatter: {
    relative: 0.125,
    reading: '±25 % quoted, read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Not with its own exponent: carry j_H over and use the exponent of the analogy.',
  source:
    'McAdams W.H., Heat Transmission, 2nd ed., 1942, after Dittus F.W., Boelter L.M.K., Univ. Calif. Publ. Eng. 2 (1930) 443-461',
  year: 1942,
  status: 'library-checked',
  pitfalls: [
    'The exponent 0.4 is for a fluid that is heated, 0.3 for one that is cooled.',
    'The paper of 1930 prints 0.0243 and 0.0265.',
  ],
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
      given: { Re: 69400, Pr: 1.06 },
      gives: 175.767169276,
      relativeTolerance: 1e-6,
    },
  ],
});
