import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { plainScanner } from '../../src/calc/scanner.js';
import type { GivenParameters, Series } from '../../src/calc/series.js';
import { type CarryAim, carryAims, type SeriesCarry } from '../../src/search/carry.js';
import { carrySeries } from '../../src/search/carry-series.js';
import type { StudySeries } from '../../src/study/study.js';
import { seriesOf } from '../calc/series-of.js';

/** A series of a study: invented, as `seriesOf` is. */
function studySeries(key: ClassKey, given: GivenParameters, besides: Partial<Series>): StudySeries {
  return {
    ...seriesOf(key, given, besides),
    id: 'one',
    title: 'One',
    priority: 1,
    mustKeep: [],
    ranges: {},
    pairedWith: [],
    locked: [],
    opened: [],
  };
}

function carry(series: StudySeries, toT: number, aim: CarryAim = 'contrast', fromT = 1.5): SeriesCarry {
  return carrySeries(series, { from: plainScanner(fromT), to: plainScanner(toT), aim, rules: new Map() });
}

function valueNamed(carried: SeriesCarry, key: string) {
  const found = carried.values.find((value) => value.key === key);
  if (found === undefined) throw new Error(`${key} is not among ${carried.values.map((value) => value.key).join(', ')}`);
  return found;
}

const shoulder = {
  matrixRead: 320,
  matrixPhase: 256,
  fieldOfViewMm: 160,
  sliceThicknessMm: 3.5,
  pixelBandwidthHz: 220,
  averages: 2,
} as const;
const protonDensity = studySeries(
  'spin-echo/2D',
  { ...shoulder, repetitionTimeMs: 3000, echoTimeMs: 36, fatSuppression: 'spectral' },
  { target: 'articular cartilage', comparison: 'synovial fluid' },
);
const t1 = studySeries(
  'spin-echo/2D',
  { ...shoulder, repetitionTimeMs: 500, echoTimeMs: 12 },
  { target: 'skeletal muscle', comparison: 'subcutaneous fat' },
);

