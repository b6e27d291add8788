import type { SessionRecord } from './record.js';
import { reasonWords } from './record-reasons.js';
import { noReasonGiven } from './record-words.js';

/** Which records are wanted; what is null is not asked. */
export interface RecordFilter {
  /** First and last day, both included, YYYY-MM-DD. A record without a day is in no period. */
  readonly from: string | null;
  readonly to: string | null;
  readonly preset: string | null;
  readonly region: string | null;
  readonly role: string | null;
  /** A reason's code, its words, or the free text; any of the session's or of one of its series. */
  readonly reason: string | null;
}

/** Every record. */
export const allRecords: RecordFilter = { from: null, to: null, preset: null, region: null, role: null, reason: null };

/** True when a record is among those wanted. Letters count the same, large or small. */
export function isWanted(record: SessionRecord, filter: RecordFilter): boolean {
  const { from, to, preset, region, role, reason } = filter;
  if (from !== null && (record.day === null || record.day < from)) return false;
  if (to !== null && (record.day === null || record.day > to)) return false;
  if (preset !== null && record.preset.id !== preset) return false;
  if (region !== null && !same(record.region, region)) return false;
  if (role !== null && !same(record.role, role)) return false;
  return reason === null || reasonsIn(record).some((given) => same(given, reason) || same(reasonWords(given), reason));
}

/** Reasons of the session and of its series; a blank one where a change has none at all. */
function reasonsIn({ reasons, series }: SessionRecord): string[] {
  const given = [...reasons, ...series.map((one) => one.reason)].filter((reason) => reason.trim() !== '');
  return given.length > 0 ? given : [''];
}

function same(a: string, b: string): boolean {
  return a.toLowerCase() === b.toLowerCase();
}

/** The filter in words, for the head of a report: empty where every record is wanted. */
export function filterWords({ from, to, preset, region, role, reason }: RecordFilter): string {
  const words = [
    from === null ? '' : `from ${from}`,
    to === null ? '' : `to ${to}`,
    preset === null ? '' : `preset ${preset}`,
    region === null ? '' : `region ${region}`,
    role === null ? '' : `role ${role}`,
    reason === null ? '' : `reason ${reason === noReasonGiven ? noReasonGiven : reasonWords(reason)}`,
  ];
  return words.filter((word) => word !== '').join(', ');
}
