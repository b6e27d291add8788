import { deepestFormula } from './formula.js';
import type { ParsedNode } from './parsed-node.js';

/** Why a part of a formula is not allowed. */
export interface Refusal {
  readonly code: 'formula-part' | 'formula-name' | 'formula-kind' | 'formula-depth' | 'formula-unit';
  /** The part, as text. */
  readonly part: string;
  readonly because: string;
  readonly expected: string;
  readonly hint: string;
}

/** Carries a refusal up to the reader of the formula. */
export class NotAllowed extends Error {
  constructor(readonly refusal: Refusal) {
    super(refusal.because);
  }
}

const kindsInWords: ReadonlyMap<string, string> = new Map([
  ['AssignmentNode', 'an assignment'],
  ['FunctionAssignmentNode', 'the definition of a function'],
  ['AccessorNode', 'a property'],
  ['IndexNode', 'an index'],
  ['ArrayNode', 'a matrix'],
  ['ObjectNode', 'an object'],
  ['RangeNode', 'a range'],
  ['BlockNode', 'more than one expression'],
  ['ConditionalNode', 'a choice with ? and :'],
  ['ConstantNode', 'a value that is no number'],
  ['FunctionNode', 'a function'],
]);

/** Everything a formula may hold, in words. */
export const allowed =
  'names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt, units after numbers';

function partOf(node: ParsedNode): string {
  try {
    return (node as unknown as { toString(): string }).toString();
  } catch {
    return node.type;
  }
}

/** Refuses a node: the part is named as text. */
export function refuse(
  node: ParsedNode,
  code: Refusal['code'],
  because: string,
  expected = allowed,
  hint = 'Write the rule with what is allowed.',
): never {
  throw new NotAllowed({ code, part: partOf(node), because, expected, hint });
}

/** Refuses a node whose kind is on no list. */
export function refuseKind(node: ParsedNode): never {
  const operator =
    node.type === 'OperatorNode'
      ? `the operator "${typeof node.op === 'string' ? node.op : ''}"`
      : (kindsInWords.get(node.type) ?? 'something');
  const hint = node.type === 'AssignmentNode' ? 'Compare with == instead of =.' : 'Write the rule with what is allowed.';
  return refuse(node, 'formula-part', `${operator} is not allowed`, allowed, hint);
}

/** Stops where a tree is deeper than the limit, before it is walked any further. */
export function checkDepth(depth: number): void {
  if (depth <= deepestFormula) return;
  throw new NotAllowed({
    code: 'formula-depth',
    part: '',
    because: `it is nested more than ${deepestFormula} deep`,
    expected: `at most ${deepestFormula} levels`,
    hint: 'Split it into several rules.',
  });
}
