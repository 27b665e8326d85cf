import { findMethod } from '../methods/catalogue.ts';
import type { Method } from '../methods/method.ts';
import type { MatchCheck, Verdict } from '../model/evaluation.ts';
import type { OperatingPoint } from '../model/study-model.ts';
import { formatNumber } from '../quantity/format-measured.ts';
import { checkRegime } from './flow-regimes.ts';
import { type BoundVariable, boundVariables, readAtOwnPoint } from './follow-correlation.ts';
import { analogyMethodId } from './follow-heat-analogue.ts';
import {
  freeConvection,
  judgeFreeConvection,
  judgeLengthRatio,
  judgeReynoldsMatch,
  judgeWindow,
  reynoldsMatch,
  windowSentence,
} from './judge-window.ts';
import type { Answer, Term } from './sensitivity-graph.ts';
import type { RouteOf, Workings } from './workings.ts';

/** Expanded uncertainty (k = 2) of a term, in its unit. */
export type ExpandedOf = (term: Term) => number;

/** Everything compared on the link of a heat analogue: groups, geometry, regime, and the windows of the analogy. */
export function checkHeatAnalogue(
  workings: Workings,
  route: RouteOf<'heat-analogue'>,
  expandedOf: ExpandedOf,
): MatchCheck[] {
  const { points } = workings;
  const from = workings.quantity(route.sourceQuantityId ?? '')?.operatingPointId;
  const to = workings.quantity(route.quantityId)?.operatingPointId;
  const [source, target] = [points.point(from ?? ''), points.point(to ?? '')];
  if (!source || !target) return [];
  const [bench, plant] = [points.nameOf(source.id), points.nameOf(target.id)];
  const reynolds = { source: points.read(source.id, 'Re'), target: points.read(target.id, 'Re') };
  const regime =
    reynolds.source.ok && reynolds.target.ok && source.geometry.family === target.geometry.family
      ? checkRegime(
          source.geometry.family,
          { reynolds: reynolds.source.term.value, place: bench },
          { reynolds: reynolds.target.term.value, place: plant },
        )
      : null;
  return [
    matchReynolds(workings, reynolds.source, reynolds.target, bench, plant, expandedOf),
    ...analogyWindows(workings, source, target, expandedOf),
    ...compareGeometry(source, target),
    ...(regime ? [regime] : []),
    checkFreeConvection(points.read(source.id, 'GrRe2'), bench, 'source'),
    checkFreeConvection(points.read(target.id, 'GrRe2'), plant, 'target'),
  ];
}

function matchReynolds(
  workings: Workings,
  source: Answer,
  target: Answer,
  bench: string,
  plant: string,
  expandedOf: ExpandedOf,
): MatchCheck {
  const base = { key: 'match:Re', kind: 'match', group: 'Re', window: reynoldsMatch } as const;
  const ratio =
    source.ok && target.ok
      ? workings.graph.expression('target / source', { target: target.term, source: source.term })
      : null;
  if (!source.ok || !target.ok || !ratio) {
    const reasons = [source, target].flatMap((answer) => (answer.ok ? [] : answer.reasons));
    return {
      ...base,
      source: source.ok ? source.term.value : null,
      target: target.ok ? target.term.value : null,
      ratio: null,
      verdict: 'not evaluated',
      sentence: `The Reynolds numbers of ${bench} and ${plant} are not compared. ${reasons.join(' ')}`.trim(),
    };
  }
  const expanded = expandedOf(ratio) / Math.abs(ratio.value);
  const verdict = judgeReynoldsMatch(ratio.value, expanded);
  const apart = Math.max(ratio.value, 1 / ratio.value);
  const percent = `${formatNumber(Math.abs(ratio.value - 1) * 100, 2)} %`;
  const uncertain = `${formatNumber(expanded * 100, 2)} %`;
  const words: Record<Verdict, string> = {
    inside:
      Math.abs(ratio.value - 1) < 1e-12
        ? 'the same.'
        : `${percent} apart, ${Math.abs(Math.log(ratio.value)) <= expanded ? `within their uncertainty of ${uncertain}` : 'matched within 5 %'}.`,
    'near the edge': `${percent} apart, more than their uncertainty of ${uncertain}; the exponent m carries the difference.`,
    outside: `${formatNumber(apart, 3)} times ${ratio.value > 1 ? 'higher' : 'lower'} at ${plant}, not a match (0.8 to 1.25).`,
    'not evaluated': '',
  };
  return {
    ...base,
    source: source.term.value,
    target: target.term.value,
    ratio: ratio.value,
    verdict,
    sentence:
      `Re is ${formatNumber(source.term.value)} at ${bench} and ${formatNumber(target.term.value)} at ${plant}: ` +
      words[verdict],
  };
}

