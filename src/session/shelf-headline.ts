import { headersHeadline } from './header-words.js';
import { presetRows, revisionRow } from './preset-rows.js';
import { recordsHeadline } from './record-rows.js';
import { releaseHeadline } from './release-form.js';
import type { ScreenName, State } from './state.js';

/** The screens of what lies outside a session: presets, records, headers. */
export const shelfScreens = [
  'presets',
  'revisions',
  'compare',
  'release',
  'records',
  'past-record',
  'report',
  'headers',
  'header-values',
] as const satisfies readonly ScreenName[];

export function isShelfScreen(screen: ScreenName): screen is (typeof shelfScreens)[number] {
  return (shelfScreens as readonly string[]).includes(screen);
}

/** The first line of a screen of presets, records or headers: what it shows, in words. */
export function shelfHeadline(state: State): string {
  const { screen } = state.place;
  const { revisions, compared, record, report } = state.shelf;
  if (screen === 'headers' || screen === 'header-values') return headersHeadline(state);
  if (screen === 'release') return releaseHeadline(state);
  if (screen === 'records') return recordsHeadline(state);
  if (screen === 'presets') {
    const count = presetRows(state).filter(({ origin }) => origin !== 'session').length;
    return `${count} ${count === 1 ? 'preset' : 'presets'}${state.shelf.narrowing === '' ? '' : ` of ${state.presets.length}`}`;
  }
  if (screen === 'revisions') {
    if (revisions === null) return 'Revisions';
    const count = revisions.presets?.length;
    const here = revisionRow(state)?.study.title;
    return count === undefined
      ? `Reading the revisions of ${revisions.id}`
      : `${revisions.id}: ${count} ${count === 1 ? 'revision' : 'revisions'}${here === undefined ? '' : `, ${here}`}`;
  }
  if (screen === 'compare') {
    if (compared === null) return 'Nothing to compare';
    const { from, to } = compared;
    if (to.status === 'draft' && from.id === to.id)
      return `${from.id} revision ${from.revision} against ${from.revision === to.revision ? 'its draft' : `the draft of revision ${to.revision}`}`;
    return `${from.id} revision ${from.revision} against ${to.id === from.id ? '' : `${to.id} `}revision ${to.revision}`;
  }
  const reading = screen === 'report' ? report : record;
  if (reading === null) return 'Nothing was read';
  if (reading.trouble !== null) return reading.trouble;
  if (reading.read === null) return `Reading${reading.share === null ? '' : `: ${Math.round(reading.share * 100)} %`}`;
  if (screen === 'past-record')
    return record?.read == null
      ? 'Record'
      : `${record.read.preset.id} revision ${record.read.preset.revision}, ${record.read.day ?? 'day left out'}: planned against used`;
  const counts = report?.read;
  if (counts == null) return 'Report';
  const { meant, records, damaged, stopped } = counts;
  return `Report over ${meant} of ${records} ${records === 1 ? 'record' : 'records'}${damaged === 0 ? '' : `, ${damaged} damaged skipped`}${stopped ? '; STOPPED before the end, not all are counted' : ''}`;
}
