import { defineMethod } from '../method.ts';

/** Mass transfer from a smooth cylinder that turns in a still liquid, turbulent. */
export const eisenberg = defineMethod({
  id: 'eisenberg',
  version: 1,
  kind: 'correlation',
  title: 'Eisenberg-Tobias-Wilke, rotating cylinder',
  summary: 'Mass transfer from a smooth cylinder that turns in a still liquid, turbulent.',
  family: ['rotating cylinder'],
  transport: 'mass',
  gives: 'Sh',
  expression: '0.0791 * Re^0.7 * Sc^0.356',
  variables: {
    Re: { meaning: 'Reynolds number on the cylinder diameter, peripheral speed', unit: '1' },
    Sc: { meaning: 'Schmidt number of the species', unit: '1' },
  },
  result: { symbol: 'Sh', meaning: 'Sherwood number on the cylinder diameter', unit: '1' },
  length: 'diameter of the turning cylinder; the velocity is the peripheral speed ω d/2',
  temperature: 'bulk mean temperature',
  window: [
    { group: 'Re', min: 1000, max: 100000, basis: 'sourced' },
    { group: 'Sc', min: 835, max: 11490, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.08,
    reading: '±8 % quoted, read as one standard deviation',
    from: 'from memory of the paper',
  },
  carriesTo: 'Measured at high Sc only, so not a heat form.',
  source: 'Eisenberg M., Tobias C.W., Wilke C.R., J. Electrochem. Soc. 101 (1954) 306-320',
  year: 1954,
  status: 'from memory',
  pitfalls: [
    'The peripheral speed is ω d/2, not ω d.',
    'j_D is defined here with Sc^0.644, not with Sc^(2/3).',
    'The data of the paper itself span Sc 2230 to 3650; the wider range comes from later data.',
  ],
  assumptions: [
    {
      key: 'smooth',
      statement: 'The cylinder is smooth and stays so.',
      ifItFails: 'A rough cylinder transfers more; measure, or use a relation for rough cylinders.',
      checkGroups: [],
    },
    {
      key: 'concentric',
      statement: 'The cylinder turns in the middle of a vessel that is wide against it, with no flow along its axis.',
      ifItFails: 'In a narrow gap or with a flow along the axis use a relation for that flow.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed independently with 40 digits',
      given: { Re: 7250.50254310345, Sc: 3520 },
      gives: 729.463133943,
      relativeTolerance: 1e-6,
    },
  ],
});
