import type { Outcome, Problem } from '../calc/problem.js';
import { KnownValues } from './known-values.js';
import { type Checksum, sumVerdict } from './line-sum.js';
import { recordVersion, type SessionRecord } from './record.js';
import { faultOfRecord } from './record-shape.js';

/**
 * Reads one line of a record file: its sum first, then its shape. A line that fails is damaged, and the problem says how;
 * `code` is one of `record-cut-short`, `record-sum-differs`, `record-not-json`, `record-of-later-version`, `record-shape`.
 *
 * @param bytes The line's bytes as they stand in the file, for readers that have them at hand.
 * @param checksum A faster CRC-32 where there is one.
 * @param known Remembers planned values from line to line, for readers of many.
 */
export function readRecordLine(line: string, bytes?: Uint8Array, checksum?: Checksum, known = new KnownValues()): Outcome<SessionRecord> {
  const verdict = sumVerdict(line, bytes, checksum);
  if (verdict === 'missing') return damaged('record-cut-short', 'sum', 'the line does not end in a sum of eight hexadecimal digits');
  if (verdict === 'different') return damaged('record-sum-differs', 'sum', 'the sum does not belong to what stands before it');
  const value = parsed(line, known);
  if (value === undefined) return damaged('record-not-json', '', 'the line is no JSON object');
  if (isLaterVersion(value)) {
    return damaged(
      'record-of-later-version',
      'version',
      `the record has a later version than ${recordVersion}`,
      'Read it with a newer version of holdfast.',
    );
  }
  const fault = faultOfRecord(value);
  if (fault !== null) return damaged('record-shape', fault.path, `expected ${fault.expected}`);
  const { sum: _sum, ...record } = value as SessionRecord & { sum: string };
  return { ok: true, value: record };
}

function parsed(line: string, known: KnownValues): unknown {
  try {
    return known.parse(line);
  } catch {
    return undefined;
  }
}

function isLaterVersion(value: unknown): boolean {
  const { format, version } = Object(value) as { format?: unknown; version?: unknown };
  return format === 'holdfast record' && typeof version === 'number' && version > recordVersion;
}

function damaged(
  code: string,
  path: string,
  message: string,
  hint = 'The line is skipped; the others are not harmed.',
): { ok: false; problems: Problem[] } {
  return { ok: false, problems: [{ code, path, message, hint }] };
}
