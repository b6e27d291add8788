import { headerRow, headerRows } from '../session/header-rows.js';
import { headerDraft, leftOutWords, seriesHere, seriesRead } from '../session/header-view.js';
import { extraWords, headerCells, seriesTitle } from '../session/header-words.js';
import type { State } from '../session/state.js';
import { longNotice } from './common-lines.js';
import type { ShelfItem } from './shelf-items.js';

/** The screens of headers, one thing a line. */
export function headerItems(state: State): readonly ShelfItem[] {
  const { reading, found } = state.headers;
  if (reading !== null) return [{ words: 'Headers are being read; Escape stops the reading and shows what was read.', here: true }];
  if (found === null)
    return [
      { words: state.notice?.words ?? 'Type or paste the path of a folder of MR objects or sidecars; slash begins typing.', here: true },
    ];
  const said = longNotice(state, state.size.columns).length > 0 ? [{ words: state.notice?.words ?? '' }] : [];
  return [...said, ...(state.place.screen === 'headers' ? listItems(state) : valueItems(state))];
}

function listItems(state: State): ShelfItem[] {
  const here = seriesHere(state)?.read.id;
  const all = seriesRead(state.headers);
  const { study } = headerDraft(state.headers);
  return [
    ...headerCells(state).map(({ id, isPicked, slices, coverage, counts, needed }, at) => {
      const read = all[at]?.read;
      const { read: asRead, derived, assumed, missing, typed } = counts;
      const words = [
        `${read === undefined ? id : seriesTitle(read)}, ${isPicked ? 'picked' : 'not picked'}`,
        ...(needed === null ? [`reason ${read?.decision.reason ?? ''}`] : []),
        `${slices === '-' ? 'slices not stated' : `${slices} slices`}, ${coverage === '-' ? 'coverage not stated' : `coverage ${coverage}`}`,
        ...(needed === null || needed === 0 ? [] : [`${needed} to type before it can be used`]),
        `${asRead} values read, ${derived} derived, ${assumed} assumed, ${missing} missing${typed === 0 ? '' : `, ${typed} typed`}`,
      ];
      return { words: words.join('; '), here: id === here };
    }),
    {
      words:
        study === null
          ? 'Draft: no series that is picked is whole yet'
          : `Draft ${study.id}: ${study.series.map(({ id }) => id).join(', ')}`,
    },
    ...[...leftOutWords(state.headers), ...(state.headers.found?.notes ?? [])].map((words) => ({ words })),
  ];
}

function valueItems(state: State): ShelfItem[] {
  const one = seriesHere(state);
  const here = headerRow(state)?.field;
  if (one === undefined) return [{ words: 'No series was read', here: true }];
  return [
    { words: `${seriesTitle(one.read)}; ${extraWords(one.read)}` },
    ...headerRows(state).map(({ kind, field, label, shown, origin, words }) => ({
      words:
        kind === 'heading' ? `${label}:` : `${label}: ${shown}${origin === '' ? '' : `, ${origin}`}${words === '' ? '' : `: ${words}`}`,
      here: field === here,
    })),
  ];
}
