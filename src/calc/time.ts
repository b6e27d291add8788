import { type ClassKey, classRow } from './classes.js';
import { bladeCount, ellipticalShare, type Lines } from './lines.js';
import { effectiveRepetitionTimeMs, isBreathHeld, isCine, pacingPeriodMs } from './pacing.js';
import { pulseShape } from './pulses.js';
import { guardedCeil, roundHalfUp } from './rounding.js';
import type { Scanner } from './scanner.js';
import type { Parameters } from './series.js';

/** Preparation of a series, instruction and rest of one breath-hold, s (common practice, no source). */
export const preparationS = 20;
const instructionS = 10;
export const restS = 20;

/** Pauses as a site has them, s. */
export interface Pauses {
  /** Preparation of a series. */
  readonly preparationS: number;
  /** Rest between two breath-holds. */
  readonly restS: number;
}

const usualPauses: Pauses = { preparationS, restS };

/** Pauses of those who work at this scanner. */
export function pausesOf(scanner: Scanner): Pauses {
  return scanner.pauses ?? usualPauses;
}

/** Instruction and rest that come with each breath-hold, s. */
export function restOfHoldS(scanner: Scanner): number {
  return instructionS + pausesOf(scanner).restS;
}

/** Times of one series. Seconds come from whole microseconds times whole or half counts, divided once at the end. */
export interface SeriesTime {
  readonly scanTimeS: number;
  readonly holdTimeS: number | null;
  readonly holds: number | null;
  readonly tableTimeS: number;
  /** Excitations of one pass, dummies included. */
  readonly shots: number;
}

/** Shots of diffusion: the sum over b of directions x averages (directions count 1 at b 0). */
export function diffusionShots(diffusion: NonNullable<Parameters['diffusion']>): number {
  const { bValuesSPerMm2, directions, averages } = diffusion;
  let shots = 0;
  for (let i = 0; i < bValuesSPerMm2.length; i += 1) shots += (bValuesSPerMm2[i] === 0 ? 1 : directions) * (averages[i] ?? 1);
  return shots;
}

/** What one pass plays and how often passes follow each other. */
interface Passes {
  readonly shots: number;
  /** Time of one shot, whole microseconds. */
  readonly shotUs: number;
  /** Passes of one volume: rounds, slices one by one, or slabs. */
  readonly passes: number;
  /** Extra time of one pass, microseconds: fat-suppression blocks where they are stated. */
  readonly extraUs: number;
  /** Time before the first pass of a volume, microseconds: dummies that are played once for all slices. */
  readonly leadUs: number;
}

function microseconds(ms: number): number {
  return roundHalfUp(ms * 1000);
}

function passesFrom(shots: number, shotUs: number, passes: number, extraUs = 0, leadUs = 0): Passes {
  return { shots, shotUs, passes, extraUs, leadUs };
}

/** Counts shots and passes by class; `rounds` is the split in force. */
function passesOf(key: ClassKey, p: Parameters, lines: Lines, rounds: number, scanner: Scanner): Passes {
  const row = classRow(key);
  const shotUs = microseconds(effectiveRepetitionTimeMs(p));
  if (isCine(p)) {
    const beats = guardedCeil(guardedCeil(lines.phase * p.averages) / (p.linesPerBeat as number)) + 1;
    return passesFrom(beats, microseconds(pacingPeriodMs(p) as number), p.sliceCount);
  }
  switch (row.family) {
    case 'inversion-prepared-gradient-echo':
      return passesFrom(guardedCeil(lines.phase * p.averages) + p.dummyShots, shotUs, p.slabs);
    case 'echo-planar-gradient-echo':
    case 'echo-planar-spin-echo': {
      const acquired = p.diffusion === undefined ? guardedCeil(p.volumes * p.averages) : diffusionShots(p.diffusion);
      return passesFrom(acquired + p.dummyShots, shotUs, rounds);
    }
    case 'single-shot-fast-spin-echo':
      return passesFrom(guardedCeil(p.averages), shotUs, guardedCeil(p.sliceCount / p.simultaneousSlices), 0, p.dummyShots * shotUs);
    case 'rotating-strip-fast-spin-echo': {
      const blades = bladeCount(p.matrixPhase, p.echoTrainLength, p.parallelFactorPhase);
      return passesFrom(guardedCeil(blades * p.averages) + p.dummyShots, shotUs, rounds);
    }
    default:
  }
  const train = row.train ? p.echoTrainLength : 1;
  if (row.acquisition === '3D') {
    const kept = lines.total * ellipticalShare(p);
    const shots = (row.train ? guardedCeil(guardedCeil(kept / train) * p.averages) : guardedCeil(kept * p.averages)) + p.dummyShots;
    return passesFrom(shots, shotUs, p.slabs, fatBlocksUs(key, p, shots, scanner));
  }
  const shots = guardedCeil(guardedCeil(lines.phase / train) * p.averages) + p.dummyShots;
  return passesFrom(shots, shotUs, row.interleaving === 'slice-by-slice' ? p.sliceCount : rounds);
}

/** Time of the fat-suppression blocks of one pass of a 3D gradient echo, microseconds: nothing unless their distance is stated. */
function fatBlocksUs(key: ClassKey, p: Parameters, shots: number, scanner: Scanner): number {
  if (!classRow(key).gradientEcho || p.fatSuppression !== 'spectral' || p.fatSuppressionEveryLines === undefined) return 0;
  return guardedCeil(shots / p.fatSuppressionEveryLines) * microseconds(pulseShape('fatSaturation', scanner).durationMs * p.rfPulseStretch);
}

/** True where `volumes` repeat everything; an echo-planar series counts its volumes among its shots. */
function repeatsVolumes(key: ClassKey): boolean {
  return !classRow(key).echoPlanar;
}

/**
 * Scan time, breath-holds and time on the table of one series; `rounds` is the split in force.
 * Formulas: repetition time times shots times passes (Haacke et al., Magnetic Resonance Imaging, 1999; common to all textbooks).
 */
export function seriesTime(key: ClassKey, p: Parameters, lines: Lines, rounds: number, scanner: Scanner): SeriesTime {
  const { shots, shotUs, passes, extraUs, leadUs } = passesOf(key, p, lines, rounds, scanner);
  const volumes = repeatsVolumes(key) ? p.volumes : 1;
  const passUs = shots * shotUs + extraUs;
  const scanTimeS = ((passUs * passes + leadUs) * volumes) / 1e6 + p.referenceScanS;
  const prepared = pausesOf(scanner).preparationS;
  if (!isBreathHeld(p)) return { scanTimeS, holdTimeS: null, holds: null, tableTimeS: prepared + scanTimeS, shots };
  const bySlice = classRow(key).interleaving === 'slice-by-slice' || isCine(p);
  const volume = classRow(key).interleaving === 'volume';
  const units = bySlice ? p.sliceCount : volume ? 1 : rounds;
  const perHold = p.roundsPerHold ?? (bySlice ? guardedCeil(p.sliceCount / rounds) : 1);
  const holdsPerVolume = guardedCeil(units / perHold);
  const holds = holdsPerVolume * volumes;
  // Whole passes go into a hold; the fullest one is the longest. A volume is one hold with all its slabs.
  const passesPerHold = volume ? passes : Math.min(passes, guardedCeil((Math.min(perHold, units) * passes) / units));
  const holdTimeS = (passUs * passesPerHold + leadUs) / 1e6;
  return { scanTimeS, holdTimeS, holds, tableTimeS: prepared + scanTimeS + holds * restOfHoldS(scanner), shots };
}
