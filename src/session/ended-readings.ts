import type { Caution } from '../calc/caution.js';
import { readingKeys } from '../calc/reading.js';
import { type ChangedCondition, endedBy } from '../study/reading-conditions.js';
import { conditionsNow, sessionSeries } from './results.js';
import { sayNumber } from './say-number.js';
import { sayTime } from './say-time.js';
import type { State } from './state.js';

const words = {
  timeS: (value: number) => `time ${sayTime(value)}`,
  b1rmsUt: (value: number) => `B1+rms ${sayNumber(value)} uT`,
  sarWkg: (value: number) => `SAR ${sayNumber(value)} W/kg`,
} as const;

const why: Readonly<Record<ChangedCondition, string>> = {
  coil: 'with another coil',
  field: 'at another field',
  body: 'with other body extents typed',
};

/** Readings of the preset that no longer hold in this session, each with what changed since: nothing is scaled from them. */
export function endedReadings(state: State, id: string): readonly Caution[] {
  const { before } = sessionSeries(state, id);
  if (before === null) return [];
  const now = conditionsNow(state);
  return readingKeys.flatMap((key): Caution[] => {
    const value = before[key];
    const changed = endedBy(before, key, now);
    if (value === undefined || changed === null) return [];
    const text = `${words[key](value)} was read ${why[changed]}: it no longer holds, nothing is scaled from it; read it again`;
    return [{ code: 'reading-no-longer-holds', level: 'caution', text, numbers: { [key]: value } }];
  });
}
