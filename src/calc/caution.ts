/** How much a caution weighs: `error` means the series as written cannot give what it promises. */
export type CautionLevel = 'note' | 'caution' | 'error';

/** Every code the tool can raise; DEVELOPERS.md says what each means. */
export const cautionCodes = [
  'wrap',
  'wrap-unfoldable',
  'wrap-not-checked',
  'partial-fourier-two-directions',
  'partial-fourier-low',
  'cross-talk',
  'echo-pair-phase',
  'null-drift',
  'contrast-drift',
  'slices-need-rounds',
  'slot-scaled',
  'echo-off-time',
  'echo-centre-differs',
  'train-length-differs',
  'timing-impossible',
  'timing-carried',
  'below-minimum-te',
  'below-minimum-tr',
  'below-minimum-spacing',
  'readout-gradient',
  'pulse-lengthened',
  'timed-phase-not-split',
  'phases-must-match',
  'must-keep',
  'must-keep-not-checked',
  'reading-used',
  'read-scanner-again',
  'extrapolated-tissue',
  'approximate-train',
  'g-unknown',
  'rf-per-exposure',
  'rf-window-bound',
  'shift-between-holds',
  'not-modelled',
] as const;

export type CautionCode = (typeof cautionCodes)[number];

/** One thing a person should know before scanning with these values. */
export interface Caution {
  readonly code: CautionCode;
  readonly level: CautionLevel;
  /** One line, worst fact first. */
  readonly text: string;
  /** The numbers behind the line, for *why*. */
  readonly numbers: Readonly<Record<string, number>>;
}

const weight: Readonly<Record<CautionLevel, number>> = { error: 0, caution: 1, note: 2 };

/** Cautions ordered worst first; equals keep their order. */
export function worstFirst(cautions: readonly Caution[]): readonly Caution[] {
  if (cautions.length < 2) return cautions;
  return [...cautions].sort((a, b) => weight[a.level] - weight[b.level]);
}
