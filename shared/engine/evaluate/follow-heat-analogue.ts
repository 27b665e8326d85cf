import { parseUnit, sameDimension } from '../quantity/parse-unit.ts';
import { allOf, extrapolationFactor, noValue, type RouteAnswer, type RouteOf, type Workings } from './workings.ts';

/** The method whose scatter, windows and assumptions every heat analogue carries. */
export const analogyMethodId = 'chilton-colburn';
export const heatTransferCoefficientUnit = 'W/(m^2 K)';
export const massTransferCoefficientUnit = 'm/s';

/** Whether a unit can be read and has the dimension of another. */
export function hasDimensionOf(unit: string, like: string): boolean {
  const [one, other] = [parseUnit(unit), parseUnit(like)];
  return one.ok && other.ok && sameDimension(one.unit.dimension, other.unit.dimension);
}

/**
 * Carries a measured heat-transfer coefficient to a mass-transfer coefficient (Chilton and Colburn 1934):
 * Nu_s = h L_s / λ_s; Sh_t = Nu_s (Re_t/Re_s)^m (Sc_t/Pr_s)^n F; k = Sh_t D_t / L_t, in m/s.
 */
export function followHeatAnalogue(workings: Workings, route: RouteOf<'heat-analogue'>): RouteAnswer {
  const { graph, points } = workings;
  const target = workings.quantity(route.quantityId);
  if (!target) return noValue(`The route “${route.name}” leads to a quantity that is not in the study.`);
  if (route.sourceQuantityId === null) {
    return noValue(`The route “${route.name}” is not linked to a measured heat-transfer coefficient yet.`);
  }
  const source = workings.quantity(route.sourceQuantityId);
  if (!source) return noValue(`The route “${route.name}” starts from a quantity that is not in the study.`);
  if (!hasDimensionOf(source.unit, heatTransferCoefficientUnit)) {
    return noValue(
      `The route “${route.name}” starts from a heat-transfer coefficient in W/(m² K), but “${source.name}” is in ` +
        `${source.unit || '1'}.`,
    );
  }
  if (!hasDimensionOf(target.unit, massTransferCoefficientUnit)) {
    return noValue(
      `The route “${route.name}” gives a mass-transfer coefficient in m/s, but “${target.name}” is in ` +
        `${target.unit || '1'}.`,
    );
  }
  const [from, to] = [source.operatingPointId, target.operatingPointId];
  const read = allOf({
    h: workings.quantityValue(source.id),
    L_s: points.read(from, 'L'),
    lambda_s: points.read(from, 'lambda'),
    Re_s: points.read(from, 'Re'),
    Pr_s: points.read(from, 'Pr'),
    Re_t: points.read(to, 'Re'),
    Sc_t: points.read(to, 'Sc'),
    D_t: points.read(to, 'D'),
    L_t: points.read(to, 'L'),
  });
  if (!read.ok) return noValue(...read.reasons);
  const { h, L_s, lambda_s, Re_s, Pr_s, Re_t, Sc_t, D_t, L_t } = read.terms;

  const exponents = {
    m: graph.input(route.reynoldsExponent.value, {
      id: `route:${route.id}:m`,
      label: `Reynolds exponent m of “${route.name}”`,
      u: route.reynoldsExponent.u,
      degreesOfFreedom: null,
    }),
    n: graph.input(route.schmidtExponent.value, {
      id: `route:${route.id}:n`,
      label: `exponent n on Sc/Pr of “${route.name}”`,
      u: route.schmidtExponent.u,
      degreesOfFreedom: null,
    }),
  };
  const scatter = workings.scatterFactor(route);
  const allowance = extrapolationFactor(graph, route);
  const nusselt = graph.expression('h * L_s / lambda_s', { h, L_s, lambda_s });
  const sherwood =
    nusselt &&
    graph.expression('Nu_s * (Re_t / Re_s)^m * (Sc_t / Pr_s)^n * scatter * allowance', {
      Nu_s: nusselt,
      Re_t,
      Re_s,
      Sc_t,
      Pr_s,
      ...exponents,
      scatter,
      allowance,
    });
  const coefficient = sherwood && graph.expression('Sh_t * D_t / L_t', { Sh_t: sherwood, D_t, L_t });
  if (!nusselt || !sherwood || !coefficient) {
    return noValue(`The route “${route.name}” has no finite value at these numbers.`);
  }
  const [bench, plant] = [points.nameOf(from), points.nameOf(to)];
  return {
    answer: { ok: true, term: coefficient },
    steps: [
      { symbol: 'Nu_s', meaning: `Nusselt number at ${bench}`, unit: '1', term: nusselt },
      { symbol: 'Re_s', meaning: `Reynolds number at ${bench}`, unit: '1', term: Re_s },
      { symbol: 'Re_t', meaning: `Reynolds number at ${plant}`, unit: '1', term: Re_t },
      { symbol: 'Pr_s', meaning: `Prandtl number at ${bench}`, unit: '1', term: Pr_s },
      { symbol: 'Sc_t', meaning: `Schmidt number at ${plant}`, unit: '1', term: Sc_t },
      { symbol: 'Sh_t', meaning: `Sherwood number at ${plant}`, unit: '1', term: sherwood },
    ],
  };
}
