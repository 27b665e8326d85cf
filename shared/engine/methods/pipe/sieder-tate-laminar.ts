import { defineMethod } from '../method.ts';

/** Mean heat transfer over a short laminar tube with a change of viscosity towards the wall. */
export const siederTateLaminar = defineMethod({
  id: 'sieder-tate-laminar',
  version: 1,
  kind: 'correlation',
  title: 'Sieder-Tate, laminar tube',
  summary: 'Mean heat transfer over a short laminar tube with a change of viscosity towards the wall.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '1.86 * (Re * Pr / L_over_D)^(1/3) * mu_ratio^0.14',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    L_over_D: { meaning: 'length over inner diameter', unit: '1' },
    mu_ratio: { meaning: 'viscosity in the bulk over viscosity at the wall', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter; heated length',
  temperature: 'arithmetic mean of inlet and outlet; wall viscosity at the wall',
  window: [
    { group: 'Re', min: null, max: 2100, basis: 'sourced' },
    { group: 'Pr', min: 0.48, max: 16700, basis: 'sourced' },
    { group: 'mu_ratio', min: 0.0044, max: 9.75, basis: 'sourced' },
    {
      group: '(Re Pr d/L)^1/3 (mu/mu_w)^0.14',
      min: 2,
      max: null,
      basis: 'sourced',
      expression: '(Re * Pr / L_over_D)^(1/3) * mu_ratio^0.14',
    },
  ],
  scatter: {
    relative: 0.12,
    reading: '±25 % in general use, read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Mass form with Sc and the viscosity ratio at 1.',
  source: 'Sieder E.N., Tate G.E., Ind. Eng. Chem. 28 (1936) 1429-1435',
  year: 1936,
  status: 'library-checked',
  pitfalls: ['Correlated with the arithmetic mean temperature difference.', 'Below its limit use 3.66.'],
  assumptions: [
    {
      key: 'developed-velocity',
      statement: 'The velocity profile is developed before the heated length begins.',
      ifItFails: 'The coefficient is higher; use a form for simultaneous development.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 237, Pr: 14, L_over_D: 57.3, mu_ratio: 3.95 },
      gives: 8.72188703655,
      relativeTolerance: 1e-6,
    },
  ],
});
