import { beforeAll, describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import type { ParseExpression } from '../../src/formulas/parsed-node.js';
import { lineText } from '../../src/screens/line.js';
import { screenLines } from '../../src/screens/screen-lines.js';
import { draftOf } from '../../src/session/draft.js';
import { openDraft } from '../../src/session/hands/start-commands.js';
import type { Effect } from '../../src/session/message.js';
import { recordOfSession, studyOfSession } from '../../src/session/record-of-session.js';
import { sessionCautions } from '../../src/session/session-cautions.js';
import type { State } from '../../src/session/state.js';
import { draftNow, update } from '../../src/session/update.js';
import { readRules } from '../../src/study/read-rules.js';
import { readSiteRules } from '../../src/study/read-site-rules.js';
import { noSiteRules, type SiteRules } from '../../src/study/site-rules.js';
import { asciiGlyphs } from '../../src/terminal/glyphs.js';
import { keyOf, onField, presetChoice, press, startState, after as told } from './invented-state.js';

const rule = 'voxelVolumeMm3 <= 7 and chemicalShiftPx < 0.75';
const source = 'our site, invented, liver rules of 2025, section 4';
const file = { format: 'holdfast rules', version: 1, rules: [{ region: 'liver', mustKeep: { rule, source } }] };

let parser: ParseExpression;
let siteRules: SiteRules;
beforeAll(async () => {
  parser = await loadParser();
  const read = readSiteRules(JSON.stringify(file), 'rules.json', parser);
  if (!read.ok) throw new Error(read.problems[0]?.message);
  siteRules = read.value;
});

/** Answers what was asked about rules, as the world does. */
function answered({ state, effects }: { readonly state: State; readonly effects: readonly Effect[] }): State {
  const asked = effects.flatMap((effect) => (effect.kind === 'read-rules' ? [effect] : []));
  return asked.reduce(
    (before, { ask, mustKeeps }) =>
      update(before, { kind: 'answer', ask, answer: { kind: 'rules', rules: readRules(mustKeeps, parser) } })[0],
    state,
  );
}

const opened = (): State =>
  answered(
    told(startState(['liver-3t']), [
      { kind: 'site-rules', siteRules },
      { kind: 'key', key: keyOf('enter'), atMs: 1 },
    ]),
  );

const thickness = (state: State) => onField(press(state, 'enter'), 'sliceThicknessMm');
const crossed = (state: State) => sessionCautions(state, state.place.seriesId).filter(({ code }) => code === 'must-keep');
const text = (state: State) =>
  screenLines(state, { glyphs: asciiGlyphs, set: 'ascii', colourLevel: 0, reader: false })
    .map((each) => lineText(each).trim())
    .join(' ')
    .replace(/\s+/g, ' ');

describe('a rule of the site in the interface', () => {
  it('crossed by a keypress, stands on the smallest series screen at once: its numbers, its sentence, its source', () => {
    const before = thickness(opened());
    expect(crossed(before)).toEqual([]);
    const state = press(before, '+');
    expect(crossed(state)).toHaveLength(1);
    expect(state.size).toEqual({ columns: 80, rows: 24 });
    expect(text(state)).toContain('; 1 must-keep crossed');
    expect(text(state)).toMatch(new RegExp(`voxel volume [\\d.]+ mm3, chemical shift [\\d.]+ px: must keep ${rule.replace('<=', '<=')}`));
    expect(text(state)).toContain(`(${source})`);
    expect(crossed(press(state, 'u'))).toEqual([]);
  });

  it('is in the record with the role that accepted it, and with nobody before', () => {
    const state = press(thickness(opened()), '+', 'o', 'd');
    const of = (record: ReturnType<typeof recordOfSession>) => record?.series.flatMap((series) => series.crossed);
    expect(of(recordOfSession(state))).toEqual([{ rule: expect.stringContaining(source), role: null }]);
    const record = press(state, 'e');
    const accepted = press(
      { ...record, place: { ...record.place, fields: { ...record.place.fields, record: 't1-3d crossed 0' } } },
      'right',
    );
    expect(of(recordOfSession(accepted))).toEqual([{ rule: expect.stringContaining(rule), role: 'technologist' }]);
  });

  it('judges a session that was opened before it was read', () => {
    const early = press(thickness(told(startState(['liver-3t']), [{ kind: 'key', key: keyOf('enter'), atMs: 1 }]).state), '+');
    expect(crossed(early)).toEqual([]);
    expect(crossed(answered(told(early, [{ kind: 'site-rules', siteRules }])))).toHaveLength(1);
  });

  it('judges a session gone on with as it is now, not as it was then', () => {
    const draft = draftOf(JSON.parse(JSON.stringify(draftNow(press(thickness(opened()), '+')))));
    const [state, effects] = openDraft({ ...startState(['liver-3t']), siteRules }, draft);
    expect(crossed(answered({ state, effects }))).toHaveLength(1);
    const [without] = openDraft({ ...startState(['liver-3t']), siteRules: noSiteRules }, draft);
    expect(crossed(without)).toEqual([]);
    expect(without.opened?.study.series).toEqual(presetChoice('liver-3t').study.series);
  });

  it('does not go into a preset that is saved', () => {
    const mustKeeps = (study: ReturnType<typeof studyOfSession>) => study?.series.map(({ mustKeep }) => mustKeep);
    expect(mustKeeps(studyOfSession(opened()))).toEqual(mustKeeps(presetChoice('liver-3t').study));
  });
});
