import { describe, expect, it } from 'vitest';
import { type Golden, goldenKept, goldenNow, goldenText } from '../golden/golden-figures.js';
import { movedLine, sameValue, whatMoved } from '../golden/what-moved.js';

describe('every figure of every shipped preset', () => {
  const kept = goldenKept();
  const now = goldenNow();

  it('is what the golden file holds; what moved is listed, and `npm run golden` writes it anew', () => {
    expect(kept).not.toBeNull();
    expect(whatMoved(kept as Golden, now).map(movedLine)).toEqual([]);
  });

  it('was written by this version of the model', () => {
    expect(kept?.modelVersion).toBe(now.modelVersion);
  });

  it('has presets whose text is the one it was written from', () => {
    const changed = Object.keys(now.series).filter((name) => kept?.series[name]?.preset !== now.series[name]?.preset);
    expect(changed).toEqual([]);
  });

  it('survives being written and read', () => {
    expect(whatMoved(JSON.parse(goldenText(now)) as Golden, now)).toEqual([]);
  });
});

describe('what counts as moved', () => {
  const golden = (figures: Record<string, number | null>, preset = 'a'): Golden => ({
    modelVersion: '1',
    series: { 'study/series': { preset, parameters: {}, figures, signals: [], edited: {} } },
  });

  it('a number that differs by more than 1e-9 of itself, a number that became null, one that is gone, one that is new', () => {
    const before = golden({ scanTimeS: 10, holds: 2, coverageMm: 100, voxelReadMm: 1 });
    const after = golden({ scanTimeS: 10 * (1 + 2e-9), holds: null, coverageMm: 100 * (1 + 5e-10), shots: 3 });
    expect(whatMoved(before, after).map(movedLine)).toEqual([
      `study/series  figures.scanTimeS: 10 -> ${10 * (1 + 2e-9)}`,
      'study/series  figures.holds: 2 -> null',
      'study/series  figures.shots: undefined -> 3',
      'study/series  figures.voxelReadMm: 1 -> undefined',
    ]);
  });

  it('a whole series that came or went', () => {
    const none: Golden = { modelVersion: '1', series: {} };
    expect(whatMoved(none, golden({ holds: 1 })).map((one) => [one.path, one.from, one.to])).toEqual([['figures.holds', undefined, 1]]);
    expect(whatMoved(golden({ holds: 1 }), none).map((one) => [one.path, one.from, one.to])).toEqual([['figures.holds', 1, undefined]]);
  });

  it('a changed preset is told from a changed model', () => {
    expect(whatMoved(golden({ holds: 1 }), golden({ holds: 2 }, 'b'))[0]?.presetChanged).toBe(true);
    expect(whatMoved(golden({ holds: 1 }), golden({ holds: 2 }))[0]?.presetChanged).toBe(false);
  });

  it('zero and the dust of rounding are the same, zero and a small number are not', () => {
    expect(sameValue(0, 2e-16)).toBe(true);
    expect(sameValue(0, 1e-9)).toBe(false);
    expect(sameValue(null, 0)).toBe(false);
  });
});
