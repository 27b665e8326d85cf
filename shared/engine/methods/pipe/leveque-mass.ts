import { defineMethod } from '../method.ts';

/** Mean mass transfer from the wall of a tube over a short length in laminar flow. */
export const levequeMass = defineMethod({
  id: 'leveque-mass',
  version: 1,
  kind: 'correlation',
  title: 'Lévêque, laminar tube, mass',
  summary: 'Mean mass transfer from the wall of a tube over a short length in laminar flow.',
  family: ['tube'],
  transport: 'mass',
  gives: 'Sh',
  expression: '1.62 * (Re * Sc / L_over_d)^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
    L_over_d: { meaning: 'mass-transfer length over inner diameter', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the inner diameter', unit: '1' },
  length: 'inner diameter; length of the transferring wall',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: null, max: 2000, basis: 'sourced' },
    { group: 'Re Sc d/L', min: 100, max: null, basis: 'indicative', expression: 'Re * Sc / L_over_d' },
  ],
  scatter: {
    relative: 0.05,
    reading: '±10 % of electrochemical data, read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'The same with Pr for heat.',
  source: 'Lévêque M.A., Annales des Mines 13 (1928) 201-299, 305-362, 381-415',
  year: 1928,
  status: 'analytic',
  pitfalls: ['To be used with the logarithmic mean driving force.', 'The velocity profile must be developed.'],
  assumptions: [
    {
      key: 'developed-velocity',
      statement: 'The velocity profile is developed before the transferring wall begins.',
      ifItFails: 'The coefficient is higher; use a form for simultaneous development.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 18.5, Sc: 2300, L_over_d: 348 },
      gives: 8.04059994678,
      relativeTolerance: 1e-6,
    },
  ],
});
