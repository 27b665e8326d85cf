import { defineMethod } from '../method.ts';

/** Mean heat transfer over the thermal entrance of a laminar tube. */
export const levequeHeat = defineMethod({
  id: 'leveque-heat',
  version: 1,
  kind: 'correlation',
  title: 'Lévêque, laminar tube, heat',
  summary: 'Mean heat transfer over the thermal entrance of a laminar tube.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression: '1.615 * (Re * Pr / L_over_D)^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    L_over_D: { meaning: 'length over inner diameter', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter; heated length',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: null, max: 2000, basis: 'sourced' },
    { group: 'Re Pr d/L', min: 100, max: null, basis: 'indicative', expression: 'Re * Pr / L_over_D' },
  ],
  scatter: {
    relative: 0.03,
    reading: 'asymptote, up to 5.6 % above the exact solution; read as two standard deviations',
    from: 'computed against the exact solution',
  },
  carriesTo: 'The same with Sc for mass.',
  source: 'Lévêque M.A., Annales des Mines 13 (1928) 201-299, 305-362, 381-415',
  year: 1928,
  status: 'analytic',
  pitfalls: ['Mean value 1.615, local 1.077.', 'Gives nothing for long tubes: there the limit is 3.66.'],
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
      given: { Re: 118, Pr: 6.73, L_over_D: 7.86 },
      gives: 7.52195449595,
      relativeTolerance: 1e-6,
    },
  ],
});
