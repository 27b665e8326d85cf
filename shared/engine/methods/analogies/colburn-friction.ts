import { defineMethod } from '../method.ts';

/** Stanton number of mass transfer from a Fanning friction factor. */
export const colburnFriction = defineMethod({
  id: 'colburn-friction',
  version: 1,
  kind: 'correlation',
  title: 'Mass from friction, j = f/2',
  summary: 'Stanton number of mass transfer from a Fanning friction factor.',
  family: ['tube', 'flat plate'],
  transport: 'mass',
  gives: 'St',
  expression: 'f / 2 * Sc^(-2/3)',
  variables: {
    f: { meaning: 'Fanning friction factor without form drag', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'St', meaning: 'Stanton number k/u', unit: '1' },
  length: 'as in the friction factor',
  temperature: 'film temperature',
  window: [{ group: 'Sc', min: 0.6, max: 3000, basis: 'sourced' }],
  scatter: {
    relative: 0.11,
    reading: '±20 to 25 % quoted, read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Heat with Pr in place of Sc.',
  source: 'Chilton T.H., Colburn A.P., Ind. Eng. Chem. 26 (1934) 1183-1187',
  year: 1934,
  status: 'from memory',
  pitfalls: [
    'At Sc near 1000 it lies 11 to 30 % below electrochemical data.',
    'Never in laminar tube flow, nor where there is form drag.',
  ],
  assumptions: [
    {
      key: 'no-form-drag',
      statement: 'The friction factor holds skin friction only: no form drag, smooth wall, turbulent flow.',
      ifItFails: 'Use j_H = j_D from a heat measurement instead of f/2.',
      checkGroups: ['geometry'],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { f: 0.00865, Sc: 2.18 },
      gives: 0.00257245892725,
      relativeTolerance: 1e-6,
    },
  ],
});
