import { type ClassKey, classRow } from './classes.js';
import { gammaBarMhzPerT } from './constants.js';
import type { PulseName, PulseShape, Scanner } from './scanner.js';
import type { Parameters } from './series.js';
import { gaussianWaveform, hardWaveform, sincWaveform, timeBandwidthOfPower, type Waveform } from './waveform.js';

/** Power factor of a common refocusing pulse (common practice, no source). */
const refocusingPower = 2.11;
const refocusingTimeBandwidth = timeBandwidthOfPower(refocusingPower);

/** Angle of the fat-saturation pulse and of a saturation band, degrees (common practice, no source). */
export const fatSaturationAngleDeg = 100;
export const saturationBandAngleDeg = 90;
/** Energy of an adiabatic inversion, whatever its angle, uT^2 ms, and the time it takes, ms (common practice, no source). */
export const inversionEnergyUt2Ms = 272;
export const inversionPulseMs = 10;

/** Default pulses (common practice, no source); the fat-saturation pulse lasts 24 ms over the field in tesla. */
const defaults: Readonly<Record<Exclude<PulseName, 'fatSaturation'>, PulseShape>> = {
  excitation: { durationMs: 2.5, timeBandwidth: 4 },
  refocusing: { durationMs: 3, powerFactor: refocusingPower, timeBandwidth: refocusingTimeBandwidth },
  gradientEcho2D: { durationMs: 2, timeBandwidth: 3 },
  gradientEcho3D: { durationMs: 1, timeBandwidth: 6 },
  nonSelective: { durationMs: 0.5, timeBandwidth: 0 },
  balanced: { durationMs: 1, timeBandwidth: 2 },
  echoPlanarExcitation: { durationMs: 3, timeBandwidth: 4 },
  echoPlanarRefocusing: { durationMs: 4, timeBandwidth: 3 },
  saturationBand: { durationMs: 4, timeBandwidth: 6 },
};

/** The shape a scanner plays for a named pulse: its file's, else the default. */
export function pulseShape(name: PulseName, scanner: Scanner): PulseShape {
  const own = scanner.pulses[name];
  if (own !== undefined) return own;
  return name === 'fatSaturation' ? { durationMs: 24 / scanner.fieldT, gaussian: true } : defaults[name];
}

function waveform(shape: PulseShape): Waveform {
  if (shape.gaussian === true) return gaussianWaveform();
  if (shape.timeBandwidth === undefined || shape.timeBandwidth === 0)
    return shape.powerFactor === undefined ? hardWaveform : { powerFactor: shape.powerFactor, peakFactor: 1 };
  const sinc = sincWaveform(shape.timeBandwidth);
  return shape.powerFactor === undefined ? sinc : { powerFactor: shape.powerFactor, peakFactor: sinc.peakFactor };
}

/** Name of the excitation pulse of a class. */
export function excitationPulse(key: ClassKey, slabSelective: boolean): PulseName {
  const row = classRow(key);
  if (row.echoPlanar) return 'echoPlanarExcitation';
  if (!row.gradientEcho) return 'excitation';
  if (row.family === 'balanced-steady-state') return 'balanced';
  if (row.acquisition === '2D') return 'gradientEcho2D';
  return slabSelective ? 'gradientEcho3D' : 'nonSelective';
}

/** Name of the refocusing pulse of a class, null in gradient echoes. */
export function refocusingPulse(key: ClassKey): PulseName | null {
  const row = classRow(key);
  if (row.gradientEcho) return null;
  return row.echoPlanar ? 'echoPlanarRefocusing' : 'refocusing';
}

/** B1 in uT of a hard pulse: angle / (2 pi gamma-bar tau). A 90 degree pulse of 1 ms takes 5.8716 uT. */
export function hardPulseB1Ut(angleDeg: number, durationMs: number): number {
  return (angleDeg / 360 / (gammaBarMhzPerT * durationMs)) * 1000;
}

/** One pulse as played. */
export interface PlayedPulse {
  readonly durationMs: number;
  readonly timeBandwidth: number;
  readonly peakB1Ut: number;
  readonly energyUt2Ms: number;
  /** True when the scanner's maximum B1 made it longer than its shape says. */
  readonly lengthened: boolean;
}

