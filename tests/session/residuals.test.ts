import { describe, expect, it } from 'vitest';
import type { Effect, Message } from '../../src/session/message.js';
import { residualsOf } from '../../src/session/residuals.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { type ClassReadings, ReadingCounts } from '../../src/study/readings-report.js';
import { readTime, twelveTimes } from '../study/read-times.js';
import { keyOf, press, sessionOn, after as told } from './invented-state.js';
import { atScanner, shippedScanners } from './shipped-scanners.js';

function classesOf(records = twelveTimes('')): readonly ClassReadings[] {
  const counts = new ReadingCounts();
  for (const record of records) counts.add(record);
  return counts.report().scanners[0]?.classes ?? [];
}

const order = sessionOn('liver-3t');
/** The keys that lead from the running order to the 3D series. */
const toDynamic = ((): readonly string[] => {
  const at = order.session?.series.findIndex(({ id }) => id === 't1-3d') ?? -1;
  return [...Array<string>(at).fill('down'), 'enter'];
})();
const keys = (names: readonly string[]): Message[] => names.map((name, i) => ({ kind: 'key', key: keyOf(name), atMs: 1000 * (i + 1) }));
const asked = (effects: readonly Effect[]) => effects.filter((effect) => effect.kind === 'read-residuals');
const answered = (state: State, ask: number, classes = classesOf()) =>
  update(state, { kind: 'answer', ask, answer: { kind: 'residuals', classes } })[0];

describe('how far predictions have been off', () => {
  it('is asked of the records once a series is shown, once for each scanner, and keys go on meanwhile', () => {
    const { state, effects } = told(order, keys([...toDynamic, '+', '+', 'd', 'escape', 'n']));
    expect(asked(effects)).toEqual([{ kind: 'read-residuals', ask: expect.any(Number), scanner: '' }]);
    expect(state.past.length).toBeGreaterThan(0);
    expect(asked(told(order, keys(['p', 'escape', 'h', 'escape'])).effects)).toEqual([]);
  });

  it('is said of this class, in the words of the trade', () => {
    const state = press(order, ...toDynamic);
    expect(residualsOf(state, 't1-3d')).toEqual([]);
    const known = answered(state, state.open.residuals as number);
    expect(residualsOf(known, 't1-3d')).toEqual(['time: 12 readings, median +3.4 %, worst +6 %']);
    const others = order.opened?.study.series.filter((one) => `${one.family}/${one.acquisition}` !== 'spoiled-gradient-echo/3D') ?? [];
    expect(others.length).toBeGreaterThan(0);
    for (const { id } of others) expect(residualsOf(known, id)).toEqual([]);
    const other = answered(state, state.open.residuals as number, classesOf([readTime(2, { scanner: '' }, 'spin-echo/2D')]));
    expect(residualsOf(other, 't1-3d')).toEqual([]);
  });

  it('of fewer than five has no median', () => {
    const state = press(order, ...toDynamic);
    const few = classesOf(twelveTimes('').slice(0, 4));
    expect(residualsOf(answered(state, state.open.residuals as number, few), 't1-3d')).toEqual([
      'time: 4 readings, too few for a median, worst +3 %',
    ]);
  });

  it('is asked anew on another scanner: what comes late for the former counts no more', () => {
    const state = press(order, ...toDynamic);
    const old = state.open.residuals as number;
    const withScanners = update(press(state, 'escape'), { kind: 'scanners', scanners: shippedScanners, notes: [] })[0];
    const there = press(atScanner(withScanners, 'demo-3t body'), 'enter');
    const { state: again, effects } = told(there, keys(['enter']));
    expect(asked(effects)).toMatchObject([{ scanner: 'demo-3t' }]);
    expect(residualsOf(answered(again, old), again.place.seriesId)).toEqual([]);
    expect(again.open.residuals).not.toBe(old);
  });

  it('that cannot be read is no trouble and is not asked again with every key', () => {
    const state = press(order, ...toDynamic);
    const failed = update(state, {
      kind: 'answer',
      ask: state.open.residuals as number,
      answer: { kind: 'failed', problems: [{ code: 'x', path: '', message: 'It failed.', hint: 'Try again.' }] },
    })[0];
    expect(failed.notice).toEqual(state.notice);
    expect(asked(told(failed, keys(['+', 'd'])).effects)).toEqual([]);
  });

  it('is read again once a record is saved', () => {
    const state = press(order, ...toDynamic);
    const known = answered(state, state.open.residuals as number);
    const saving = press(known, '+', 'e', 's');
    expect(saving.open.record).toBeDefined();
    const saved = update(saving, { kind: 'answer', ask: saving.open.record as number, answer: { kind: 'done', words: 'Saved' } })[0];
    expect(asked(told(saved, keys(['escape'])).effects)).toHaveLength(1);
  });
});
