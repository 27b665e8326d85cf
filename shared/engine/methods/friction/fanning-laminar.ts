import { defineMethod } from '../method.ts';

/** Fanning friction factor of laminar tube flow. */
export const fanningLaminar = defineMethod({
  id: 'fanning-laminar',
  version: 1,
  kind: 'correlation',
  title: 'Hagen-Poiseuille',
  summary: 'Fanning friction factor of laminar tube flow.',
  family: ['tube'],
  transport: 'momentum',
  gives: 'f',
  expression: '16 / Re',
  variables: { Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' } },
  result: { symbol: 'f', meaning: 'Fanning friction factor', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Re', min: null, max: 2100, basis: 'sourced' }],
  scatter: { relative: 0, reading: 'exact', from: 'analytic' },
  carriesTo: 'j = f/2 never in laminar tube flow.',
  source: 'exact solution; Hagen G., Ann. Phys. 46 (1839) 423-442',
  year: 1839,
  status: 'analytic',
  pitfalls: ['The Darcy factor is 64/Re.'],
  assumptions: [],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 2.08 },
      gives: 7.69230769231,
      relativeTolerance: 1e-6,
    },
  ],
});
