import { type Arithmetic, type CallName, type Comparison, callNames, deepestFormula, type Formula, type NumberTree } from './formula.js';
import { formulaNames } from './formula-names.js';
import type { ParsedNode } from './parsed-node.js';
import { allowed, checkDepth, refuse, refuseKind } from './refusal.js';

const comparisons: ReadonlyMap<string, Comparison> = new Map([
  ['smaller', '<'],
  ['smallerEq', '<='],
  ['larger', '>'],
  ['largerEq', '>='],
  ['equal', '=='],
  ['unequal', '!='],
]);
const arithmetic: ReadonlyMap<string, Arithmetic> = new Map([
  ['add', '+'],
  ['subtract', '-'],
  ['multiply', '*'],
  ['divide', '/'],
  ['pow', '^'],
]);

const argsOf = (node: ParsedNode): readonly ParsedNode[] => (Array.isArray(node.args) ? (node.args as ParsedNode[]) : []);

function unwrapped(node: ParsedNode): ParsedNode | null {
  return node.type === 'ParenthesisNode' ? (node.content as ParsedNode) : null;
}

function nameOf(node: ParsedNode, wanted: 'number' | 'flag'): string {
  const name = String(node.name);
  const kind = formulaNames.get(name);
  if (kind === undefined) return refuse(node, 'formula-name', `the name "${name}" is not known`, 'a parameter or figure key');
  if (kind !== wanted) {
    const hint =
      kind === 'flag'
        ? 'A flag stands alone: write it without a comparison, or after not.'
        : 'Compare it: for example with <= and a number.';
    return refuse(
      node,
      'formula-kind',
      kind === 'flag' ? `"${name}" is true or false` : `"${name}" is a number`,
      wanted === 'number' ? 'a number here' : 'a comparison here',
      hint,
    );
  }
  return name;
}

function callOf(node: ParsedNode, depth: number): NumberTree {
  const called = node.fn as ParsedNode | undefined;
  const name = called?.type === 'SymbolNode' ? String(called.name) : '';
  if (!(callNames as readonly string[]).includes(name))
    return refuse(node, 'formula-part', name === '' ? 'a function is not allowed' : `the function "${name}" is not allowed`);
  const args = argsOf(node);
  const one = name === 'abs' || name === 'sqrt';
  if (one ? args.length !== 1 : args.length < 1)
    return refuse(
      node,
      'formula-part',
      `"${name}" has ${args.length} values`,
      one ? 'one value' : 'at least one value',
      'Count the values.',
    );
  return { kind: 'call', name: name as CallName, of: args.map((arg) => toNumber(arg, depth + 1)) };
}

/** The part of a formula under a node that must be a number. Depth counts from 1. */
function toNumber(node: ParsedNode, depth: number): NumberTree {
  checkDepth(depth);
  const inside = unwrapped(node);
  if (inside !== null) return toNumber(inside, depth + 1);
  if (node.type === 'ConstantNode') {
    if (typeof node.value !== 'number' || !Number.isFinite(node.value)) return refuseKind(node);
    return { kind: 'number', value: node.value };
  }
  if (node.type === 'SymbolNode') return { kind: 'name', name: nameOf(node, 'number') };
  if (node.type === 'FunctionNode') return callOf(node, depth);
  if (node.type === 'RelationalNode')
    return refuse(node, 'formula-kind', 'a comparison stands where a number belongs', 'a number', 'Put parentheses where they belong.');
  if (node.type !== 'OperatorNode') return refuseKind(node);
  const args = argsOf(node);
  const operator = arithmetic.get(String(node.fn));
  if (node.implicit === true)
    return refuse(
      node,
      'formula-part',
      'a number or name follows another without an operator',
      allowed,
      'Write the * in between, and numbers in the unit of their key, without a unit.',
    );
  if (operator !== undefined && args.length === 2) {
    return {
      kind: 'arithmetic',
      operator,
      left: toNumber(args[0] as ParsedNode, depth + 1),
      right: toNumber(args[1] as ParsedNode, depth + 1),
    };
  }
  if (node.fn === 'unaryMinus') return { kind: 'negate', of: toNumber(args[0] as ParsedNode, depth + 1) };
  if (comparisons.has(String(node.fn)) || node.fn === 'and' || node.fn === 'or' || node.fn === 'not') {
    const hint = node.fn === 'not' ? 'Put what "not" turns around in parentheses: not (a <= b).' : 'Put parentheses where they belong.';
    return refuse(node, 'formula-kind', 'true or false stands where a number belongs', 'a number', hint);
  }
  return refuseKind(node);
}

/** `a < b <= c` means `a < b and b <= c`. */
function chainOf(node: ParsedNode, depth: number): Formula {
  const params = node.params as readonly ParsedNode[];
  const links = (node.conditionals as readonly string[]).map((name, i): Formula => {
    const operator = comparisons.get(name);
    if (operator === undefined) return refuseKind(node);
    return {
      kind: 'compare',
      operator,
      left: toNumber(params[i] as ParsedNode, depth + 1),
      right: toNumber(params[i + 1] as ParsedNode, depth + 1),
    };
  });
  if (links.length > deepestFormula) checkDepth(links.length);
  return links.slice(1).reduce<Formula>((left, right) => ({ kind: 'and', left, right }), links[0] as Formula);
}

/** The part of a formula under a node that must be true or false. Depth counts from 1. */
export function toFormula(node: ParsedNode, depth: number): Formula {
  checkDepth(depth);
  const inside = unwrapped(node);
  if (inside !== null) return toFormula(inside, depth + 1);
  if (node.type === 'SymbolNode') return { kind: 'flag', name: nameOf(node, 'flag') };
  if (node.type === 'RelationalNode') return chainOf(node, depth);
  if (node.type === 'OperatorNode') {
    const args = argsOf(node);
    const operator = comparisons.get(String(node.fn));
    if (operator !== undefined && args.length === 2) {
      return {
        kind: 'compare',
        operator,
        left: toNumber(args[0] as ParsedNode, depth + 1),
        right: toNumber(args[1] as ParsedNode, depth + 1),
      };
    }
    if (node.fn === 'and' || node.fn === 'or') {
      return { kind: node.fn, left: toFormula(args[0] as ParsedNode, depth + 1), right: toFormula(args[1] as ParsedNode, depth + 1) };
    }
    if (node.fn === 'not') return { kind: 'not', of: toFormula(args[0] as ParsedNode, depth + 1) };
  }
  // What is no number either is refused by its own kind; what is one lacks a comparison.
  toNumber(node, depth);
  return refuse(
    node,
    'formula-kind',
    'a number stands where a comparison belongs',
    'a comparison',
    'Compare it: for example with <= and a number.',
  );
}
