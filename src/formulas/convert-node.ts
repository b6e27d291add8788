import { type Arithmetic, type CallName, type Comparison, callNames, deepestFormula, type Formula, type NumberTree } from './formula.js';
import { formulaNames } from './formula-names.js';
import type { ParsedNode } from './parsed-node.js';
import { allowed, checkDepth, refuse, refuseKind } from './refusal.js';
import { inUnit, productUnit, ruleUnits, type UnitLiteral, unitOfName } from './unit-literal.js';

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
const wordOf = (value: unknown): string => (typeof value === 'string' ? value : '');
const listOf = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : []);

/** A node as it should be; what a parser leaves out is refused, not read. */
function present(node: unknown): ParsedNode {
  return typeof node === 'object' && node !== null ? (node as ParsedNode) : refuseKind({ type: 'nothing' });
}

function unwrapped(node: ParsedNode): ParsedNode | null {
  return node.type === 'ParenthesisNode' ? present(node.content) : null;
}

function nameOf(node: ParsedNode, wanted: 'number' | 'flag'): string {
  const name = wordOf(node.name);
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

/** The part of a formula under a node that must be a number: its tree, and its unit where that has a name (blank for plain numbers). */
interface Part {
  readonly node: ParsedNode;
  readonly tree: NumberTree;
  readonly unit: string | null;
  /** A number with a unit that is not yet worth anything: what stands beside it decides. */
  readonly literal: UnitLiteral | null;
}

/** Refuses a number with a unit where nothing stands beside it that has one. */
function settled(part: Part): Part {
  if (part.literal === null) return part;
  return refuse(
    part.node,
    'formula-unit',
    'a number with a unit has nothing beside it to be counted in',
    'it beside a name or a sum of that kind',
    'Write the number in the unit of its key, without a unit.',
  );
}

/** A number as a formula writes it: minus is an operation. */
function plainNumber(value: number): NumberTree {
  return value < 0 ? { kind: 'negate', of: { kind: 'number', value: -value } } : { kind: 'number', value };
}

/** Puts numbers with units into the unit of the first part beside them that has one. */
function sideBySide(parts: readonly Part[]): { readonly trees: readonly NumberTree[]; readonly unit: string | null } {
  const plain = parts.filter(({ literal }) => literal === null);
  const unit = plain.find((part) => part.unit !== '')?.unit ?? (plain.every((part) => part.unit === '') ? '' : null);
  const trees = parts.map((part): NumberTree => {
    if (part.literal === null) return part.tree;
    const value = unit === null ? null : inUnit(part.literal, unit);
    if (value !== null) return plainNumber(value);
    if (plain.length === 0 || unit === null) return settled(part).tree;
    const given =
      unit === ''
        ? `beside a plain number, "${part.literal.unit}" measures nothing`
        : `${part.literal.unit} does not measure what is counted in ${unit}`;
    return refuse(
      part.node,
      'formula-unit',
      given,
      unit === '' ? 'a plain number' : `a unit that measures the same as ${unit}`,
      'Change the unit.',
    );
  });
  return { trees, unit: plain.every((part) => part.unit === unit || part.unit === '') ? unit : null };
}

function callOf(node: ParsedNode, depth: number): Part {
  const called = node.fn as ParsedNode | undefined;
  const name = called?.type === 'SymbolNode' ? wordOf(called.name) : '';
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
  const parts = args.map((arg) => toPart(present(arg), depth + 1));
  if (one) {
    const { tree, unit } = settled(parts[0] as Part);
    return {
      node,
      tree: { kind: 'call', name: name as CallName, of: [tree] },
      unit: name === 'abs' || unit === '' ? unit : null,
      literal: null,
    };
  }
  const { trees, unit } = sideBySide(parts);
  return { node, tree: { kind: 'call', name: name as CallName, of: trees }, unit, literal: null };
}

/** `5 mm`: a plain number before a unit that rules know; null for anything else that follows without an operator. */
function literalOf(node: ParsedNode): UnitLiteral | null {
  const [before, second] = argsOf(node);
  // A minus binds closer than the unit: -5 mm is (-5) mm.
  const minus = before?.type === 'OperatorNode' && before.fn === 'unaryMinus';
  const first = minus ? argsOf(before)[0] : before;
  if (first?.type !== 'ConstantNode' || second?.type !== 'SymbolNode') return null;
  if (typeof first.value !== 'number' || !Number.isFinite(first.value) || !ruleUnits.has(wordOf(second.name))) return null;
  return { number: minus ? -first.value : first.value, unit: wordOf(second.name) };
}

function operationOf(node: ParsedNode, operator: Arithmetic, depth: number): Part {
  const [first, second] = argsOf(node) as readonly [ParsedNode, ParsedNode];
  const left = toPart(present(first), depth + 1);
  const right = toPart(present(second), depth + 1);
  if (operator === '+' || operator === '-') {
    const { trees, unit } = sideBySide([left, right]);
    return {
      node,
      tree: { kind: 'arithmetic', operator, left: trees[0] as NumberTree, right: trees[1] as NumberTree },
      unit,
      literal: null,
    };
  }
  const tree: NumberTree = { kind: 'arithmetic', operator, left: settled(left).tree, right: settled(right).tree };
  if (operator !== '^') return { node, tree, unit: productUnit(left.unit, right.unit, operator), literal: null };
  const squared = right.tree.kind === 'number' && right.tree.value === 2 ? productUnit(left.unit, left.unit, '*') : null;
  return { node, tree, unit: left.unit === '' ? '' : squared, literal: null };
}

/** The part of a formula under a node that must be a number. Depth counts from 1. */
function toPart(node: ParsedNode, depth: number): Part {
  checkDepth(depth);
  const inside = unwrapped(node);
  if (inside !== null) return toPart(inside, depth + 1);
  if (node.type === 'ConstantNode') {
    if (typeof node.value !== 'number' || !Number.isFinite(node.value)) return refuseKind(node);
    return { node, tree: { kind: 'number', value: node.value }, unit: '', literal: null };
  }
  if (node.type === 'SymbolNode') {
    const name = nameOf(node, 'number');
    return { node, tree: { kind: 'name', name }, unit: unitOfName(name), literal: null };
  }
  if (node.type === 'FunctionNode') return callOf(node, depth);
  if (node.type === 'RelationalNode')
    return refuse(node, 'formula-kind', 'a comparison stands where a number belongs', 'a number', 'Put parentheses where they belong.');
  if (node.type !== 'OperatorNode') return refuseKind(node);
  const args = argsOf(node);
  const operator = arithmetic.get(wordOf(node.fn));
  if (node.implicit === true) {
    const literal = literalOf(node);
    if (literal !== null) return { node, tree: { kind: 'number', value: literal.number }, unit: null, literal };
    return refuse(
      node,
      'formula-part',
      'a number or name follows another without an operator',
      allowed,
      'Write the * in between; after a number, a unit such as mm, ms or s.',
    );
  }
  if (operator !== undefined && args.length === 2) return operationOf(node, operator, depth);
  if (node.fn === 'unaryMinus') {
    const of = toPart(present(args[0]), depth + 1);
    const literal = of.literal === null ? null : { ...of.literal, number: -of.literal.number };
    return { node, tree: { kind: 'negate', of: of.tree }, unit: of.unit, literal };
  }
  if (comparisons.has(wordOf(node.fn)) || node.fn === 'and' || node.fn === 'or' || node.fn === 'not') {
    const hint = node.fn === 'not' ? 'Put what "not" turns around in parentheses: not (a <= b).' : 'Put parentheses where they belong.';
    return refuse(node, 'formula-kind', 'true or false stands where a number belongs', 'a number', hint);
  }
  return refuseKind(node);
}

/** A comparison of two parts, numbers with units put into the unit of the other side. */
function comparisonOf(operator: Comparison, left: ParsedNode, right: ParsedNode, depth: number): Formula {
  const { trees } = sideBySide([toPart(left, depth + 1), toPart(right, depth + 1)]);
  return { kind: 'compare', operator, left: trees[0] as NumberTree, right: trees[1] as NumberTree };
}

/** `a < b <= c` means `a < b and b <= c`. */
function chainOf(node: ParsedNode, depth: number): Formula {
  const params = listOf(node.params);
  const links = listOf(node.conditionals).map((name, i): Formula => {
    const operator = comparisons.get(wordOf(name));
    if (operator === undefined) return refuseKind(node);
    return comparisonOf(operator, present(params[i]), present(params[i + 1]), depth);
  });
  if (links.length === 0) return refuseKind(node);
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
    const operator = comparisons.get(wordOf(node.fn));
    if (operator !== undefined && args.length === 2) return comparisonOf(operator, present(args[0]), present(args[1]), depth);
    if (node.fn === 'and' || node.fn === 'or') {
      return { kind: node.fn, left: toFormula(present(args[0]), depth + 1), right: toFormula(present(args[1]), depth + 1) };
    }
    if (node.fn === 'not') return { kind: 'not', of: toFormula(present(args[0]), depth + 1) };
  }
  // What is no number either is refused by its own kind; what is one lacks a comparison.
  toPart(node, depth);
  return refuse(
    node,
    'formula-kind',
    'a number stands where a comparison belongs',
    'a comparison',
    'Compare it: for example with <= and a number.',
  );
}
