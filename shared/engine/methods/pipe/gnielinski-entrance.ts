import { defineMethod } from '../method.ts';

/** Mean heat transfer of a liquid through a tube of finite length from the transition region on. */
export const gnielinskiEntrance = defineMethod({
  id: 'gnielinski-entrance',
  version: 1,
  kind: 'correlation',
  title: 'Gnielinski with entrance and property factors',
  summary: 'Mean heat transfer of a liquid through a tube of finite length from the transition region on.',
  family: ['tube'],
  transport: 'heat',
  gives: 'Nu',
  expression:
    '((0.790*log(Re) - 1.64)^(-2)/8) * (Re - 1000) * Pr / (1 + 12.7 * sqrt((0.790*log(Re) - 1.64)^(-2)/8) * (Pr^(2/3) - 1)) * (1 + D_over_L^(2/3)) * Pr_ratio^0.11',
  variables: {
    Re: { meaning: 'Reynolds number on the inner diameter, mean velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
    D_over_L: { meaning: 'inner diameter over length', unit: '1' },
    Pr_ratio: { meaning: 'Pr in the bulk over Pr at the wall', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the inner diameter', unit: '1' },
  length: 'inner diameter',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 3000, max: 5000000, basis: 'sourced' },
    { group: 'Pr', min: 0.5, max: 2000, basis: 'sourced' },
    { group: 'D_over_L', min: null, max: 0.2, basis: 'indicative' },
    { group: 'Pr_ratio', min: 0.05, max: 20, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.07,
    reading: '±10 to 20 %; ±15 % read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'The entrance factor carries over to mass, the property factor does not.',
  source: 'Gnielinski V., Int. Chem. Eng. 16 (1976) 359-368',
  year: 1976,
  status: 'from memory',
  pitfalls: ['The factor takes D/L, not L/D.'],
  assumptions: [
    {
      key: 'smooth',
      statement: 'The wall is smooth and stays so.',
      ifItFails: 'A rough wall transfers more; measure, or use a relation for rough walls.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 435000, Pr: 0.987, D_over_L: 0.00384, Pr_ratio: 0.443 },
      gives: 678.634190822,
      relativeTolerance: 1e-6,
    },
  ],
});
