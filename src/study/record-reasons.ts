import { noReasonGiven } from './record-words.js';

/**
 * Why a preset was rewritten: the stable word in the file, and the words a person reads.
 * Common practice, no source. Entries may be added; what a file may hold already never changes its meaning.
 */
export const recordReasons = {
  'breath-hold-short': 'breath-hold short',
  'no-breath-hold': 'no breath-hold',
  pain: 'pain',
  tremor: 'tremor',
  confusion: 'confusion',
  claustrophobia: 'claustrophobia',
  child: 'child',
  infant: 'infant',
  'body-size': 'body size',
  'implant-rf': 'implant RF',
  fever: 'fever',
  pregnancy: 'pregnancy',
  metal: 'metal',
  'late-slot': 'late slot',
  coil: 'coil',
  'artefact-from-metal': 'artefact from metal',
  'failed-fat-suppression': 'failed fat suppression',
  wrap: 'wrap',
  'flow-or-csf-ghosts': 'flow or CSF ghosts',
  'match-a-prior': 'match a prior',
  'nerve-stimulation': 'nerve stimulation',
  noise: 'noise',
  'missed-contrast-timing': 'missed contrast timing',
  'changed-by-the-scanner': 'changed by the scanner',
  'repeat-for-quality': 'repeat for quality',
  'radiologists-request': "radiologist's request",
  other: 'other',
} as const;

export type ReasonCode = keyof typeof recordReasons;

/** All reason codes in the order they are offered. */
export const reasonCodes = Object.keys(recordReasons) as readonly ReasonCode[];

/**
 * The words of a reason: of its code, or the free text itself; NO REASON GIVEN when it is blank.
 *
 * @example reasonWords('breath-hold-short') //=> 'breath-hold short'
 * @example reasonWords('  ') //=> 'NO REASON GIVEN'
 */
export function reasonWords(reason: string): string {
  if (Object.hasOwn(recordReasons, reason)) return recordReasons[reason as ReasonCode];
  return reason.trim() === '' ? noReasonGiven : reason;
}
