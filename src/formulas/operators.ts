import { atMost, below, same } from '../calc/rounding.js';
import type { Comparison, NumberTree } from './formula.js';

export type ArithmeticOperator = Extract<NumberTree, { kind: 'arithmetic' }>['operator'];

/** Two numbers joined by an operator. What has no value (NaN) stays without one: JavaScript gives 1 for NaN ^ 0. */
export function joinNumbers(operator: ArithmeticOperator, a: number, b: number): number {
  switch (operator) {
    case '+':
      return a + b;
    case '-':
      return a - b;
    case '*':
      return a * b;
    case '/':
      return a / b;
    case '^':
      return Number.isNaN(a) ? Number.NaN : a ** b;
  }
}

/** Two numbers compared with the tolerance of `calc/rounding`. */
export function compareNumbers(operator: Comparison, a: number, b: number): boolean {
  switch (operator) {
    case '<':
      return below(a, b);
    case '<=':
      return atMost(a, b);
    case '>':
      return below(b, a);
    case '>=':
      return atMost(b, a);
    case '==':
      return same(a, b);
    case '!=':
      return !same(a, b);
  }
}
