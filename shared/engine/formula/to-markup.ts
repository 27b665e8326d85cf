import { type FormulaTree, readFormulaTree } from './formula-tree.ts';

const greek: Readonly<Record<string, string>> = {
  alpha: 'α',
  beta: 'β',
  gamma: 'γ',
  delta: 'δ',
  epsilon: 'ε',
  eta: 'η',
  theta: 'θ',
  lambda: 'λ',
  mu: 'μ',
  nu: 'ν',
  pi: 'π',
  rho: 'ρ',
  sigma: 'σ',
  tau: 'τ',
  phi: 'φ',
  omega: 'ω',
  Delta: 'Δ',
  Phi: 'Φ',
  Gamma: 'Γ',
};
/** Groups named after people keep their upright two letters. */
const upright = new Set([
  'Re',
  'Pr',
  'Sc',
  'Nu',
  'Sh',
  'St',
  'Gr',
  'Ra',
  'Gz',
  'Pe',
  'Bi',
  'Fo',
  'Fr',
  'We',
  'Po',
  'Le',
]);

function escapeText(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;');
}

/** Only names of its own: "constructor" is in every object. */
function inGreek(name: string): string {
  return Object.hasOwn(greek, name) ? (greek[name] ?? name) : name;
}

function identifier(name: string): string {
  const shown = escapeText(inGreek(name));
  return upright.has(name) ? `<mi mathvariant="normal">${shown}</mi>` : `<mi>${shown}</mi>`;
}

function symbol(name: string): string {
  const [head = '', ...tail] = name.split('_');
  if (tail.length === 0) return identifier(head);
  return `<msub>${identifier(head)}<mrow>${tail.map((part) => `<mi mathvariant="normal">${escapeText(inGreek(part))}</mi>`).join('<mo>,</mo>')}</mrow></msub>`;
}

const row = (...parts: string[]) => `<mrow>${parts.join('')}</mrow>`;
const bracketed = (inner: string) => row('<mo>(</mo>', inner, '<mo>)</mo>');
const isSum = (tree: FormulaTree) => tree.kind === 'operation' && (tree.sign === '+' || tree.sign === '-');

/** What stands first on the line: a minus there would read as a subtraction, a digit would join the one before. */
function firstOf(tree: FormulaTree): FormulaTree {
  if (tree.kind !== 'operation' || tree.sign === '/') return tree;
  if (tree.sign === '^') return tree.left.kind === 'number' ? tree.left : tree;
  return firstOf(tree.left);
}
const startsWithMinus = (tree: FormulaTree) => firstOf(tree).kind === 'negative';
const startsWithNumber = (tree: FormulaTree) => firstOf(tree).kind === 'number';

function numberMarkup(value: number): string {
  if (value === Math.PI) return '<mi mathvariant="normal">π</mi>';
  const [mantissa, exponent] = String(value).split('e');
  if (exponent === undefined) return `<mn>${value}</mn>`;
  const power = exponent.replace('+', '').replace('-', '−');
  return row(`<mn>${mantissa}</mn>`, '<mo>×</mo>', `<msup><mn>10</mn><mn>${power}</mn></msup>`);
}

function markup(tree: FormulaTree): string {
  switch (tree.kind) {
    case 'number':
      return numberMarkup(tree.value);
    case 'variable':
      return symbol(tree.name);
    case 'negative':
      return row('<mo>−</mo>', isSum(tree.of) ? bracketed(markup(tree.of)) : markup(tree.of));
    case 'function':
      return functionMarkup(tree);
    case 'operation':
      return operationMarkup(tree);
  }
}

function functionMarkup({ name, of }: Extract<FormulaTree, { kind: 'function' }>): string {
  const [first] = of;
  if (name === 'sqrt' && first) return `<msqrt>${markup(first)}</msqrt>`;
  if (name === 'cbrt' && first) return `<mroot>${row(markup(first))}<mn>3</mn></mroot>`;
  if (name === 'abs' && first) return row('<mo>|</mo>', markup(first), '<mo>|</mo>');
  const shown = name === 'log' ? 'ln' : name;
  const head =
    name === 'log10'
      ? '<msub><mi mathvariant="normal">log</mi><mn>10</mn></msub>'
      : `<mi mathvariant="normal">${shown}</mi>`;
  return row(head, '<mo>&#x2061;</mo>', bracketed(of.map(markup).join('<mo>,</mo>')));
}

function operationMarkup({ sign, left, right }: Extract<FormulaTree, { kind: 'operation' }>): string {
  switch (sign) {
    case '/':
      return `<mfrac>${row(markup(left))}${row(markup(right))}</mfrac>`;
    case '^': {
      const isPlain = left.kind === 'variable' || (left.kind === 'number' && !String(left.value).includes('e'));
      return `<msup>${isPlain ? row(markup(left)) : bracketed(markup(left))}${row(flat(right))}</msup>`;
    }
    case '*': {
      const part = (tree: FormulaTree) => (isSum(tree) ? bracketed(markup(tree)) : markup(tree));
      const join = startsWithNumber(right) && !isSum(right) ? '<mo>·</mo>' : '<mo>&#x2009;</mo>';
      return row(part(left), join, startsWithMinus(right) && !isSum(right) ? bracketed(markup(right)) : part(right));
    }
    default: {
      const needsBrackets = (sign === '-' && isSum(right)) || startsWithMinus(right);
      return row(
        markup(left),
        `<mo>${sign === '-' ? '−' : '+'}</mo>`,
        needsBrackets ? bracketed(markup(right)) : markup(right),
      );
    }
  }
}

/** In an exponent a fraction of numbers reads better on one line: 1/3. */
function flat(tree: FormulaTree): string {
  if (tree.kind === 'operation' && tree.sign === '/') return row(markup(tree.left), '<mo>/</mo>', markup(tree.right));
  if (tree.kind === 'negative') return row('<mo>−</mo>', flat(tree.of));
  return markup(tree);
}

/** MathML of a formula (or of `name = formula`); the text itself where it cannot be read. */
export function formulaToMathMl(text: string): string {
  const [head, ...tail] = text.split('=');
  const hasHead = tail.length > 0;
  const read = readFormulaTree(hasHead ? tail.join('=') : text);
  const body = read.ok ? markup(read.tree) : `<mtext>${escapeText(text)}</mtext>`;
  const before = hasHead && read.ok ? `${symbol((head ?? '').trim())}<mo>=</mo>` : '';
  return `<math xmlns="http://www.w3.org/1998/Math/MathML"><mrow>${before}${body}</mrow></math>`;
}
