import { atMost } from '../calc/rounding.js';
import type { Comparison, Formula, NumberTree } from './formula.js';

/** Every value a number may take; `sure` is false where it may have none (a null figure, a division by zero). */
export interface Interval {
  readonly low: number;
  readonly high: number;
  readonly sure: boolean;
}

/** What a rule may say over a whole box of values. */
export interface TruthBounds {
  readonly canHold: boolean;
  readonly canFail: boolean;
  /** True where a value may be missing, so that the rule may be not checked. */
  readonly canMiss: boolean;
}

/** Bounds of a name: an interval, the flags it may take, or null where nothing is known of it. */
export type BoundsOfName = (name: string) => Interval | readonly boolean[] | null;

const largest = Number.MAX_VALUE;
const anything: Interval = { low: -largest, high: largest, sure: false };

/** Ends as finite numbers; overflow has no value at evaluation, so it is unsure. */
function interval(low: number, high: number, sure: boolean): Interval {
  if (Number.isNaN(low) || Number.isNaN(high)) return anything;
  const inside = low >= -largest && high <= largest;
  return { low: Math.max(low, -largest), high: Math.min(high, largest), sure: sure && inside };
}

function corners(a: Interval, b: Interval, of: (x: number, y: number) => number): Interval {
  const values = [of(a.low, b.low), of(a.low, b.high), of(a.high, b.low), of(a.high, b.high)];
  return interval(Math.min(...values), Math.max(...values), a.sure && b.sure);
}

/** The power function is not rounded monotonically: its bounds are widened a little. */
function widened({ low, high, sure }: Interval): Interval {
  return interval(low - Math.abs(low) * 1e-12, high + Math.abs(high) * 1e-12, sure);
}

function power(a: Interval, b: Interval): Interval {
  if (a.low > 0) return widened(corners(a, b, (x, y) => x ** y));
  const whole = b.low === b.high && Number.isInteger(b.low) && b.low > 0;
  if (!whole) return anything;
  const ends = corners(a, b, (x, y) => x ** y);
  return widened(b.low % 2 === 0 && a.high > 0 ? interval(0, ends.high, ends.sure) : ends);
}

/** Bounds of the numeric part of a formula over a box of values. */
function boundNumber(tree: NumberTree, boundsOf: BoundsOfName): Interval {
  switch (tree.kind) {
    case 'number':
      return { low: tree.value, high: tree.value, sure: true };
    case 'name': {
      const known = boundsOf(tree.name);
      return known === null || Array.isArray(known)
        ? anything
        : interval((known as Interval).low, (known as Interval).high, (known as Interval).sure);
    }
    case 'negate': {
      const { low, high, sure } = boundNumber(tree.of, boundsOf);
      return { low: -high, high: -low, sure };
    }
    case 'arithmetic': {
      const a = boundNumber(tree.left, boundsOf);
      const b = boundNumber(tree.right, boundsOf);
      switch (tree.operator) {
        case '+':
          return interval(a.low + b.low, a.high + b.high, a.sure && b.sure);
        case '-':
          return interval(a.low - b.high, a.high - b.low, a.sure && b.sure);
        case '*':
          return corners(a, b, (x, y) => x * y);
        case '/':
          return b.low <= 0 && b.high >= 0 ? anything : corners(a, b, (x, y) => x / y);
        case '^':
          return power(a, b);
      }
      break;
    }
    case 'call': {
      const parts = tree.of.map((part) => boundNumber(part, boundsOf));
      const sure = parts.every((part) => part.sure);
      const first = parts[0] as Interval;
      switch (tree.name) {
        case 'min':
          return { low: Math.min(...parts.map((part) => part.low)), high: Math.min(...parts.map((part) => part.high)), sure };
        case 'max':
          return { low: Math.max(...parts.map((part) => part.low)), high: Math.max(...parts.map((part) => part.high)), sure };
        case 'abs': {
          const ends = [Math.abs(first.low), Math.abs(first.high)];
          return { low: first.low <= 0 && first.high >= 0 ? 0 : Math.min(...ends), high: Math.max(...ends), sure };
        }
        case 'sqrt':
          return first.high < 0
            ? anything
            : { low: Math.sqrt(Math.max(0, first.low)), high: Math.sqrt(first.high), sure: sure && first.low >= 0 };
      }
    }
  }
  return anything;
}

/** `a <= b` within the tolerance grows with b and falls with a: its corners bound it exactly. */
function compareBounds(operator: Comparison, a: Interval, b: Interval): { canHold: boolean; canFail: boolean } {
  switch (operator) {
    case '<=':
      return { canHold: atMost(a.low, b.high), canFail: !atMost(a.high, b.low) };
    case '>=':
      return compareBounds('<=', b, a);
    case '>': {
      const reverse = compareBounds('<=', a, b);
      return { canHold: reverse.canFail, canFail: reverse.canHold };
    }
    case '<':
      return compareBounds('>', b, a);
    case '==': {
      const below = compareBounds('<=', a, b);
      const above = compareBounds('<=', b, a);
      return { canHold: below.canHold && above.canHold, canFail: below.canFail || above.canFail };
    }
    case '!=': {
      const reverse = compareBounds('==', a, b);
      return { canHold: reverse.canFail, canFail: reverse.canHold };
    }
  }
}

/**
 * What a rule may say while its names move within bounds (interval evaluation; Moore, Interval Analysis, 1966): never too narrow,
 * perhaps too wide. `canHold` false means that no value in the box keeps the rule; `canFail` and `canMiss` false, that all do.
 *
 * @example boundFormula(tree, () => ({ low: 3, high: 4, sure: true })) //=> { canHold: true, canFail: false, canMiss: false }
 */
export function boundFormula(tree: Formula, boundsOf: BoundsOfName): TruthBounds {
  switch (tree.kind) {
    case 'flag': {
      const values = boundsOf(tree.name);
      if (!Array.isArray(values)) return { canHold: true, canFail: true, canMiss: true };
      return { canHold: values.includes(true), canFail: values.includes(false), canMiss: values.length === 0 };
    }
    case 'not': {
      const { canHold, canFail, canMiss } = boundFormula(tree.of, boundsOf);
      return { canHold: canFail, canFail: canHold, canMiss };
    }
    case 'compare': {
      const left = boundNumber(tree.left, boundsOf);
      const right = boundNumber(tree.right, boundsOf);
      return { ...compareBounds(tree.operator, left, right), canMiss: !(left.sure && right.sure) };
    }
    case 'and':
    case 'or': {
      const left = boundFormula(tree.left, boundsOf);
      const right = boundFormula(tree.right, boundsOf);
      const canMiss = left.canMiss || right.canMiss;
      return tree.kind === 'and'
        ? { canHold: left.canHold && right.canHold, canFail: left.canFail || right.canFail, canMiss }
        : { canHold: left.canHold || right.canHold, canFail: left.canFail && right.canFail, canMiss };
    }
  }
}