describe('a 1.5 T shoulder carried to 3 T (scenario: chemical shift under 1 px, contrast equal)', () => {
  it.each([
    [3, 435],
    [2.89, 419],
  ])('asks for the bandwidth of equal shift at the exact field: %d T takes at least %d Hz/px', (fieldT, leastHz) => {
    for (const series of [protonDensity, t1]) {
      const { parameters, evaluation } = carry(series, fieldT);
      expect(parameters.pixelBandwidthHz).toBeGreaterThanOrEqual(leastHz);
      // 0.99 px in the preset (217.15 Hz at 3.4 ppm over 220 Hz/px), and no more after it.
      expect(evaluation.figures.chemicalShiftPx).toBeLessThan(1);
      expect(parameters.pixelBandwidthHz).toBeCloseTo((220 * fieldT) / 1.5, -1);
    }
  });

  it('gains 1.41 in SNR from field and bandwidth alone', () => {
    // Scenario: B0 x 2, bandwidth x 2: 2 / sqrt(2).
    const { evaluation, before } = carry(
      { ...protonDensity, tissueOverrides: { 'articular cartilage': { t1Ms: 1000, t2Ms: 40 } } },
      3,
      'shift',
    );
    expect((evaluation.figures.relativeSnr as number) / (before.figures.relativeSnr as number)).toBeCloseTo(Math.SQRT2, 2);
  });

  it('says what one average gives: cartilage 0.86 in half the time, muscle 0.99 in 0.64 of it', () => {
    for (const [series, snr, time] of [
      [protonDensity, 0.86, 0.5],
      [t1, 0.99, 0.64],
    ] as const) {
      const { averages, before } = carry(series, 3);
      const one = averages.choices.find((choice) => choice.averages === 1);
      expect(Math.abs((one?.snr ?? 0) - snr)).toBeLessThanOrEqual(0.05);
      expect(Math.abs((one?.scanTimeS ?? 0) / (before.figures.scanTimeS as number) / time - 1)).toBeLessThanOrEqual(0.05);
      expect(averages.factor).toBeCloseTo(1 / (averages.snr as number) ** 2, 9);
    }
  });

  it('solves TR 500 to about 640 for muscle over fat, with its bracket, and leaves proton density as it is', () => {
    const { parameters, contrast } = carry(t1, 3);
    // Scenario, times within 5 %: 640 ms keeps 0.312 to 0.311.
    expect(Math.abs(parameters.repetitionTimeMs / 640 - 1)).toBeLessThanOrEqual(0.05);
    expect(parameters.echoTimeMs).toBe(12);
    expect(contrast).toMatchObject({ status: 'solved', solved: [{ key: 'repetitionTimeMs' }] });
    expect(contrast.from).toBeCloseTo(0.312, 2);
    expect(contrast.to).toBeCloseTo(0.311, 2);
    const [solved] = contrast.solved;
    expect(solved?.bracket[0]).toBeLessThanOrEqual(solved?.x as number);
    expect(solved?.bracket[1]).toBeGreaterThanOrEqual(solved?.x as number);
    expect(Math.abs(solved?.residual as number)).toBeLessThanOrEqual(1e-4);
    // TR unchanged gives 0.282, -9 %.
    expect(carry(t1, 3, 'shift').contrast.to).toBeCloseTo(0.282, 2);

    const unchanged = carry(protonDensity, 3);
    expect(unchanged.contrast.status).toBe('unchanged');
    expect([unchanged.parameters.repetitionTimeMs, unchanged.parameters.echoTimeMs]).toEqual([3000, 36]);
    expect(unchanged.contrast.from).toBeCloseTo(0.382, 2);
    expect(unchanged.contrast.to).toBeCloseTo(0.385, 2);
    expect(valueNamed(unchanged, 'repetitionTimeMs').why).toMatch(/^stays; .*no change needed/);
  });

  it('gives RF as a range, x4 at its upper end, and the refocusing angle that brings it back', () => {
    // A train, so that refocusing carries the energy: one excitation, eight refocusing pulses.
    const train = studySeries(
      'fast-spin-echo/2D',
      { ...shoulder, repetitionTimeMs: 3000, echoTimeMs: 40, echoTrainLength: 8, echoSpacingMs: 10 },
      { target: 'articular cartilage', comparison: 'synovial fluid' },
    );
    const { rf } = carry(train, 3, 'shift');
    // Quasi-static upper bound (3 / 1.5)^2, full-wave models 2^0.85.
    expect(rf.high).toBeCloseTo(4, 1);
    expect(rf.low).toBeCloseTo(2 ** 0.85, 1);
    expect(rf.back?.key).toBe('refocusingAngleDeg');
    const at = (refocusingAngleDeg: number, aim: CarryAim = 'shift') => {
      // The angle set at the new field, against the preset at 180.
      const carried = carry(train, 3, aim);
      const again = carrySeries(
        { ...train, parameters: { ...train.parameters, refocusingAngleDeg } },
        { from: plainScanner(1.5), to: plainScanner(3), aim, rules: new Map() },
      );
      const energy = ((again.evaluation.figures.b1PlusRmsUt as number) / (carried.evaluation.figures.b1PlusRmsUt as number)) ** 2;
      return energy * carried.rf.high;
    };
    // Scenario: 130 deg x2.1, 120 deg x1.8.
    expect(Math.abs(at(130) - 2.1)).toBeLessThanOrEqual(0.1);
    expect(Math.abs(at(120) - 1.8)).toBeLessThanOrEqual(0.1);
    expect(at(rf.back?.upperDeg as number)).toBeLessThanOrEqual(1.0001);
    expect(at((rf.back?.upperDeg as number) + 1)).toBeGreaterThan(1);
    expect(rf.words).toContain("Read the scanner's own value before starting");
  });

  it('moves a fat null of 200 ms to about 257 ms, and shows the null by both definitions', () => {
    const inversion = studySeries(
      'fast-spin-echo/2D',
      { ...shoulder, repetitionTimeMs: 4000, echoTimeMs: 40, echoTrainLength: 8, inversionTimeMs: 200, fatSuppression: 'inversion' },
      { target: 'synovial fluid', comparison: 'skeletal muscle' },
    );
    const carried = carry(inversion, 3);
    expect(Math.abs((carried.parameters.inversionTimeMs as number) / 257 - 1)).toBeLessThanOrEqual(0.05);
    expect(carried.nulls?.tissue).toBe('subcutaneous fat');
    const { ownFromMs = 0, ownToMs = 0, simpleFromMs = 0, simpleToMs = 0 } = carried.nulls ?? {};
    expect(ownToMs / ownFromMs).toBeCloseTo((carried.parameters.inversionTimeMs as number) / 200, 2);
    // T1 of fat 288 ms at 1.5 T (tissue table): textbook null 288 ln 2 = 199.6 ms at long TR.
    expect(simpleFromMs).toBeCloseTo(199.6, 0);
    expect(simpleToMs).toBeGreaterThan(simpleFromMs);
    expect(valueNamed(carried, 'inversionTimeMs').why).toMatch(/own equation .* textbook/);
  });
});

