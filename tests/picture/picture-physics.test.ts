import { describe, expect, it } from 'vitest';
import { blurFwhmPx, type LineOrder } from '../../src/calc/blur.js';
import { weightedSignal } from '../../src/calc/model.js';
import { crossings, draw, inCircle, line, model, objectOf, placed } from './plain-object.js';

const liverSignal = (of: ReturnType<typeof model>) => weightedSignal(of.target) as number;

describe('blur, measured in the picture', () => {
  // Refocusing by 180 degrees; T2 through the override, so that T/T2 is what is asked for. Sub-voxel line across phase.
  const cases = ([0.05, 0.5, 1, 2, 3, 4] as const).flatMap((ratio) => [
    [ratio, 'linear'],
    [ratio, 'centric'],
  ]) as [number, LineOrder][];
  it.each(cases)(
    'T/T2 %f, %s: full width at half maximum is blurFwhmPx within 5 percent (Constable & Gore, Magn Reson Med 1992;28:9)',
    (ratio, order) => {
      const echoTrainLength = 32;
      const echoSpacingMs = 6;
      const t2Ms = (echoTrainLength * echoSpacingMs) / ratio;
      const echoTimeMs = order === 'linear' ? (echoTrainLength / 2) * echoSpacingMs : echoSpacingMs;
      const of = model(
        'fast-spin-echo/2D',
        { repetitionTimeMs: 20000, echoTrainLength, echoSpacingMs, echoTimeMs, matrixRead: 32, matrixPhase: 192, fieldOfViewMm: 192 },
        { tissueOverrides: { liver: { t2Ms } } },
      );
      const thin = objectOf([placed('liver', { atMm: [0, 0.25], halfAxesMm: [80, 0.02] })]);
      const profile = line(draw(of, thin, { fineness: 16 }), 'down', 0);
      const peak = Math.max(...profile.values);
      const [rise, fall] = crossings(profile, peak / 2) as [number, number];
      expect(Math.abs((fall - rise) / of.geometry.voxelPhaseMm / blurFwhmPx(ratio, order) - 1)).toBeLessThan(0.05);
    },
  );

  it('a series without a train is not blurred: 1.207 voxels (sinc)', () => {
    const of = model('spin-echo/2D', { matrixRead: 32, matrixPhase: 128, fieldOfViewMm: 128 });
    const profile = line(draw(of, objectOf([placed('liver', { atMm: [0, 0], halfAxesMm: [50, 0.02] })]), { fineness: 16 }), 'down', 0);
    const [rise, fall] = crossings(profile, Math.max(...profile.values) / 2) as [number, number];
    expect(fall - rise).toBeCloseTo(1.207, 2);
  });
});

describe('echoes far before the one that sets contrast', () => {
  it('give no more than all the magnetisation there is, however short T2 is', () => {
    // Stored magnetisation makes the late echo; counting back by T2 alone would make the early ones e^155 times larger.
    const of = model(
      'fast-spin-echo/2D',
      {
        repetitionTimeMs: 9000,
        echoTrainLength: 64,
        echoSpacingMs: 10,
        echoTimeMs: 320,
        refocusingAngleDeg: 60,
        matrixRead: 64,
        matrixPhase: 64,
      },
      { tissueOverrides: { liver: { t2Ms: 2, t1Ms: 900 } } },
    );
    const { values } = draw(of, objectOf([placed('liver', { atMm: [0, 0], halfAxesMm: [60, 60] })]));
    expect(liverSignal(of)).toBeGreaterThan(0);
    expect(Math.max(...values)).toBeLessThan(1.5 * (of.target?.protonDensity ?? 0));
  });
});

describe('truncation ringing at a long straight edge, no decay', () => {
  // A broad ellipse is straight at its middle; fine display, so that the overshoot is not missed between pixels.
  const of = model('spin-echo/2D', { matrixRead: 64, matrixPhase: 128, fieldOfViewMm: 256 });
  const signal = liverSignal(of);
  const profile = line(draw(of, objectOf([placed('liver', { atMm: [0, 0], halfAxesMm: [120, 60] })]), { fineness: 16 }), 'down', 0);
  const inside = profile.values
    .map((value, i) => ({ value: value / signal, mm: profile.mm[i] as number }))
    .filter(({ mm }) => mm > 0 && mm < 59);

  it('first overshoot is 8.95 % of the height (Gibbs; value from memory)', () => {
    expect(Math.max(...inside.map(({ value }) => value)) - 1).toBeCloseTo(0.0895, 2);
  });

  it('has a period of two voxels', () => {
    const peaks = inside.filter(
      ({ value }, i) => i > 0 && i < inside.length - 1 && value > (inside[i - 1]?.value ?? 0) && value > (inside[i + 1]?.value ?? 0),
    );
    const last = peaks.slice(-4).map(({ mm }) => mm);
    const period = ((last[3] as number) - (last[0] as number)) / 3;
    expect(period / (2 * of.geometry.voxelPhaseMm)).toBeCloseTo(1, 1);
  });
});

