import type { ReadingConditions, RecordedReading } from './record.js';

/** What a reading was taken with and is no longer so. */
export type ChangedCondition = 'coil' | 'field' | 'body';

/** A magnet this much off is still one of that field; as share of it. Common practice, no source. */
const sameField = 0.05;

/** What is no longer as it was when a reading was taken. An extent that was not typed then, or is not now, is not held against it. */
export function changedConditions(then: ReadingConditions, now: ReadingConditions): readonly ChangedCondition[] {
  const moved = (a: number | null, b: number | null) => a !== null && b !== null && a !== b;
  return [
    ...(then.coil !== now.coil ? (['coil'] as const) : []),
    ...(Math.abs(then.fieldT - now.fieldT) > sameField * then.fieldT ? (['field'] as const) : []),
    ...(moved(then.frontBackMm, now.frontBackMm) || moved(then.leftRightMm, now.leftRightMm) ? (['body'] as const) : []),
  ];
}

type ReadNumber = 'timeS' | 'b1rmsUt' | 'sarWkg';

/**
 * Why a number of a reading no longer holds; null while it does. Coil and field end all of it; the body ends SAR alone, since time and
 * B1+rms hang on the pulses and not on the patient (McRobbie, Essentials of MRI Safety). A reading whose conditions nobody kept holds.
 *
 * @example endedBy({ sarWkg: 1, conditions }, 'sarWkg', { ...conditions, leftRightMm: 420 }) //=> 'body'
 */
export function endedBy(reading: RecordedReading | null, key: ReadNumber, now: ReadingConditions | undefined): ChangedCondition | null {
  if (reading?.[key] === undefined || reading.conditions === undefined || now === undefined) return null;
  return changedConditions(reading.conditions, now).find((changed) => changed !== 'body' || key === 'sarWkg') ?? null;
}
