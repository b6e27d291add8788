import { cleanText } from '../study/clean-text.js';
import type { RecordFilter } from '../study/record-report-filter.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandRequest } from './command-request.js';

/** Reads the filter of a command line. A month or a day that the calendar has not is wrong use. */
export function readRecordFilter(request: CommandRequest): Attempt<RecordFilter> {
  const text = (option: string) => request.value(option) ?? null;
  for (const option of ['from', 'to']) {
    const day = text(option);
    if (day === null || isDay(day)) continue;
    return wrongUse(`--${option}`, `--${option} takes a day; "${cleanText(day, 40)}" was given.`, `Write --${option} 2026-03-02.`);
  }
  const filter = {
    from: text('from'),
    to: text('to'),
    preset: text('preset'),
    region: text('region'),
    role: text('role'),
    reason: text('reason'),
  };
  if (filter.from !== null && filter.to !== null && filter.from > filter.to) {
    return wrongUse('--from', `--from ${filter.from} is after --to ${filter.to}.`, 'Swap the two.');
  }
  return { ok: true, value: filter };
}

function isDay(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const time = Date.parse(`${text}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(text);
}
