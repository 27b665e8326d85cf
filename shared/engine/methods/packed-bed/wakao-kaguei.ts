import { defineMethod } from '../method.ts';

/** Heat transfer between the particles of a packed bed and the fluid. */
export const wakaoKaguei = defineMethod({
  id: 'wakao-kaguei',
  version: 1,
  kind: 'correlation',
  title: 'Wakao-Kaguei-Funazkri, packed bed, heat',
  summary: 'Heat transfer between the particles of a packed bed and the fluid.',
  family: ['packed bed'],
  transport: 'heat',
  gives: 'Nu',
  expression: '2 + 1.1 * Pr^(1/3) * Re^0.6',
  variables: {
    Re: { meaning: 'Reynolds number on the particle diameter, superficial velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the particle diameter', unit: '1' },
  length: 'particle diameter',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: 15, max: 8500, basis: 'sourced' }],
  scatter: {
    relative: 0.14,
    reading: '±25 to 30 % spread of the data, read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'Mass form by Wakao and Funazkri with the same constants.',
  source: 'Wakao N., Kaguei S., Funazkri T., Chem. Eng. Sci. 34 (1979) 325-336',
  year: 1979,
  status: 'library-checked',
  pitfalls: ['Superficial, not interstitial velocity.'],
  assumptions: [
    {
      key: 'voidage',
      statement: 'The bed has a voidage near 0.4 and no channels.',
      ifItFails: 'Use a relation with the voidage in it, or measure.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 18.3, Pr: 1.69 },
      gives: 9.49593089036,
      relativeTolerance: 1e-6,
    },
  ],
});
