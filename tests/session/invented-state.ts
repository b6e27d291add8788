import { readFileSync } from 'node:fs';
import { openPreset } from '../../src/session/hands/start-commands.js';
import type { Effect, KeyPress, Message, PresetChoice } from '../../src/session/message.js';
import { initialState, type State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { readPreset } from '../../src/study/read-preset.js';

/** A shipped preset as the start screen offers it. */
export function presetChoice(id: string): PresetChoice {
  const read = readPreset(readFileSync(new URL(`../../presets/${id}.json`, import.meta.url), 'utf8'), `${id}.json`);
  if (!read.ok) throw new Error(read.problems.map(({ message }) => message).join('\n'));
  return { study: read.value, hash: 'a'.repeat(64), origin: 'shipped' };
}

/** The start screen with some presets. */
export function startState(ids: readonly string[] = ['liver-3t', 'lumbar-spine-1.5t', 'brain-3t']): State {
  const state = initialState({ role: 'technologist', scannerName: '', coilName: '' }, { columns: 80, rows: 24 });
  return update(state, { kind: 'presets', presets: ids.map(presetChoice), notes: [] })[0];
}

/** A session on a shipped preset, at its running order. */
export function sessionOn(id: string): State {
  return openPreset(startState([id]), presetChoice(id))[0];
}

const named = new Set([
  'up',
  'down',
  'left',
  'right',
  'home',
  'end',
  'page-up',
  'page-down',
  'tab',
  'shift-tab',
  'enter',
  'escape',
  'backspace',
  'delete',
]);

/** A key by the name the key map has for it. */
export function keyOf(name: string): KeyPress {
  return named.has(name) ? { name } : { name: 'text', text: name };
}

/** What messages make of a state, and everything it asked for. */
export function after(state: State, messages: readonly Message[]): { readonly state: State; readonly effects: readonly Effect[] } {
  const effects: Effect[] = [];
  let next = state;
  for (const message of messages) {
    const [changed, asked] = update(next, message);
    next = changed;
    effects.push(...asked);
  }
  return { state: next, effects };
}

/** Presses keys, a second apart; a word of several letters that is no key's name is typed letter by letter. */
export function press(state: State, ...keys: readonly string[]): State {
  const each = keys.flatMap((key) => (named.has(key) ? [key] : [...key]));
  return after(
    state,
    each.map((key, at) => ({ kind: 'key', key: keyOf(key), atMs: state.nowMs + 1000 * (at + 1) })),
  ).state;
}

/** Puts the hand of the series screen on a parameter. */
export function onField(state: State, path: string): State {
  return { ...state, place: { ...state.place, fields: { ...state.place.fields, series: path } } };
}
