import { defineMethod } from '../method.ts';

/** Stanton number from friction up to high Pr or Sc. */
export const friendMetzner = defineMethod({
  id: 'friend-metzner',
  version: 1,
  kind: 'correlation',
  title: 'Friend-Metzner',
  summary: 'Stanton number from friction up to high Pr or Sc.',
  family: ['tube'],
  transport: 'heat',
  gives: 'St',
  expression: '(f/2) / (1.20 + 11.8 * sqrt(f/2) * (Pr - 1) * Pr^(-1/3))',
  variables: {
    f: { meaning: 'Fanning friction factor without form drag', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'St', meaning: 'Stanton number of heat transfer', unit: '1' },
  length: 'as in the friction factor',
  temperature: 'bulk mean temperature',
  window: [{ group: 'Pr', min: 0.5, max: 600, basis: 'sourced' }],
  scatter: { relative: 0.08, reading: '±15 %, read as two standard deviations', from: 'from memory of the paper' },
  carriesTo: 'Mass with Sc up to 3000.',
  source: 'Friend W.L., Metzner A.B., AIChE J. 4 (1958) 393-402',
  year: 1958,
  status: 'library-checked',
  pitfalls: ['At Pr 1 it gives f/2.4, not f/2.', 'At Sc 1000 it lies 18 to 27 % above electrochemical data.'],
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
      given: { f: 0.00551, Pr: 1.2 },
      gives: 0.00209256199641,
      relativeTolerance: 1e-6,
    },
  ],
});
