import { readFileSync } from 'node:fs';
import type {
  MeasuredValue,
  OperatingPoint,
  PointVariableKey,
  StudyModel,
} from '../../shared/engine/model/study-model.ts';

type Facts = {
  readonly inputs: Readonly<Record<string, { readonly value: number; readonly u: number; readonly unit: string }>>;
  readonly correlations: readonly { readonly a: string; readonly b: string; readonly r: number }[];
  readonly steps: readonly { readonly name: string; readonly value: number; readonly u: number }[];
  readonly expected: Readonly<
    Record<
      'k' | 't',
      { readonly value: number; readonly u: number; readonly variance_share: Readonly<Record<string, number>> }
    >
  >;
  readonly relative_tolerance: number;
};

const facts: Facts = JSON.parse(readFileSync(new URL('./analogue-chain.json', import.meta.url), 'utf8'));

const id = (place: number) => `00000000-0000-4000-8000-${String(place).padStart(12, '0')}`;

/** Ids of the parts of the analogue chain that tests speak of. */
export const analogueChainIds = {
  bench: id(1),
  plant: id(2),
  heatTransferCoefficient: id(10),
  massTransferCoefficient: id(11),
  dissolutionTime: id(12),
  analogueRoute: id(31),
} as const;

/** The stated quantities by their name in the record: symbol, name, place of their ids. */
const stated = {
  P: ['heater power', 'W', 40],
  Q_loss: ['heat loss', 'W', 41],
  L_m: ['heated length', 'm', 42],
  T_w: ['wall temperature', '°C', 43],
  T_b: ['bulk temperature', '°C', 44],
  rho_s: ['density of the solid', 'kg/m³', 45],
  layer: ['layer to be dissolved', 'm', 46],
  dc: ['concentration difference', 'kg/m³', 47],
} as const;
type StatedName = keyof typeof stated;
const statedAtBench: readonly StatedName[] = ['P', 'Q_loss', 'L_m', 'T_w', 'T_b'];

const quantityIdOf = (name: StatedName) => id(stated[name][2]);
const routeIdOf = (name: StatedName) => id(stated[name][2] + 20);

/** By name in the record: the input id that the engine gives it. */
export const analogueInputIds: Readonly<Record<string, string>> = {
  ...Object.fromEntries((Object.keys(stated) as StatedName[]).map((name) => [name, `route:${routeIdOf(name)}`])),
  d_m: `point:${id(1)}:L`,
  u_m: `point:${id(1)}:u`,
  nu_m: `point:${id(1)}:nu`,
  Pr: `point:${id(1)}:Pr`,
  k_f: `point:${id(1)}:lambda`,
  d_p: `point:${id(2)}:L`,
  u_p: `point:${id(2)}:u`,
  nu_p: `point:${id(2)}:nu`,
  D_p: `point:${id(2)}:D`,
  F_ana: 'method:chilton-colburn',
};

export const expectedAnalogueChain = {
  steps: facts.steps,
  ...facts.expected,
  relativeTolerance: facts.relative_tolerance,
};

function measured(name: string, unit: string): MeasuredValue {
  const input = facts.inputs[name];
  if (!input) throw new Error(`The record has no input ${name}.`);
  const isCelsius = unit === '°C';
  return {
    text: `${input.value} ${unit}`,
    // 36.4 °C is 309.55 K; the differences that the record works with are the same.
    value: isCelsius ? input.value + 273.15 : input.value,
    unit,
    uncertaintyText: isCelsius ? `${input.u} K` : `${input.u} ${unit}`,
    uncertainty: { form: 'standard', u: input.u },
  };
}

function point(
  place: number,
  name: string,
  scale: 'bench' | 'plant',
  names: Partial<Record<PointVariableKey, [string, string]>>,
): OperatingPoint {
  return {
    id: id(place),
    name,
    scale,
    geometry: {
      family: 'cylinder in crossflow',
      description: 'Cylinder across a duct, length five times its diameter',
      ratios: [
        { name: 'L/d', value: 5 },
        { name: 'W/d', value: 8 },
      ],
    },
    fluid: place === 1 ? 'water' : 'process solution',
    entries: Object.entries(names).map(([key, [input, unit]]) => ({
      key: key as PointVariableKey,
      source: { from: 'entered', value: measured(input, unit) },
    })),
  };
}

