import { readQuantity } from '../../formulas/read-quantity.js';
import { presetLimits } from '../../study/limits.js';
import { freeText } from '../../study/record-text.js';
import { type Change, type Command, goBack, neighbour, only, open, pointAt, say } from '../change.js';
import { headerDraft, leftOutWords, seriesHere } from '../header-view.js';
import { lackWords } from '../header-words.js';
import type { Answer } from '../message.js';
import type { State } from '../state.js';
import { back } from './common-commands.js';

/** Begins to type a path. */
function beginPath(state: State, text: string): State {
  if (state.headers.reading !== null) return say(state, 'Headers are being read: Escape stops it');
  return { ...state, notice: null, entry: { field: 'path', text, ask: null, isText: true } };
}

/** Opens the screen of headers; where nothing was read yet, a path is typed at once. */
export const showHeaders: Command = (state) => {
  const shown = open(state, 'headers');
  return only(shown.headers.found === null && shown.headers.reading === null ? beginPath(shown, '') : shown);
};

/** Another path from its beginning: it may be pasted. */
export const typePath: Command = (state) => only(beginPath(state, ''));

/** A path that is pasted begins its typing. */
export const pastePath: Command = (state, key) => only(beginPath(state, (key.text ?? '').trim()));

/** Reads the folder that was typed. */
export function commitPath(state: State, text: string): Change {
  const path = text.trim();
  const closed: State = { ...state, entry: null };
  if (path === '') return only(closed);
  const ask = state.asks + 1;
  const { headerClass: _class, ...others } = state.open;
  const headers = { ...state.headers, path, reading: { files: null } };
  return [{ ...closed, notice: null, asks: ask, open: { ...others, headers: ask }, headers }, [{ kind: 'read-headers', ask, path }]];
}

/** Takes what reading gave: a wrong path can be mended where it was typed, and what was read before stays. */
export function takeHeaders(state: State, answer: Answer, failed: string | null): State {
  const headers = { ...state.headers, reading: null };
  if (answer.kind !== 'headers') {
    const said = say({ ...state, headers }, failed ?? 'The folder could not be read', 'trouble');
    if (state.place.screen !== 'headers' || state.entry !== null) return said;
    return { ...said, entry: { field: 'path', text: headers.path, ask: null, isText: true } };
  }
  const { found } = answer;
  const own = found.series.filter(({ isDerived }) => !isDerived).map(({ id }) => id);
  const first = found.series[0]?.id ?? '';
  const fields = { ...state.place.fields, headers: first, 'header-values': '' };
  const read: State = {
    ...state,
    notice: null,
    place: { ...state.place, fields },
    headers: { ...headers, found, picked: own, typed: {}, fieldT: null, seriesId: first },
  };
  return found.isStopped ? say(read, 'Stopped: slices, coverage and counts are of what was read so far') : read;
}

/** Ends the reading that runs and shows what there is; else goes back, to a list that knows the drafts that were saved. */
export const stopHeadersOrBack: Command = (state, key) => {
  if (state.headers.reading !== null) return [say(state, 'Stopping: what was read so far is shown'), [{ kind: 'stop-headers' }]];
  if (state.place.back.length === 0) return back(state, key);
  const before = goBack(state);
  return before.place.screen === 'start' ? [before, [{ kind: 'list-presets' }]] : only(before);
};

export const moveInHeaders =
  (by: number): Command =>
  (state) => {
    const here = seriesHere(state)?.read.id;
    return only(pointAt({ ...state, notice: null }, neighbour(state.headers.found?.series ?? [], ({ id }) => id === here, by)?.id ?? ''));
  };

/** Picks the series of the hand for the draft, or leaves it out again. */
export const pickSeries: Command = (state) => {
  const id = seriesHere(state)?.read.id;
  if (id === undefined) return only(say(state, 'No series was read: / types a folder'));
  const { picked } = state.headers;
  const isPicked = picked.includes(id);
  const next = isPicked ? picked.filter((one) => one !== id) : [...picked, id];
  return only(say({ ...state, headers: { ...state.headers, picked: next } }, `${id} ${isPicked ? 'is not picked any more' : 'is picked'}`));
};

/** Picks every series, or none where all are picked. */
export const pickAll: Command = (state) => {
  const all = (state.headers.found?.series ?? []).map(({ id }) => id);
  const picked = all.length === state.headers.picked.length ? [] : all;
  return only(
    say({ ...state, headers: { ...state.headers, picked } }, picked.length === 0 ? 'None is picked' : `All ${all.length} are picked`),
  );
};

/** Opens the review of the series of the hand. */
export const reviewSeries: Command = (state, key) => {
  const one = seriesHere(state);
  if (one === undefined) return state.headers.reading === null ? typePath(state, key) : only(state);
  const next = open({ ...state, headers: { ...state.headers, seriesId: one.read.id } }, 'header-values');
  return only(pointAt(next, ''));
};

/** The review of the next series of the list. */
export const reviewNext: Command = (state) => {
  const series = state.headers.found?.series ?? [];
  const at = series.findIndex(({ id }) => id === state.headers.seriesId);
  const next = series[(at + 1) % Math.max(1, series.length)];
  if (next === undefined) return only(state);
  const { fields } = state.place;
  const place = { ...state.place, fields: { ...fields, headers: next.id, 'header-values': '' } };
  return only({ ...state, notice: null, place, headers: { ...state.headers, seriesId: next.id } });
};

/** Saves the picked series that are whole as one draft preset: a person reviews and releases it. */
export const saveHeaderDraft: Command = (state) => {
  const { headers } = state;
  if (headers.reading !== null) return only(say(state, 'Headers are being read: Escape stops it'));
  if (headers.picked.length === 0) return only(say(state, 'No series is picked: Space picks the one under the hand', 'trouble'));
  if (state.open.preset !== undefined) return only(say(state, 'The draft is being saved'));
  const { study } = headerDraft(headers);
  if (study === null) return only(say(state, `Nothing is saved: ${nothingWhole(state)}`, 'trouble'));
  const ask = state.asks + 1;
  return [
    say({ ...state, asks: ask, open: { ...state.open, preset: ask } }, `Saving ${study.series.map(({ id }) => id).join(', ')} as a draft`),
    [{ kind: 'save-preset', ask, study }],
  ];
};

function nothingWhole({ headers }: State): string {
  const [first, ...others] = leftOutWords(headers);
  const { min, max } = presetLimits.fieldT;
  if (first === undefined) return `type a field strength of ${min} to ${max} T`;
  return `${first}${others.length === 0 ? '' : `, and ${others.length} more`}`;
}

/** Takes a field strength typed for the draft. */
export function takeHeaderField(state: State, text: string): State {
  const read = readQuantity(text, 'T');
  const { min, max } = presetLimits.fieldT;
  if (!read.ok || read.value < min || read.value > max)
    return say(state, `${freeText(text, 20)} was given, expected ${min} to ${max} T`, 'trouble');
  return say({ ...state, entry: null, headers: { ...state.headers, fieldT: read.value } }, `The draft is for ${read.value} T`);
}

/** What a series still lacks after something was typed. */
export function lackNow(state: State): string {
  const one = seriesHere(state);
  return one === undefined ? '' : (lackWords(one) ?? 'nothing more must be typed');
}
