import { classRow } from '../calc/classes.js';
import { type SeriesModel, type TissueSignal, tissueSignal, weightedSignal } from '../calc/model.js';
import type { Outcome } from '../calc/problem.js';
import { isFat } from '../calc/tissues.js';
import { type LineWeights, objectSpectrum } from './object-spectrum.js';
import type { PicturePlane } from './picture-plane.js';
import type { PlacedObject } from './placed-object.js';
import { normalNumbers } from './random-numbers.js';
import { fatPhase, frequencyIndex, lineDelaysMs, type SamplingGrid, samplingGrid } from './sampling-grid.js';
import { type Stretch, toPicture, transformSize } from './transform.js';

/** A computed picture: magnitudes row after row, in the unit of the signal of a tissue. */
export interface Picture {
  readonly columns: number;
  readonly rows: number;
  readonly columnMm: number;
  readonly rowMm: number;
  /** Place of the middle of the first pixel, mm from the middle of the field. */
  readonly leftMm: number;
  readonly topMm: number;
  /** In single precision: seven digits, where noise leaves two. Each change of a series hands a picture from one thread to another. */
  readonly values: Float32Array;
}

export interface PictureOptions {
  /** Deviation of the noise in each of the two components, in the unit of the values; 0 draws none. */
  readonly noise: number;
  readonly seed: number;
  /** Pixels at least this many times finer than the display matrix: interpolation alone. */
  readonly fineness: number;
}

/** What a picture is computed of. */
export interface PictureSubject {
  readonly model: SeriesModel;
  readonly object: PlacedObject;
  readonly plane: PicturePlane;
}

/** Largest side of a computed picture, in pixels: beyond, nobody sees a difference. */
const mostPixels = 2048;

/**
 * The picture of an object that a series acquires: closed-form transform on the acquired grid (field, matrix, phase direction and
 * oversampling; wrap by the sampling itself), missing lines of partial Fourier left 0, decay along the train, fat displaced and turned in
 * phase, noise, then filled up with zeros to at least the display matrix, and magnitude.
 *
 * Refuses a timing that cannot be played and a grid that is too fine to compute.
 */
export function pictureOf({ model, object, plane }: PictureSubject, options: PictureOptions): Outcome<Picture> {
  if (model.impossible !== null) {
    const hint = 'Change the timing, then draw again.';
    return { ok: false, problems: [{ code: 'nothing-to-draw', path: '', message: `There is no picture: ${model.impossible}.`, hint }] };
  }
  const readExtentMm = object.bodyMm[plane.phaseIsDown ? 0 : 1];
  const made = samplingGrid(model, readExtentMm);
  if (!made.ok) return made;
  const grid = made.value;
  const signals = tissueWeights(model, object);
  const delays = lineDelaysMs(model);
  const none: LineWeights = { water: new Float64Array(grid.phaseLines), fat: new Float64Array(grid.phaseLines) };
  const weights = new Map(object.tissues.map((name) => [name, lineWeights(signals.get(name) ?? null, model, delays)]));
  const { water, fat } = objectSpectrum(
    object.shapes,
    model.geometry.voxelSliceMm,
    { ...grid, phaseIsDown: plane.phaseIsDown },
    grid.firstLine,
    (tissue) => (tissue === null ? none : (weights.get(tissue) ?? none)),
  );
  addFat(water, fat, grid, model);
  if (options.noise > 0) addNoise(water, grid, options.noise, options.seed);
  return { ok: true, value: magnitudes(water, grid, model, plane, options.fineness) };
}

/** Signals of every tissue of an object in a series. */
export function tissueWeights(
  { setting, series, scanner, impossible }: SeriesModel,
  object: PlacedObject,
): Map<string, TissueSignal | null> {
  return new Map(object.tissues.map((name) => [name, tissueSignal(setting, series, scanner.fieldT, name, impossible !== null)]));
}

/**
 * What a tissue gives in each line: its signal at the middle one, decayed along the train. Refocused echoes decay by T2; gradient echoes of an
 * echo-planar train by T2*, before a spin echo by T2 while what T2* adds is still being refocused. No echo gives more than all there is.
 */
function lineWeights(signal: TissueSignal | null, { key }: SeriesModel, delays: Float64Array): LineWeights {
  const empty = new Float64Array(delays.length);
  const amount = weightedSignal(signal) ?? 0;
  if (signal === null || amount === 0) return { water: empty, fat: empty };
  const { echoPlanar, gradientEcho } = classRow(key);
  const most = signal.protonDensity * signal.suppression * (signal.diffusionFactor ?? 1);
  const dephasing = echoPlanar ? Math.max(0, 1 / signal.t2StarMs - 1 / signal.t2Ms) : 0;
  const lines = delays.map((ms) => {
    const lost = ms / signal.t2Ms + (gradientEcho ? ms : Math.abs(ms)) * dephasing;
    return Math.min(Math.max(most, amount), amount * Math.exp(-lost));
  });
  return isFat(signal.tissue) ? { water: empty, fat: lines } : { water: lines, fat: empty };
}

