/** The six comparisons, as written. */
export type Comparison = '<' | '<=' | '>' | '>=' | '==' | '!=';
export type Arithmetic = '+' | '-' | '*' | '/' | '^';
export const callNames = ['min', 'max', 'abs', 'sqrt'] as const;
export type CallName = (typeof callNames)[number];

/** Part of a formula that is a number. */
export type NumberTree =
  | { readonly kind: 'number'; readonly value: number }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'negate'; readonly of: NumberTree }
  | { readonly kind: 'arithmetic'; readonly operator: Arithmetic; readonly left: NumberTree; readonly right: NumberTree }
  | { readonly kind: 'call'; readonly name: CallName; readonly of: readonly NumberTree[] };

/** Part of a formula that is true or false: a whole rule is one of these. */
export type Formula =
  | { readonly kind: 'compare'; readonly operator: Comparison; readonly left: NumberTree; readonly right: NumberTree }
  | { readonly kind: 'flag'; readonly name: string }
  | { readonly kind: 'not'; readonly of: Formula }
  | { readonly kind: 'and' | 'or'; readonly left: Formula; readonly right: Formula };

/** Deepest tree that is accepted, counted from 1 at the outermost operation. */
export const deepestFormula = 40;