/**
 * A pulse of this angle on this scanner: stretched as the series asks, then lengthened until its peak stays within the maximum B1.
 * Energy = (angle / (2 pi gamma-bar tau))^2 tau P (McRobbie, Essentials of MRI Safety, eq. 1.9, for the sum; read in a secondary page).
 */
export function playPulse(name: PulseName, angleDeg: number, stretch: number, scanner: Scanner, simultaneous = 1): PlayedPulse {
  const shape = pulseShape(name, scanner);
  return playShape(shape, waveform(shape), angleDeg, stretch, scanner.maximumB1Ut, simultaneous);
}

function playShape(
  shape: PulseShape,
  form: Waveform,
  angleDeg: number,
  stretch: number,
  maximumB1Ut: number,
  simultaneous: number,
): PlayedPulse {
  const wantedMs = shape.durationMs * stretch;
  // Simultaneous slices add up in amplitude: peak power grows with the square of their number (Barth, Magn Reson Med 2016;75:63, law from memory).
  const peakAtWanted = hardPulseB1Ut(angleDeg, wantedMs) * form.peakFactor * simultaneous;
  const lengthened = peakAtWanted > maximumB1Ut * (1 + 1e-9);
  const durationMs = lengthened ? wantedMs * (peakAtWanted / maximumB1Ut) : wantedMs;
  const b1 = hardPulseB1Ut(angleDeg, durationMs);
  return {
    durationMs,
    timeBandwidth: shape.timeBandwidth ?? 0,
    peakB1Ut: Math.min(peakAtWanted, maximumB1Ut),
    energyUt2Ms: b1 * b1 * durationMs * form.powerFactor,
    lengthened,
  };
}

/** Plays the pulses of one role (excitation, refocusing, ...), remembering shape and last pulse: the edits of a series ask for the same few. */
class PulseRole {
  #name: PulseName = 'excitation';
  #scanner: Scanner | null = null;
  #shape: PulseShape = defaults.excitation;
  #form: Waveform = hardWaveform;
  #angleDeg = 0;
  #stretch = 0;
  #simultaneous = 0;
  #pulse: PlayedPulse | null = null;

  play(name: PulseName, angleDeg: number, stretch: number, scanner: Scanner, simultaneous: number): PlayedPulse {
    if (name !== this.#name || scanner !== this.#scanner) {
      this.#name = name;
      this.#scanner = scanner;
      this.#shape = pulseShape(name, scanner);
      this.#form = waveform(this.#shape);
      this.#pulse = null;
    }
    if (this.#pulse === null || angleDeg !== this.#angleDeg || stretch !== this.#stretch || simultaneous !== this.#simultaneous) {
      this.#angleDeg = angleDeg;
      this.#stretch = stretch;
      this.#simultaneous = simultaneous;
      this.#pulse = playShape(this.#shape, this.#form, angleDeg, stretch, scanner.maximumB1Ut, simultaneous);
    }
    return this.#pulse;
  }
}
const excitations = new PulseRole();
const refocusings = new PulseRole();
const fatSaturations = new PulseRole();
const bands = new PulseRole();

/** The pulses of one slot of a series. */
export interface SlotPulses {
  readonly excitation: PlayedPulse;
  readonly refocusing: PlayedPulse | null;
  readonly fatSaturation: PlayedPulse | null;
  readonly band: PlayedPulse | null;
}

/** All pulses of one slot as played on this scanner. */
export function slotPulses(key: ClassKey, p: Parameters, scanner: Scanner): SlotPulses {
  const m = p.simultaneousSlices;
  const refocusing = refocusingPulse(key);
  return {
    excitation: excitations.play(excitationPulse(key, p.slabSelective), p.flipAngleDeg, p.rfPulseStretch, scanner, m),
    refocusing: refocusing === null ? null : refocusings.play(refocusing, p.refocusingAngleDeg, p.rfPulseStretch, scanner, m),
    fatSaturation:
      p.fatSuppression === 'spectral' ? fatSaturations.play('fatSaturation', fatSaturationAngleDeg, p.rfPulseStretch, scanner, 1) : null,
    band: p.saturationBands > 0 ? bands.play('saturationBand', saturationBandAngleDeg, p.rfPulseStretch, scanner, 1) : null,
  };
}