/** The windows of the analogy: Pr where the heat was measured, Sc where the mass is transferred. */
function analogyWindows(
  workings: Workings,
  source: OperatingPoint,
  target: OperatingPoint,
  expandedOf: ExpandedOf,
): MatchCheck[] {
  const { points } = workings;
  const method = findMethod(analogyMethodId);
  return (method?.window ?? []).flatMap((entry) => {
    if (entry.group !== 'Pr' && entry.group !== 'Sc') return [];
    const point = entry.group === 'Pr' ? source : target;
    const check = checkWindow(
      entry,
      { answer: points.read(point.id, entry.group), place: points.nameOf(point.id) },
      expandedOf,
    );
    return entry.group === 'Pr' ? [{ ...check, source: check.target, target: null }] : [check];
  });
}

type WindowEntry = Method['window'][number];

function checkWindow(entry: WindowEntry, { answer, place }: BoundVariable, expandedOf: ExpandedOf): MatchCheck {
  const window = { min: entry.min ?? null, max: entry.max ?? null, basis: entry.basis };
  const base = {
    key: `window:${entry.group}`,
    kind: 'window',
    group: entry.group,
    source: null,
    ratio: null,
    window,
  } as const;
  if (!answer.ok) {
    return {
      ...base,
      target: null,
      verdict: 'not evaluated',
      sentence: `${entry.group} is not checked. ${answer.reasons.join(' ')}`,
    };
  }
  const { value } = answer.term;
  const verdict = judgeWindow(value, expandedOf(answer.term), window);
  return { ...base, target: value, verdict, sentence: windowSentence(entry.group, place, value, window, verdict) };
}

function compareGeometry(source: OperatingPoint, target: OperatingPoint): MatchCheck[] {
  const [from, to] = [source.geometry, target.geometry];
  const base = { kind: 'geometry', source: null, target: null, ratio: null, window: null } as const;
  const isSame = from.family === to.family;
  const family: MatchCheck = {
    ...base,
    key: 'geometry:family',
    group: 'shape',
    verdict: isSame ? 'inside' : 'outside',
    sentence: isSame
      ? `“${source.name}” and “${target.name}” have the same shape: ${from.family}.`
      : `“${source.name}” is a ${from.family}, “${target.name}” a ${to.family}: no analogy holds between different shapes.`,
  };
  const names = [...new Set([...from.ratios, ...to.ratios].map((ratio) => ratio.name))];
  if (names.length === 0) {
    return [
      family,
      {
        ...base,
        key: 'geometry:ratios',
        group: 'length ratios',
        verdict: 'not evaluated',
        sentence: `No length ratios are entered at “${source.name}” and “${target.name}”, so only their shapes are compared.`,
      },
    ];
  }
  return [family, ...names.map((name) => compareRatio(name, source, target))];
}

