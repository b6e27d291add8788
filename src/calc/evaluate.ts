import type { Baseline } from './baseline.js';
import { seriesNullMs } from './baseline.js';
import { blurFwhmPx } from './blur.js';
import type { Body } from './body.js';
import { type AddCaution, type Caution, SaidCaution, worstFirst } from './caution.js';
import { driftCautions } from './cautions/drift-cautions.js';
import { echoPairCautions } from './cautions/echo-pair-cautions.js';
import { pictureCautions } from './cautions/picture-cautions.js';
import { rfCautions } from './cautions/rf-cautions.js';
import { splitCautions, timingCautions, trainCautions } from './cautions/timing-cautions.js';
import { wrapCautions } from './cautions/wrap-cautions.js';
import { phaseTimesMs } from './chemical-shift.js';
import { classRow } from './classes.js';
import { type Comparison, compareWith } from './compare.js';
import type { FigureKey, Figures } from './figures.js';
import { modelOf, type SeriesModel, type TissueSignal, tissueSignal } from './model.js';
import { effectiveRepetitionTimeMs, isBreathHeld, isCine, pacingPeriodMs } from './pacing.js';
import type { Readings } from './reading.js';
import { guardedFloor } from './rounding.js';
import type { Scanner } from './scanner.js';
import type { Series } from './series.js';
import { contrastEcho } from './signal/echo-train-signal.js';
import { ernstAngleDeg } from './signal/spoiled-gradient-echo.js';
import { tissuesWithValueAt } from './tissues.js';

export type { TissueSignal } from './model.js';

/** Everything the tool says about one series: figures (numbers or null), tissue signals, cautions worst first. */
export interface Evaluation {
  readonly figures: Figures;
  readonly signals: readonly TissueSignal[];
  readonly cautions: readonly Caution[];
  /** Figures scaled from a scanner reading instead of computed. */
  readonly fromReading: readonly FigureKey[];
}

export interface EvaluateOptions {
  /** `pair`: target and comparison only; `all`: then every tissue with a value at this field. */
  readonly tissues?: 'pair' | 'all';
  readonly readings?: Readings;
}

const noReadings: Readings = {};

/**
 * Evaluates a series on a scanner for a body, against a baseline. Total over every series the schema allows:
 * what cannot be computed is null, never NaN, and it never throws.
 */
export function evaluate(series: Series, scanner: Scanner, body: Body, baseline: Baseline, options: EvaluateOptions = {}): Evaluation {
  const readings = options.readings ?? noReadings;
  const model = modelOf(series, scanner, baseline.model.slotFactor);
  const comparison = compareWith(model, baseline);
  const nullMs = seriesNullMs(model);
  const figures = figuresOf(model, comparison, nullMs, baseline, readings);
  return {
    figures,
    signals: signalsOf(model, options.tissues ?? 'pair'),
    cautions: cautionsOf(model, body, baseline, comparison, nullMs, readings),
    fromReading: fromReading(figures, readings),
  };
}

/** A finite number, or null. */
function finite(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}

