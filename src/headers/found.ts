import type { ParameterKey } from '../calc/parameters.js';

/** Where a value comes from. `guess`: one of several that the header allows, the one that explains the rest of it. */
export type Origin = 'read' | 'derived' | 'guess' | 'assumed' | 'missing';

/** What a header says of one parameter. */
export interface Found {
  readonly origin: Origin;
  /** In the parameter's unit; undefined where it is missing, and where it is known that the series has none. */
  readonly value: unknown;
  /** From which attributes, by which thought; or why it is missing. */
  readonly words: string;
  /** Missing, but it is said that there is some: only not how much. */
  readonly some?: true;
}

/** A parameter and what the headers say of it. */
export interface ReadValue extends Found {
  readonly key: ParameterKey;
}

export function readAs(value: unknown, words: string): Found {
  return { origin: 'read', value, words };
}

export function derivedAs(value: unknown, words: string): Found {
  return { origin: 'derived', value, words };
}

export function guessedAs(value: unknown, words: string): Found {
  return { origin: 'guess', value, words };
}

export function missingFor(words: string): Found {
  return { origin: 'missing', value: undefined, words };
}

/** Missing, although the header says that there is some of it. */
export function someOf(words: string): Found {
  return { ...missingFor(`${words}, how much is not stated`), some: true };
}

/** A number without the noise of arithmetic: six digits after the point. */
export function plainNumber(value: number): number {
  return Number(value.toFixed(6));
}
