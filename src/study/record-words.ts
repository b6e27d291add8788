/** How a series ended: the word in the file, and the words on screen and paper. */
export const outcomeWords = {
  done: 'done',
  repeated: 'repeated',
  'given-up': 'given up',
} as const;
export type SeriesOutcome = keyof typeof outcomeWords;

/** Quality as seen at the console by the person whose role stands in the record; no diagnosis. */
export const qualityWords = {
  diagnostic: 'diagnostic',
  limited: 'limited',
  not: 'not diagnostic',
} as const;
export type Quality = keyof typeof qualityWords;

/** What should become of the preset. */
export const recommendationWords = {
  'keep-as-it-was': 'keep as it was',
  'make-this-a-variant': 'make this a variant',
  'ask-the-physicist': 'ask the physicist',
} as const;
export type Recommendation = keyof typeof recommendationWords;

/** State of breath in which this patient holds. */
export const holdStates = ['inspiration', 'expiration'] as const;
export type HoldState = (typeof holdStates)[number];

/** Stands wherever a reason was asked for and left blank. */
export const noReasonGiven = 'NO REASON GIVEN';
