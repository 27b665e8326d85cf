import { defineMethod } from '../method.ts';

/** Carries a measured heat-transfer coefficient over to mass transfer by j_H = j_D. */
export const chiltonColburn = defineMethod({
  id: 'chilton-colburn',
  version: 1,
  kind: 'analogy',
  title: 'Chilton-Colburn, heat to mass',
  summary: 'Carries a measured heat-transfer coefficient over to mass transfer by j_H = j_D.',
  family: [],
  transport: 'mass',
  gives: 'factor',
  expression: '(Re_target/Re_source)^m * (Sc/Pr)^n',
  variables: {
    Re_target: { meaning: 'Reynolds number where the mass is transferred', unit: '1' },
    Re_source: { meaning: 'Reynolds number of the heat test', unit: '1' },
    Sc: { meaning: 'Schmidt number where the mass is transferred', unit: '1' },
    Pr: { meaning: 'Prandtl number of the heat test', unit: '1' },
    m: { meaning: 'exponent of Re in this device and regime', unit: '1' },
    n: { meaning: 'exponent of Pr and Sc, 1/3', unit: '1' },
  },
  result: { symbol: 'Sh/Nu', meaning: 'Sherwood number over Nusselt number', unit: '1' },
  length: 'the same characteristic length at both ends',
  temperature: 'film temperature',
  window: [
    { group: 'Pr', min: 0.6, max: 60, basis: 'sourced' },
    { group: 'Sc', min: 0.6, max: 3000, basis: 'sourced' },
  ],
  scatter: {
    relative: 0.1,
    reading: 'j_H against j_D, ±20 % read as two standard deviations',
    from: 'common practice, no source',
  },
  carriesTo: 'Holds in all directions between heat and mass; momentum joins by f/2 only without form drag.',
  source: 'Chilton T.H., Colburn A.P., Ind. Eng. Chem. 26 (1934) 1183-1187',
  year: 1934,
  status: 'from memory',
  pitfalls: [
    'The exponent is 1/3 on Nu and Sh, 2/3 on St.',
    'The further Sc is from Pr, the more the uncertain exponent costs.',
  ],
  assumptions: [
    {
      key: 'geometry',
      statement: 'Model and plant have the same shape: every length ratio is equal.',
      ifItFails: 'There is no transfer between different shapes; measure in a model of the right shape.',
      checkGroups: ['geometry'],
    },
    {
      key: 'reynolds',
      statement: 'Both ends run at the same Reynolds number, or the exponent of the regime corrects the difference.',
      ifItFails: "Run the rig at the plant's Re, or show the exponent from the same device.",
      checkGroups: ['match:Re'],
    },
    {
      key: 'regime',
      statement: 'Both ends are in the same flow regime.',
      ifItFails: 'Laminar and turbulent transfer do not follow one law; repeat the test in the regime of the plant.',
      checkGroups: ['regime'],
    },
    {
      key: 'prandtl',
      statement: 'Pr of the heat test lies where the analogy was shown to hold.',
      ifItFails: 'Liquid metals and very viscous liquids need their own relation.',
      checkGroups: ['window:Pr'],
    },
    {
      key: 'schmidt',
      statement: 'Sc of the plant lies where the analogy was shown to hold.',
      ifItFails: 'Above Sc 3000 use a relation made for such Sc.',
      checkGroups: ['window:Sc'],
    },
    {
      key: 'free-convection',
      statement: 'Free convection is small against the forced flow at both ends.',
      ifItFails: 'Combine forced and free convection; there is no clean analogy then.',
      checkGroups: ['Gr/Re²'],
    },
    {
      key: 'boundary',
      statement:
        'The boundary conditions correspond: uniform wall temperature to uniform wall concentration, uniform flux to uniform flux.',
      ifItFails: 'In turbulent flow at Pr or Sc above 1 a few per cent, in laminar flow up to 20 % and more.',
      checkGroups: [],
    },
    {
      key: 'low-flux',
      statement: 'The mass flux is low: no flow normal to the wall that would change the film.',
      ifItFails: 'Correct with ln(1 + B)/B, B being the blowing number.',
      checkGroups: [],
    },
    {
      key: 'heat-losses',
      statement: 'Conduction and radiation losses of the heat test are subtracted.',
      ifItFails: 'Measure them, or estimate them with an uncertainty of their own.',
      checkGroups: [],
    },
    {
      key: 'constant-properties',
      statement: 'Property changes between bulk and wall are small.',
      ifItFails: 'Apply a property-ratio factor on the heat side only.',
      checkGroups: [],
    },
    {
      key: 'surface-stays',
      statement: 'The transferring surface neither recedes nor roughens noticeably.',
      ifItFails: 'Follow the geometry in steps; a rippled surface transfers more.',
      checkGroups: [],
    },
    {
      key: 'no-reaction',
      statement: 'No reaction in the film and no coupling between species.',
      ifItFails: 'Use an enhancement factor.',
      checkGroups: [],
    },
    {
      key: 'diffusivity',
      statement: "The diffusivity is that of the plant's mixture at its temperature.",
      ifItFails: 'Measure it; it is often the largest single contribution.',
      checkGroups: [],
    },
  ],
  checks: [
    {
      from: 'computed by hand: (12/6)^(1/3)',
      given: { Re_target: 20000, Re_source: 20000, Sc: 12, Pr: 6, m: 0.8, n: 0.3333333333333333 },
      gives: 1.2599210498948732,
      relativeTolerance: 1e-12,
    },
  ],
});
