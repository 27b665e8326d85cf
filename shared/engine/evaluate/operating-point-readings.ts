import { findPointVariable } from '../model/point-variables.ts';
import { type OperatingPoint, pointReadingKeys, type StudyModel } from '../model/study-model.ts';
import { standardUncertainty } from '../quantity/standard-uncertainty.ts';
import type { Answer, SensitivityGraph, Term } from './sensitivity-graph.ts';

const STANDARD_GRAVITY = 9.80665; // m/s², exact by definition

type Derivation = { readonly expression: string; readonly needs: readonly string[]; readonly origin: string };

/** How a group follows from what is entered; the first that can be computed counts. */
const derivations: Readonly<Record<string, readonly Derivation[]>> = {
  nu: [{ expression: 'mu / rho', needs: ['mu', 'rho'], origin: 'mu / rho' }],
  mu: [{ expression: 'nu * rho', needs: ['nu', 'rho'], origin: 'nu rho' }],
  Re: [{ expression: 'u * L / nu', needs: ['u', 'L', 'nu'], origin: 'u L / nu' }],
  Pr: [
    { expression: 'mu * cp / lambda', needs: ['mu', 'cp', 'lambda'], origin: 'mu cp / lambda' },
    { expression: 'nu * rho * cp / lambda', needs: ['nu', 'rho', 'cp', 'lambda'], origin: 'nu rho cp / lambda' },
  ],
  Sc: [{ expression: 'nu / D', needs: ['nu', 'D'], origin: 'nu / D' }],
  Gr: [
    {
      expression: `${STANDARD_GRAVITY} * beta * dT * L^3 / nu^2`,
      needs: ['beta', 'dT', 'L', 'nu'],
      origin: 'g beta dT L³ / nu²',
    },
  ],
  GrRe2: [{ expression: 'Gr / Re^2', needs: ['Gr', 'Re'], origin: 'Gr / Re²' }],
};

type Reading = { readonly term: Term; readonly origin: string };

/** Reads variables and groups of the operating points of a study, each computed once. */
export class OperatingPointReadings {
  readonly #graph: SensitivityGraph;
  readonly #points: ReadonlyMap<string, OperatingPoint>;
  readonly #velocityOf: (testId: string) => Answer;
  readonly #known = new Map<string, Reading | null>();
  readonly #visiting = new Set<string>();

  constructor(graph: SensitivityGraph, model: StudyModel, velocityOf: (testId: string) => Answer) {
    this.#graph = graph;
    this.#points = new Map(model.operatingPoints.map((point) => [point.id, point]));
    this.#velocityOf = velocityOf;
  }

  nameOf(pointId: string): string {
    return `“${this.#points.get(pointId)?.name ?? 'an operating point that is not in the study'}”`;
  }

  point(pointId: string): OperatingPoint | undefined {
    return this.#points.get(pointId);
  }

  read(pointId: string, key: string): Answer {
    const reading = this.#find(pointId, key);
    return reading ? { ok: true, term: reading.term } : { ok: false, reasons: [this.#whyMissing(pointId, key)] };
  }

  /** Everything that can be read at a point, in the order of the variables. */
  all(pointId: string): { key: string; term: Term; origin: string }[] {
    return pointReadingKeys.flatMap((key) => {
      const reading = this.#find(pointId, key);
      return reading ? [{ key, ...reading }] : [];
    });
  }

  /** What a group would be by computation where it was entered instead; null where it cannot be computed. */
  computedBesideEntered(pointId: string, key: string): { term: Term; origin: string } | null {
    const entry = this.#points.get(pointId)?.entries.find((one) => one.key === key);
    return entry ? this.#derive(pointId, key) : null;
  }

  #find(pointId: string, key: string): Reading | null {
    const id = `${pointId}:${key}`;
    const known = this.#known.get(id);
    if (known !== undefined) return known;
    // nu follows from mu and mu from nu: whoever is asked first is not asked again.
    if (this.#visiting.has(id)) return null;
    this.#visiting.add(id);
    const reading = this.#entered(pointId, key) ?? this.#derive(pointId, key);
    this.#visiting.delete(id);
    this.#known.set(id, reading);
    return reading;
  }

  #entered(pointId: string, key: string): Reading | null {
    const point = this.#points.get(pointId);
    const entry = point?.entries.find((one) => one.key === key);
    if (!point || !entry) return null;
    if (entry.source.from === 'test') {
      const velocity = key === 'u' ? this.#velocityOf(entry.source.testId) : null;
      return velocity?.ok ? { term: velocity.term, origin: 'test' } : null;
    }
    const { value, uncertainty } = entry.source.value;
    const variable = findPointVariable(key);
    const term = this.#graph.input(value, {
      id: `point:${pointId}:${key}`,
      label: `${variable?.name ?? key} ${variable?.symbol ?? ''} of ${this.nameOf(pointId)}`,
      u: standardUncertainty(uncertainty, value),
      degreesOfFreedom: null,
    });
    return { term, origin: 'entered' };
  }

  #derive(pointId: string, key: string): Reading | null {
    for (const { expression, needs, origin } of derivations[key] ?? []) {
      const readings = needs.map((need) => this.#find(pointId, need));
      if (readings.some((reading) => reading === null)) continue;
      const terms = Object.fromEntries(
        needs.map((need, place) => [need, readings[place]?.term ?? this.#graph.constant(Number.NaN)]),
      );
      const term = this.#graph.expression(expression, terms);
      if (term) return { term, origin };
    }
    return null;
  }

  #whyMissing(pointId: string, key: string): string {
    const point = this.#points.get(pointId);
    if (!point) return `${symbolOf(key)} is asked of an operating point that is not in the study.`;
    const ratio = point.entries.find((entry) => entry.key === key && entry.source.from === 'test');
    if (ratio) return `${symbolOf(key)} of “${point.name}” comes from a test that gives no velocity.`;
    const lacking = this.#lacking(pointId, key, new Set());
    if (lacking.length === 0)
      return `${symbolOf(key)} of “${point.name}” has no finite value: check what is entered there.`;
    if (lacking.length === 1 && lacking[0] === key) return `${symbolOf(key)} is not entered at “${point.name}”.`;
    const itself = findPointVariable(key) ? 'it, or ' : '';
    return `${symbolOf(key)} of “${point.name}” is not known: enter ${itself}${listed(lacking.map(withAlternative))}.`;
  }

  /** The entries that the shortest derivation still needs. */
  #lacking(pointId: string, key: string, path: ReadonlySet<string>): string[] {
    if (this.#find(pointId, key)) return [];
    const options = (derivations[key] ?? [])
      .filter(({ needs }) => !needs.some((need) => path.has(need)))
      .map(({ needs }) => [...new Set(needs.flatMap((need) => this.#lacking(pointId, need, new Set([...path, key]))))]);
    const alone = path.size > 0 && (key === 'nu' || key === 'mu');
    const shortest = options.sort((one, other) => one.length - other.length)[0];
    return shortest === undefined || (alone && shortest.length > 1) ? [key] : shortest;
  }
}

export function symbolOf(key: string): string {
  return findPointVariable(key)?.symbol ?? key;
}

function withAlternative(key: string): string {
  return key === 'nu' ? 'ν (or μ and ρ)' : symbolOf(key);
}

function listed(names: readonly string[]): string {
  return names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