const quantityBase = { adoptedRouteId: null, limit: null, unsafeSide: null, note: '' } as const;
const routeBase = { rationale: '', justifications: {} } as const;

/**
 * A heated cylinder in a 1:5 duct model, carried to the dissolution of a cast rod in the plant duct, built as a person
 * would: two operating points, stated quantities, a balance for h, the heat analogue for k, and a balance for the time.
 */
export function analogueChain(): StudyModel {
  const names = Object.keys(stated) as StatedName[];
  const ids = analogueChainIds;
  return {
    format: 'stemma-study',
    version: 1,
    operatingPoints: [
      point(1, 'Duct model', 'bench', {
        L: ['d_m', 'm'],
        u: ['u_m', 'm/s'],
        nu: ['nu_m', 'm²/s'],
        Pr: ['Pr', '1'],
        lambda: ['k_f', 'W/(m K)'],
      }),
      point(2, 'Plant duct', 'plant', {
        L: ['d_p', 'm'],
        u: ['u_p', 'm/s'],
        nu: ['nu_p', 'm²/s'],
        D: ['D_p', 'm²/s'],
      }),
    ],
    quantities: [
      ...names.map((name) => ({
        ...quantityBase,
        id: quantityIdOf(name),
        symbol: name,
        name: stated[name][0],
        unit: stated[name][1],
        operatingPointId: statedAtBench.includes(name) ? ids.bench : ids.plant,
      })),
      {
        ...quantityBase,
        id: ids.heatTransferCoefficient,
        symbol: 'h',
        name: 'heat-transfer coefficient of the model',
        unit: 'W/(m² K)',
        operatingPointId: ids.bench,
      },
      {
        ...quantityBase,
        id: ids.massTransferCoefficient,
        symbol: 'k',
        name: 'mass-transfer coefficient of the rod',
        unit: 'm/s',
        operatingPointId: ids.plant,
      },
      {
        ...quantityBase,
        id: ids.dissolutionTime,
        symbol: 't',
        name: 'time to dissolve the layer',
        unit: 's',
        operatingPointId: ids.plant,
      },
    ],
    routes: [
      ...names.map((name) => ({
        ...routeBase,
        id: routeIdOf(name),
        quantityId: quantityIdOf(name),
        name: `${stated[name][0]}, stated`,
        kind: 'stated-value' as const,
        value: measured(name, stated[name][1]),
        evidence: 'Test sheet of the duct model and data sheet of the rod',
      })),
      {
        ...routeBase,
        id: id(30),
        quantityId: ids.heatTransferCoefficient,
        name: 'heat balance of the cylinder',
        kind: 'balance',
        expression: '(P - Q_loss) / (pi * d * L_m * (T_w - T_b))',
        bindings: {
          ...Object.fromEntries(
            statedAtBench.map((name) => [name, { from: 'quantity', quantityId: quantityIdOf(name) } as const]),
          ),
          d: { from: 'point', operatingPointId: ids.bench, key: 'L' },
        },
      },
      {
        ...routeBase,
        id: ids.analogueRoute,
        quantityId: ids.massTransferCoefficient,
        name: 'heat analogue of the duct model',
        kind: 'heat-analogue',
        sourceQuantityId: ids.heatTransferCoefficient,
        reynoldsExponent: { value: 1, u: 0 },
        schmidtExponent: { value: 1 / 3, u: 0 },
        scatter: facts.inputs.F_ana?.u ?? Number.NaN,
        extrapolationAllowance: null,
      },
      {
        ...routeBase,
        id: id(32),
        quantityId: ids.dissolutionTime,
        name: 'balance on the layer',
        kind: 'balance',
        expression: 'rho_s * layer / (k * dc)',
        bindings: {
          rho_s: { from: 'quantity', quantityId: quantityIdOf('rho_s') },
          layer: { from: 'quantity', quantityId: quantityIdOf('layer') },
          dc: { from: 'quantity', quantityId: quantityIdOf('dc') },
          k: { from: 'quantity', quantityId: ids.massTransferCoefficient },
        },
      },
    ],
    tests: [],
    inputCorrelations: facts.correlations.map(({ a, b, r }, place) => ({
      id: id(90 + place),
      a: analogueInputIds[a] ?? '',
      b: analogueInputIds[b] ?? '',
      r,
      reason: 'Both thermocouples were compared with the same reference.',
    })),
  };
}
