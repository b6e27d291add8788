import { type Attributes, attributeRow, type Keyword } from './attribute-table.js';
import { sidecarKeywords, sidecarTable } from './sidecar-table.js';
import { takeValue } from './take-value.js';

/** Without any of these a JSON file is no sidecar of an MR series. */
const telling: readonly Keyword[] = [
  'RepetitionTime',
  'RepetitionTimeExcitation',
  'RepetitionTimePreparation',
  'EchoTime',
  'FlipAngle',
  'ScanningSequence',
];

/** More times of slices than this are no list of slices. */
const mostSlices = 4096;

/** The values of a field as a list: words of one text stand apart where it says so (`GR\IR`, `SK_SP`, `GR, IR`). */
function listOf(value: unknown, keyword: Keyword): readonly unknown[] {
  const list = Array.isArray(value) ? value : [value];
  const row = attributeRow(keyword);
  if (row.kind === 'numbers') return list.slice(0, 17);
  return list.slice(0, 17).flatMap((item) => {
    if (typeof item !== 'string' || item.length > 100) return [];
    const whole = item.trim().toUpperCase();
    return row.words.includes(whole) ? [whole] : whole.split(/[\\/_,;\s]+/);
  });
}

/**
 * The attributes of a sidecar (BIDS), times turned into ms; fields that are not on the list are never looked at.
 *
 * @param text The file's text.
 * @returns The attributes, `not-json`, or `no-sidecar` for JSON of another kind.
 * @example readSidecar('{"EchoTime": 0.03, "FlipAngle": 77}') //=> { EchoTime: [30], FlipAngle: [77] }
 */
export function readSidecar(text: string): Attributes | 'not-json' | 'no-sidecar' {
  let json: unknown;
  try {
    json = JSON.parse(text.replace(/^\ufeff/, ''));
  } catch {
    return 'not-json';
  }
  if (typeof json !== 'object' || json === null || Array.isArray(json)) return 'no-sidecar';
  const fields = json as Readonly<Record<string, unknown>>;
  const taken: Attributes = {};
  for (const keyword of sidecarKeywords) {
    if (Object.hasOwn(fields, keyword)) takeValue(taken, keyword, listOf(fields[keyword], keyword));
  }
  for (const [field, { keyword, times, flag }] of Object.entries(sidecarTable)) {
    if (!Object.hasOwn(fields, field)) continue;
    const value = fields[field];
    if (flag !== undefined && typeof value === 'boolean') takeValue(taken, keyword, [value ? flag.yes : flag.no]);
    else
      takeValue(
        taken,
        keyword,
        listOf(value, keyword).map((item) => scaled(item, times)),
      );
  }
  const timing = Object.hasOwn(fields, 'SliceTiming') ? fields['SliceTiming'] : undefined;
  if (Array.isArray(timing) && timing.length > 0 && timing.length <= mostSlices) takeValue(taken, 'SliceTimingCount', [timing.length]);
  return telling.some((keyword) => taken[keyword] !== undefined) ? taken : 'no-sidecar';
}

/** A number in the attribute's unit; what is no number stays as it is and is dropped later. Nine digits, so that 0.0033 s is 3.3 ms. */
function scaled(value: unknown, times: number): unknown {
  return typeof value === 'number' && times !== 1 ? Number((value * times).toPrecision(12)) : value;
}
