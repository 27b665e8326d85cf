import type { FormulaTree } from './formula-tree.ts';

const strength = { '+': 1, '-': 1, '*': 2, '/': 2, '^': 4 } as const;

function strengthOf(tree: FormulaTree): number {
  if (tree.kind === 'operation') return strength[tree.sign];
  return tree.kind === 'negative' ? 3 : 5;
}

/** The text of a tree, with brackets only where they are needed. */
export function writeFormula(tree: FormulaTree): string {
  const inside = (child: FormulaTree, least: number) =>
    strengthOf(child) < least ? `(${writeFormula(child)})` : writeFormula(child);
  switch (tree.kind) {
    case 'number':
      return tree.value === Math.PI ? 'pi' : String(tree.value);
    case 'variable':
      return tree.name;
    case 'negative':
      return `-${inside(tree.of, 3)}`;
    case 'function':
      return `${tree.name}(${tree.of.map(writeFormula).join(', ')})`;
    case 'operation': {
      const own = strength[tree.sign];
      const [left, right] = tree.sign === '^' ? [own + 1, own] : [own, own + 1];
      const gap = tree.sign === '^' ? '' : ' ';
      return `${inside(tree.left, left)}${gap}${tree.sign}${gap}${inside(tree.right, right)}`;
    }
  }
}
