import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parameterKeys } from '../../src/calc/parameters.js';
import { fillDefaults } from '../../src/calc/series.js';
import { readSetValues } from '../../src/study/set-values.js';

const required = {
  repetitionTimeMs: 4000,
  echoTimeMs: 90,
  fieldOfViewMm: 380,
  matrixRead: 256,
  matrixPhase: 192,
  sliceCount: 20,
  sliceThicknessMm: 5,
  pixelBandwidthHz: 300,
};
const series = {
  parameters: fillDefaults('fast-spin-echo/2D', { ...required, pacing: { kind: 'respiratory-trigger', periodMs: 4000, windowMs: 1800 } }),
};
const diffusion = {
  parameters: fillDefaults('echo-planar-spin-echo/2D', {
    ...required,
    diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [1, 4] },
  }),
};

describe('readSetValues', () => {
  it.each([
    [['fieldOfViewMm=38 cm', 'averages=2'], { fieldOfViewMm: 380, averages: 2 }],
    [['repetitionTimeMs=1.2 s'], { repetitionTimeMs: 1200 }],
    [['pixelBandwidthHz=20 kHz'], { pixelBandwidthHz: 20_000 }],
    [['partialFourierPhase=6/8'], { partialFourierPhase: 0.75 }],
    [['phaseFieldOfViewPercent=80 %'], { phaseFieldOfViewPercent: 80 }],
    [['refocusingAngleDeg=120 deg'], { refocusingAngleDeg: 120 }],
    [['referenceScanS=0:16'], { referenceScanS: 16 }],
    [['phaseDirection=rl', 'fatSuppression=spectral'], { phaseDirection: 'RL', fatSuppression: 'spectral' }],
    [['flowCompensation=true', 'ellipticalSampling=no'], { flowCompensation: true, ellipticalSampling: false }],
    [['averages=2', 'averages=3'], { averages: 3 }],
    [['pacing.periodMs=5 s'], { pacing: { kind: 'respiratory-trigger', periodMs: 5000, windowMs: 1800 } }],
    [
      ['pacing.kind=cardiac-gate', 'pacing.periodMs=900', 'pacing.windowMs=800'],
      { pacing: { kind: 'cardiac-gate', periodMs: 900, windowMs: 800 } },
    ],
    [['pacing=breath-hold'], { pacing: { kind: 'breath-hold' } }],
    [['pacing=none', 'pacing.breathHold=true'], { pacing: { kind: 'none', breathHold: true } }],
    [['linesPerBeat=8'], { linesPerBeat: 8 }],
    [[], {}],
  ])('%j', (entries, value) => {
    expect(readSetValues(entries, series)).toEqual({ ok: true, value });
  });

  it.each([
    [['diffusion.directions=6'], { diffusion: { bValuesSPerMm2: [0, 800], directions: 6, averages: [1, 4] } }],
    [['diffusion.averages=2,8'], { diffusion: { bValuesSPerMm2: [0, 800], directions: 3, averages: [2, 8] } }],
    [
      ['diffusion.bValuesSPerMm2=[50, 400, 800]', 'diffusion.averages=1, 2, 3'],
      { diffusion: { bValuesSPerMm2: [50, 400, 800], directions: 3, averages: [1, 2, 3] } },
    ],
  ])('%j on a diffusion series', (entries, value) => {
    expect(readSetValues(entries, diffusion)).toEqual({ ok: true, value });
  });

  it.each([
    [['avarages=2'], 'unknown-key', 'avarages: no such parameter; expected "averages".', 'Did you mean "averages"?'],
    [['TR=2'], 'unknown-key', 'TR: no such parameter; expected "repetitionTimeMs".', 'Did you mean "repetitionTimeMs"?'],
    [['colour=2'], 'unknown-key', 'colour: no such parameter; expected a parameter key.', 'See "holdfast figures --help" for the keys.'],
    [
      ['constructor=2'],
      'unknown-key',
      'constructor: no such parameter; expected a parameter key.',
      'See "holdfast figures --help" for the keys.',
    ],
    [['averages.x=2'], 'unknown-key', 'averages.x: no such parameter; expected "averages".', 'Did you mean "averages"?'],
    [
      ['pacing.period=2'],
      'unknown-key',
      'pacing.period: no such parameter; expected "pacing.periodMs".',
      'Did you mean "pacing.periodMs"?',
    ],
    [
      ['pacing.constructor=2'],
      'unknown-key',
      'pacing.constructor: no such parameter; expected kind, periodMs, windowMs, breathHold.',
      'See "holdfast figures --help" for the keys.',
    ],
    [
      ['matrixRead=-256'],
      'out-of-range',
      'matrixRead: "-256" was given; expected a whole number from 8 to 4096.',
      'Give a number within the range.',
    ],
    [
      ['matrixRead=256.5'],
      'out-of-range',
      'matrixRead: "256.5" was given; expected a whole number from 8 to 4096.',
      'Give a number within the range.',
    ],
    [
      ['fieldOfViewMm=3.8 m'],
      'out-of-range',
      'fieldOfViewMm: "3.8 m" was given; expected a number from 10 to 1000 mm.',
      'Give a number within the range.',
    ],
    [
      ['partialFourierPhase=0.5'],
      'out-of-range',
      'partialFourierPhase: "0.5" was given; expected a number from more than 0.5 to 1.',
      'Give a number within the range.',
    ],
    [
      ['averages=NaN'],
      'not-a-quantity',
      'averages: "NaN" was given; expected a plain number, a number from 0.1 to 256.',
      'Write a number such as 1.5, alone or with one of these units.',
    ],
    [
      ['fieldOfViewMm=38 kg'],
      'not-a-quantity',
      'fieldOfViewMm: "38 kg" was given; expected a number, alone or in mm, cm, m, um, a number from 10 to 1000 mm.',
      'Write a number such as 1.5, alone or with one of these units.',
    ],
    [
      ['averages=1,5'],
      'not-a-quantity',
      'averages: "1,5" was given; expected a plain number, a number from 0.1 to 256.',
      'Write decimals with a point.',
    ],
    [['phaseDirection=up'], 'unknown-word', 'phaseDirection: "up" was given; expected AP, RL, HF.', 'Use one of these words.'],
    [
      ['fatSuppression=spectrl'],
      'unknown-word',
      'fatSuppression: "spectrl" was given; expected none, spectral, inversion, water-excitation, two-point.',
      'Did you mean "spectral"?',
    ],
    [['flowCompensation=1'], 'wrong-type', 'flowCompensation: "1" was given; expected true or false.', 'Write true or false.'],
    [
      ['diffusion=3'],
      'wrong-type',
      'diffusion: one value was given for several; expected a key inside it, such as diffusion.directions.',
      'Reach inside with a dot.',
    ],
    [
      ['diffusion.directions=6'],
      'missing-key',
      'diffusion: bValuesSPerMm2 and averages missing; expected all of bValuesSPerMm2, directions, averages.',
      'This series has no diffusion yet: set the others too.',
    ],
    [
      ['pacing.windowMs=5000'],
      'values-clash',
      'pacing.windowMs: a window of 5000 ms in a period of 4000 ms; expected a window no longer than the period.',
      'Shorten the window.',
    ],
    [
      ['averages'],
      'set-form',
      'averages: "averages" was given; expected KEY=VALUE.',
      'Write for example averages=2 or "fieldOfViewMm=38 cm".',
    ],
    [
      ['averages='],
      'set-form',
      'averages: "averages=" was given; expected KEY=VALUE.',
      'Write for example averages=2 or "fieldOfViewMm=38 cm".',
    ],
    [['=2'], 'set-form', 'value to set: "=2" was given; expected KEY=VALUE.', 'Write for example averages=2 or "fieldOfViewMm=38 cm".'],
  ])('%j is refused', (entries, code, message, hint) => {
    const read = readSetValues(entries, series);
    expect(read.ok ? 'accepted' : read.problems.map((problem) => [problem.code, problem.message, problem.hint])).toEqual([
      [code, message, hint],
    ]);
  });

  it('tells all problems at once', () => {
    const read = readSetValues(['avarages=2', 'averages=2', 'matrixRead=1'], series);
    expect(read.ok ? [] : read.problems.map(({ path }) => path)).toEqual(['avarages', 'matrixRead']);
  });

  it('refuses averages beside diffusion, and averages that are too few', () => {
    for (const entry of ['averages=2', 'diffusion.averages=1', 'diffusion.bValuesSPerMm2=800,800']) {
      expect(readSetValues([entry], diffusion)).toMatchObject({ ok: false, problems: [{ code: 'values-clash' }] });
    }
  });

  it('never throws, and never gives a number outside the table', () => {
    const value = fc.oneof(fc.string(), fc.double().map(String), fc.constantFrom('1', '38 cm', 'true', 'none', '1,2', '[]', '-0', '6/8'));
    const key = fc.oneof(
      fc.constantFrom(...parameterKeys),
      fc.constantFrom('pacing.periodMs', 'pacing.kind', 'diffusion.averages', 'pacing.', '.', ''),
      fc.string(),
    );
    fc.assert(
      fc.property(key, value, (name, text) => {
        const read = readSetValues([`${name}=${text}`], series);
        if (read.ok) for (const set of Object.values(read.value)) if (typeof set === 'number') expect(Number.isFinite(set)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });
});
