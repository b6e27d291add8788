import { describe, expect, it } from 'vitest';
import { acquisitionWindowMs, effectiveRepetitionTimeMs, isBreathHeld, isCine, pacingPeriodMs } from '../../src/calc/pacing.js';
import type { GivenParameters } from '../../src/calc/series.js';
import { parametersOf } from './series-of.js';

const paced = (pacing: GivenParameters['pacing'], given: GivenParameters = {}) =>
  parametersOf('spoiled-gradient-echo/2D', { ...given, ...(pacing === undefined ? {} : { pacing }) });

describe('pacing', () => {
  it('has a period only where something starts the shots; 4 s of breath, 0.9 s of beat when none is given (common practice, no source)', () => {
    expect(pacingPeriodMs(paced(undefined))).toBeNull();
    expect(pacingPeriodMs(paced({ kind: 'breath-hold', periodMs: 3000 }))).toBeNull();
    expect(pacingPeriodMs(paced({ kind: 'respiratory-trigger' }))).toBe(4000);
    expect(pacingPeriodMs(paced({ kind: 'cardiac-gate' }))).toBe(900);
    expect(pacingPeriodMs(paced({ kind: 'cardiac-gate', periodMs: 700 }))).toBe(700);
    expect(pacingPeriodMs(paced({ kind: 'respiratory-trigger', periodMs: 5500 }))).toBe(5500);
  });

  it.each([
    // computed: period x ceil(TR / period)
    [2000, 4000],
    [4000, 4000],
    [4001, 8000],
    [9000, 12000],
  ])('a breath of 4 s turns TR %d into %d', (tr, effective) => {
    expect(effectiveRepetitionTimeMs(paced({ kind: 'respiratory-trigger', periodMs: 4000 }, { repetitionTimeMs: tr }))).toBe(effective);
  });

  it('leaves TR alone without a trigger, in breath-holds and in a cine', () => {
    expect(effectiveRepetitionTimeMs(paced(undefined, { repetitionTimeMs: 1234 }))).toBe(1234);
    expect(effectiveRepetitionTimeMs(paced({ kind: 'breath-hold' }, { repetitionTimeMs: 1234 }))).toBe(1234);
    expect(effectiveRepetitionTimeMs(paced({ kind: 'cardiac-gate', periodMs: 900 }, { repetitionTimeMs: 3, linesPerBeat: 10 }))).toBe(3);
  });

  it('a gate without lines per beat waits for the next beat', () => {
    expect(effectiveRepetitionTimeMs(paced({ kind: 'cardiac-gate', periodMs: 900 }, { repetitionTimeMs: 1000 }))).toBe(1800);
  });

  it('slices are acquired in the window of a trigger, else in 40 % of the breath, else in all of TR', () => {
    expect(acquisitionWindowMs(paced({ kind: 'respiratory-trigger', periodMs: 4000, windowMs: 900 }))).toBe(900);
    expect(acquisitionWindowMs(paced({ kind: 'respiratory-trigger', periodMs: 4000 }))).toBe(1600);
    expect(acquisitionWindowMs(paced(undefined, { repetitionTimeMs: 700 }))).toBe(700);
    expect(acquisitionWindowMs(paced({ kind: 'cardiac-gate', periodMs: 900, windowMs: 100 }, { repetitionTimeMs: 700 }))).toBe(900);
  });

  it('a cine is gated and takes lines per beat', () => {
    expect(isCine(paced({ kind: 'cardiac-gate' }, { linesPerBeat: 8 }))).toBe(true);
    expect(isCine(paced({ kind: 'cardiac-gate' }))).toBe(false);
    expect(isCine(paced({ kind: 'breath-hold' }, { linesPerBeat: 8 }))).toBe(false);
  });

  it('is held in breath-holds, and in gated series that say so', () => {
    expect(isBreathHeld(paced({ kind: 'breath-hold' }))).toBe(true);
    expect(isBreathHeld(paced({ kind: 'cardiac-gate', breathHold: true }))).toBe(true);
    expect(isBreathHeld(paced({ kind: 'cardiac-gate' }))).toBe(false);
    expect(isBreathHeld(paced({ kind: 'respiratory-trigger', breathHold: true }))).toBe(false);
    expect(isBreathHeld(paced(undefined))).toBe(false);
  });
});
