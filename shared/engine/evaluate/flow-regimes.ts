import type { MatchCheck, Verdict } from '../model/evaluation.ts';
import type { GeometryFamily } from '../model/study-model.ts';
import { formatNumber } from '../quantity/format-measured.ts';

type Regime = { readonly name: string; readonly below: number };

/** Regimes by rising Reynolds number, limits indicative; families without an accepted limit are not judged. */
const regimes: Readonly<Partial<Record<GeometryFamily, readonly Regime[]>>> = {
  tube: bands('laminar', 2300, 'transitional', 1e4, 'turbulent'),
  'cylinder in crossflow': bands('subcritical', 2e5, 'critical', 5e5, 'supercritical'),
  'flat plate': bands('laminar', 5e5, 'transitional', 3e6, 'turbulent'),
  sphere: bands('subcritical', 2e5, 'critical', 4e5, 'supercritical'),
  'packed bed': bands('creeping', 10, 'transitional', 300, 'inertial'),
  'stirred vessel': bands('laminar', 10, 'transitional', 1e4, 'turbulent'),
  'rotating cylinder': bands('laminar', 60, 'transitional', 1000, 'turbulent'),
};
const between = new Set(['transitional', 'critical']);

function bands(low: string, first: number, middle: string, second: number, high: string): readonly Regime[] {
  return [
    { name: low, below: first },
    { name: middle, below: second },
    { name: high, below: Number.POSITIVE_INFINITY },
  ];
}

function regimeOf(family: GeometryFamily, reynolds: number): string | undefined {
  return regimes[family]?.find((regime) => reynolds < regime.below)?.name;
}

/** Whether both ends of a link flow in the same regime; null where the family has no accepted limits. */
export function checkRegime(
  family: GeometryFamily,
  source: { readonly reynolds: number; readonly place: string },
  target: { readonly reynolds: number; readonly place: string },
): MatchCheck | null {
  const [from, to] = [regimeOf(family, source.reynolds), regimeOf(family, target.reynolds)];
  if (!from || !to) return null;
  const verdict: Verdict = from !== to ? 'outside' : between.has(from) ? 'near the edge' : 'inside';
  const ends = `Re is ${formatNumber(source.reynolds)} at ${source.place} and ${formatNumber(target.reynolds)} at ${target.place}`;
  const words: Record<Verdict, string> = {
    inside: `${ends}: both ${from}.`,
    'near the edge': `${ends}: both ${from}, where small disturbances decide how the flow behaves.`,
    outside: `${ends}: ${from} at one end, ${to} at the other.`,
    'not evaluated': `${ends}.`,
  };
  return {
    key: 'regime:Re',
    kind: 'regime',
    group: 'Re',
    source: source.reynolds,
    target: target.reynolds,
    ratio: target.reynolds / source.reynolds,
    window: null,
    verdict,
    sentence: words[verdict],
  };
}
