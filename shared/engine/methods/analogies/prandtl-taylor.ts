import { defineMethod } from '../method.ts';

/** Stanton number from friction with a laminar sublayer. */
export const prandtlTaylor = defineMethod({
  id: 'prandtl-taylor',
  version: 1,
  kind: 'correlation',
  title: 'Prandtl-Taylor analogy',
  summary: 'Stanton number from friction with a laminar sublayer.',
  family: ['tube'],
  transport: 'heat',
  gives: 'St',
  expression: '(f/2) / (1 + 5 * sqrt(f/2) * (Pr - 1))',
  variables: {
    f: { meaning: 'Fanning friction factor without form drag', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'St', meaning: 'Stanton number of heat transfer', unit: '1' },
  length: 'as in the friction factor',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Pr', min: 0.5, max: 30, basis: 'indicative' }],
  scatter: { relative: 0.1, reading: '±20 %, read as two standard deviations', from: 'common practice, no source' },
  carriesTo: 'Mass with Sc in place of Pr within the same limits.',
  source: 'Prandtl L., Phys. Z. 11 (1910) 1072-1078; Taylor G.I., ARC Rep. Mem. 272 (1916)',
  year: 1910,
  status: 'from memory',
  pitfalls: ['A variant with 8.7 instead of 5 is in use.'],
  assumptions: [
    {
      key: 'no-form-drag',
      statement: 'The friction factor holds skin friction only: no form drag, smooth wall, turbulent flow.',
      ifItFails: 'Use j_H = j_D from a measurement instead of f/2.',
      checkGroups: ['geometry'],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { f: 0.00367, Pr: 0.848 },
      gives: 0.00189675069919,
      relativeTolerance: 1e-6,
    },
  ],
});
