/** What is wrong with data a person gave: which rule, where, in words, and what to do about it. */
export interface Problem {
  /** Stable short name of the rule, for tests and scripts. */
  readonly code: string;
  /** Where: keys from the outside in, joined by dots (`series.t1-3d.parameters.matrixRead`). */
  readonly path: string;
  /** What was given and what was expected, one sentence. */
  readonly message: string;
  /** What to do next, one sentence. */
  readonly hint: string;
}

/** A value, or the list of reasons why there is none. User data never throws inside the core. */
export type Outcome<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problems: readonly Problem[] };
