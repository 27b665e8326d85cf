import { defineMethod } from '../method.ts';

/** Fanning friction factor of a tube in laminar, transitional and turbulent flow. */
export const churchill = defineMethod({
  id: 'churchill',
  version: 1,
  kind: 'correlation',
  title: 'Churchill, all regimes',
  summary: 'Fanning friction factor of a tube in laminar, transitional and turbulent flow.',
  family: ['tube'],
  transport: 'momentum',
  gives: 'f',
  expression: '2 * ((8/Re)^12 + ((2.457 * log(1 / ((7/Re)^0.9 + 0.27*eD)))^16 + (37530/Re)^16)^(-3/2))^(1/12)',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    eD: { meaning: 'roughness over inner diameter', unit: '1' },
  },
  result: { symbol: 'f', meaning: 'Fanning friction factor', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: null, max: 100000000, basis: 'indicative' },
    { group: 'eD', min: null, max: 0.05, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.06,
    reading: '±10 to 15 % of data in turbulent flow, the larger about two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'j = f/2 on smooth walls in turbulent flow only.',
  source: 'Churchill S.W., Chem. Eng. 84 (24) (1977) 91-92',
  year: 1977,
  status: 'library-checked',
  pitfalls: ['In the transition region any single value is uncertain.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 43.3, eD: 0.000757 },
      gives: 0.369515011547,
      relativeTolerance: 1e-6,
    },
  ],
});