describe('chemical shift, measured in the picture', () => {
  function centre(profile: { mm: readonly number[]; values: readonly number[] }): number {
    // The middle between the two half heights of a disc.
    const [rise, fall] = crossings(profile, Math.max(...profile.values) / 2) as [number, number];
    return (rise + fall) / 2;
  }

  it.each([
    [1.5, 100],
    [3, 150],
    [3, 434.29],
  ])('along readout at %f T and %f Hz/px: within 0.1 px of chemicalShiftPx', (fieldT, pixelBandwidthHz) => {
    const of = model('spin-echo/2D', { pixelBandwidthHz, matrixRead: 128, matrixPhase: 64, fieldOfViewMm: 256 }, {}, fieldT);
    const disc = (tissue: string) => objectOf([placed(tissue, { atMm: [-20, 0], halfAxesMm: [20, 20] })]);
    const fat = centre(line(draw(of, disc('subcutaneous fat'), { fineness: 8 }), 'across', 0));
    const water = centre(line(draw(of, disc('liver'), { fineness: 8 }), 'across', 0));
    expect(Math.abs((fat - water) / of.geometry.voxelReadMm - of.shift.chemicalShiftPx)).toBeLessThan(0.1);
  });

  it('along phase in echo-planar series', () => {
    const of = model('echo-planar-spin-echo/2D', {
      echoTimeMs: 60,
      echoSpacingMs: 0.5,
      parallelFactorPhase: 2,
      phaseFieldOfViewPercent: 75,
      matrixRead: 64,
      matrixPhase: 128,
      fieldOfViewMm: 256,
      repetitionTimeMs: 4000,
    });
    const disc = (tissue: string) => objectOf([placed(tissue, { atMm: [0, -40], halfAxesMm: [20, 20] })]);
    const fat = centre(line(draw(of, disc('subcutaneous fat'), { fineness: 8 }), 'down', 0));
    const water = centre(line(draw(of, disc('liver'), { fineness: 8 }), 'down', 0));
    expect(of.shift.chemicalShiftPx).toBeGreaterThan(5);
    expect(Math.abs((fat - water) / of.geometry.voxelPhaseMm - of.shift.chemicalShiftPx)).toBeLessThan(0.1);
  });
});

describe('water and fat in one voxel of a gradient echo (Dixon 1984)', () => {
  const half = { atMm: [0, 0], halfAxesMm: [60, 60] } as const;
  const shapes = [placed('liver', half), placed('subcutaneous fat', { atMm: [0, 20], halfAxesMm: [30, 30] }, 'liver')];
  // High bandwidth, so that fat stays in its place; long T2*, so that the echo time changes the phase alone.
  const besides = {
    tissueOverrides: {
      liver: { t2StarMs: 1e5, t2Ms: 1e5 },
      'subcutaneous fat': { t2StarMs: 1e5, t2Ms: 1e5, t1Ms: 586, protonDensity: 0.9 },
    },
  };
  const at = (echoTimeMs: number) =>
    model(
      'spoiled-gradient-echo/2D',
      {
        repetitionTimeMs: 200,
        echoTimeMs,
        flipAngleDeg: 60,
        pixelBandwidthHz: 20000,
        matrixRead: 128,
        matrixPhase: 128,
        fieldOfViewMm: 192,
      },
      besides,
    );
  /** Lowest value along the line that leaves fat for liver, over the lower of the two plain values. */
  function gap(echoTimeMs: number): number {
    const profile = line(draw(at(echoTimeMs), objectOf(shapes), { fineness: 4 }), 'down', 0);
    const between = (low: number, high: number) =>
      profile.values.filter((_, i) => (profile.mm[i] as number) > low && (profile.mm[i] as number) < high);
    const plain = Math.min(Math.max(...between(15, 25)), Math.max(...between(-45, -30)));
    return Math.min(...between(-14, -6)) / plain;
  }

  it('opposed at 2.303 ms at 1.5 T: a dark line at the boundary', () => {
    expect(gap(4.605 / 2)).toBeLessThan(0.25);
  });

  it('in phase at 4.605 ms: none', () => {
    expect(gap(4.605)).toBeGreaterThan(0.85);
  });

  it('a spin echo has none at either', () => {
    const of = model('spin-echo/2D', { echoTimeMs: 10, pixelBandwidthHz: 20000, matrixRead: 128, matrixPhase: 128, fieldOfViewMm: 192 });
    const profile = line(draw(of, objectOf(shapes), { fineness: 4 }), 'down', 0);
    const near = profile.values.filter((_, i) => Math.abs((profile.mm[i] as number) + 10) < 4);
    expect(Math.min(...near) / liverSignal(of)).toBeGreaterThan(0.8);
  });
});

