import { defineMethod } from '../method.ts';

/** Heat transfer in developed turbulent flow through a smooth tube over a wide range of Pr. */
export const petukhov = defineMethod({
  id: 'petukhov',
  version: 1,
  kind: 'correlation',
  title: 'Petukhov, turbulent tube',
  summary: 'Heat transfer in developed turbulent flow through a smooth tube over a wide range of Pr.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression:
    '((0.790*log(Re) - 1.64)^(-2)/8) * Re * Pr / (1.07 + 12.7 * sqrt((0.790*log(Re) - 1.64)^(-2)/8) * (Pr^(2/3) - 1))',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 10000, max: 5000000, basis: 'sourced' },
    { group: 'Pr', min: 0.5, max: 2000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.05,
    reading: '±6 % up to Pr 200 and ±10 % up to 2000 quoted, the larger read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'Mass form with Sc up to 2000.',
  source: 'Petukhov B.S., Adv. Heat Transfer 6 (1970) 503-564',
  year: 1970,
  status: 'from memory',
  pitfalls: [
    'The friction factor inside is the Darcy factor, four times the Fanning factor.',
    'Variants of the bracket (1.07 against 1 + 3.4 f) differ by up to 7 %.',
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
      given: { Re: 96600, Pr: 0.883 },
      gives: 189.111687439,
      relativeTolerance: 1e-6,
    },
  ],
});
