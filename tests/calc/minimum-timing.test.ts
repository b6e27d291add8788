import { describe, expect, it } from 'vitest';
import type { ClassKey } from '../../src/calc/classes.js';
import { gammaBarMhzPerT } from '../../src/calc/constants.js';
import { geometryOf } from '../../src/calc/geometry.js';
import { acquiredLines } from '../../src/calc/lines.js';
import { diffusionLobeMs, echoPlanarLeadMs, minimumTiming } from '../../src/calc/minimum-timing.js';
import { slotPulses } from '../../src/calc/pulses.js';
import { plainScanner, type Scanner } from '../../src/calc/scanner.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { parametersOf } from './series-of.js';

const scanner = plainScanner(1.5);

function fastest(key: ClassKey, given: GivenParameters, on: Scanner = scanner) {
  const p = parametersOf(key, given);
  return minimumTiming(key, p, acquiredLines(key, p), geometryOf(key.endsWith('3D') ? '3D' : '2D', p), slotPulses(key, p, on), on);
}

const planar: GivenParameters = {
  fieldOfViewMm: 220,
  matrixRead: 64,
  matrixPhase: 64,
  pixelBandwidthHz: 2000,
  sliceThicknessMm: 4,
  echoSpacingMs: 0.6,
};

describe('fastest timing from trapezoids at 40 mT/m and 150 T/m/s (each value added up by hand from ramps, plateaus and lobes)', () => {
  it.each<[string, ClassKey, GivenParameters, number, number, number | null]>([
    ['2D gradient echo, 1 mm, 200 Hz/px', 'spoiled-gradient-echo/2D', {}, 4.138538, 8.230102, null],
    ['with flow compensation one more prephasing lobe', 'spoiled-gradient-echo/2D', { flowCompensation: true }, 4.700626, 8.79219, null],
    [
      '3D gradient echo, 320 x 200, 500 Hz/px',
      'spoiled-gradient-echo/3D',
      { fieldOfViewMm: 380, matrixRead: 320, matrixPhase: 200, pixelBandwidthHz: 500, sliceCount: 60, sliceThicknessMm: 3 },
      2.087849,
      4.311886,
      null,
    ],
    [
      'balanced, 900 Hz/px',
      'balanced-steady-state/2D',
      { fieldOfViewMm: 340, matrixRead: 192, matrixPhase: 192, pixelBandwidthHz: 900, sliceThicknessMm: 6 },
      1.60785,
      3.178306,
      null,
    ],
    ['spin echo', 'spin-echo/2D', {}, 9.120498, 13.371021, null],
    ['train of 16 x 10 ms', 'fast-spin-echo/2D', { echoTrainLength: 16 }, 9.120498, 164.250523, 9.120498],
    ['with an inversion of 150 ms', 'fast-spin-echo/2D', { echoTrainLength: 16, inversionTimeMs: 150 }, 9.120498, 319.250523, 9.120498],
    ['echo-planar gradient echo', 'echo-planar-gradient-echo/2D', planar, 21.567549, 42.267549, 0.5],
    [
      '6/8 and R 2 bring the centre nearer',
      'echo-planar-gradient-echo/2D',
      { ...planar, partialFourierPhase: 0.75, parallelFactorPhase: 2 },
      7.167549,
      18.267549,
      0.5,
    ],
    ['echo-planar spin echo', 'echo-planar-spin-echo/2D', planar, 42.9, 63.6, 0.5],
    [
      'with b 1000',
      'echo-planar-spin-echo/2D',
      { ...planar, diffusion: { bValuesSPerMm2: [0, 1000], directions: 3, averages: [1, 1] } },
      86.366556,
      107.066556,
      0.5,
    ],
    [
      'inversion-prepared: the cycle ends with its last readout',
      'inversion-prepared-gradient-echo/3D',
      { inversionTimeMs: 900, sliceCount: 160, sliceThicknessMm: 1 },
      3.343403,
      1460,
      7.565715,
    ],
  ])('%s', (_what, key, given, te, tr, spacing) => {
    const minimum = fastest(key, given);
    expect(minimum.echoTimeMs).toBeCloseTo(te, 5);
    expect(minimum.repetitionTimeMs).toBeCloseTo(tr, 5);
    if (spacing === null) expect(minimum.echoSpacingMs).toBeNull();
    else expect(minimum.echoSpacingMs).toBeCloseTo(spacing, 5);
  });

  it('says what the shortest echo hangs on', () => {
    expect(fastest('spoiled-gradient-echo/2D', {}).binding).toBe('phase encoding');
    expect(fastest('spoiled-gradient-echo/2D', { matrixPhase: 64 }).binding).toBe('readout prephasing');
    expect(fastest('spoiled-gradient-echo/2D', { matrixPhase: 64, matrixRead: 64, sliceThicknessMm: 1.5 }).binding).toBe(
      'slice refocusing',
    );
    expect(fastest('spoiled-gradient-echo/3D', { matrixPhase: 64, sliceCount: 100, sliceThicknessMm: 0.6, matrixRead: 64 }).binding).toBe(
      'partition encoding',
    );
    expect(fastest('echo-planar-spin-echo/2D', planar).binding).toBe('the lines before the centre of k-space');
    expect(fastest('echo-planar-spin-echo/2D', { ...planar, partialFourierPhase: 0.51, parallelFactorPhase: 2 }).binding).toBe(
      'the first half of the echo',
    );
  });

  it('a second echo lengthens what one line takes', () => {
    const [one, two] = [fastest('spoiled-gradient-echo/2D', {}), fastest('spoiled-gradient-echo/2D', { secondEchoTimeMs: 12 })];
    expect(two.repetitionTimeMs - one.repetitionTimeMs).toBeCloseTo(12 - one.echoTimeMs, 9);
    const [single, dual] = [fastest('spin-echo/2D', {}), fastest('spin-echo/2D', { secondEchoTimeMs: 80 })];
    expect(dual.repetitionTimeMs - single.repetitionTimeMs).toBeCloseTo(80 - single.echoTimeMs, 9);
  });

  it('longer pulses lengthen spacing and shortest TE', () => {
    const [one, two] = [
      fastest('fast-spin-echo/2D', { echoTrainLength: 8 }),
      fastest('fast-spin-echo/2D', { echoTrainLength: 8, rfPulseStretch: 2 }),
    ];
    expect((two.echoSpacingMs as number) - (one.echoSpacingMs as number)).toBeCloseTo(3, 9);
  });

  it('the readout may not ask for more than the gradients give', () => {
    // 256 samples over 256 mm at 40 mT/m: 40 x 42.577 = 1703.1 Hz/px
    const most = 40 * gammaBarMhzPerT;
    expect(fastest('spoiled-gradient-echo/2D', { pixelBandwidthHz: most }).readoutOverGradient).toBe(false);
    expect(fastest('spoiled-gradient-echo/2D', { pixelBandwidthHz: most * 1.001 }).readoutOverGradient).toBe(true);
    expect(fastest('spoiled-gradient-echo/2D', { pixelBandwidthHz: most }).readoutMtPerM).toBeCloseTo(40, 9);
  });
});