describe('wrap', () => {
  it('what lies beyond the encoded extent appears one extent further in (geometry)', () => {
    // 200 mm encoded, a disc at 120 mm: it folds to -80 mm.
    const of = model('spin-echo/2D', { fieldOfViewMm: 200, matrixRead: 64, matrixPhase: 100 });
    const far = objectOf([placed('liver', { atMm: [30, 120], halfAxesMm: [8, 8] })], [100, 300]);
    const picture = draw(of, far, { fineness: 4 });
    expect(inCircle(picture, [30, -80], 4).mean / liverSignal(of)).toBeCloseTo(1, 1);
    expect(inCircle(picture, [30, 60], 10).mean / liverSignal(of)).toBeLessThan(0.02);
  });

  it('oversampling keeps it out, and leaves it where it belongs: outside the picture', () => {
    const of = model('spin-echo/2D', { fieldOfViewMm: 200, matrixRead: 64, matrixPhase: 100, phaseOversamplingPercent: 60 });
    const far = objectOf([placed('liver', { atMm: [30, 120], halfAxesMm: [8, 8] })], [100, 300]);
    const picture = draw(of, far);
    expect(Math.max(...picture.values) / liverSignal(of)).toBeLessThan(0.15);
    expect(picture.rows * picture.rowMm).toBeCloseTo(200, 0);
  });

  it('nothing folds along readout, whatever the body', () => {
    const of = model('spin-echo/2D', { fieldOfViewMm: 200, matrixRead: 64, matrixPhase: 100 });
    const far = objectOf([placed('liver', { atMm: [120, 0], halfAxesMm: [8, 8] })], [300, 100]);
    expect(Math.max(...draw(of, far).values) / liverSignal(of)).toBeLessThan(0.15);
  });

  it('phase across the picture turns the direction of the fold', () => {
    const of = model('spin-echo/2D', { fieldOfViewMm: 200, matrixRead: 64, matrixPhase: 100, phaseDirection: 'RL' });
    const far = objectOf([placed('liver', { atMm: [120, 30], halfAxesMm: [8, 8] })], [300, 100]);
    expect(inCircle(draw(of, far, { fineness: 4 }), [-80, 30], 4).mean / liverSignal(of)).toBeCloseTo(1, 1);
  });
});

describe('along the slice', () => {
  const of = model('spin-echo/2D', { sliceThicknessMm: 6, fieldOfViewMm: 128, matrixRead: 128, matrixPhase: 128 });
  const around = placed('spleen', { atMm: [0, 0], halfAxesMm: [50, 50] });
  const spleen = weightedSignal(of.comparison) as number;
  const contrast = (shape: Parameters<typeof placed>[1]) =>
    inCircle(draw(of, objectOf([around, placed('liver', shape, 'spleen')]), { fineness: 4 }), [0, 0], 1.2).mean - spleen;
  const whole = liverSignal(of) - spleen;

  it.each([1.5, 3, 4.5, 6])('a disc of %f mm in a slice of 6 mm has that share of its contrast', (lengthMm) => {
    expect(contrast({ atMm: [0, 0], halfAxesMm: [12, 12], lengthMm }) / whole).toBeCloseTo(lengthMm / 6, 1);
  });

  it('a ball of 4 mm shows 4/6 at its middle', () => {
    // A much finer grid than the ball, so that its middle is seen.
    const fine = model('spin-echo/2D', { sliceThicknessMm: 6, fieldOfViewMm: 40, matrixRead: 256, matrixPhase: 256 });
    const picture = draw(
      fine,
      objectOf([
        placed('spleen', { atMm: [0, 0], halfAxesMm: [15, 15] }),
        placed('liver', { atMm: [0, 0], halfAxesMm: [2, 2, 2] }, 'spleen'),
      ]),
    );
    expect((inCircle(picture, [0, 0], 0.3).mean - spleen) / whole).toBeCloseTo(4 / 6, 1);
  });

  it('an edge that leans 1 mm a mm is as wide as the slice is thick', () => {
    const wide = (sliceThicknessMm: number) => {
      const leaning = model('spin-echo/2D', { sliceThicknessMm, fieldOfViewMm: 64, matrixRead: 256, matrixPhase: 64 });
      const picture = draw(leaning, objectOf([placed('liver', { atMm: [0, 0], halfAxesMm: [14, 14], leanMmPerMm: [1, 0] })]));
      const profile = line(picture, 'across', 0);
      const right = { mm: profile.mm.filter((mm) => mm > 0), values: profile.values.filter((_, i) => (profile.mm[i] as number) > 0) };
      const signal = liverSignal(leaning);
      return (crossings(right, 0.25 * signal)[0] as number) - (crossings(right, 0.75 * signal)[0] as number);
    };
    // The middle half of the slope: half the thickness.
    expect(wide(8)).toBeCloseTo(4, 0);
    expect(wide(4)).toBeCloseTo(2, 0);
  });
});
