import { defineMethod } from '../method.ts';

/** Heat transfer between particles and fluid over a wide range of voidage. */
export const gunn = defineMethod({
  id: 'gunn',
  version: 1,
  kind: 'correlation',
  title: 'Gunn, fixed and fluidised bed, heat',
  summary: 'Heat transfer between particles and fluid over a wide range of voidage.',
  family: ['packed bed'],
  transport: 'heat',
  gives: 'Nu',
  expression:
    '(7 - 10*voidage + 5*voidage^2) * (1 + 0.7 * Re^0.2 * Pr^(1/3)) + (1.33 - 2.4*voidage + 1.2*voidage^2) * Re^0.7 * Pr^(1/3)',
  variables: {
    voidage: { meaning: 'free volume over bed volume', unit: '1' },
    Re: { meaning: 'Reynolds number on the particle diameter, superficial velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the particle diameter', unit: '1' },
  length: 'particle diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'voidage', min: 0.35, max: 1, basis: 'sourced' },
    { group: 'Re', min: null, max: 100000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.13,
    reading: '±25 % or more, read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Mass form with Sc.',
  source: 'Gunn D.J., Int. J. Heat Mass Transfer 21 (1978) 467-476',
  year: 1978,
  status: 'from memory',
  pitfalls: ['The constant is 1.33, not 1.3.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { voidage: 0.429, Re: 0.41, Pr: 14.1 },
      gives: 9.4412392314,
      relativeTolerance: 1e-6,
    },
  ],
});