describe('an in/opposed pair', () => {
  const pair = studySeries(
    'spoiled-gradient-echo/2D',
    {
      repetitionTimeMs: 165,
      echoTimeMs: 2.3,
      secondEchoTimeMs: 4.6,
      flipAngleDeg: 70,
      fieldOfViewMm: 380,
      matrixRead: 256,
      matrixPhase: 192,
      pixelBandwidthHz: 500,
    },
    {},
  );

  it.each([
    [3, 1.15, 2.3],
    [2.89, 1.2, 2.39],
    [0.55, 6.28, 12.56],
  ])('of 2.3/4.6 ms at 1.5 T becomes the pair of %d T', (fieldT, opposedMs, inMs) => {
    // Scenario: 1.15/2.30 at 3.0 T, 1.20/2.39 at 2.89 T; 6.28/12.56 at 0.55 T (computed from gamma-bar and 3.4 ppm).
    const { parameters, evaluation } = carry(pair, fieldT);
    expect(parameters.echoTimeMs).toBeCloseTo(opposedMs, 2);
    expect(parameters.secondEchoTimeMs).toBeCloseTo(inMs, 2);
    expect(evaluation.cautions.filter(({ code }) => code === 'echo-pair-phase')).toEqual([]);
  });

  it('names the fall-back where the shortest TE may forbid it: 2.30/3.45 with the opposed echo later, and what that confounds', () => {
    const { gaps } = carry(pair, 3);
    const gap = gaps.find(({ what }) => what === 'in and opposed phase');
    expect(gap?.why).toMatch(/2\.3 and 3\.45 ms, with the opposed echo later, so that T2\* decay reads as fat/);
  });

  it('goes where the readout has room when it is longer than half a cycle', () => {
    const slow = { ...pair, parameters: { ...pair.parameters, pixelBandwidthHz: 180, matrixRead: 512 } };
    const { parameters } = carry(slow, 3, 'contrast');
    const gapMs = (parameters.secondEchoTimeMs as number) - parameters.echoTimeMs;
    expect(gapMs).toBeGreaterThanOrEqual(1000 / parameters.pixelBandwidthHz - 0.01);
  });
});

describe('what a carry always says', () => {
  it.each(carryAims)('every value of aim %s has a sentence, a formula, a source and plain numbers', (aim) => {
    for (const series of [protonDensity, t1]) {
      for (const toT of [0.55, 2.89, 3]) {
        const { values } = carry(series, toT, aim);
        expect(values.length).toBeGreaterThan(3);
        for (const { why, formula, source, numbers } of values) {
          expect([why, formula, source].every((words) => words.length > 5 && !/NaN|undefined|null of null/.test(words))).toBe(true);
          expect(Object.values(numbers).every(Number.isFinite)).toBe(true);
        }
      }
    }
  });

  it('equal SNR spends what is gained on averages and bandwidth, and reaches the preset', () => {
    const { parameters, evaluation } = carry(protonDensity, 3, 'snr');
    expect(parameters.pixelBandwidthHz).toBeGreaterThan(440);
    expect(evaluation.figures.relativeSnr).toBeGreaterThan(0.99);
    expect(evaluation.figures.relativeSnr).toBeLessThan(1.05);
    const down = carry({ ...protonDensity, parameters: { ...protonDensity.parameters, averages: 1 } }, 1.5, 'snr', 3);
    expect(down.parameters.averages).toBeGreaterThan(1);
    expect(down.evaluation.figures.relativeSnr).toBeGreaterThanOrEqual(0.99);
  });

  it('equal time lets no series take longer', () => {
    for (const [from, to] of [
      [1.5, 3],
      [3, 1.5],
    ] as const) {
      const { evaluation, before } = carry(t1, to, 'time', from);
      expect(evaluation.figures.scanTimeS).toBeLessThanOrEqual((before.figures.scanTimeS as number) + 1e-9);
    }
  });

  it('the field it came from gives the series back unchanged', () => {
    for (const aim of carryAims) {
      const { parameters, gaps } = carry(t1, 1.5, aim);
      expect(parameters).toEqual(t1.parameters);
      expect(gaps).toEqual([]);
    }
  });

  it('gradients that cannot read the wanted bandwidth bound it, and it is said', () => {
    const fine = { ...t1, parameters: { ...t1.parameters, matrixRead: 512, fieldOfViewMm: 100, pixelBandwidthHz: 260 } };
    const weak = { ...plainScanner(3), gradientMtPerM: 33 };
    const carried = carrySeries(fine, { from: plainScanner(1.5), to: weak, aim: 'contrast', rules: new Map() });
    // G gamma-bar FOV / matrix: 33 x 42.577 x 100 / 512 = 274 Hz/px.
    expect(carried.parameters.pixelBandwidthHz).toBe(274);
    expect(carried.gaps.map(({ what }) => what)).toContain('equal chemical shift');
  });

  it('acceleration beyond the table of the new coil is not known', () => {
    const fast = { ...t1, parameters: { ...t1.parameters, parallelFactorPhase: 3 } };
    const coil = { name: 'two', elements: { AP: 2, RL: 2, HF: 2 }, g: [{ phase: 2, slice: 1, g: 1.1 }] };
    const carried = carrySeries(fast, { from: plainScanner(1.5), to: { ...plainScanner(3), coil }, aim: 'contrast', rules: new Map() });
    expect(carried.evaluation.figures.relativeSnr).toBeNull();
    expect(carried.averages.factor).toBeNull();
    expect(carried.gaps.find(({ what }) => what === 'acceleration')?.why).toContain('coil two');
  });
});
