import { defineMethod } from '../method.ts';

/** Stanton number from friction with sublayer and buffer layer. */
export const vonKarman = defineMethod({
  id: 'von-karman',
  version: 1,
  kind: 'correlation',
  title: 'Kármán analogy',
  summary: 'Stanton number from friction with sublayer and buffer layer.',
  family: ['tube'],
  transport: 'heat',
  gives: 'St',
  expression: '(f/2) / (1 + 5 * sqrt(f/2) * (Pr - 1 + log((5*Pr + 1)/6)))',
  variables: {
    f: { meaning: 'Fanning friction factor without form drag', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'St', meaning: 'Stanton number of heat transfer', unit: '1' },
  length: 'as in the friction factor',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Pr', min: 0.5, max: 30, basis: 'indicative' }],
  scatter: {
    relative: 0.1,
    reading: '±15 to 20 %, the larger read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Mass with Sc in place of Pr within the same limits.',
  source: 'von Kármán T., Trans. ASME 61 (1939) 705-710',
  year: 1939,
  status: 'library-checked',
  pitfalls: ['At Pr 1 it is f/2.'],
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
      given: { f: 0.00708, Pr: 0.762 },
      gives: 0.00409990916888,
      relativeTolerance: 1e-6,
    },
  ],
});