describe('diffusionLobeMs', () => {
  it.each([50, 400, 800, 1500])(
    'gives lobes whose b is %d s/mm2 by the published weighting (Stejskal & Tanner, J Chem Phys 1965;42:288), in SI units',
    (b) => {
      const lobe = diffusionLobeMs(b, 4, scanner) / 1000;
      const gammaGd = 2 * Math.PI * gammaBarMhzPerT * 1e6 * 0.04 * lobe; // rad/m
      const separation = lobe + 0.004;
      expect((gammaGd ** 2 * (separation - lobe / 3)) / 1e6).toBeCloseTo(b, 4);
    },
  );

  it('is nothing without diffusion weighting', () => {
    expect(diffusionLobeMs(0, 4, scanner)).toBe(0);
  });
});

describe('echoPlanarLeadMs', () => {
  it('128 lines of 0.6 ms: 38.4 ms before the centre at R 1, 19.2 at R 2, 12.8 at R 3 (computed)', () => {
    const lead = (given: GivenParameters) => {
      const p = parametersOf('echo-planar-spin-echo/2D', { matrixPhase: 128, echoSpacingMs: 0.6, ...given });
      return echoPlanarLeadMs(p, acquiredLines('echo-planar-spin-echo/2D', p));
    };
    expect(lead({})).toBeCloseTo(38.4, 9);
    expect(lead({ parallelFactorPhase: 2 })).toBeCloseTo(19.2, 9);
    expect(lead({ parallelFactorPhase: 3 })).toBeCloseTo(12.8, 9);
    expect(lead({ partialFourierPhase: 0.75 })).toBeCloseTo(19.2, 9);
  });
});
