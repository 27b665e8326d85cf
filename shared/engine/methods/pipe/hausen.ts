import { defineMethod } from '../method.ts';

/** Mean heat transfer over a laminar tube of any length, uniform wall temperature. */
export const hausen = defineMethod({
  id: 'hausen',
  version: 1,
  kind: 'correlation',
  title: 'Hausen, laminar thermal entrance',
  summary: 'Mean heat transfer over a laminar tube of any length, uniform wall temperature.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '3.66 + 0.0668 * (Re * Pr / L_over_D) / (1 + 0.04 * (Re * Pr / L_over_D)^(2/3))',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    L_over_D: { meaning: 'length over inner diameter', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter; heated length',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: null, max: 2200, basis: 'sourced' }],
  scatter: {
    relative: 0.07,
    reading: '±10 to 15 %, the larger read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Mass form with Sc.',
  source: 'Hausen H., Z. VDI Beiheft Verfahrenstechnik 4 (1943) 91-98',
  year: 1943,
  status: 'library-checked',
  pitfalls: ['Another formula of 1959 has the same name.', 'To be used with the logarithmic mean difference.'],
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
      given: { Re: 1560, Pr: 2.07, L_over_D: 24.6 },
      gives: 7.97285907894,
      relativeTolerance: 1e-6,
    },
  ],
});
