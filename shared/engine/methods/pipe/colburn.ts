import { defineMethod } from '../method.ts';

/** Heat transfer in turbulent flow through a smooth tube, with the exponent 1/3 of the analogy. */
export const colburn = defineMethod({
  id: 'colburn',
  version: 1,
  kind: 'correlation',
  title: 'Colburn, turbulent tube',
  summary: 'Heat transfer in turbulent flow through a smooth tube, with the exponent 1/3 of the analogy.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.023 * Re^0.8 * Pr^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: 10000, max: null, basis: 'sourced' },
    { group: 'Pr', min: 0.7, max: 160, basis: 'sourced' },
    { group: 'L/d', min: 60, max: null, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.125,
    reading: '±25 % quoted, read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Mass form with Sc in place of Pr: this is the root of j_H = j_D.',
  source: 'Colburn A.P., Trans. AIChE 29 (1933) 174-210',
  year: 1933,
  status: 'library-checked',
  pitfalls: ['Film temperature, unlike Dittus-Boelter.', '0.023 Re^-0.2 equals f/2 only with f = 0.046 Re^-0.2.'],
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
      given: { Re: 542000, Pr: 1.33 },
      gives: 977.712450291,
      relativeTolerance: 1e-6,
    },
  ],
});
