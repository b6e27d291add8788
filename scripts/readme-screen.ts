import { readFileSync } from 'node:fs';
import { lineText } from '../src/screens/line.js';
import type { Look } from '../src/screens/look.js';
import { screenLines } from '../src/screens/screen-lines.js';
import { openPreset } from '../src/session/hands/start-commands.js';
import { initialState } from '../src/session/state.js';
import { update } from '../src/session/update.js';
import { readPreset } from '../src/study/read-preset.js';
import { asciiGlyphs } from '../src/terminal/glyphs.js';

const look: Look = { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false };
/** A key, with how often it is pressed: `Down*7`. Anything else is typed letter by letter. */
const named = /^(Enter|Escape|Down|Up|Tab)(?:\*(\d+))?$/;

function pressed(keys: string): readonly { readonly name: string; readonly text?: string }[] {
  return keys.split(' ').flatMap((word) => {
    const [, name, times] = named.exec(word) ?? [];
    if (name !== undefined) return Array.from({ length: Number(times ?? 1) }, () => ({ name: name.toLowerCase() }));
    return [...word].map((text) => ({ name: 'text', text }));
  });
}

/** The screen of a shipped preset after some keys, in plain ASCII: what the example blocks of the README show. */
export function screenAfter(columns: number, rows: number, presetId: string, keys: string): string {
  const read = readPreset(readFileSync(new URL(`../presets/${presetId}.json`, import.meta.url), 'utf8'), `${presetId}.json`);
  if (!read.ok) throw new Error(read.problems[0]?.message);
  const start = initialState({ role: '', scannerName: '', coilName: '' }, { columns, rows });
  let [state] = openPreset(start, { study: read.value, hash: '', origin: 'shipped' });
  for (const key of pressed(keys)) [state] = update(state, { kind: 'key', key, atMs: 0 });
  return `${screenLines(state, look)
    .map((each) => lineText(each).trimEnd())
    .join('\n')}\n`;
}
