import type { ReadingConditions, RecordedReading } from '../study/record.js';
import { type FormRow, numberRow, textRow } from './form-row.js';
import { conditionsNow, sessionSeries } from './results.js';
import { sayNumber } from './say-number.js';
import { sayTime } from './say-time.js';
import type { Session } from './session.js';
import { eachSeries } from './set-field.js';
import type { State } from './state.js';

type When = 'before' | 'after';

/** What the scanner displayed for one series: for the preset, and after the changes. */
export function readingsForm(state: State, id: string): readonly FormRow[] {
  const series = sessionSeries(state, id);
  return [
    { field: 'heading before', label: 'Displayed for the preset, before any change', shown: '', help: '', kind: 'heading' },
    ...readingRows(state, 'before', id, series.before),
    { field: 'heading after', label: 'Displayed after the changes', shown: '', help: '', kind: 'heading' },
    ...readingRows(state, 'after', id, series.after),
  ];
}

/** The lines of one reading. */
export function readingRows(state: State, when: When, id: string, reading: RecordedReading | null): FormRow[] {
  const keep = (session: Session, values: { readonly [K in keyof RecordedReading]: RecordedReading[K] | undefined | null }) =>
    eachSeries(session, new Set([id]), (series) => ({ ...series, [when]: cleaned({ ...series[when], ...values }) }));
  const scaled = when === 'before' ? 'Later figures scale from it: same coil and patient.' : 'Shows how far the prediction was off.';
  const number = (
    key: 'timeS' | 'b1rmsUt' | 'sarWkg',
    label: string,
    unit: 's' | 'uT' | 'W/kg',
    max: number,
    say: (value: number) => string,
  ): FormRow => {
    const value = reading?.[key] ?? null;
    return numberRow({
      field: `${when} ${key}`,
      label,
      help: `As the scanner displays it. ${scaled}`,
      value,
      unit,
      shown: value === null ? '-' : say(value),
      min: unit === 's' ? 1 : 0.01,
      max,
      step: unit === 's' ? 1 : 0.1,
      first: 1,
      keep: (session, next) => keep(session, { [key]: next, ...(next === null ? {} : { conditions: readWith(state, reading, key) }) }),
    });
  };
  return [
    number('timeS', 'scan time', 's', 7200, sayTime),
    number('b1rmsUt', 'B1+rms', 'uT', 20, (value) => `${sayNumber(value)} uT`),
    number('sarWkg', 'SAR', 'W/kg', 20, (value) => `${sayNumber(value)} W/kg`),
    textRow(
      `${when} operatingMode`,
      'operating mode',
      reading?.operatingMode ?? null,
      'Normal, first level: as displayed.',
      (session, text) => keep(session, { operatingMode: text === '' ? null : text }),
    ),
    ...(when === 'after'
      ? [
          textRow(
            'after changedByScanner',
            'changed by the scanner',
            reading?.changedByScanner ?? null,
            'What the scanner changed by itself.',
            (session, text) => keep(session, { changedByScanner: text === '' ? null : text }),
          ),
          textRow(
            'after notModelled',
            'used, not modelled',
            reading?.notModelled?.join('; ') ?? null,
            'What was used that the figures do not know of.',
            (session, text) => keep(session, { notModelled: text === '' ? null : [text] }),
          ),
        ]
      : []),
  ];
}

/** What a number typed now was read with. SAR alone hangs on the body: while it stays as it was read, so do the extents it was read with. */
function readWith(state: State, reading: RecordedReading | null, key: keyof RecordedReading): ReadingConditions {
  const now = conditionsNow(state);
  const then = reading?.conditions;
  if (key === 'sarWkg' || reading?.sarWkg === undefined || then === undefined) return now;
  return { ...now, frontBackMm: then.frontBackMm, leftRightMm: then.leftRightMm };
}

/** A reading without what was taken out; null when nothing is left. */
function cleaned(reading: Readonly<Record<string, unknown>>): RecordedReading | null {
  const entries = Object.entries(reading).filter(([, value]) => value !== undefined && value !== null);
  return entries.every(([key]) => key === 'conditions') ? null : (Object.fromEntries(entries) as RecordedReading);
}
