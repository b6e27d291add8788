import type { SeriesModel } from './model.js';

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
  'reading-no-longer-holds',
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

/**
 * How the checks of one series report: code, level, numbers, and the sentence, which is only put together when somebody reads it.
 * The sentence takes what it needs from the numbers and the model, and nothing from around it: what a function remembers for its
 * sentences is set up at every call, whether there is anything to say or not.
 */
export type AddCaution = <Numbers extends Readonly<Record<string, number>>>(
  code: CautionCode,
  level: CautionLevel,
  numbers: Numbers,
  say: (numbers: Numbers, model: SeriesModel) => string,
) => void;

/** A caution whose sentence is put together when it is read: most evaluations of a search never read one. */
export class SaidCaution implements Caution {
  // Declared only: what a class defines is written twice at every making.
  declare readonly code: CautionCode;
  declare readonly level: CautionLevel;
  declare readonly numbers: Readonly<Record<string, number>>;
  declare private readonly model: SeriesModel;
  declare private readonly say: (numbers: never, model: SeriesModel) => string;

  constructor(
    code: CautionCode,
    level: CautionLevel,
    numbers: Readonly<Record<string, number>>,
    model: SeriesModel,
    say: (numbers: never, model: SeriesModel) => string,
  ) {
    this.code = code;
    this.level = level;
    this.numbers = numbers;
    this.model = model;
    this.say = say;
  }

  get text(): string {
    return this.say(this.numbers as never, this.model);
  }

  toJSON(): Caution {
    return { code: this.code, level: this.level, text: this.text, numbers: this.numbers };
  }
}

const levels: readonly CautionLevel[] = ['error', 'caution', 'note'];

/** Cautions ordered worst first; equals keep their order. */
export function worstFirst(cautions: readonly Caution[]): readonly Caution[] {
  let last = 0;
  let sorted = true;
  for (let i = 0; i < cautions.length; i += 1) {
    const { level } = cautions[i] as Caution;
    const rank = level === 'error' ? 0 : level === 'caution' ? 1 : 2;
    if (rank < last) sorted = false;
    last = rank;
  }
  if (sorted) return cautions;
  const ordered: Caution[] = [];
  for (const level of levels) {
    for (const caution of cautions) if (caution.level === level) ordered.push(caution);
  }
  return ordered;
}
