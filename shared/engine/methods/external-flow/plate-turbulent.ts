import { defineMethod } from '../method.ts';

/** Mean heat transfer of a flat plate with a boundary layer that is turbulent from the leading edge. */
export const plateTurbulent = defineMethod({
  id: 'plate-turbulent',
  version: 1,
  kind: 'correlation',
  title: 'Turbulent plate, tripped',
  summary: 'Mean heat transfer of a flat plate with a boundary layer that is turbulent from the leading edge.',
  family: ['flat plate'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.037 * Re^0.8 * Pr^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the plate length, free stream', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'mean Nusselt number on the plate length', unit: '1' },
  length: 'plate length from the leading edge',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: 500000, max: 100000000, basis: 'sourced' },
    { group: 'Pr', min: 0.6, max: 60, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: '±15 to 20 % quoted, the larger read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Mass form with Sc up to 60; to 3000 by the analogy.',
  source:
    'Chilton-Colburn analogy on the friction law Cf = 0.074 Re^-0.2; Chilton T.H., Colburn A.P., Ind. Eng. Chem. 26 (1934) 1183-1187',
  year: 1934,
  status: 'from memory',
  pitfalls: ['A plate that is not tripped needs the mixed form.', '0.036 instead of 0.037 is also in use.'],
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
      given: { Re: 1020000, Pr: 3.27 },
      gives: 3520.44674538,
      relativeTolerance: 1e-6,
    },
  ],
});
