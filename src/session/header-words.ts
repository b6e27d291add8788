import { classRow } from '../calc/classes.js';
import type { SeriesToDraft } from '../headers/draft-of-headers.js';
import type { ReadSeries } from '../headers/read-series.js';
import { neededOf, originCounts, someOf } from './header-rows.js';
import { headerDraft, seriesHere, seriesRead } from './header-view.js';
import { sayTime } from './say-time.js';
import type { State } from './state.js';

/** A series in one line: class, plane, field, images. */
export function seriesTitle(read: ReadSeries): string {
  const { key } = read.decision;
  return [
    `${read.id}: ${key === null ? 'class not decided' : classRow(key).label}`,
    typeof read.plane.value === 'string' ? read.plane.value : 'plane not stated',
    typeof read.fieldT.value === 'number' ? `${read.fieldT.value} T` : 'field not stated',
    read.source === 'sidecar' ? 'a sidecar' : `${read.images} ${read.images === 1 ? 'image' : 'images'}`,
    ...(read.seriesNumber === null ? [] : [`series number ${read.seriesNumber}`]),
  ].join(', ');
}

/** Coverage, echoes, b-values and duration: what a series shows besides its parameters. */
export function extraWords(read: ReadSeries): string {
  const parts = [
    ...(read.coverageMm === null ? [] : [`coverage ${read.coverageMm} mm`]),
    ...(read.echoTimesMs.length > 1 ? [`${read.echoTimesMs.length} echo times (${read.echoTimesMs.slice(0, 8).join(', ')} ms)`] : []),
    ...(read.bValues.length > 0 ? [`b ${read.bValues.slice(0, 12).join(', ')} s/mm2`] : []),
    ...(read.durationS === null ? [] : [`acquired in ${sayTime(read.durationS)}${timeWords(read.durationS, read.computedS)}`]),
  ];
  return parts.length === 0 ? 'neither coverage nor duration is stated' : parts.join('; ');
}

/** Real series run up to 6 % over the rules; further off, something that time hangs on is not as read. */
function timeWords(durationS: number, computedS: number | null): string {
  if (computedS === null) return '';
  const ratio = computedS / durationS;
  const agrees = ratio > 0.9 && ratio < 1.03;
  return `, these values give ${sayTime(computedS)}${agrees ? '' : ': something that time hangs on is missing or not as read'}`;
}

/** One line of the list, cell by cell. */
export interface HeaderCells {
  readonly id: string;
  readonly isPicked: boolean;
  readonly className: string;
  readonly slices: string;
  readonly coverage: string;
  readonly counts: Readonly<Record<'read' | 'derived' | 'assumed' | 'missing' | 'typed', number>>;
  /** Values that must be typed first; null where the class is not decided. */
  readonly needed: number | null;
}

/** The series that were read, as the list shows them. */
export function headerCells({ headers }: State): readonly HeaderCells[] {
  const picked = new Set(headers.picked);
  return seriesRead(headers).map((one) => {
    const { read, typed } = one;
    const { key } = read.decision;
    const slices = typed.sliceCount ?? read.values.find((value) => value.key === 'sliceCount')?.value;
    return {
      id: read.id,
      isPicked: picked.has(read.id),
      className: key === null ? 'not decided' : classRow(key).label,
      slices: typeof slices === 'number' ? String(slices) : '-',
      coverage: read.coverageMm === null ? '-' : `${read.coverageMm.toFixed(1)} mm`,
      counts: originCounts(one),
      needed: key === null ? null : neededOf(one).length,
    };
  });
}

/** What a series still lacks, in words; null where it is whole. */
export function lackWords(one: SeriesToDraft): string | null {
  if (one.read.decision.key === null) return 'class not decided';
  const needed = neededOf(one).length;
  return needed === 0 ? null : `${needed} ${needed === 1 ? 'value' : 'values'} to type before it can be used`;
}

/** The first line of the screens of headers. */
export function headersHeadline(state: State): string {
  const { screen } = state.place;
  const { reading, found, picked } = state.headers;
  if (reading !== null) return reading.files === null ? 'Reading headers' : `Reading headers: ${reading.files} files so far`;
  if (found === null) return 'Read headers: type or paste the path of a folder';
  if (screen === 'header-values') {
    const one = seriesHere(state);
    if (one === undefined) return 'No series was read';
    const { missing } = originCounts(one);
    const some = someOf(one);
    const defaults = `${missing} missing at ${missing === 1 ? 'its default' : 'their defaults'}`;
    return `${one.read.id}: ${lackWords(one) ?? `can be saved; ${defaults}${some === 0 ? '' : `, ${some} of them said to be there`}`}`;
  }
  const whole = headerDraft(state.headers).study?.series.length ?? 0;
  const count = found.series.length;
  return `${found.isStopped ? 'STOPPED before the end: ' : ''}${count} series in ${found.read} of ${found.files} files; ${picked.length} picked, ${whole} of them whole`;
}
