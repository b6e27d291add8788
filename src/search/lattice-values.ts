import type { Body } from '../calc/body.js';
import { classRow } from '../calc/classes.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import { type ParameterKey, parameterRow } from '../calc/parameters.js';
import { guardedCeil, guardedFloor } from '../calc/rounding.js';
import type { Scanner } from '../calc/scanner.js';
import { classOf, type Parameters } from '../calc/series.js';
import type { StudySeries } from '../study/study.js';

/** A value a search may set: never an object. */
export type StepValue = number | string | boolean;

/** What the steps of a parameter depend on besides its own value. */
export interface StepCircumstances {
  readonly series: StudySeries;
  readonly scanner: Scanner;
  readonly body: Body;
  /** An RF cap is set: TR may rise, angles may fall. */
  readonly rfCap: boolean;
  /** The preset or the user opened it beyond what the class allows. */
  readonly opened: boolean;
}

/** Clears binary dust: a millionth of the unit. */
const tidy = (value: number) => Math.round(value * 1e6) / 1e6;

/** All multiples of a step from low to high, both included. */
function multiples(low: number, high: number, step: number): number[] {
  const values: number[] = [];
  for (let i = guardedCeil(low / step); i <= guardedFloor(high / step); i += 1) values.push(tidy(i * step));
  return values;
}

/** Extent of this body along a phase direction, mm, where it was typed and the plane lies along it; null otherwise. */
function typedExtentMm(series: StudySeries, direction: Parameters['phaseDirection'], body: Body): number | null {
  if (series.plane.includes('oblique') || series.plane.includes('axis')) return null;
  if (direction === 'AP') return body.frontBackMm;
  return direction === 'RL' ? body.leftRightMm : null;
}

/** Step of a repetition time, ms: about 3 % of it, a round number (common practice, no source). */
function repetitionStepMs(repetitionTimeMs: number): number {
  if (repetitionTimeMs >= 2000) return 100;
  if (repetitionTimeMs >= 1000) return 50;
  if (repetitionTimeMs >= 200) return 10;
  if (repetitionTimeMs >= 50) return 5;
  return repetitionTimeMs >= 10 ? 0.5 : 0.1;
}

/** TR below which a series counts as T1-weighted, ms (common practice, no source). */
const longestT1WeightedMs = 1200;

function repetitionTimes(p: Parameters, { series, rfCap, opened }: StepCircumstances): number[] {
  const row = classRow(classOf(series));
  const gradientLine = row.gradientEcho && !series.family.startsWith('echo-planar');
  const t1Weighted = gradientLine || p.repetitionTimeMs < longestT1WeightedMs;
  const up = rfCap ? 1.5 : opened ? (t1Weighted ? 1.15 : 1.5) : 1;
  // Where each line is read at once, TR is as short as readout and pulses let it be: it is not shortened by wish.
  const down = gradientLine && row.interleaving !== 'interleaved' && !opened ? 1 : 0.9;
  const tr = p.repetitionTimeMs;
  return multiples(tr * down, tr * up, repetitionStepMs(tr));
}

/** One step of acceleration up and down, within what is known of the coil's noise. */
function accelerations(
  key: 'parallelFactorPhase' | 'parallelFactorSlice',
  p: Parameters,
  { series, scanner }: StepCircumstances,
): number[] {
  const own = p[key];
  const volume = series.acquisition === '3D';
  if (key === 'parallelFactorSlice' && !volume) return [];
  const along = key === 'parallelFactorPhase' ? p.phaseDirection : null;
  return [guardedCeil(own - 1), guardedFloor(own + 1)].filter((factor) => {
    if (factor < 1) return false;
    if (along !== null && factor > own && scanner.coil !== null && scanner.coil.elements[along] < factor) return false;
    const other = key === 'parallelFactorPhase' ? (volume ? p.parallelFactorSlice : 1) : p.parallelFactorPhase;
    const g =
      key === 'parallelFactorPhase' ? parallelNoiseFactor(scanner.coil, factor, other) : parallelNoiseFactor(scanner.coil, other, factor);
    return g !== null;
  });
}

