import { defineMethod } from '../method.ts';

/** Mass transfer between particles and a gas in a packed bed. */
export const guptaThodosGas = defineMethod({
  id: 'gupta-thodos-gas',
  version: 1,
  kind: 'correlation',
  title: 'Gupta-Thodos, gases in a packed bed',
  summary: 'Mass transfer between particles and a gas in a packed bed.',
  family: ['packed bed'],
  transport: 'mass',
  gives: 'Sh',
  expression: '2.06 * Re^0.425 * Sc^(1/3) / voidage',
  variables: {
    Re: { meaning: 'Reynolds number on the particle diameter, superficial velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
    voidage: { meaning: 'free volume over bed volume', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the particle diameter', unit: '1' },
  length: 'particle diameter',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: 90, max: 4000, basis: 'sourced' },
    { group: 'Sc', min: 0.6, max: 3, basis: 'indicative' },
  ],
  scatter: { relative: 0.1, reading: '±20 %, read as two standard deviations', from: 'from memory of the paper' },
  carriesTo: 'j_H = 1.076 j_D in the same beds.',
  source: 'Gupta A.S., Thodos G., AIChE J. 9 (1963) 751-754',
  year: 1963,
  status: 'from memory',
  pitfalls: ['For gases only.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 129, Sc: 0.728, voidage: 0.57 },
      gives: 25.6470125713,
      relativeTolerance: 1e-6,
    },
  ],
});
