import { type FormulaTree, type FunctionName, readFormulaTree, variablesOf } from './formula-tree.ts';

export type Formula = {
  readonly text: string;
  /** In order of first appearance; constants such as pi are not among them. */
  readonly variables: readonly string[];
  /**
   * Value and exact partial derivatives, by reverse accumulation.
   *
   * @param values - One for each variable, in their order.
   * @returns Non-finite numbers where the formula has no real value, such as the logarithm of a negative number.
   */
  readonly evaluate: (values: ArrayLike<number>) => { readonly value: number; readonly gradient: Float64Array };
};
export type FormulaReading =
  | { readonly ok: true; readonly formula: Formula }
  | { readonly ok: false; readonly reason: string };

const cache = new Map<string, FormulaReading>();

/** Reads a formula once and keeps it: mathjs parses, our own whitelist admits, our own tape evaluates. Never throws. */
export function parseFormula(text: string): FormulaReading {
  const known = cache.get(text);
  if (known) return known;
  const read = readFormulaTree(text);
  const reading: FormulaReading = read.ok ? { ok: true, formula: compile(text, read.tree) } : read;
  if (cache.size > 5000) cache.clear();
  cache.set(text, reading);
  return reading;
}

type Instruction =
  | { readonly op: 'number'; readonly value: number }
  | { readonly op: 'variable'; readonly index: number }
  | { readonly op: 'negative'; readonly a: number }
  | { readonly op: '+' | '-' | '*' | '/' | '^'; readonly a: number; readonly b: number }
  | { readonly op: FunctionName; readonly of: readonly number[] };

function compile(text: string, tree: FormulaTree): Formula {
  const variables = variablesOf(tree);
  const tape: Instruction[] = [];
  const put = (instruction: Instruction) => tape.push(instruction) - 1;
  const place = (node: FormulaTree): number => {
    switch (node.kind) {
      case 'number':
        return put({ op: 'number', value: node.value });
      case 'variable':
        return put({ op: 'variable', index: variables.indexOf(node.name) });
      case 'negative':
        return put({ op: 'negative', a: place(node.of) });
      case 'operation':
        return put({ op: node.sign, a: place(node.left), b: place(node.right) });
      case 'function':
        return put({ op: node.name, of: node.of.map(place) });
    }
  };
  place(tree);
  const values = new Float64Array(tape.length);
  const adjoints = new Float64Array(tape.length);
  return {
    text,
    variables,
    evaluate: (given) => {
      for (const [index, instruction] of tape.entries()) values[index] = forward(instruction, values, given);
      adjoints.fill(0);
      adjoints[tape.length - 1] = 1;
      const gradient = new Float64Array(variables.length);
      for (let index = tape.length - 1; index >= 0; index -= 1) {
        const instruction = tape[index];
        const adjoint = adjoints[index] ?? 0;
        // Nothing flows back from what the result does not depend on; 0 · ∞ must not become NaN.
        if (instruction && adjoint !== 0)
          backward(instruction, values, adjoints, gradient, adjoint, values[index] ?? 0);
      }
      return { value: values[tape.length - 1] ?? Number.NaN, gradient };
    },
  };
}

function forward(instruction: Instruction, values: Float64Array, given: ArrayLike<number>): number {
  const at = (index: number) => values[index] ?? Number.NaN;
  switch (instruction.op) {
    case 'number':
      return instruction.value;
    case 'variable':
      return given[instruction.index] ?? Number.NaN;
    case 'negative':
      return -at(instruction.a);
    case '+':
      return at(instruction.a) + at(instruction.b);
    case '-':
      return at(instruction.a) - at(instruction.b);
    case '*':
      return at(instruction.a) * at(instruction.b);
    case '/':
      return at(instruction.a) / at(instruction.b);
    case '^':
      return at(instruction.a) ** at(instruction.b);
    case 'min':
      return Math.min(...instruction.of.map(at));
    case 'max':
      return Math.max(...instruction.of.map(at));
    default:
      return Math[instruction.op](at(instruction.of[0] ?? -1));
  }
}

function backward(
  instruction: Instruction,
  values: Float64Array,
  adjoints: Float64Array,
  gradient: Float64Array,
  adjoint: number,
  value: number,
): void {
  const at = (index: number) => values[index] ?? Number.NaN;
  const give = (index: number, share: number) => {
    adjoints[index] = (adjoints[index] ?? 0) + adjoint * share;
  };
  switch (instruction.op) {
    case 'number':
      break;
    case 'variable':
      gradient[instruction.index] = (gradient[instruction.index] ?? 0) + adjoint;
      break;
    case 'negative':
      give(instruction.a, -1);
      break;
    case '+':
      give(instruction.a, 1);
      give(instruction.b, 1);
      break;
    case '-':
      give(instruction.a, 1);
      give(instruction.b, -1);
      break;
    case '*':
      give(instruction.a, at(instruction.b));
      give(instruction.b, at(instruction.a));
      break;
    case '/':
      give(instruction.a, 1 / at(instruction.b));
      give(instruction.b, -value / at(instruction.b));
      break;
    case '^': {
      const [base, exponent] = [at(instruction.a), at(instruction.b)];
      give(instruction.a, exponent === 0 ? 0 : exponent * base ** (exponent - 1));
      // The logarithm only exists, and only matters, where the base is positive.
      give(instruction.b, base > 0 ? value * Math.log(base) : 0);
      break;
    }
    case 'min':
    case 'max':
      give(instruction.of.find((index) => at(index) === value) ?? -1, 1);
      break;
    default: {
      const of = instruction.of[0] ?? -1;
      give(of, slope(instruction.op, at(of), value));
      break;
    }
  }
}

/** Derivative of a function of one argument at x, where it has the value y. */
function slope(name: Exclude<FunctionName, 'min' | 'max'>, x: number, y: number): number {
  switch (name) {
    case 'log':
      return 1 / x;
    case 'log10':
      return 1 / (x * Math.LN10);
    case 'exp':
      return y;
    case 'sqrt':
      return 0.5 / y;
    case 'cbrt':
      return 1 / (3 * y * y);
    case 'abs':
      return Math.sign(x);
    case 'sin':
      return Math.cos(x);
    case 'cos':
      return -Math.sin(x);
    case 'tan':
      return 1 + y * y;
    case 'tanh':
      return 1 - y * y;
    case 'atan':
      return 1 / (1 + x * x);
  }
}
