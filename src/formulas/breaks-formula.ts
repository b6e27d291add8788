import type { ValueOfName } from './evaluate-formula.js';
import type { Formula, NumberTree } from './formula.js';
import { compareNumbers, joinNumbers } from './operators.js';

/** A number, or NaN where a name has no value or the result is none. */
function number(tree: NumberTree, valueNamed: ValueOfName): number {
  switch (tree.kind) {
    case 'number':
      return tree.value;
    case 'name': {
      const value = valueNamed(tree.name);
      return typeof value === 'number' ? finite(value) : Number.NaN;
    }
    case 'negate':
      return -number(tree.of, valueNamed);
    case 'arithmetic':
      return finite(joinNumbers(tree.operator, number(tree.left, valueNamed), number(tree.right, valueNamed)));
    case 'call':
      return finite(called(tree, valueNamed));
  }
}

function finite(value: number): number {
  return Number.isFinite(value) ? value : Number.NaN;
}

function called({ name, of }: NumberTree & { kind: 'call' }, valueNamed: ValueOfName): number {
  let result = number(of[0] as NumberTree, valueNamed);
  if (name === 'abs') return Math.abs(result);
  if (name === 'sqrt') return Math.sqrt(result);
  for (let i = 1; i < of.length; i += 1) {
    const next = number(of[i] as NumberTree, valueNamed);
    result = name === 'min' ? Math.min(result, next) : Math.max(result, next);
  }
  return result;
}

/** True, false, or null where values are missing that could decide. */
function truth(tree: Formula, valueNamed: ValueOfName): boolean | null {
  switch (tree.kind) {
    case 'flag': {
      const value = valueNamed(tree.name);
      return typeof value === 'boolean' ? value : null;
    }
    case 'not': {
      const inner = truth(tree.of, valueNamed);
      return inner === null ? null : !inner;
    }
    case 'compare': {
      const a = number(tree.left, valueNamed);
      const b = number(tree.right, valueNamed);
      return Number.isNaN(a) || Number.isNaN(b) ? null : compareNumbers(tree.operator, a, b);
    }
    case 'and':
    case 'or': {
      const decides = tree.kind === 'or';
      const left = truth(tree.left, valueNamed);
      if (left === decides) return decides;
      const right = truth(tree.right, valueNamed);
      if (right === decides) return decides;
      return left === null || right === null ? null : !decides;
    }
  }
}

/**
 * True where a rule is broken: `evaluateFormula(...).truth === false` without its list of what is missing, for a search that asks it
 * millions of times.
 *
 * @example breaksFormula(tree, (name) => figures[name]) //=> false
 */
export function breaksFormula(tree: Formula, valueNamed: ValueOfName): boolean {
  return truth(tree, valueNamed) === false;
}