/** Phase extents by 10 mm as percent of the readout extent: smaller only where the body's own extent is known. */
function phaseExtents(p: Parameters, { series, body, opened }: StepCircumstances): number[] {
  const known = typedExtentMm(series, p.phaseDirection, body) !== null;
  if (!known && !opened) return [];
  const extentMm = (p.fieldOfViewMm * p.phaseFieldOfViewPercent) / 100;
  const widestMm = Math.max(extentMm, p.fieldOfViewMm);
  return multiples(extentMm * 0.7, Math.min(extentMm * 1.2, widestMm), 10).map((mm) => Math.round((mm / p.fieldOfViewMm) * 1e4) / 100);
}

/** Oversampling by 10 %: more always, less than the preset only where the body's own extent is known. */
function oversamplings(own: number, lessAllowed: boolean): number[] {
  return multiples(lessAllowed ? 0 : own, own < 50 ? own + 50 : own + 20, 10);
}

/** Thickness: by 0.5 mm, by 0.1 under 2 mm; a fifth thinner to seven tenths thicker. */
function thicknesses(own: number): number[] {
  return multiples(own * 0.8, own * 1.7, own < 2 ? 0.1 : 0.5);
}

const eighths = [0.625, 0.75, 0.875, 1];

/** Angles by 5 degrees from half of the own angle up to it (or beyond, where opened). */
function angles(own: number, high: number): number[] {
  return multiples(own * 0.5, Math.min(180, high), own < 30 ? 1 : 5);
}

/** Values of a parameter that only `opened` lets in. */
function openedValues(key: ParameterKey, p: Parameters, circumstances: StepCircumstances): readonly StepValue[] {
  const row = parameterRow(key);
  const own = p[key];
  if (row.kind === 'flag') return [false, true];
  if (row.kind === 'choice') return row.choices;
  if (row.kind === 'object' || typeof own !== 'number') return [];
  const volume = circumstances.series.acquisition === '3D';
  switch (key) {
    case 'fieldOfViewMm':
      return multiples(own * 0.9, own * 1.2, 10);
    case 'matrixRead':
      return multiples(own * 0.7, own * 1.1, 16);
    case 'sliceCount':
      return multiples(own * 0.7, own * 1.1, volume ? 2 : 1);
    case 'sliceGapMm':
      return multiples(0, Math.max(own * 2, 0.5), own < 2 ? 0.1 : 0.5);
    case 'pixelBandwidthHz':
      return multiples(own * 0.7, own * 1.5, Math.max(10, Math.round(own / 100) * 10));
    case 'flipAngleDeg':
      return angles(own, own * 1.5);
    case 'inversionTimeMs':
      return multiples(own * 0.9, own * 1.1, 10);
    case 'echoTimeMs':
    case 'secondEchoTimeMs':
      return classRow(classOf(circumstances.series)).train
        ? multiples(own * 0.75, own * 1.25, p.echoSpacingMs)
        : multiples(own * 0.8, own * 1.2, own < 10 ? 0.1 : 1);
    case 'echoSpacingMs':
      return multiples(own * 0.8, own * 1.2, own < 2 ? 0.05 : 0.1);
    case 'referenceLines':
      return multiples(0, Math.max(own, 24), 8);
    case 'dummyShots':
    case 'referenceScanS':
      return multiples(0, own, 1);
    case 'volumes':
    case 'slabs':
    case 'linesPerBeat':
    case 'roundsPerHold':
    case 'simultaneousSlices':
    case 'fatSuppressionEveryLines':
      return multiples(1, own + 2, 1);
    default:
      return multiples(own * 0.8, own * 1.2, row.step);
  }
}

