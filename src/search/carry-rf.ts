import { classRow } from '../calc/classes.js';
import { compareWith } from '../calc/compare.js';
import type { Figures } from '../calc/figures.js';
import { modelOf } from '../calc/model.js';
import type { RfCarry } from './carry.js';
import { nearestRoot } from './carry-root.js';
import type { CarrySetting, Settled } from './carry-setting.js';
import { digits } from './carry-words.js';

/** Smallest angle that is looked at, degrees. */
const smallestDeg = 20;

/**
 * RF at the new field against the preset: SAR between B0^0.85 (full-wave whole-body models from 1.5 to 3 T: IEEE Rev Biomed Eng 2017;10:95,
 * table VI) and B0^2 (quasi-static, an upper bound going up) times the ratio of B1+rms squared; and the angle that brings each end back to the
 * preset's. It is shown, never set: the angle costs signal, and a person decides.
 */
export function carriedRf(setting: CarrySetting, settled: Settled, figures: Figures): RfCarry {
  const { baseline, series, to } = setting;
  const low = figures.sarTrendLow ?? 0;
  const high = figures.sarTrendHigh ?? 0;
  const b1RmsRatio = (figures.b1PlusRmsUt ?? 0) / baseline.model.b1PlusRmsUt;
  const said = `SAR trend x${digits(low, 2)} to x${digits(high, 2)} of the preset's, B1+rms x${digits(b1RmsRatio, 2)}`;
  if (high <= 1) return { low, high, b1RmsRatio, back: null, words: `${said}: no more than the preset` };
  const key = classRow(baseline.model.key).gradientEcho ? 'flipAngleDeg' : 'refocusingAngleDeg';
  const fromDeg = settled.parameters[key];
  const at = (angle: number) => {
    const parameters = { ...settled.parameters, [key]: angle };
    return compareWith(modelOf({ ...series, parameters }, to, baseline.model.slotFactor), baseline);
  };
  const angleFor = (end: 'sarTrendLow' | 'sarTrendHigh') => {
    const found = nearestRoot((angle) => (at(angle)[end] as number) - 1, fromDeg, Math.min(smallestDeg, fromDeg / 10), fromDeg);
    // Rounded down to halves: the angle must not go over.
    return found.found ? Math.floor(found.x * 2) / 2 : null;
  };
  const upperDeg = angleFor('sarTrendHigh');
  const name = key === 'flipAngleDeg' ? 'an excitation angle' : 'a refocusing angle';
  if (upperDeg === null)
    return {
      low,
      high,
      b1RmsRatio,
      back: null,
      words: `${said}; no ${name.slice(name.indexOf(' ') + 1)} brings the upper end back: longer pulses, TR or fewer slices would`,
    };
  const lowerDeg = low <= 1 ? null : angleFor('sarTrendLow');
  const snrBefore = figures.relativeSnr;
  const after = at(upperDeg).relativeSnr;
  const snr = snrBefore === null || snrBefore === 0 || after === null ? null : after / snrBefore;
  const cost = snr === null ? '' : `, at ${digits(snr * 100, 0)} % of the signal of ${series.target}`;
  const lower = lowerDeg === null ? '' : ` (${digits(lowerDeg, 1)} deg the lower)`;
  return {
    low,
    high,
    b1RmsRatio,
    back: { key, fromDeg, upperDeg, lowerDeg, snr },
    words: `${said}; ${name} of ${digits(upperDeg, 1)} deg instead of ${digits(fromDeg, 1)} brings the upper end back${lower}${cost}. Read the scanner's own value before starting`,
  };
}
