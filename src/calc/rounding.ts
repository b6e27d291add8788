/** Slack that keeps products of decimal fractions whole: 0.55 x 100 is 55.00000000000001 in binary. */
const slack = 1e-9;

/**
 * Ceiling of a product of decimal fractions: `ceil(x - 1e-9)`.
 *
 * @example guardedCeil(0.55 * 100) //=> 55
 */
export function guardedCeil(x: number): number {
  return Math.ceil(x - slack) + 0;
}

/**
 * Floor with the same guard: `floor(x + 1e-9)`.
 *
 * @example guardedFloor(3 * 1.1 / 1.1) //=> 3
 */
export function guardedFloor(x: number): number {
  return Math.floor(x + slack);
}

/**
 * Nearest whole number, halves upwards, guarded the same way.
 *
 * @example roundHalfUp(2.5) //=> 3
 */
export function roundHalfUp(x: number): number {
  return Math.floor(x + 0.5 + slack);
}

/** Tolerance of a comparison between a and b: 1e-9 of the larger, and never below 1e-9. */
function tolerance(a: number, b: number): number {
  return 1e-9 * Math.max(1, Math.abs(a), Math.abs(b));
}

/**
 * `a <= b` for rules and limits, forgiving the last binary digit.
 *
 * @example atMost(0.1 + 0.2, 0.3) //=> true
 */
export function atMost(a: number, b: number): boolean {
  return a <= b || a - b <= tolerance(a, b);
}

/** `a >= b`, forgiving the last binary digit. */
export function atLeast(a: number, b: number): boolean {
  return atMost(b, a);
}

/** `a < b` by more than the last binary digit. */
export function below(a: number, b: number): boolean {
  return !atMost(b, a);
}

/** `a = b` to the last binary digit. */
export function same(a: number, b: number): boolean {
  return atMost(a, b) && atMost(b, a);
}
