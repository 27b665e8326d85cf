import { defineMethod } from '../method.ts';

/** Heat transfer in turbulent flow with a marked change of viscosity towards the wall. */
export const siederTateTurbulent = defineMethod({
  id: 'sieder-tate-turbulent',
  version: 1,
  kind: 'correlation',
  title: 'Sieder-Tate, turbulent tube',
  summary: 'Heat transfer in turbulent flow with a marked change of viscosity towards the wall.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.027 * Re^0.8 * Pr^(1/3) * mu_ratio^0.14',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    mu_ratio: { meaning: 'viscosity in the bulk over viscosity at the wall', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature; wall viscosity at the wall temperature',
  window: [
    { group: 'Re', min: 10000, max: null, basis: 'sourced' },
    { group: 'Pr', min: 0.7, max: 16700, basis: 'sourced' },
    { group: 'mu_ratio', min: 0.0044, max: 9.75, basis: 'sourced' },
    { group: 'L/d', min: 10, max: null, basis: 'indicative' },
  ],
  scatter: {
    relative: 0.12,
    reading: '±20 to 25 % quoted, read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Mass form with Sc in place of Pr and the viscosity ratio at 1.',
  source: 'Sieder E.N., Tate G.E., Ind. Eng. Chem. 28 (1936) 1429-1435',
  year: 1936,
  status: 'library-checked',
  pitfalls: [
    'The ratio is bulk over wall, above 1 for a liquid that is heated.',
    'The viscosity factor has no counterpart in mass transfer.',
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
      given: { Re: 150000, Pr: 1.23, mu_ratio: 4.68 },
      gives: 496.63755974,
      relativeTolerance: 1e-6,
    },
  ],
});
