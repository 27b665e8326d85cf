import { defineMethod } from '../method.ts';

/** Mean heat transfer of a sphere with a change of viscosity towards its surface. */
export const whitakerSphere = defineMethod({
  id: 'whitaker-sphere',
  version: 1,
  kind: 'correlation',
  title: 'Whitaker, sphere',
  summary: 'Mean heat transfer of a sphere with a change of viscosity towards its surface.',
  family: ['sphere'],
  transport: 'heat',
  gives: 'Nu',
  expression: '2 + (0.4 * Re^(1/2) + 0.06 * Re^(2/3)) * Pr^0.4 * mu_ratio^(1/4)',
  variables: {
    Re: { meaning: 'Reynolds number on the diameter, free stream', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    mu_ratio: { meaning: 'viscosity in the stream over viscosity at the surface', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the diameter', unit: '1' },
  length: 'sphere diameter',
  temperature: 'free stream; surface viscosity at the surface',
  window: [
    { group: 'Re', min: 3.5, max: 76000, basis: 'sourced' },
    { group: 'Pr', min: 0.71, max: 380, basis: 'sourced' },
    { group: 'mu_ratio', min: 1, max: 3.2, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.15,
    reading: '±30 % quoted, read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Mass form with Sc and the viscosity ratio at 1; Sc near 1000 is outside the measured range.',
  source: 'Whitaker S., AIChE J. 18 (1972) 361-371',
  year: 1972,
  status: 'from memory',
  pitfalls: ['Free-stream, not film temperature.', 'The ratio is bulk over surface with the exponent 1/4.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 4.54, Pr: 20.6, mu_ratio: 2.59 },
      gives: 6.326205939,
      relativeTolerance: 1e-6,
    },
  ],
});
