import { defineMethod } from '../method.ts';

/** Mass transfer between the particles of a packed bed and the fluid. */
export const wakaoFunazkri = defineMethod({
  id: 'wakao-funazkri',
  version: 1,
  kind: 'correlation',
  title: 'Wakao-Funazkri, packed bed, mass',
  summary: 'Mass transfer between the particles of a packed bed and the fluid.',
  family: ['packed bed'],
  transport: 'mass',
  gives: 'Sh',
  expression: '2 + 1.1 * Sc^(1/3) * Re^0.6',
  variables: {
    Re: { meaning: 'Reynolds number on the particle diameter, superficial velocity', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the particle diameter', unit: '1' },
  length: 'particle diameter',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: 3, max: 10000, basis: 'sourced' }],
  scatter: {
    relative: 0.14,
    reading: '±25 to 30 % spread of the data, read as two standard deviations',
    from: 'from memory of the paper',
  },
  carriesTo: 'Heat form by Wakao, Kaguei and Funazkri with the same constants.',
  source: 'Wakao N., Funazkri T., Chem. Eng. Sci. 33 (1978) 1375-1384',
  year: 1978,
  status: 'library-checked',
  pitfalls: [
    'Superficial, not interstitial velocity.',
    'Made for the dispersed plug-flow model; plain plug flow gives another result at low Re.',
  ],
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
      given: { Re: 312, Sc: 1.69 },
      gives: 43.1005540577,
      relativeTolerance: 1e-6,
    },
  ],
});
