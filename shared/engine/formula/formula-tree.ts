import { create, type FactoryFunctionMap, type MathJsInstance, type MathNode, parseDependencies } from 'mathjs';

/** An expression after the whitelist: five kinds of node, nothing else gets through. */
export type FormulaTree =
  | { readonly kind: 'number'; readonly value: number }
  | { readonly kind: 'variable'; readonly name: string }
  | { readonly kind: 'negative'; readonly of: FormulaTree }
  | {
      readonly kind: 'operation';
      readonly sign: '+' | '-' | '*' | '/' | '^';
      readonly left: FormulaTree;
      readonly right: FormulaTree;
    }
  | { readonly kind: 'function'; readonly name: FunctionName; readonly of: readonly FormulaTree[] };

export const functionNames = [
  'log',
  'log10',
  'exp',
  'sqrt',
  'cbrt',
  'abs',
  'min',
  'max',
  'sin',
  'cos',
  'tan',
  'tanh',
  'atan',
] as const;
export type FunctionName = (typeof functionNames)[number];

/** Names that stand for numbers and cannot be variables. */
export const constants: Readonly<Record<string, number>> = { pi: Math.PI };

export type TreeReading =
  | { readonly ok: true; readonly tree: FormulaTree }
  | { readonly ok: false; readonly reason: string };

const math = create({ parseDependencies } as FactoryFunctionMap) as MathJsInstance;
const longest = 500;
const deepest = 50;
const mostNodes = 300;

class Refusal extends Error {}

/** Deep nesting would exhaust the stack of the parser, so brackets are counted before it sees the text. */
function depthOf(text: string): number {
  let depth = 0;
  let most = 0;
  for (const character of text) {
    if (character === '(') depth += 1;
    if (character === ')') depth -= 1;
    most = Math.max(most, depth);
  }
  return most;
}

const plainCharacters = /^[\p{L}\p{N}_ \t.+\-*/^(),]*$/u;

/** What people paste in: typographic operators and superscripts of whole numbers. */
function normalise(text: string): string {
  return text
    .replace(/[·⋅×]/g, '*')
    .replace(/[−–]/g, '-')
    .replace(/÷/g, '/')
    .replaceAll('**', '^')
    .replace(/⁻?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/g, (power) => {
      const digits = [...power].map((digit) => (digit === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(digit)))).join('');
      return `^(${digits})`;
    })
    .replaceAll('π', 'pi')
    .replace(/\bln\b/g, 'log');
}

/** Reads a formula into its tree, or says in a sentence why it may not be one. Never throws. */
export function readFormulaTree(text: string): TreeReading {
  if (text.trim() === '') return { ok: false, reason: 'Write a formula, for example rho_s * layer / (k * dc).' };
  if (text.length > longest) return { ok: false, reason: `A formula has at most ${longest} characters.` };
  const normal = normalise(text);
  const stranger = [...normal].find((character) => !plainCharacters.test(character));
  if (stranger) {
    return {
      ok: false,
      reason: `"${stranger}" has no place in a formula. Use names, numbers, + - * / ^, brackets and the functions ${functionNames.join(', ')}.`,
    };
  }
  if (depthOf(normal) > deepest) return { ok: false, reason: `Brackets may be nested ${deepest} deep.` };
  try {
    const budget = { nodes: 0 };
    return { ok: true, tree: admit(math.parse(normal), budget, 0) };
  } catch (error) {
    if (error instanceof Refusal) return { ok: false, reason: error.message };
    return { ok: false, reason: `The formula cannot be read: ${plainer(error)}` };
  }
}

function plainer(error: unknown): string {
  const message = error instanceof SyntaxError ? error.message : 'it is not complete';
  const place = /\(char (\d+)\)/.exec(message)?.[1];
  if (/Unexpected end|Value expected/.test(message))
    return `something is missing${place ? ` at character ${place}` : ' at the end'}.`;
  if (/Parenthesis/.test(message)) return 'a bracket is missing.';
  return `something is wrong${place ? ` at character ${place}` : ''}.`;
}

const operators: Readonly<Record<string, '+' | '-' | '*' | '/' | '^'>> = {
  add: '+',
  subtract: '-',
  multiply: '*',
  divide: '/',
  pow: '^',
};

type AnyNode = MathNode & {
  readonly value?: unknown;
  readonly name?: unknown;
  readonly fn?: unknown;
  readonly implicit?: unknown;
  readonly args?: MathNode[];
  readonly content?: MathNode;
};

function admit(node: MathNode, budget: { nodes: number }, depth: number): FormulaTree {
  budget.nodes += 1;
  if (budget.nodes > mostNodes || depth > 2 * deepest)
    throw new Refusal('The formula is too long. Split it into two quantities.');
  const given = node as AnyNode;
  const next = (child: MathNode) => admit(child, budget, depth + 1);
  switch (node.type) {
    case 'ConstantNode':
      if (typeof given.value !== 'number' || !Number.isFinite(given.value))
        throw new Refusal('Only numbers may stand in a formula.');
      return { kind: 'number', value: given.value };
    case 'SymbolNode': {
      const name = String(given.name);
      if (Object.hasOwn(constants, name)) return { kind: 'number', value: constants[name] ?? Number.NaN };
      if ((functionNames as readonly string[]).includes(name))
        throw new Refusal(`${name} is a function; write ${name}(…).`);
      return { kind: 'variable', name };
    }
    case 'ParenthesisNode':
      if (given.content) return next(given.content);
      break;
    case 'OperatorNode': {
      const [left, right] = given.args ?? [];
      if (given.fn === 'unaryMinus' && left) return { kind: 'negative', of: next(left) };
      if (given.fn === 'unaryPlus' && left) return next(left);
      if (given.implicit === true) {
        throw new Refusal(
          'A product needs its *: write a * b and not a b, so that what stands below a / is plain to see.',
        );
      }
      const sign = operators[String(given.fn)];
      if (sign && left && right) return { kind: 'operation', sign, left: next(left), right: next(right) };
      break;
    }
    case 'FunctionNode': {
      const name = String((given.fn as { name?: unknown } | undefined)?.name ?? '');
      if (!(functionNames as readonly string[]).includes(name)) {
        throw new Refusal(
          `"${name}" is not a function that formulas may use. Allowed are ${functionNames.join(', ')}. A product needs its *: write ${name || 'a'} * (…).`,
        );
      }
      const args = given.args ?? [];
      const takes = name === 'min' || name === 'max' ? args.length >= 2 : args.length === 1;
      if (!takes)
        throw new Refusal(`${name} takes ${name === 'min' || name === 'max' ? 'two or more values' : 'one value'}.`);
      return { kind: 'function', name: name as FunctionName, of: args.map(next) };
    }
  }
  throw new Refusal('Only names, numbers, + - * / ^, brackets and the listed functions may stand in a formula.');
}

/** The variables of a tree in the order in which they first appear. */
export function variablesOf(tree: FormulaTree): string[] {
  const names = new Set<string>();
  const visit = (node: FormulaTree): void => {
    switch (node.kind) {
      case 'variable':
        names.add(node.name);
        break;
      case 'negative':
        visit(node.of);
        break;
      case 'operation':
        visit(node.left);
        visit(node.right);
        break;
      case 'function':
        for (const argument of node.of) visit(argument);
        break;
      case 'number':
        break;
    }
  };
  visit(tree);
  return [...names];
}
