import { readFileSync } from 'node:fs';
import { loadParser } from '../src/formulas/load-parser.js';
import type { ParseExpression } from '../src/formulas/parsed-node.js';
import { readSeries } from '../src/headers/read-series.js';
import { readSidecar } from '../src/headers/read-sidecar.js';
import { SeriesCollector } from '../src/headers/series-collector.js';
import { lineText } from '../src/screens/line.js';
import type { Look } from '../src/screens/look.js';
import { screenLines } from '../src/screens/screen-lines.js';
import { carryStudy } from '../src/search/carry-study.js';
import type { Change } from '../src/session/change.js';
import { openPreset } from '../src/session/hands/start-commands.js';
import type { HeadersFound } from '../src/session/header-view.js';
import type { Effect, Message, PresetChoice } from '../src/session/message.js';
import { initialState } from '../src/session/state.js';
import { update } from '../src/session/update.js';
import { readPreset } from '../src/study/read-preset.js';
import { readRules } from '../src/study/read-rules.js';
import { readScannerFile } from '../src/study/read-scanner-file.js';
import type { ScannerFile } from '../src/study/scanner-file.js';
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

function shippedFile(name: string): string {
  return readFileSync(new URL(`../${name}`, import.meta.url), 'utf8');
}

/** The scanners that ship. */
function shippedScanners(): readonly ScannerFile[] {
  return ['demo-1.5t.json', 'demo-3t.json'].map((name) => {
    const read = readScannerFile(shippedFile(`scanners/${name}`), name);
    if (!read.ok) throw new Error(read.problems[0]?.message);
    return read.value;
  });
}

/** One sidecar of the project, read. */
function sidecarRead(path: string): HeadersFound {
  const attributes = readSidecar(shippedFile(path));
  if (typeof attributes === 'string') throw new Error(`${path}: ${attributes}`);
  const collector = new SeriesCollector();
  collector.add({ source: 'sidecar', seriesKey: path, attributes });
  const series = collector.series().map((one, at) => readSeries(one, `s${at + 1}`));
  return { series, files: 1, read: 1, passedOver: 0, notes: [], isStopped: false };
}

/** What is answered to what a key asks for: rules are read, a preset is carried, the preset is its own one revision; searches are left open. */
function answerTo(effect: Effect, parser: ParseExpression, preset: PresetChoice | null): Message | null {
  if (effect.kind === 'read-headers')
    return { kind: 'answer', ask: effect.ask, answer: { kind: 'headers', found: sidecarRead(effect.path) } };
  if (effect.kind === 'read-revisions' && preset !== null)
    return { kind: 'answer', ask: effect.ask, answer: { kind: 'revisions', presets: [preset], notes: [] } };
  if (effect.kind === 'read-rules')
    return { kind: 'answer', ask: effect.ask, answer: { kind: 'rules', rules: readRules(effect.mustKeeps, parser) } };
  if (effect.kind !== 'carry') return null;
  const { carry, circumstances } = effect.problem;
  return { kind: 'answer', ask: effect.ask, answer: { kind: 'carried', carried: carryStudy(carry, circumstances) } };
}

/** The preset that ships under this id; null for the screen that no preset is open on. */
function presetNamed(id: string): PresetChoice | null {
  if (id === 'start') return null;
  const read = readPreset(shippedFile(`presets/${id}.json`), `${id}.json`);
  if (!read.ok) throw new Error(read.problems[0]?.message);
  return { study: read.value, hash: '', origin: 'shipped' };
}

/** The screen of a shipped preset (`start`: of none) after some keys, in plain ASCII: what the example blocks of the README show. */
export async function screenAfter(columns: number, rows: number, presetId: string, keys: string): Promise<string> {
  const parser = await loadParser();
  const preset = presetNamed(presetId);
  let state = initialState({ role: '', scannerName: '', coilName: '' }, { columns, rows });
  const take = ([next, effects]: Change) => {
    state = next;
    for (const effect of effects) {
      const answer = answerTo(effect, parser, preset);
      if (answer !== null) take(update(state, answer));
    }
  };
  take(update(state, { kind: 'scanners', scanners: shippedScanners(), notes: [] }));
  if (preset !== null) take(openPreset(state, preset));
  for (const key of pressed(keys)) take(update(state, { kind: 'key', key, atMs: 0 }));
  return `${screenLines(state, look)
    .map((each) => lineText(each).trimEnd())
    .join('\n')}\n`;
}
