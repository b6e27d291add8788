import type { ClassKey } from '../calc/classes.js';
import type { Attributes } from './attribute-table.js';
import type { CollectedSeries } from './collected-series.js';
import { encodedMatrix } from './encoded-matrix.js';

/** The class of a series as its header tells it; null is *not decided*. The reason names the attributes. */
export interface ClassDecision {
  readonly key: ClassKey | null;
  readonly reason: string;
}

const decided = (key: ClassKey, reason: string): ClassDecision => ({ key, reason });
const undecided = (reason: string): ClassDecision => ({ key: null, reason });

type Dimension = '2D' | '3D';
/** How the echo is made, and by which attribute that is known. */
type Echo = { readonly kind: 'spin' | 'gradient' | 'both'; readonly by: string };

const has = (list: readonly string[] | undefined, word: string) => list?.includes(word) === true;

/**
 * Decides the class from the pulse sequence attributes (PS3.3, C.8.3.1 and C.8.13.4), with the reason; says *not decided* rather than
 * choose between two.
 */
export function classOfHeaders(series: CollectedSeries): ClassDecision {
  const a = series.attributes;
  const nucleus = (a.ResonantNucleus ?? a.ImagedNucleus)?.[0];
  if (nucleus !== undefined && nucleus !== '1H' && nucleus !== 'H') return undecided(`the nucleus is ${nucleus}, not hydrogen`);
  const dimension = a.MRAcquisitionType?.[0] as Dimension | undefined;
  if (dimension === undefined) return undecided('MRAcquisitionType does not say 2D or 3D');
  const echo = echoOf(series);
  if (echo === null) return undecided('neither EchoPulseSequence nor ScanningSequence tells a spin echo from a gradient echo');
  if (echo.kind === 'both') return undecided(`${echo.by}: spin and gradient echoes in one train, a class that is not modelled`);
  if (a.EchoPlanarPulseSequence?.[0] === 'YES' || has(a.ScanningSequence, 'EP')) return echoPlanarClass(echo, dimension);
  const geometry = a.GeometryOfKSpaceTraversal?.[0] ?? 'RECTILINEAR';
  if (geometry === 'SPIRAL') return undecided('GeometryOfKSpaceTraversal SPIRAL is not modelled');
  return echo.kind === 'spin' ? spinClass(series, echo, dimension, geometry) : gradientClass(a, echo, dimension, geometry);
}

function echoOf(series: CollectedSeries): Echo | null {
  const a = series.attributes;
  const stated = a.EchoPulseSequence?.[0];
  if (stated !== undefined) return { kind: stated.toLowerCase() as Echo['kind'], by: `EchoPulseSequence ${stated}` };
  const words = a.ScanningSequence;
  const by = `ScanningSequence ${words?.join('\\')}`;
  if (has(words, 'SE') && has(words, 'GR')) return { kind: 'both', by };
  if (has(words, 'SE')) return { kind: 'spin', by };
  if (has(words, 'GR')) return { kind: 'gradient', by };
  if (has(words, 'EP')) {
    if (series.bValues.length > 0 || has(a.ImageType, 'DIFFUSION')) return { kind: 'spin', by: `${by} with diffusion images` };
    const angle = a.FlipAngle?.[0];
    // A refocused echo follows an excitation of about 90 degrees (common practice).
    if (angle !== undefined && angle < 80) return { kind: 'gradient', by: `${by}, FlipAngle ${angle}: well under 90` };
    return null;
  }
  return has(words, 'IR') ? { kind: 'spin', by: `${by} without GR` } : null;
}

function echoPlanarClass({ kind, by }: Echo, dimension: Dimension): ClassDecision {
  if (dimension === '3D') return undecided(`${by}, 3D: echo-planar volumes are not modelled`);
  return decided(kind === 'spin' ? 'echo-planar-spin-echo/2D' : 'echo-planar-gradient-echo/2D', `${by}, echo-planar readout`);
}

function spinClass(series: CollectedSeries, { by }: Echo, dimension: Dimension, geometry: string): ClassDecision {
  const a = series.attributes;
  const train = a.RFEchoTrainLength?.[0] ?? a.EchoTrainLength?.[0];
  if ((a.GradientEchoTrainLength?.[0] ?? 0) > 1 && (train ?? 0) > 1) {
    return undecided(`${by}, GradientEchoTrainLength over 1: spin and gradient echoes in one train are not modelled`);
  }
  if (a.MultipleSpinEcho?.[0] === 'YES') return plainSpin(`${by}, MultipleSpinEcho YES: one image an echo`, dimension, geometry);
  if (series.echoTimes.length > 1 && series.echoTimes.length === train) {
    return plainSpin(`${by}, as many echo times as EchoTrainLength says: one image an echo`, dimension, geometry);
  }
  const full = a.SegmentedKSpaceTraversal?.[0] === 'FULL';
  if (train === undefined || train <= 1) {
    if (full && dimension === '2D') return singleShot(`${by}, SegmentedKSpaceTraversal FULL: all lines after one excitation`);
    const said = train === undefined ? 'no echo train is stated' : 'EchoTrainLength 1';
    return plainSpin(`${by}, ${said}`, dimension, geometry);
  }
  const trains = `${by}, echo train of ${train}`;
  if (geometry === 'RADIAL') {
    if (dimension === '3D') return undecided(`${trains}, GeometryOfKSpaceTraversal RADIAL in 3D is not modelled`);
    return decided('rotating-strip-fast-spin-echo/2D', `${trains}, GeometryOfKSpaceTraversal RADIAL`);
  }
  if (dimension === '3D') return decided('fast-spin-echo/3D', trains);
  if (full || a.NumberOfKSpaceTrajectories?.[0] === 1) return singleShot(`${trains}, all lines after one excitation`);
  const lines = encodedMatrix(a)?.phase;
  const factor = Math.max(1, a.ParallelReductionFactorInPlane?.[0] ?? 1);
  // Half the lines at least are needed, less with acceleration; an unstated acceleration leaves room for two trains.
  if (lines !== undefined && train >= (0.5 * lines) / factor)
    return singleShot(`${trains} for ${lines} lines: one train reads all it needs`);
  return decided('fast-spin-echo/2D', trains);
}

