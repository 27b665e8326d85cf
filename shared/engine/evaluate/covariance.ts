import type { Finding } from '../model/evaluation.ts';
import type { InputCorrelation, StudyModel } from '../model/study-model.ts';
import type { SensitivityGraph } from './sensitivity-graph.ts';

/** Covariance of two different inputs by their places, `a` < `b`. */
export type Covariance = { readonly a: number; readonly b: number; readonly value: number };

type Pair = { readonly a: number; readonly b: number; readonly r: number };

/**
 * The covariances among the inputs of a study: those of means taken from the same readings, and those that people
 * stated as correlation coefficients, which win where both speak of the same pair. A group of correlations that no
 * set of numbers could have (a matrix that is not positive semi-definite) is left out and named in a finding.
 */
export function gatherCovariances(
  graph: SensitivityGraph,
  model: StudyModel,
): { covariances: Covariance[]; findings: Finding[] } {
  const findings: Finding[] = [];
  const pairs = new Map<string, Pair>();
  for (const pair of [...meansOfTests(graph, model), ...statedPairs(graph, model, findings)]) {
    pairs.set(`${pair.a},${pair.b}`, pair);
  }
  const covariances: Covariance[] = [];
  for (const group of connectedGroups([...pairs.values()])) {
    if (!isPositiveSemiDefinite(group)) {
      findings.push(impossibleGroup(graph, group));
      continue;
    }
    for (const { a, b, r } of group.pairs) {
      covariances.push({ a, b, value: r * (graph.inputs[a]?.u ?? 0) * (graph.inputs[b]?.u ?? 0) });
    }
  }
  return { covariances, findings };
}

export const scatterNames = ['power', 'wall temperature', 'bulk temperature', 'flow'] as const;

function meansOfTests(graph: SensitivityGraph, model: StudyModel): Pair[] {
  return model.tests.flatMap((test) => {
    const places = scatterNames.map((name) => graph.placeOf(`test:${test.id}:${name} scatter`));
    return test.reduction.summary.covarianceOfMeans.flatMap((line, first) =>
      line.flatMap((covariance, second): Pair[] => {
        const [a, b] = [places[first], places[second]];
        if (second <= first || a === undefined || b === undefined || covariance === 0) return [];
        const scale = (graph.inputs[a]?.u ?? 0) * (graph.inputs[b]?.u ?? 0);
        return scale > 0 ? [ordered(a, b, covariance / scale)] : [];
      }),
    );
  });
}

function statedPairs(graph: SensitivityGraph, model: StudyModel, findings: Finding[]): Pair[] {
  return model.inputCorrelations.flatMap((correlation): Pair[] => {
    const a = graph.placeOf(correlation.a);
    const b = graph.placeOf(correlation.b);
    if (a === undefined || b === undefined || a === b) {
      findings.push(unusedCorrelation(correlation, a === undefined || b === undefined));
      return [];
    }
    return correlation.r === 0 ? [] : [ordered(a, b, correlation.r)];
  });
}

function unusedCorrelation(correlation: InputCorrelation, isUnknown: boolean): Finding {
  return {
    code: 'correlation-without-effect',
    severity: 'tells',
    subject: { kind: 'study', id: correlation.id },
    sentence: isUnknown
      ? `A correlation of r = ${correlation.r} has no effect: one of its inputs is not in use in this study.`
      : 'A correlation of an input with itself has no effect.',
  };
}

function ordered(a: number, b: number, r: number): Pair {
  return a < b ? { a, b, r } : { a: b, b: a, r };
}

type Group = { readonly members: number[]; readonly pairs: Pair[] };

function connectedGroups(pairs: readonly Pair[]): Group[] {
  const groupOf = new Map<number, Group>();
  for (const pair of pairs) {
    const [first, second] = [groupOf.get(pair.a), groupOf.get(pair.b)];
    const members = [...new Set([...(first?.members ?? [pair.a]), ...(second?.members ?? [pair.b])])];
    const kept = first === second ? (first?.pairs ?? []) : [...(first?.pairs ?? []), ...(second?.pairs ?? [])];
    const merged = { members, pairs: [...kept, pair] };
    for (const member of members) groupOf.set(member, merged);
  }
  return [...new Set(groupOf.values())];
}

/** Cholesky on the correlation matrix; a pivot of zero is allowed where its whole column is zero (r = ±1). */
function isPositiveSemiDefinite({ members, pairs }: Group): boolean {
  const size = members.length;
  const matrix = members.map((_, line) =>
    Float64Array.from({ length: size }, (_, column) => (line === column ? 1 : 0)),
  );
  for (const { a, b, r } of pairs) {
    const [first, second] = [members.indexOf(a), members.indexOf(b)];
    const [lineA, lineB] = [matrix[first], matrix[second]];
    if (lineA) lineA[second] = r;
    if (lineB) lineB[first] = r;
  }
  const at = (line: number, column: number) => matrix[line]?.[column] ?? 0;
  // Rounding of r = ±1 among several inputs leaves pivots of about 1e-16 on either side of zero.
  const nearlyZero = 1e-10;
  for (let pivot = 0; pivot < size; pivot += 1) {
    const diagonal = at(pivot, pivot);
    if (diagonal < -nearlyZero) return false;
    for (let line = pivot + 1; line < size; line += 1) {
      if (diagonal <= nearlyZero) {
        if (Math.abs(at(line, pivot)) > Math.sqrt(nearlyZero)) return false;
        continue;
      }
      const factor = at(line, pivot) / diagonal;
      const target = matrix[line];
      if (!target) continue;
      for (let column = pivot; column < size; column += 1) {
        target[column] = (target[column] ?? 0) - factor * at(pivot, column);
      }
    }
  }
  return true;
}

function impossibleGroup(graph: SensitivityGraph, group: Group): Finding {
  const labels = group.members.map((place) => graph.inputs[place]?.label ?? '').join('; ');
  return {
    code: 'correlation-impossible',
    severity: 'stops',
    subject: { kind: 'study', id: 'study' },
    sentence:
      `The correlations among these inputs contradict each other, no numbers can be so related: ${labels}. ` +
      'They are left out until one of them is corrected.',
  };
}
