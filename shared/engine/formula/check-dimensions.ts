import { type Dimension, describeDimension, sameDimension } from '../quantity/parse-unit.ts';
import { type FormulaTree, readFormulaTree } from './formula-tree.ts';
import { writeFormula } from './write-formula.ts';

export type DimensionReading =
  | { readonly ok: true; readonly dimension: Dimension }
  | { readonly ok: false; readonly reason: string };

const none: Dimension = [0, 0, 0, 0, 0, 0, 0];

class Inhomogeneous extends Error {}

/**
 * The dimension of a formula's result; where terms do not fit, a sentence that names the offending one.
 *
 * @param dimensions - One for each variable of the formula.
 */
export function dimensionOfFormula(text: string, dimensions: Readonly<Record<string, Dimension>>): DimensionReading {
  const read = readFormulaTree(text);
  if (!read.ok) return read;
  try {
    return { ok: true, dimension: dimensionOf(read.tree, dimensions) };
  } catch (error) {
    if (error instanceof Inhomogeneous) return { ok: false, reason: error.message };
    throw error;
  }
}

function named(tree: FormulaTree, dimension: Dimension): string {
  const unit = describeDimension(dimension);
  return `${writeFormula(tree)} (${unit === '1' ? 'a plain number' : unit})`;
}

function dimensionOf(tree: FormulaTree, dimensions: Readonly<Record<string, Dimension>>): Dimension {
  const of = (node: FormulaTree) => dimensionOf(node, dimensions);
  switch (tree.kind) {
    case 'number':
      return none;
    case 'variable': {
      const dimension = Object.hasOwn(dimensions, tree.name) ? dimensions[tree.name] : undefined;
      if (!dimension) throw new Inhomogeneous(`${tree.name} is not bound to anything yet, so its unit is not known.`);
      return dimension;
    }
    case 'negative':
      return of(tree.of);
    case 'operation':
      return ofOperation(tree, of);
    case 'function':
      return ofFunction(tree, of);
  }
}

function ofOperation(
  tree: Extract<FormulaTree, { kind: 'operation' }>,
  of: (node: FormulaTree) => Dimension,
): Dimension {
  const left = of(tree.left);
  switch (tree.sign) {
    case '+':
    case '-': {
      const right = of(tree.right);
      if (!sameDimension(left, right)) {
        const [what, join] = tree.sign === '+' ? ['add', 'and'] : ['subtract', 'and'];
        throw new Inhomogeneous(
          `Cannot ${what} ${named(tree.left, left)} ${join} ${named(tree.right, right)}: their units are of different kinds.`,
        );
      }
      return left;
    }
    case '*': {
      const right = of(tree.right);
      return left.map((exponent, index) => exponent + (right[index] ?? 0));
    }
    case '/': {
      const right = of(tree.right);
      return left.map((exponent, index) => exponent - (right[index] ?? 0));
    }
    case '^': {
      const exponentDimension = of(tree.right);
      if (!sameDimension(exponentDimension, none)) {
        throw new Inhomogeneous(`The exponent ${named(tree.right, exponentDimension)} must be a plain number.`);
      }
      if (sameDimension(left, none)) return none;
      const exponent = constantOf(tree.right);
      if (exponent === null) {
        throw new Inhomogeneous(
          `${named(tree.left, left)} has a unit, so its exponent ${writeFormula(tree.right)} must be a fixed number.`,
        );
      }
      return left.map((one) => one * exponent);
    }
  }
}

function ofFunction(tree: Extract<FormulaTree, { kind: 'function' }>, of: (node: FormulaTree) => Dimension): Dimension {
  const [first] = tree.of;
  if (!first) return none;
  const dimension = of(first);
  switch (tree.name) {
    case 'abs':
      return dimension;
    case 'sqrt':
      return dimension.map((exponent) => exponent / 2);
    case 'cbrt':
      return dimension.map((exponent) => exponent / 3);
    case 'min':
    case 'max':
      for (const other of tree.of.slice(1)) {
        const otherDimension = of(other);
        if (!sameDimension(dimension, otherDimension)) {
          throw new Inhomogeneous(
            `${tree.name} cannot compare ${named(first, dimension)} and ${named(other, otherDimension)}: their units are of different kinds.`,
          );
        }
      }
      return dimension;
    default:
      if (!sameDimension(dimension, none)) {
        throw new Inhomogeneous(
          `${tree.name} takes a plain number, but ${named(first, dimension)} has a unit. Divide it by a reference value.`,
        );
      }
      return none;
  }
}

/** The number that a subtree without variables stands for; null where it depends on one. */
function constantOf(tree: FormulaTree): number | null {
  switch (tree.kind) {
    case 'number':
      return tree.value;
    case 'negative': {
      const of = constantOf(tree.of);
      return of === null ? null : -of;
    }
    case 'operation': {
      const [left, right] = [constantOf(tree.left), constantOf(tree.right)];
      if (left === null || right === null) return null;
      switch (tree.sign) {
        case '+':
          return left + right;
        case '-':
          return left - right;
        case '*':
          return left * right;
        case '/':
          return left / right;
        case '^':
          return left ** right;
      }
      return null;
    }
    default:
      return null;
  }
}
