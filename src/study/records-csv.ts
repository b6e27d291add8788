import { figureKeys } from '../calc/figures.js';
import { parameterKeys } from '../calc/parameters.js';
import type { RecordedReading, RecordedSeries, SessionRecord } from './record.js';
import { changedParameters } from './record-changes.js';

type Cell = string | number | boolean | null | undefined;
type Column = readonly [name: string, value: (record: SessionRecord, series: RecordedSeries) => Cell];

const readingColumns = (when: 'before' | 'after'): Column[] =>
  (['timeS', 'b1rmsUt', 'sarWkg', 'operatingMode'] as const satisfies readonly (keyof RecordedReading)[]).map((key) => [
    `reading.${when}.${key}`,
    (_record, { readings }) => readings[when]?.[key],
  ]);

const valueColumns = (which: 'planned' | 'used'): Column[] => [
  ...parameterKeys.map((key): Column => [`${which}.${key}`, (_record, series) => plainCell(series[which].parameters[key])]),
  ...figureKeys.map((key): Column => [`${which}.${key}`, (_record, series) => series[which].figures[key]]),
];

/** One row a series of a session: the session's columns, the series', then every parameter and figure planned and used. */
const columns: readonly Column[] = [
  ['record', ({ id }) => id],
  ['day', ({ day }) => day],
  ['preset', ({ preset }) => preset.id],
  ['revision', ({ preset }) => preset.revision],
  ['region', ({ region }) => region],
  ['fieldT', ({ fieldT }) => fieldT],
  ['scanner', ({ scanner }) => scanner],
  ['coil', ({ coil }) => coil],
  ['role', ({ role }) => role],
  ['reasons', ({ reasons }) => reasons.join('; ')],
  ['recommendation', ({ recommendation }) => recommendation],
  ['series', (_record, { id }) => id],
  ['outcome', (_record, { outcome }) => outcome],
  ['reason', (_record, { reason }) => reason],
  ['quality', (_record, { quality }) => quality],
  ['changed', (_record, series) => changedParameters(series).join('; ')],
  ['crossed', (_record, { crossed }) => crossed.map(({ rule, role }) => `${rule}: ${role ?? 'accepted by nobody'}`).join('; ')],
  ...readingColumns('before'),
  ...readingColumns('after'),
  ...valueColumns('planned'),
  ...valueColumns('used'),
];

/** The head of the table (RFC 4180: commas, CR LF). */
export const recordsCsvHead = `${columns.map(([name]) => name).join(',')}\r\n`;

/** One record as rows of the table, one a series; none for a session without any. */
export function recordsCsvRows(record: SessionRecord): string {
  return record.series.map((series) => `${columns.map(([, value]) => csvCell(value(record, series))).join(',')}\r\n`).join('');
}

/**
 * A value as a cell. Texts in which a spreadsheet would see a formula get an apostrophe in front.
 *
 * @example csvCell('=1+1, "two"') //=> '"\'=1+1, ""two"""'
 */
export function csvCell(value: Cell): string {
  if (value === null || value === undefined) return '';
  if (typeof value !== 'string') return String(value);
  const harmless = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}

function plainCell(value: unknown): Cell {
  return typeof value === 'object' && value !== null ? JSON.stringify(value) : (value as Cell);
}
