import { describe, expect, it } from 'vitest';
import type { CautionCode } from '../../../src/calc/caution.js';
import { plainScanner } from '../../../src/calc/scanner.js';
import { edit, seriesOf } from '../series-of.js';

type Edited = ReturnType<typeof edit>;

const cautionOf = (code: CautionCode, edited: Edited) => {
  const found = edited.cautions.find((caution) => caution.code === code);
  if (found === undefined) throw new Error(`no ${code} among ${edited.codes.join(', ')}`);
  return found;
};
const textOf = (code: CautionCode, edited: Edited) => cautionOf(code, edited).text;

/**
 * Digits as a person reads them at the console (common practice, no source): percents and millimetres of a body whole, TI whole,
 * gradients, echoes and effective TE to a tenth, short times, gaps and fields to a hundredth, the slot factor to a thousandth;
 * zeros at the end are dropped.
 */
describe('numbers that cautions say', () => {
  it('an acceleration that the coil table does not know: along phase, and along partitions only where there are any', () => {
    expect(textOf('g-unknown', edit(seriesOf('spin-echo/2D', { parallelFactorPhase: 5 })))).toContain('acceleration 5 x 1 is not known');
    expect(
      textOf('g-unknown', edit(seriesOf('spoiled-gradient-echo/3D', { parallelFactorPhase: 5, parallelFactorSlice: 2, sliceCount: 20 }))),
    ).toContain('acceleration 5 x 2 is not known');
  });

  it('a change of the contrast ratio in whole percent', () => {
    const edited = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 500 }), { repetitionTimeMs: 2000 });
    const change = edited.figures.contrastRatioChange as number;
    expect(Math.abs(change)).toBeGreaterThan(0.1);
    expect(textOf('contrast-drift', edited)).toContain(`changes by ${Math.round(100 * change)} %`);
  });

  it('a null that moved, in whole ms', () => {
    const series = seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 9000, inversionTimeMs: 2500, echoTrainLength: 16, echoTimeMs: 100 });
    const edited = edit(series, { repetitionTimeMs: 6000 });
    const { wantedMs } = cautionOf('null-drift', edited).numbers;
    expect(textOf('null-drift', edited)).toContain(`TI 2500 ms, about ${Math.round(wantedMs as number)} ms would null`);
  });

  it('partial Fourier and acceleration: 6/8 over 4 is 19 % of the lines', () => {
    expect(textOf('partial-fourier-low', edit(seriesOf('spin-echo/2D', { partialFourierPhase: 0.75, parallelFactorPhase: 4 })))).toContain(
      'only 19 %',
    );
  });

  it('a gap of 0.25 mm', () => {
    const series = seriesOf('spin-echo/2D', { sliceCount: 5, sliceGapMm: 0.25, repetitionTimeMs: 2000 });
    expect(textOf('cross-talk', edit(series))).toContain('gap 0.25 mm is under 10 %');
  });

  it('the field beyond the measured ones, as it is', () => {
    expect(textOf('extrapolated-tissue', edit(seriesOf('spin-echo/2D'), {}, { fieldT: 0.35 }))).toContain('at 0.35 T');
    const pair = seriesOf('spoiled-gradient-echo/2D', { repetitionTimeMs: 150, echoTimeMs: 2.3, secondEchoTimeMs: 4.6 });
    expect(textOf('echo-pair-phase', edit(pair, {}, { fieldT: 2.89 }))).toContain('at 2.89 T');
  });

  it("the scanner's highest B1 to a tenth, the pulse to a hundredth of a ms", () => {
    const scanner = { ...plainScanner(1.5), maximumB1Ut: 10.4 };
    const edited = edit(seriesOf('spin-echo/2D'), {}, { scanner });
    const { durationMs } = cautionOf('pulse-lengthened', edited).numbers;
    expect(textOf('pulse-lengthened', edited)).toContain(
      `scanner's 10.4 uT and is lengthened to ${Number((durationMs as number).toFixed(2))} ms`,
    );
    expect(String(Number((durationMs as number).toFixed(2)))).toMatch(/\.\d\d$/);
  });

  it('gradients to a tenth', () => {
    const scanner = { ...plainScanner(1.5), gradientMtPerM: 22.5 };
    // 1234 x 256 / (42.577 x 256) = 28.98 mT/m
    const series = seriesOf('spoiled-gradient-echo/2D', { pixelBandwidthHz: 1234 });
    expect(textOf('readout-gradient', edit(series, {}, { scanner }))).toContain('needs 29 mT/m, the gradients give 22.5');
    const other = seriesOf('spoiled-gradient-echo/2D', { pixelBandwidthHz: 1200 });
    expect(textOf('readout-gradient', edit(other, {}, { scanner }))).toContain('needs 28.2 mT/m');
  });

  it('times under the shortest to a hundredth of a ms', () => {
    const short = (code: CautionCode, edited: Edited) => Number((cautionOf(code, edited).numbers['minimumMs'] as number).toFixed(2));
    const gradient = edit(
      seriesOf('spoiled-gradient-echo/3D', { repetitionTimeMs: 4.55, echoTimeMs: 1.15, sliceCount: 20, pixelBandwidthHz: 215 }),
    );
    expect(textOf('below-minimum-te', gradient)).toContain(
      `TE 1.15 ms is under the estimated minimum of ${short('below-minimum-te', gradient)} ms`,
    );
    expect(textOf('below-minimum-tr', gradient)).toContain(
      `TR 4.55 ms is under the estimated minimum of ${short('below-minimum-tr', gradient)} ms`,
    );
    const train = edit(seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTimeMs: 63, echoTrainLength: 16, echoSpacingMs: 5.25 }));
    expect(textOf('below-minimum-spacing', train)).toContain(
      `spacing 5.25 ms is under the estimated minimum of ${short('below-minimum-spacing', train)} ms`,
    );
    for (const [code, edited] of [
      ['below-minimum-te', gradient],
      ['below-minimum-tr', gradient],
      ['below-minimum-spacing', train],
    ] as const) {
      expect(String(short(code, edited))).toMatch(/\.\d\d$/);
    }
  });

  it('the factor of a slot to a thousandth', () => {
    const edited = edit(seriesOf('spin-echo/2D', { repetitionTimeMs: 500, echoTimeMs: 15, sliceCount: 30 }));
    const { factor } = cautionOf('slot-scaled', edited).numbers;
    expect(factor).toBeLessThan(1);
    expect(textOf('slot-scaled', edited)).toContain(`takes ${Number((factor as number).toFixed(3))} of`);
  });

  it('effective echo times to a tenth: the last of 5 echoes at 10.5 ms is at 52.5 ms', () => {
    const train = seriesOf('fast-spin-echo/2D', { repetitionTimeMs: 3000, echoTimeMs: 97.5, echoTrainLength: 5, echoSpacingMs: 10.5 });
    expect(textOf('echo-off-time', edit(train))).toContain('TE 97.5 ms is at 52.5 ms');
  });

  it('echoes before the centre of a single shot: (5/8 - 1/2) of 250 lines is 31.3, TE 100 at 5 ms asks for 19', () => {
    const shot = seriesOf('single-shot-fast-spin-echo/2D', {
      echoTimeMs: 100,
      matrixPhase: 250,
      partialFourierPhase: 0.625,
      repetitionTimeMs: 2000,
    });
    expect(textOf('echo-centre-differs', edit(shot))).toMatch(/puts 31\.[23] echoes before the centre, TE asks for 19:/);
  });

  it('millimetres of a body, whole: 430.4 mm on a field of 340.4, 385 needed', () => {
    const series = seriesOf('spin-echo/2D', { fieldOfViewMm: 340.4 });
    const body = { frontBackMm: 430.4, leftRightMm: null };
    expect(textOf('wrap', edit(series, {}, { body }))).toContain('body 430 mm, 340 mm encoded, 385 mm needed');
    const fast = seriesOf('spin-echo/2D', { fieldOfViewMm: 340.4, parallelFactorPhase: 2 });
    expect(textOf('wrap-unfoldable', edit(fast, {}, { body }))).toContain('body 430 mm, 340 mm encoded');
  });

  it('readings as they were typed, time to a tenth, B1+rms and SAR to a hundredth', () => {
    const edited = edit(seriesOf('spin-echo/2D'), {}, { readings: { timeS: 61.54, b1rmsUt: 2.754, sarWkg: 1.104 } });
    expect(textOf('reading-used', edited)).toContain('time 61.5 s, B1+rms 2.75 uT, SAR 1.1 W/kg of');
    const finer = edit(seriesOf('spin-echo/2D'), {}, { readings: { timeS: 60.25, b1rmsUt: 2.5, sarWkg: 1.126 } });
    expect(textOf('reading-used', finer)).toMatch(/time 60\.[23] s, B1\+rms 2\.5 uT, SAR 1\.13 W\/kg of/);
  });
});
