import { describe, expect, it } from 'vitest';
import { same } from '../../src/calc/rounding.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { judgePoint } from '../../src/search/judge.js';
import { search } from '../../src/search/search.js';
import { type SearchSetting, settingOf } from '../../src/search/setting.js';
import { lumbarTrain } from '../scenarios/invented-parameters.js';
import { inventedSeries, problemOf } from './problems.js';

function pointOf({ variables }: SearchSetting, given: GivenParameters): number[] | null {
  const point = variables.map(({ key, values }) =>
    given[key] === undefined ? 0 : values.findIndex((value) => same(value as number, given[key] as number)),
  );
  return point.includes(-1) ? null : point;
}

/** Lumbar T2 at 1.5 T: 15 slices, train 20, 180 degrees. The implant allows 2.0 uT, the scanner shows 2.8 for the preset. */
const lumbar = inventedSeries('fast-spin-echo/2D', lumbarTrain, {
  plane: 'sagittal',
  target: 'intervertebral disc (nucleus)',
  comparison: 'spinal cord (white matter)',
});

describe('lumbar T2 at 1.5 T, B1+rms at most 2.0 uT, 2.8 displayed', () => {
  const problem = problemOf(lumbar, 1.5, { b1rmsUt: 2 }, { readings: { b1rmsUt: 2.8 } });
  const setting = settingOf(problem);
  const judge = (given: GivenParameters) => {
    const point = pointOf(setting, given);
    expect(point, JSON.stringify(given)).not.toBeNull();
    const { isWay, candidate } = judgePoint(setting, point as number[]);
    return isWay ? candidate.rank : 2;
  };

  it.each<[string, GivenParameters, 0 | 1]>([
    ['125 degrees', { refocusingAngleDeg: 125 }, 1],
    ['120 degrees', { refocusingAngleDeg: 120 }, 0],
    ['150 degrees and TR 5000', { refocusingAngleDeg: 150, repetitionTimeMs: 5000 }, 1],
    ['130 degrees and TR 4000', { refocusingAngleDeg: 130, repetitionTimeMs: 4000 }, 1],
    ['pulses twice as long', { rfPulseStretch: 2 }, 0],
  ])('%s is a way', (_words, given, rank) => {
    expect(judge(given)).toBe(rank);
  });

  it.each<[string, GivenParameters]>([
    ['130 degrees alone: 2.04 uT', { refocusingAngleDeg: 130 }],
    ['150 degrees and TR 4800: 2.00 uT', { refocusingAngleDeg: 150, repetitionTimeMs: 4800 }],
  ])('the trap %s is over', (_words, given) => {
    expect(judge(given)).toBe(2);
  });

  it('offers the angle alone, scaled from the scanner, to be read again, and never calls it more than a trend', {
    timeout: 600_000,
  }, () => {
    const { ways } = search(problem);
    const angle = ways.filter(({ changes }) => Object.keys(changes).join() === 'refocusingAngleDeg');
    expect(angle.map(({ changes, verdict }) => [changes.refocusingAngleDeg?.to, verdict])).toEqual([
      [120, 'FITS'],
      [125, 'TOO CLOSE'],
    ]);
    for (const { cautions, spare } of ways) {
      expect(spare.b1rmsUt).toBeGreaterThanOrEqual(0);
      expect(cautions.map(({ code }) => code)).toContain('read-scanner-again');
      for (const { text } of cautions) expect(text).not.toMatch(/\b(safe|cleared|compliant|compliance)\b/i);
    }
  });
});

/** Cervical T1 at 3 T, a patient with fever: the scanner shows 2.6 W/kg, the site allows 2.0. */
const cervical = inventedSeries(
  'fast-spin-echo/2D',
  {
    repetitionTimeMs: 600,
    echoTimeMs: 10,
    echoTrainLength: 3,
    echoSpacingMs: 10,
    refocusingAngleDeg: 150,
    sliceCount: 15,
    sliceThicknessMm: 3,
    sliceGapMm: 0.3,
    fieldOfViewMm: 240,
    matrixRead: 320,
    matrixPhase: 256,
    pixelBandwidthHz: 250,
  },
  {
    plane: 'sagittal',
    target: 'spinal cord (white matter)',
    comparison: 'skeletal muscle',
    mustKeep: [{ figure: 'voxelSliceMm', atMost: 3, source: 'ACR spine accreditation, 2022 support article' }],
  },
);

describe('cervical T1 at 3 T, SAR at most 2.0 W/kg, 2.6 displayed', () => {
  it('presents TR, angle and slices side by side, each with what it costs', { timeout: 600_000 }, () => {
    const { ways } = search(problemOf(cervical, 3, { sarWkg: 2 }, { readings: { sarWkg: 2.6 } }));
    const alone = (key: string) => ways.filter(({ changes }) => Object.keys(changes).join() === key);
    const tr = alone('repetitionTimeMs').find(({ verdict }) => verdict === 'TOO CLOSE');
    expect(tr?.changes.repetitionTimeMs?.to).toBe(780);
    // 127 degrees lie between two steps; 131, the trap, would be 130.
    expect(alone('refocusingAngleDeg').map(({ changes }) => changes.refocusingAngleDeg?.to)).toEqual([120, 125]);
    const slices = alone('sliceCount').find(({ verdict }) => verdict === 'TOO CLOSE');
    expect(slices?.changes.sliceCount?.to).toBe(11);
    expect(slices?.cautions.some(({ code }) => code === 'coverage-lost')).toBe(true);
    // More, thinner slices in two acquisitions would lower RF too: no route that anybody asks for.
    const routes = ways.filter(({ kind }) => kind === 'fewest-changes');
    expect(routes.filter(({ changes: { sliceCount } }) => Number(sliceCount?.to ?? 0) > 15)).toEqual([]);
    expect(tr?.gives.some(({ figure }) => figure === 'scanTimeS')).toBe(true);
    expect(ways.every(({ spare }) => (spare.sarWkg as number) >= 0)).toBe(true);
  });
});
