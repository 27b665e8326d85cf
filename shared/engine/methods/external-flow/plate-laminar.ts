import { defineMethod } from '../method.ts';

/** Mean heat transfer of a flat plate under a laminar boundary layer, uniform wall temperature. */
export const plateLaminar = defineMethod({
  id: 'plate-laminar',
  version: 1,
  kind: 'correlation',
  title: 'Pohlhausen, laminar plate',
  summary: 'Mean heat transfer of a flat plate under a laminar boundary layer, uniform wall temperature.',
  family: ['flat plate'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.664 * Re^(1/2) * Pr^(1/3)',
  variables: {
    Re: { meaning: 'Reynolds number on the plate length, free stream', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'mean Nusselt number on the plate length', unit: '1' },
  length: 'plate length from the leading edge',
  temperature: 'film temperature',
  window: [
    { group: 'Re', min: null, max: 500000, basis: 'sourced' },
    { group: 'Pr', min: 0.6, max: null, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.05,
    reading: 'data within ±5 to 10 %, the larger read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Exact heat-mass analogue at low flux with Sc in place of Pr.',
  source: 'Pohlhausen E., Z. angew. Math. Mech. 1 (1921) 115-121',
  year: 1921,
  status: 'library-checked',
  pitfalls: ['Mean value; the local one is half of it.', 'For a uniform heat flux the constant is 0.680.'],
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
      given: { Re: 1570, Pr: 6.64 },
      gives: 49.4508694751,
      relativeTolerance: 1e-6,
    },
  ],
});
