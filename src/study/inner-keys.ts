import { pacingKinds } from '../calc/series.js';

/** One key inside `pacing` or `diffusion`. */
export type InnerRow =
  | {
      readonly kind: 'number' | 'numbers';
      readonly unit: 'ms' | '';
      readonly min: number;
      readonly max: number;
      readonly whole?: true;
      readonly required?: true;
      readonly help: string;
    }
  | { readonly kind: 'flag'; readonly required?: true; readonly help: string }
  | { readonly kind: 'choice'; readonly choices: readonly string[]; readonly required?: true; readonly help: string };

/** Keys inside the two parameters that hold objects. Ranges bound what a file may say, not what is sensible. */
export const innerKeys: Readonly<{
  pacing: Readonly<Record<string, InnerRow>> & { kind: InnerRow };
  diffusion: Readonly<Record<string, InnerRow>>;
}> = {
  pacing: {
    kind: { kind: 'choice', choices: pacingKinds, required: true, help: 'what starts each shot' },
    periodMs: { kind: 'number', unit: 'ms', min: 100, max: 60000, help: 'breath interval, or RR interval' },
    windowMs: { kind: 'number', unit: 'ms', min: 1, max: 60000, help: 'quiet part of the breath in which slices may be acquired' },
    breathHold: { kind: 'flag', help: 'gated series acquired in breath-holds' },
  },
  diffusion: {
    bValuesSPerMm2: { kind: 'numbers', unit: '', min: 0, max: 20000, required: true, help: 'b-values, s/mm2' },
    directions: { kind: 'number', unit: '', min: 1, max: 512, whole: true, required: true, help: 'diffusion directions; one at b 0' },
    averages: {
      kind: 'numbers',
      unit: '',
      min: 1,
      max: 256,
      whole: true,
      required: true,
      help: 'averages of each b-value, in the same order',
    },
  },
};

/** Longest list of b-values. */
export const mostBValues = 32;
