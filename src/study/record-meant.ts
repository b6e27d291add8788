import type { SessionRecord } from './record.js';
import { reasonWords } from './record-reasons.js';

/** What of a record can be meant by typed words. */
export interface NamedRecord {
  readonly day: string | null;
  readonly preset: string;
  readonly region: string;
  readonly role: string;
  /** Codes or free texts, of the session and of its series. */
  readonly reasons: readonly string[];
}

/** The part of a record that words are compared with. */
export function namedRecord({ day, preset, region, role, reasons, series }: SessionRecord): NamedRecord {
  const given = [...reasons, ...series.map(({ reason }) => reason)].filter((reason) => reason.trim() !== '');
  return { day, preset: preset.id, region, role, reasons: [...new Set(given)] };
}

/** `2026-03..2026-05`, `2026-03..`, `..2026-05-02`: from the first day of the one to the last of the other. */
const period = /^(\d{4}(?:-\d{1,2}){0,2})?\.\.(\d{4}(?:-\d{1,2}){0,2})?$/;
const beginningOfDay = /^\d{4}(?:-\d{0,2}){0,2}$/;

/**
 * Whether a record is meant by what was typed: every word must stand in its day, preset, region, role or reasons. A year, a month or a
 * day, or two of them with `..` between, is a period; a record without a day is in none.
 *
 * @example isMeantRecord(record, 'liver 2026-03') // liver sessions of March 2026
 */
export function isMeantRecord({ day, preset, region, role, reasons }: NamedRecord, typed: string): boolean {
  const words = typed
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  if (words.length === 0) return true;
  const text = [preset, region, role, ...(reasons.length === 0 ? [''] : reasons).map(reasonWords), ...reasons].join(' ').toLowerCase();
  return words.every((word) => {
    const [, from = '', to = ''] = period.exec(word) ?? [];
    if (word.includes('..') && (from !== '' || to !== ''))
      return day !== null && day >= from && (to === '' || day.slice(0, to.length) <= to);
    return beginningOfDay.test(word) ? day?.startsWith(word) === true : text.includes(word);
  });
}
