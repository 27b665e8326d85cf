import type { PointVariableKey } from './study-model.ts';

export type PointVariable = {
  readonly symbol: string;
  readonly name: string;
  /** The unit a bare number is read in and results are shown in. */
  readonly unit: string;
  /** The coherent SI unit the engine computes in. */
  readonly siUnit: string;
  readonly kind: 'variable' | 'group';
  /** Zero and below are impossible. */
  readonly positive: boolean;
};

/** What can be read from an operating point: what may be entered, and the groups that only follow (Gr, Gr/Re²). */
export const pointVariables: Readonly<Record<PointVariableKey | 'Gr' | 'GrRe2', PointVariable>> = {
  L: variable('L', 'characteristic length', 'm', 'm'),
  u: variable('u', 'velocity', 'm/s', 'm/s'),
  T: variable('T', 'bulk temperature', '°C', 'K'),
  rho: variable('ρ', 'density', 'kg/m³', 'kg/m^3'),
  mu: variable('μ', 'dynamic viscosity', 'mPa·s', 'Pa s'),
  nu: variable('ν', 'kinematic viscosity', 'm²/s', 'm^2/s'),
  cp: variable('c_p', 'specific heat capacity', 'J/(kg K)', 'J/(kg K)'),
  lambda: variable('λ', 'thermal conductivity', 'W/(m K)', 'W/(m K)'),
  D: variable('D', 'diffusion coefficient', 'm²/s', 'm^2/s'),
  // Water below 4 °C contracts when heated, and a wall may be the colder side.
  beta: { ...variable('β', 'thermal expansion coefficient', '1/K', '1/K'), positive: false },
  dT: { ...variable('ΔT', 'temperature difference between wall and bulk', 'K', 'K'), positive: false },
  Re: group('Re', 'Reynolds number'),
  Pr: group('Pr', 'Prandtl number'),
  Sc: group('Sc', 'Schmidt number'),
  Gr: { ...group('Gr', 'Grashof number'), positive: false },
  GrRe2: { ...group('Gr/Re²', 'free over forced convection'), positive: false },
};

function variable(symbol: string, name: string, unit: string, siUnit: string): PointVariable {
  return { symbol, name, unit, siUnit, kind: 'variable', positive: true };
}

function group(symbol: string, name: string): PointVariable {
  return { symbol, name, unit: '1', siUnit: '1', kind: 'group', positive: true };
}

/** The variable behind a reading key, or undefined for a key that no operating point has. */
export function findPointVariable(key: string): PointVariable | undefined {
  return Object.hasOwn(pointVariables, key) ? pointVariables[key as keyof typeof pointVariables] : undefined;
}