function singleShot(reason: string): ClassDecision {
  return decided('single-shot-fast-spin-echo/2D', reason);
}

function plainSpin(reason: string, dimension: Dimension, geometry: string): ClassDecision {
  if (geometry === 'RADIAL') return undecided(`${reason}, GeometryOfKSpaceTraversal RADIAL without a train is not modelled`);
  return decided(`spin-echo/${dimension}`, reason);
}

function gradientClass(a: Attributes, { by }: Echo, dimension: Dimension, geometry: string): ClassDecision {
  if (geometry === 'RADIAL') return undecided(`${by}, GeometryOfKSpaceTraversal RADIAL is not modelled`);
  const inversion = inversionWords(a);
  if (inversion !== null) {
    if (dimension === '3D') return decided('inversion-prepared-gradient-echo/3D', `${by}, 3D, ${inversion}`);
    return undecided(`${by}, 2D, ${inversion}: an inversion before a 2D gradient echo is not modelled`);
  }
  const readouts = a.GradientEchoTrainLength?.[0] ?? 0;
  if (dimension === '3D' && readouts > 1) {
    return undecided(`${by}, 3D, trains of ${readouts} readouts (GradientEchoTrainLength): what prepares them is not stated`);
  }
  const steady = a.SteadyStatePulseSequence?.[0];
  const spoiling = a.Spoiling?.[0];
  const variant = a.SequenceVariant;
  if (steady === 'TIME_REVERSED' || has(variant, 'TRSS')) return undecided(`${by}, time-reversed steady state is not modelled`);
  const spoiled =
    has(variant, 'SP') || steady === 'LONGITUDINAL' || (spoiling !== undefined && spoiling !== 'NONE') ? spoiledWords(a) : null;
  if (steady === 'FREE_PRECESSION') {
    if (has(variant, 'SP') || spoiling?.includes('RF') === true)
      return undecided(`${by}, free precession and spoiling contradict each other`);
    return decided(`balanced-steady-state/${dimension}`, `${by}, SteadyStatePulseSequence FREE_PRECESSION`);
  }
  if (spoiled !== null) return decided(`spoiled-gradient-echo/${dimension}`, `${by}, ${spoiled}`);
  if (steady === 'TRANSVERSE') return undecided(`${by}, SteadyStatePulseSequence TRANSVERSE: neither spoiled nor balanced`);
  if (has(variant, 'SS')) {
    const [tr, te] = [a.RepetitionTime?.[0] ?? 0, a.EchoTime?.[0] ?? 0];
    // Balanced gradients put the echo in the middle of a short TR (common practice).
    if (tr > 0 && tr < 12 && Math.abs(te / tr - 0.5) < 0.1) {
      return decided(`balanced-steady-state/${dimension}`, `${by}, SequenceVariant SS without SP, TE half of a short TR`);
    }
    return undecided(`${by}, SequenceVariant SS without SP: a steady state that may be balanced or not`);
  }
  return undecided(`${by}: nothing says spoiled or balanced`);
}

function inversionWords(a: Attributes): string | null {
  const time = a.InversionTime?.[0] ?? a.InversionTimes?.[0] ?? 0;
  if (a.InversionRecovery?.[0] === 'NO') return null;
  if (a.InversionRecovery?.[0] === 'YES') return 'InversionRecovery YES';
  if (has(a.ScanningSequence, 'IR')) return 'ScanningSequence IR';
  if (time > 0 && (has(a.SequenceVariant, 'MP') || (a.GradientEchoTrainLength?.[0] ?? 0) > 1))
    return `an inversion time and prepared magnetisation`;
  return time > 0 ? 'an inversion time' : null;
}

function spoiledWords(a: Attributes): string {
  if (has(a.SequenceVariant, 'SP')) return 'SequenceVariant SP';
  const spoiling = a.Spoiling?.[0];
  return spoiling !== undefined && spoiling !== 'NONE' ? `Spoiling ${spoiling}` : 'SteadyStatePulseSequence LONGITUDINAL';
}
