import { type Formula, parseFormula } from '../formula/parse-formula.ts';

/** One independent source of uncertainty. */
export type Input = {
  readonly id: string;
  /** What a practitioner calls it: "wall temperature of “Rig run 3”, instrument". */
  readonly label: string;
  /** Standard uncertainty, SI. */
  readonly u: number;
  /** Of `u`; null where infinite (type B). */
  readonly degreesOfFreedom: number | null;
  /** Inputs estimated together from the same readings count once in the degrees of freedom. */
  readonly group: string;
};

/** A number of the study with its partial derivatives with respect to every input known when it was made. */
export type Term = {
  readonly value: number;
  readonly row: Float64Array;
  /** True where an uncertain input is behind it, even if its sensitivity vanishes. */
  readonly restsOnUncertainty: boolean;
};

/** A term, or the sentences that say why there is none. */
export type Answer = { readonly ok: true; readonly term: Term } | { readonly ok: false; readonly reasons: string[] };

/**
 * Carries exact derivatives with respect to all inputs forward through a study (JCGM 100:2008, 5.1.2). Intermediate
 * results keep their rows instead of a standard uncertainty of their own, so that an input shared by two branches
 * counts once and x − x cancels.
 */
export class SensitivityGraph {
  readonly inputs: Input[] = [];
  readonly #terms = new Map<string, Term>();
  readonly #places = new Map<string, number>();

  /** The term of an input; asked for twice by the same id it is the same input. */
  input(value: number, input: Omit<Input, 'group'> & { readonly group?: string }): Term {
    const known = this.#terms.get(input.id);
    if (known) return known;
    const place = this.inputs.length;
    this.inputs.push({ ...input, group: input.group ?? input.id });
    this.#places.set(input.id, place);
    const row = new Float64Array(place + 1);
    row[place] = 1;
    const term = { value, row, restsOnUncertainty: input.u > 0 };
    this.#terms.set(input.id, term);
    return term;
  }

  placeOf(inputId: string): number | undefined {
    return this.#places.get(inputId);
  }

  constant(value: number): Term {
    return { value, row: new Float64Array(0), restsOnUncertainty: false };
  }

  /** A term of the given value whose derivative with respect to `parts[i].term` is `parts[i].by`. */
  combine(value: number, parts: readonly { readonly term: Term; readonly by: number }[]): Term {
    const row = new Float64Array(parts.reduce((length, part) => Math.max(length, part.term.row.length), 0));
    let restsOnUncertainty = false;
    for (const { term, by } of parts) {
      restsOnUncertainty ||= term.restsOnUncertainty;
      if (by === 0) continue;
      const from = term.row;
      for (let place = 0; place < from.length; place += 1) row[place] = (row[place] ?? 0) + by * (from[place] ?? 0);
    }
    return { value, row, restsOnUncertainty };
  }

  /** Factor · product of the terms; defined where a term is zero as well. */
  product(factor: number, terms: readonly Term[]): Term {
    const without = (skipped: number) =>
      terms.reduce((product, term, place) => (place === skipped ? product : product * term.value), factor);
    return this.combine(
      without(-1),
      terms.map((term, place) => ({ term, by: without(place) })),
    );
  }

  /** A formula of terms; null where it has no finite value or derivative there (a root of zero, a division by it). */
  formula(formula: Formula, terms: readonly Term[]): Term | null {
    const { value, gradient } = formula.evaluate(Float64Array.from(terms, (term) => term.value));
    if (!Number.isFinite(value) || gradient.some((derivative) => !Number.isFinite(derivative))) return null;
    return this.combine(
      value,
      terms.map((term, place) => ({ term, by: gradient[place] ?? 0 })),
    );
  }

  /** As `formula`, for an expression of our own over named terms. Throws where a name has no term. */
  expression(text: string, terms: Readonly<Record<string, Term>>): Term | null {
    const parsed = parseFormula(text);
    if (!parsed.ok) throw new Error(`The engine's own expression “${text}” cannot be read: ${parsed.reason}`);
    const ordered = parsed.formula.variables.map((name) => {
      const term = terms[name];
      if (!term) throw new Error(`The engine's own expression “${text}” has no term for ${name}.`);
      return term;
    });
    return this.formula(parsed.formula, ordered);
  }
}
