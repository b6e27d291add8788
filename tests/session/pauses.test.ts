import { describe, expect, it } from 'vitest';
import { openPreset } from '../../src/session/hands/start-commands.js';
import { resultNow } from '../../src/session/results.js';
import { timeline } from '../../src/session/timeline.js';
import { onField, presetChoice, press, startState } from './invented-state.js';

/** The running order of the liver preset where a site has its own pauses. */
function liverWith(pauses?: { readonly preparationS: number; readonly restS: number }) {
  const start = startState(['liver-3t']);
  return openPreset(
    { ...start, defaults: { ...start.defaults, ...(pauses === undefined ? {} : { pauses }) } },
    presetChoice('liver-3t'),
  )[0];
}

describe('preparation and rest as the settings have them', () => {
  const usual = liverWith();
  const slow = liverWith({ preparationS: 35, restS: 50 });
  const tableTimeS = (state: typeof usual, id: string) => resultNow(state, id).evaluation.figures.tableTimeS as number;

  it('count in the time on the table: preparation once, rest with every hold', () => {
    expect(tableTimeS(slow, 't1-3d') - tableTimeS(usual, 't1-3d')).toBeCloseTo(15 + 4 * 30, 9);
    expect(tableTimeS(slow, 't2fs') - tableTimeS(usual, 't2fs')).toBeCloseTo(15, 9);
    expect(resultNow(slow, 't1-3d').evaluation.figures.scanTimeS).toBe(resultNow(usual, 't1-3d').evaluation.figures.scanTimeS);
  });

  it('count in the running total, and in what is left of a running series', () => {
    expect(timeline(slow).totalS - timeline(usual).totalS).toBeCloseTo(5 * 15 + (4 + 2 + 2) * 30, 9);
    const leftS = (state: typeof usual) => timeline(press(state, 's')).rows[0]?.takesS as number;
    expect(leftS(slow) - leftS(usual)).toBeCloseTo(3 * 30, 9);
    expect(leftS(usual)).toBeCloseTo(4 * 17.04 + 3 * 30, 1);
  });

  it('change nothing else: no value of an edited series is carried for them', () => {
    const edited = (state: typeof usual) => resultNow(press(onField(press(state, 'enter'), 'pixelBandwidthHz'), '+'), 't1-3d');
    expect(edited(slow).parameters).toEqual(edited(usual).parameters);
  });

  it('are those that are usual where nothing was set', () => {
    expect(timeline(liverWith({ preparationS: 20, restS: 20 })).totalS).toBeCloseTo(timeline(usual).totalS, 9);
  });
});