/** Parameters that a search may change in any class that has them, and those that only an RF cap lets in. */
const usuallyOpen: readonly ParameterKey[] = [
  'phaseFieldOfViewPercent',
  'phaseOversamplingPercent',
  'matrixPhase',
  'sliceThicknessMm',
  'sliceOversamplingPercent',
  'rounds',
  'averages',
  'parallelFactorPhase',
  'parallelFactorSlice',
  'partialFourierPhase',
  'partialFourierSlice',
  'repetitionTimeMs',
  'echoTrainLength',
];
const openUnderRfCap: readonly ParameterKey[] = ['refocusingAngleDeg', 'saturationBands', 'rfPulseStretch'];

/** True when the class, the limits or an opening lets a search touch a parameter; locks of the preset come on top. */
export function isOpen(key: ParameterKey, circumstances: StepCircumstances): boolean {
  const { series, rfCap, opened } = circumstances;
  if (opened) return true;
  if (openUnderRfCap.includes(key)) return rfCap;
  if (!usuallyOpen.includes(key)) return false;
  const row = classRow(classOf(series));
  // These trains are as long as their lines; an inversion-prepared cycle and the averages of b-values are given.
  if (key === 'echoTrainLength') return row.train && row.otherwise.echoTrainLength !== 'lines';
  if (key === 'repetitionTimeMs') return series.family !== 'inversion-prepared-gradient-echo';
  if (key === 'averages') return series.parameters.diffusion === undefined;
  // Two holds instead of one: only what is interleaved, held and not timed.
  if (key === 'rounds')
    return row.interleaving === 'interleaved' && series.purpose !== 'dynamic' && series.parameters.pacing.kind === 'breath-hold';
  return true;
}

/**
 * Values that a search may give to a parameter: steps that a scanner accepts, around the preset's own. The own value need not be among them.
 * Common practice, no source, unless a comment names one.
 */
export function stepValues(key: ParameterKey, circumstances: StepCircumstances): readonly StepValue[] {
  const { series, body, opened } = circumstances;
  const p = series.parameters;
  const volume = series.acquisition === '3D';
  switch (key) {
    case 'repetitionTimeMs':
      return repetitionTimes(p, circumstances);
    case 'phaseFieldOfViewPercent':
      return phaseExtents(p, circumstances);
    case 'phaseOversamplingPercent':
      return oversamplings(p.phaseOversamplingPercent, opened || typedExtentMm(series, p.phaseDirection, body) !== null);
    case 'sliceOversamplingPercent':
      // Nothing says what a slab's edges fold: never less than the preset.
      return multiples(opened ? 0 : p.sliceOversamplingPercent, p.sliceOversamplingPercent + 20, 10);
    case 'matrixPhase':
      return multiples(p.matrixPhase * (volume && p.pacing.kind === 'breath-hold' ? 0.75 : 0.7), p.matrixPhase * 1.1, volume ? 8 : 16);
    case 'sliceThicknessMm':
      return thicknesses(p.sliceThicknessMm);
    case 'averages':
      return multiples(1, p.averages, 1);
    case 'parallelFactorPhase':
    case 'parallelFactorSlice':
      return accelerations(key, p, circumstances);
    case 'partialFourierPhase':
    case 'partialFourierSlice':
      return eighths;
    case 'rounds':
      return [p.rounds + 1, p.rounds + 2];
    case 'echoTrainLength':
      return multiples(p.echoTrainLength * 0.75, p.echoTrainLength * 1.25, p.echoTrainLength > 40 ? 4 : 1);
    case 'refocusingAngleDeg':
      return angles(p.refocusingAngleDeg, opened ? p.refocusingAngleDeg * 1.5 : p.refocusingAngleDeg);
    case 'saturationBands':
      return multiples(0, opened ? p.saturationBands + 1 : p.saturationBands, 1);
    case 'rfPulseStretch':
      return multiples(p.rfPulseStretch, p.rfPulseStretch * 2, 0.25);
    default:
      return openedValues(key, p, circumstances);
  }
}
