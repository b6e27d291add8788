/** Numbers the scanner displayed for the baseline, typed in once; later figures scale from them. */
export interface Readings {
  readonly timeS?: number;
  readonly b1rmsUt?: number;
  readonly sarWkg?: number;
}

/** Names of the readings in the order they are typed. */
export const readingKeys = ['timeS', 'b1rmsUt', 'sarWkg'] as const satisfies readonly (keyof Readings)[];
