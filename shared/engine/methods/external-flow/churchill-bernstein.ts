import { defineMethod } from '../method.ts';

/** Mean heat transfer of a long cylinder across a stream. */
export const churchillBernstein = defineMethod({
  id: 'churchill-bernstein',
  version: 1,
  kind: 'correlation',
  title: 'Churchill-Bernstein, cylinder in crossflow',
  summary: 'Mean heat transfer of a long cylinder across a stream.',
  family: ['cylinder in crossflow'],
  transport: 'heat',
  gives: 'Nu',
  expression: '0.3 + 0.62 * Re^(1/2) * Pr^(1/3) * (1 + (0.4/Pr)^(2/3))^(-1/4) * (1 + (Re/282000)^(5/8))^(4/5)',
  variables: {
    Re: { meaning: 'Reynolds number on the diameter, approach velocity', unit: '1' },
    Pr: { meaning: 'Prandtl number of the fluid', unit: '1' },
  },
  result: { symbol: 'Nu', meaning: 'Nusselt number on the diameter', unit: '1' },
  length: 'cylinder diameter',
  temperature: 'film temperature',
  window: [
    { group: 'Re Pr', min: 0.2, max: null, basis: 'sourced', expression: 'Re * Pr' },
    { group: 'Re', min: null, max: 10000000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: '±20 % quoted, read as two standard deviations',
    from: 'from memory of handbooks',
  },
  carriesTo: 'Mass form with Sc; f/2 never, there is form drag.',
  source: 'Churchill S.W., Bernstein M., J. Heat Transfer 99 (1977) 300-306',
  year: 1977,
  status: 'library-checked',
  pitfalls: ['0.4/Pr, not Pr/0.4.', 'Long cylinder, low turbulence of the stream, no blockage.'],
  assumptions: [
    {
      key: 'stream-turbulence',
      statement: 'The stream is of low turbulence and the duct does not block it.',
      ifItFails: 'Turbulence of the stream raises the coefficient by up to 30 %.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 28.2, Pr: 20.1 },
      gives: 9.1169390776,
      relativeTolerance: 1e-6,
    },
  ],
});