function compareRatio(name: string, source: OperatingPoint, target: OperatingPoint): MatchCheck {
  const valueAt = (point: OperatingPoint) => point.geometry.ratios.find((ratio) => ratio.name === name)?.value ?? null;
  const [from, to] = [valueAt(source), valueAt(target)];
  const base = {
    key: `geometry:${name}`,
    kind: 'geometry',
    group: name,
    source: from,
    target: to,
    window: null,
  } as const;
  if (from === null || to === null) {
    const [without, has] = from === null ? [source, target] : [target, source];
    return {
      ...base,
      ratio: null,
      verdict: 'not evaluated',
      sentence: `${name} is entered at “${has.name}” but not at “${without.name}”.`,
    };
  }
  const verdict = judgeLengthRatio(from, to);
  const apart = formatNumber((Math.max(from, to) / Math.min(from, to) - 1) * 100, 2);
  const words: Record<Verdict, string> = {
    inside: from === to ? 'equal' : `${apart} % apart, equal within 5 %`,
    'near the edge': `${apart} % apart`,
    outside: `${apart} % apart, not similar`,
    'not evaluated': 'not compared',
  };
  return {
    ...base,
    ratio: to / from,
    verdict,
    sentence: `${name} is ${formatNumber(from)} at “${source.name}” and ${formatNumber(to)} at “${target.name}”: ${words[verdict]}.`,
  };
}

function checkFreeConvection(answer: Answer, place: string, end: 'source' | 'target'): MatchCheck {
  const base = {
    key: `window:Gr/Re² ${end}`,
    kind: 'window',
    group: 'Gr/Re²',
    ratio: null,
    window: freeConvection,
  } as const;
  if (!answer.ok) {
    return {
      ...base,
      source: null,
      target: null,
      verdict: 'not evaluated',
      sentence: `The share of free convection at ${place} is not checked. ${answer.reasons.join(' ')}`,
    };
  }
  const value = Math.abs(answer.term.value);
  const verdict = judgeFreeConvection(value);
  const words: Record<Verdict, string> = {
    inside: 'below 0.1, free convection is negligible.',
    'near the edge': 'between 0.1 and 10, free convection adds to the forced flow.',
    outside: 'above 10, free convection governs.',
    'not evaluated': '',
  };
  return {
    ...base,
    source: end === 'source' ? value : null,
    target: end === 'target' ? value : null,
    verdict,
    sentence: `Gr/Re² is ${formatNumber(value)} at ${place}: ${words[verdict]}`,
  };
}

/** Every limit of a correlation with the value at which it is used, and whether its shape is the method's. */
export function checkCorrelation(
  workings: Workings,
  route: RouteOf<'correlation'>,
  method: Method,
  expandedOf: ExpandedOf,
): MatchCheck[] {
  const quantity = workings.quantity(route.quantityId);
  if (!quantity) return [];
  const variables = boundVariables(workings, route, method, quantity);
  const windows = method.window.map((entry) => {
    const bound = variables[entry.group];
    if (bound) return checkWindow(entry, bound, expandedOf);
    const { expression } = entry;
    const read = expression
      ? combined(workings, expression, variables, workings.points.nameOf(quantity.operatingPointId))
      : readAtOwnPoint(workings, entry.group, quantity, method);
    return checkWindow(entry, read, expandedOf);
  });
  const point = workings.points.point(quantity.operatingPointId);
  return [...windows, ...(point ? checkFamily(method, point) : [])];
}

function combined(
  workings: Workings,
  expression: string,
  variables: Readonly<Record<string, BoundVariable>>,
  place: string,
): BoundVariable {
  const reasons = Object.values(variables).flatMap(({ answer }) => (answer.ok ? [] : answer.reasons));
  if (reasons.length > 0) return { answer: { ok: false, reasons }, place };
  const terms = Object.fromEntries(
    Object.entries(variables).flatMap(([name, { answer }]) => (answer.ok ? [[name, answer.term]] : [])),
  );
  const term = workings.graph.expression(expression, terms);
  const failed: Answer = { ok: false, reasons: [`${expression} has no finite value there.`] };
  return { answer: term ? { ok: true, term } : failed, place };
}

function checkFamily(method: Method, point: OperatingPoint): MatchCheck[] {
  if (method.family.length === 0) return [];
  const { family } = point.geometry;
  const fits = method.family.includes(family);
  return [
    {
      key: 'geometry:family',
      kind: 'geometry',
      group: 'shape',
      source: null,
      target: null,
      ratio: null,
      window: null,
      verdict: fits ? 'inside' : 'outside',
      sentence: fits
        ? `“${point.name}” has the shape that ${method.title} was made for: ${family}.`
        : `“${point.name}” is a ${family}; ${method.title} was made for: ${method.family.join(', ')}.`,
    },
  ];
}
