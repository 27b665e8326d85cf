import type { Uncertainty } from '../model/study-model.ts';

/**
 * The standard uncertainty that a statement amounts to, in the unit of the value (JCGM 100:2008, 4.3).
 * Half-widths: a/√3 for a rectangular, a/√6 for a triangular distribution.
 */
export function standardUncertainty(uncertainty: Uncertainty, value: number): number {
  switch (uncertainty.form) {
    case 'exact':
      return 0;
    case 'standard':
      return uncertainty.u;
    case 'expanded':
      return uncertainty.U / uncertainty.k;
    case 'relative':
      return uncertainty.fraction * Math.abs(value);
    case 'half-width':
      return uncertainty.halfWidth / Math.sqrt(uncertainty.distribution === 'rectangular' ? 3 : 6);
  }
}
