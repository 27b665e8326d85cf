import { defineMethod } from '../method.ts';

/** Heat transfer through a smooth tube from the transition region on. */
export const gnielinski = defineMethod({
  id: 'gnielinski',
  version: 1,
  kind: 'correlation',
  title: 'Gnielinski, transition and turbulent tube',
  summary: 'Heat transfer through a smooth tube from the transition region on.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression:
    '((0.790*log(Re) - 1.64)^(-2)/8) * (Re - 1000) * Pr / (1 + 12.7 * sqrt((0.790*log(Re) - 1.64)^(-2)/8) * (Pr^(2/3) - 1))',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner (hydraulic) diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 3000, max: 5000000, basis: 'sourced' },
    { group: 'Pr', min: 0.5, max: 2000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.05,
    reading: '±10 % quoted, read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'Mass form with Sc up to 2000.',
  source: 'Gnielinski V., Int. Chem. Eng. 16 (1976) 359-368',
  year: 1976,
  status: 'library-checked',
  pitfalls: ['The friction factor inside is the Darcy factor.', 'Re − 1000 stands in the numerator only.'],
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
      given: { Re: 1010000, Pr: 1.16 },
      gives: 1616.76469324,
      relativeTolerance: 1e-6,
    },
  ],
});
