import type { Formula, NumberTree } from './formula.js';

function atom(tree: NumberTree): string {
  const text = printNumber(tree);
  return tree.kind === 'arithmetic' || tree.kind === 'negate' ? `(${text})` : text;
}

/** The numeric part of a formula as text that reads back to the same tree. */
export function printNumber(tree: NumberTree): string {
  switch (tree.kind) {
    case 'number':
      return String(tree.value);
    case 'name':
      return tree.name;
    case 'negate':
      return `-${atom(tree.of)}`;
    case 'call':
      return `${tree.name}(${tree.of.map(printNumber).join(', ')})`;
    case 'arithmetic':
      return `${atom(tree.left)} ${tree.operator} ${atom(tree.right)}`;
  }
}

function closed(tree: Formula): string {
  const text = printFormula(tree);
  return tree.kind === 'and' || tree.kind === 'or' ? `(${text})` : text;
}

/**
 * A formula as text that reads back to the same tree.
 *
 * @example printFormula({ kind: 'not', of: { kind: 'flag', name: 'ellipticalSampling' } }) //=> 'not ellipticalSampling'
 */
export function printFormula(tree: Formula): string {
  switch (tree.kind) {
    case 'flag':
      return tree.name;
    case 'not':
      return tree.of.kind === 'flag' ? `not ${tree.of.name}` : `not (${printFormula(tree.of)})`;
    case 'compare':
      return `${printNumber(tree.left)} ${tree.operator} ${printNumber(tree.right)}`;
    case 'and':
    case 'or':
      return `${closed(tree.left)} ${tree.kind} ${closed(tree.right)}`;
  }
}