function figuresOf(model: SeriesModel, comparison: Comparison, nullMs: number | null, baseline: Baseline, readings: Readings): Figures {
  const p = model.series.parameters;
  const row = classRow(model.key);
  const { time, geometry, lines, shift } = model;
  const timeRatio = readings.timeS === undefined ? 1 : readings.timeS / baseline.model.time.scanTimeS;
  const b1Ratio = readings.b1rmsUt === undefined ? 1 : readings.b1rmsUt / baseline.model.b1PlusRmsUt;
  const volume = row.acquisition === '3D';
  const shared = row.interleaving === 'interleaved' && !isCine(p);
  const cine = isCine(p) && row.gradientEcho && !volume;
  const period = pacingPeriodMs(p) ?? 0;
  const phaseTimes = phaseTimesMs(model.scanner.fieldT);
  const beatMs = (p.linesPerBeat ?? 0) * p.repetitionTimeMs;
  const ernst = givesErnstAngle(model) && model.target !== null ? ernstAngleDeg(effectiveRepetitionTimeMs(p), model.target.t1Ms) : null;
  return {
    scanTimeS: finite(time.scanTimeS * timeRatio),
    holdTimeS: time.holdTimeS === null ? null : finite(time.holdTimeS * timeRatio),
    holds: time.holds,
    tableTimeS: finite(time.tableTimeS),
    linesPhase: lines.phase,
    linesSlice: volume ? lines.slice : null,
    shots: time.shots,
    slicesPerRepetition: shared ? model.capacity : null,
    roundsNeeded: shared ? model.roundsNeeded : null,
    voxelReadMm: geometry.voxelReadMm,
    voxelPhaseMm: geometry.voxelPhaseMm,
    voxelSliceMm: geometry.voxelSliceMm,
    voxelVolumeMm3: geometry.voxelVolumeMm3,
    displayedVoxelReadMm: geometry.displayedVoxelReadMm,
    displayedVoxelPhaseMm: geometry.displayedVoxelPhaseMm,
    coverageMm: geometry.coverageMm,
    relativeSnr: finite(comparison.relativeSnr),
    relativeContrast: finite(comparison.relativeContrast),
    contrastRatio: finite(comparison.contrastRatio),
    contrastRatioChange: finite(comparison.contrastRatioChange),
    b1PlusRmsUt: finite(model.b1PlusRmsUt * b1Ratio),
    rfPowerTrend: finite(comparison.rfPowerTrend),
    sarTrendLow: finite(comparison.sarTrendLow),
    sarTrendHigh: finite(comparison.sarTrendHigh),
    chemicalShiftPx: finite(shift.chemicalShiftPx),
    chemicalShiftMm: finite(shift.chemicalShiftMm),
    distortionPxPer100Hz: finite(shift.distortionPxPer100Hz),
    minimumEchoTimeMs: finite(model.minimum.echoTimeMs),
    minimumRepetitionTimeMs: finite(model.minimum.repetitionTimeMs),
    blurFwhmPx: row.train && model.target !== null ? blurOf(model, model.target.t2Ms) : null,
    nullTimeMs: nullMs === null ? null : finite(nullMs),
    ernstAngleDeg: ernst === null ? null : finite(ernst),
    inPhaseMs: phaseTimes.inPhaseMs,
    opposedPhaseMs: phaseTimes.opposedPhaseMs,
    temporalResolutionMs: cine ? beatMs : null,
    cardiacPhases: cine ? guardedFloor((0.9 * period) / beatMs) : null,
  };
}

/** True for the classes that a single angle drives to a spoiled steady state. */
function givesErnstAngle(model: SeriesModel): boolean {
  return model.series.family === 'spoiled-gradient-echo' || model.series.family === 'echo-planar-gradient-echo';
}

/** Blur of the target over the whole train; centric when the contrast echo is among the first two. */
function blurOf(model: SeriesModel, t2Ms: number): number | null {
  const p = model.series.parameters;
  const echo = contrastEcho(p.echoTimeMs, p.echoSpacingMs, p.echoTrainLength);
  return finite(blurFwhmPx((p.echoTrainLength * p.echoSpacingMs) / t2Ms, echo <= 2 ? 'centric' : 'linear'));
}

/** Figures that come from a reading: time and breath-hold, B1+rms. SAR has no figure of its own: it follows the trend. */
function fromReading(figures: Figures, readings: Readings): readonly FigureKey[] {
  const keys: FigureKey[] = [];
  if (readings.timeS !== undefined) keys.push('scanTimeS', ...(figures.holdTimeS === null ? [] : (['holdTimeS'] as const)));
  if (readings.b1rmsUt !== undefined) keys.push('b1PlusRmsUt');
  return keys;
}

function signalsOf(model: SeriesModel, which: 'pair' | 'all'): TissueSignal[] {
  const { target, comparison } = model;
  const signals: TissueSignal[] = [];
  if (target !== null) signals.push(target);
  if (comparison !== null) signals.push(comparison);
  if (which === 'pair') return signals;
  const listed = new Set([model.series.target, model.series.comparison]);
  for (const name of tissuesWithValueAt(model.scanner.fieldT)) {
    if (listed.has(name)) continue;
    const signal = tissueSignal(model.setting, model.series, model.scanner.fieldT, name, model.impossible !== null, model.timing);
    if (signal !== null) signals.push(signal);
  }
  return signals;
}

function cautionsOf(
  model: SeriesModel,
  body: Body,
  baseline: Baseline,
  comparison: Comparison,
  nullMs: number | null,
  readings: Readings,
): readonly Caution[] {
  const cautions: Caution[] = [];
  const add: AddCaution = (code, level, numbers, say) => {
    cautions.push(new SaidCaution(code, level, numbers, model, say));
  };
  timingCautions(model, baseline, add);
  splitCautions(model, baseline, isBreathHeld(model.series.parameters), add);
  trainCautions(model, add);
  echoPairCautions(model, add);
  wrapCautions(model, body, baseline, add);
  pictureCautions(model, add);
  driftCautions(model, nullMs, comparison, baseline, add);
  rfCautions(model, baseline, readings, add);
  return worstFirst(cautions);
}
