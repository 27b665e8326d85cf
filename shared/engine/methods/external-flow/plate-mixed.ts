import { defineMethod } from '../method.ts';

/** Mean heat transfer of a flat plate, laminar first and turbulent behind Re 500 000. */
export const plateMixed = defineMethod({
  id: 'plate-mixed',
  version: 1,
  kind: 'correlation',
  title: 'Mixed plate, transition at Re 500 000',
  summary: 'Mean heat transfer of a flat plate, laminar first and turbulent behind Re 500 000.',
  family: ['flat plate'],
  transport: 'heat',
  gives: 'Nu',
  expression: '(0.037 * Re^0.8 - 871) * Pr^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the plate length, free stream', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'mean Nusselt number on the plate length', unit: '1' },
  length: 'plate length from the leading edge',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: 600000, max: 100000000, basis: 'indicative' },
    { group: 'Pr', min: 0.6, max: 60, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: '±15 to 20 % quoted, the larger read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Mass form with Sc.',
  source: 'integration of the laminar and the turbulent law; constants as in the two plate laws of this library',
  year: 1934,
  status: 'from memory',
  pitfalls: ['871 belongs to a transition at Re 500 000 only.', 'Negative below Re 290 000.'],
  assumptions: [
    {
      key: 'leading-edge',
      statement: 'The boundary layer starts at the leading edge: no unheated length before it.',
      ifItFails: 'Apply the factor for an unheated starting length.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 676000, Pr: 1.73 },
      gives: 1003.23567628,
      relativeTolerance: 1e-6,
    },
  ],
});