/** Adds fat where its frequency puts it (along readout, in echo-planar series along phase), turned by its phase at the echo. */
function addFat(water: Float64Array, fat: Float64Array, grid: SamplingGrid, model: SeriesModel): void {
  const { readSamples, phaseLines, firstLine } = grid;
  const echoPlanar = classRow(model.key).echoPlanar;
  const shiftMm = model.shift.chemicalShiftMm;
  const perIndex = (-2 * Math.PI * shiftMm) / (echoPlanar ? grid.phaseExtentMm : grid.readExtentMm);
  const phase = fatPhase(model);
  const turned = Float64Array.from({ length: 2 * (echoPlanar ? phaseLines : readSamples) }, (_, i) => {
    const angle = phase + perIndex * frequencyIndex(i >> 1, echoPlanar ? phaseLines : readSamples);
    return i % 2 === 0 ? Math.cos(angle) : Math.sin(angle);
  });
  for (let line = firstLine; line < phaseLines; line += 1) {
    for (let i = 0; i < readSamples; i += 1) {
      const at = 2 * (line * readSamples + i);
      const by = 2 * (echoPlanar ? line : i);
      const [re, im] = [fat[at] as number, fat[at + 1] as number];
      const [c, s] = [turned[by] as number, turned[by + 1] as number];
      water[at] = (water[at] as number) + re * c - im * s;
      water[at + 1] = (water[at + 1] as number) + re * s + im * c;
    }
  }
}

/** White complex noise on every acquired sample, so that it has the asked-for deviation in the picture. */
function addNoise(
  samples: Float64Array,
  { readSamples, phaseLines, firstLine, readExtentMm, phaseExtentMm }: SamplingGrid,
  noise: number,
  seed: number,
) {
  const normal = normalNumbers(seed);
  const deviation = (noise * readExtentMm * phaseExtentMm) / Math.sqrt(readSamples * (phaseLines - firstLine));
  for (let i = 2 * firstLine * readSamples; i < samples.length; i += 1) samples[i] = (samples[i] as number) + deviation * normal();
}

/** Pixels of an extent that lie in its kept middle part. */
function keptStretch(size: number, extentMm: number, keptMm: number): Stretch {
  const count = Math.min(size, Math.max(1, Math.round((size * keptMm) / extentMm)));
  return { first: Math.max(0, Math.ceil((size - count) / 2)), count };
}

function magnitudes(samples: Float64Array, grid: SamplingGrid, { geometry }: SeriesModel, plane: PicturePlane, fineness: number): Picture {
  const { readExtentMm, phaseExtentMm, readSamples, phaseLines, firstLine } = grid;
  const sizeFor = (count: number, extentMm: number, pixelMm: number) =>
    transformSize(Math.max(count, Math.min(fineness * Math.max(count, Math.round(extentMm / pixelMm)), mostPixels)));
  const sizes = {
    read: sizeFor(readSamples, readExtentMm, geometry.displayedVoxelReadMm),
    phase: sizeFor(phaseLines, phaseExtentMm, geometry.displayedVoxelPhaseMm),
  };
  const alongRead = keptStretch(sizes.read, readExtentMm, grid.keptReadMm);
  const alongPhase = keptStretch(sizes.phase, phaseExtentMm, grid.keptPhaseMm);
  const complex = toPicture(samples, { readSamples, phaseLines, firstLine }, sizes, alongRead, alongPhase);
  const area = readExtentMm * phaseExtentMm;
  const readMm = readExtentMm / sizes.read;
  const phaseMm = phaseExtentMm / sizes.phase;
  const firstReadMm = (alongRead.first - sizes.read / 2) * readMm;
  const firstPhaseMm = (alongPhase.first - sizes.phase / 2) * phaseMm;
  const values = new Float32Array(alongRead.count * alongPhase.count);
  const { phaseIsDown } = plane;
  for (let j = 0; j < alongPhase.count; j += 1) {
    for (let i = 0; i < alongRead.count; i += 1) {
      const at = 2 * (j * alongRead.count + i);
      const [re, im] = [complex[at] as number, complex[at + 1] as number];
      values[phaseIsDown ? j * alongRead.count + i : i * alongPhase.count + j] = Math.sqrt(re * re + im * im) / area;
    }
  }
  return phaseIsDown
    ? {
        columns: alongRead.count,
        rows: alongPhase.count,
        columnMm: readMm,
        rowMm: phaseMm,
        leftMm: firstReadMm,
        topMm: firstPhaseMm,
        values,
      }
    : {
        columns: alongPhase.count,
        rows: alongRead.count,
        columnMm: phaseMm,
        rowMm: readMm,
        leftMm: firstPhaseMm,
        topMm: firstReadMm,
        values,
      };
}
