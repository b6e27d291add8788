import type { Formula, NumberTree } from './formula.js';
import { compareNumbers, joinNumbers } from './operators.js';
import { printNumber } from './print-formula.js';

/** What a rule says of one series. `null`: not checked. */
export interface FormulaVerdict {
  readonly truth: boolean | null;
  /** Names without a value, and parts that are no number (`1 / 0`), each once. */
  readonly missing: readonly string[];
}

export type ValueOfName = (name: string) => number | boolean | null | undefined;

function computed(tree: NumberTree & { kind: 'arithmetic' | 'call' }, values: readonly number[]): number {
  const [a, b] = values as readonly [number, number];
  if (tree.kind === 'arithmetic') return joinNumbers(tree.operator, a, b);
  switch (tree.name) {
    case 'min':
      return Math.min(...values);
    case 'max':
      return Math.max(...values);
    case 'abs':
      return Math.abs(a);
    case 'sqrt':
      return Math.sqrt(a);
  }
}

function numberOf(tree: NumberTree, valueNamed: ValueOfName, missing: Set<string>): number | null {
  if (tree.kind === 'number') return tree.value;
  if (tree.kind === 'name') {
    const value = valueNamed(tree.name);
    if (typeof value === 'number' && Number.isFinite(value)) return value;
    missing.add(tree.name);
    return null;
  }
  if (tree.kind === 'negate') {
    const inner = numberOf(tree.of, valueNamed, missing);
    return inner === null ? null : -inner;
  }
  const parts = tree.kind === 'call' ? tree.of : [tree.left, tree.right];
  const values = parts.map((part) => numberOf(part, valueNamed, missing));
  if (values.includes(null)) return null;
  const result = computed(tree, values as number[]);
  if (Number.isFinite(result)) return result;
  missing.add(printNumber(tree));
  return null;
}

function truthOf(tree: Formula, valueNamed: ValueOfName, missing: Set<string>): boolean | null {
  switch (tree.kind) {
    case 'flag': {
      const value = valueNamed(tree.name);
      if (typeof value === 'boolean') return value;
      missing.add(tree.name);
      return null;
    }
    case 'not': {
      const inner = truthOf(tree.of, valueNamed, missing);
      return inner === null ? null : !inner;
    }
    case 'compare': {
      const left = numberOf(tree.left, valueNamed, missing);
      const right = numberOf(tree.right, valueNamed, missing);
      return left === null || right === null ? null : compareNumbers(tree.operator, left, right);
    }
    case 'and':
    case 'or': {
      // Both sides are looked at, so that everything missing is named.
      const left = truthOf(tree.left, valueNamed, missing);
      const right = truthOf(tree.right, valueNamed, missing);
      const decides = tree.kind === 'or';
      if (left === decides || right === decides) return decides;
      return left === null || right === null ? null : !decides;
    }
  }
}

/**
 * Whether a rule holds for the values of one series, compared with the tolerance of `calc/rounding`.
 * A name without a value makes the rule not checked, never passed: also where the rest alone would make it true.
 * What is false whatever the missing values are is false.
 *
 * @example evaluateFormula(tree, (name) => figures[name]).truth //=> true
 */
export function evaluateFormula(tree: Formula, valueNamed: ValueOfName): FormulaVerdict {
  const missing = new Set<string>();
  const truth = truthOf(tree, valueNamed, missing);
  return { truth: truth === true && missing.size > 0 ? null : truth, missing: [...missing] };
}

/** Names that a formula uses, each once, in order of appearance. */
export function namesIn(tree: Formula | NumberTree): readonly string[] {
  switch (tree.kind) {
    case 'number':
      return [];
    case 'name':
    case 'flag':
      return [tree.name];
    case 'negate':
    case 'not':
      return namesIn(tree.of);
    case 'call':
      return [...new Set(tree.of.flatMap(namesIn))];
    case 'arithmetic':
    case 'compare':
    case 'and':
    case 'or':
      return [...new Set([...namesIn(tree.left), ...namesIn(tree.right)])];
  }
}
