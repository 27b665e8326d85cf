import type { GeometryFamily } from '../model/study-model.ts';

/** One limit or pair of limits of a method. `sourced`: stated by the source; `indicative`: engineering judgement. */
export type WindowEntry = {
  /** A variable of the method, a length ratio such as `L/d`, or the name of a combined group. */
  readonly group: string;
  readonly min: number | null;
  readonly max: number | null;
  readonly basis: 'sourced' | 'indicative';
  /** For a combined limit: the group as an expression of the method's variables, e.g. `Re * Pr`. */
  readonly expression?: string;
};

/** What has to hold for the method to be right. */
export type MethodAssumption = {
  readonly key: string;
  readonly statement: string;
  readonly ifItFails: string;
  /** Match checks that speak to it, by group, kind or key; none: it is ruled on by judgement. */
  readonly checkGroups: readonly string[];
};

/** A value worked out elsewhere, that the expression must give. */
export type MethodCheck = {
  readonly from: string;
  readonly given: Readonly<Record<string, number>>;
  readonly gives: number;
  readonly relativeTolerance: number;
};

/**
 * One entry of the library, as data. Value, derivatives, typeset formula, window checks, picker and tests are derived
 * from it; nothing branches on a particular method.
 */
export type Method = {
  readonly id: string;
  /** Raised whenever a published result could change. */
  readonly version: number;
  readonly kind: 'correlation' | 'analogy';
  readonly title: string;
  readonly summary: string;
  /** Shapes it was made for; none: any. */
  readonly family: readonly GeometryFamily[];
  readonly transport: 'heat' | 'mass' | 'momentum';
  /** What the expression gives. Sh becomes k by D/L, Nu becomes h by λ/L; anything else is taken as it is. */
  readonly gives: 'Nu' | 'Sh' | 'f' | 'St' | 'factor';
  readonly expression: string;
  readonly variables: Readonly<Record<string, { readonly meaning: string; readonly unit: string }>>;
  readonly result: { readonly symbol: string; readonly meaning: string; readonly unit: string };
  /** The length in its groups, and the temperature at which properties are taken. */
  readonly length: string;
  readonly temperature: string;
  readonly window: readonly WindowEntry[];
  readonly scatter: {
    /** As one relative standard uncertainty. */
    readonly relative: number;
    /** What the source says, and how it is read. */
    readonly reading: string;
    readonly from: string;
  };
  /** Whether and how it serves the other kinds of transport. */
  readonly carriesTo: string;
  readonly source: string;
  readonly year: number;
  /** Shown to the user as it is. */
  readonly status: 'library-checked' | 'analytic' | 'from memory';
  readonly pitfalls: readonly string[];
  readonly assumptions: readonly MethodAssumption[];
  readonly checks: readonly MethodCheck[];
};

export function defineMethod(method: Method): Method {
  return method;
}
