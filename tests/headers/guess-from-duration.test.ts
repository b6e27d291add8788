import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { acquiredLines } from '../../src/calc/lines.js';
import { plainScanner } from '../../src/calc/scanner.js';
import { classOf, fillDefaults, type GivenParameters } from '../../src/calc/series.js';
import { seriesTime } from '../../src/calc/time.js';
import { readSeries } from '../../src/headers/read-series.js';
import { readPreset } from '../../src/study/read-preset.js';
import type { StudySeries } from '../../src/study/study.js';
import { imagesOfPreset, singleFrames } from './attributes-of-preset.js';
import { dicomObject } from './dicom-object.js';
import { collectObjects } from './read-objects.js';

function studyOf(name: string) {
  const read = readPreset(readFileSync(join('presets', name), 'utf8'), name);
  if (!read.ok) throw new Error(`${name} is no preset`);
  return read.value;
}

function timeOf(series: StudySeries, fieldT: number): number {
  const key = classOf(series);
  const p = series.parameters;
  return seriesTime(key, p, acquiredLines(key, p), p.rounds, plainScanner(fieldT)).scanTimeS;
}

function readWith(series: StudySeries, fieldT: number, durationS: number | undefined) {
  const images = imagesOfPreset(series, fieldT, durationS === undefined ? {} : { durationS });
  return readSeries(collectObjects(singleFrames(images, '1.2.3').map((image) => dicomObject(image))).series()[0]!, 's1');
}

const liver = studyOf('liver-3t.json');
const dynamic = liver.series.find(({ id }) => id === 't1-3d')!;

/** One volume with half the slices' oversampling left out, so that one amount alone is not stated. */
const oneUnknown: StudySeries = {
  ...dynamic,
  parameters: { ...dynamic.parameters, volumes: 1, sliceOversamplingPercent: 0, partialFourierSlice: 0.75, partialFourierPhase: 1 },
};

const found = (read: ReturnType<typeof readWith>, key: string) => read.values.find((value) => value.key === key)!;

describe('what a header says is there, from AcquisitionDuration', () => {
  it('is a guess, marked, where one amount explains the duration: partial Fourier of the slices', () => {
    const read = readWith(oneUnknown, 3, timeOf(oneUnknown, 3));
    expect(found(read, 'partialFourierSlice')).toMatchObject({ origin: 'guess', value: 0.75 });
    expect(found(read, 'partialFourierSlice').words).toMatch(
      /^explains AcquisitionDuration [\d.]+ s; no other usual amount does\. PartialFourier YES/,
    );
  });

  it('still is when the scanner took 3 % longer than the rules, as real ones do', () => {
    expect(found(readWith(oneUnknown, 3, timeOf(oneUnknown, 3) * 1.03), 'partialFourierSlice')).toMatchObject({
      origin: 'guess',
      value: 0.75,
    });
  });

  it('is missing without a duration, and says that one could bound it', () => {
    const value = found(readWith(oneUnknown, 3, undefined), 'partialFourierSlice');
    expect(value.origin).toBe('missing');
    expect(value.words).toContain('AcquisitionDuration is not stated');
  });

  it('is missing where nothing usual explains the duration', () => {
    const value = found(readWith(oneUnknown, 3, timeOf(oneUnknown, 3) * 7), 'partialFourierSlice');
    expect(value.origin).toBe('missing');
    expect(value.words).toContain('no usual amount explains');
  });

  it('stays missing where several amounts explain it equally well, and names them', () => {
    const two: StudySeries = { ...oneUnknown, parameters: { ...oneUnknown.parameters, partialFourierPhase: 0.875 } };
    const read = readWith(two, 3, timeOf(two, 3));
    for (const key of ['partialFourierPhase', 'partialFourierSlice']) {
      expect(found(read, key).origin).toBe('missing');
      expect(found(read, key).words).toMatch(/allows 0\.75 or 0\.875/);
    }
  });

  it('is compared with what the values give where nothing is open', () => {
    const plain: StudySeries = { ...oneUnknown, parameters: { ...oneUnknown.parameters, partialFourierSlice: 1 } };
    const { durationS, computedS } = readWith(plain, 3, 2 * timeOf(plain, 3));
    expect(computedS).toBeCloseTo((durationS as number) / 2, 6);
    expect(readWith(oneUnknown, 3, undefined).computedS).toBeNull();
  });

  it('explains the duration of every series that it guesses for, in all shipped presets', () => {
    let guessed = 0;
    let right = 0;
    let explained = 0;
    for (const name of readdirSync('presets')) {
      const study = studyOf(name);
      for (const series of study.series) {
        const durationS = timeOf(series, study.fieldT);
        const read = readWith(series, study.fieldT, durationS);
        const guesses = read.values.filter(({ origin }) => origin === 'guess');
        if (guesses.length === 0) continue;
        const [, named, number] = /if (\w+) is (\d)/.exec(guesses[0]!.words) ?? [];
        const known = read.values.flatMap(({ key, value }) => (value === undefined ? [] : [[key, value] as const]));
        const supposed = named === undefined ? [] : [[named, Number(number)] as const];
        const parameters = fillDefaults(classOf(series), Object.fromEntries([...known, ...supposed]) as GivenParameters);
        const ratio = timeOf({ ...series, parameters }, study.fieldT) / durationS;
        // Where another amount stays open, the guess alone need not add up.
        if (!read.values.some(({ some }) => some === true)) {
          explained += 1;
          expect(ratio).toBeGreaterThan(0.94);
          expect(ratio).toBeLessThan(1.01);
        }
        for (const { key, value, words } of guesses) {
          expect(words).toMatch(/^explains AcquisitionDuration/);
          guessed += 1;
          if (value === series.parameters[key]) right += 1;
        }
      }
    }
    expect(guessed).toBeGreaterThan(30);
    expect(explained).toBeGreaterThan(30);
    // Wrong only where a preset has an amount that is not among the usual ones.
    expect(right / guessed).toBeGreaterThan(0.9);
  }, 120_000);
});
