import { wrapCautions } from '../calc/cautions/wrap-cautions.js';
import { type Figures, figureTable } from '../calc/figures.js';
import type { Geometry } from '../calc/geometry.js';
import { geometryOf } from '../calc/geometry.js';
import { acquiredLines, type Lines } from '../calc/lines.js';
import type { SeriesModel } from '../calc/model.js';
import { noiseAveragingLines } from '../calc/noise.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import type { Parameters } from '../calc/series.js';
import { namedValues } from '../formulas/formula-names.js';
import type { MustKeep } from '../study/study.js';
import { geometryLoss } from './balanced-loss.js';
import { type BandLimit, withinBand } from './bands.js';
import { type Groups, levelOf } from './groups.js';
import type { LatticeVariable } from './lattice.js';
import { isCrossed, isTimeCap, namesOfMustKeep } from './must-keep-test.js';
import { NumberIds } from './number-ids.js';
import type { SearchSetting } from './setting.js';

/** Voxel and averages of one choice of the line variables: what a bucket shares. */
export interface LineVoxel {
  /** States of one train share what the signal needs to know of the lines. */
  readonly train: string;
  /** Buckets with one of these have the same estimates of the shortest timing. */
  readonly voxelId: number;
  /** Buckets with one of these play a count of lines in the same time. */
  readonly timeId: number;
  readonly volumeMm3: number;
  readonly geometryLoss: number;
}

/** Lines and noise of one choice of the line variables. */
export interface LineNoise {
  /** The count of lines that time follows. */
  readonly lineCount: number;
  /** Lines that average noise; null where the noise of this acceleration is not known. */
  readonly averagingLines: number | null;
}

/** One direction of a choice of the line variables: what the lines of both follow. */
export interface LinePart {
  /** What tells it apart for time and noise. */
  readonly key: number;
  /** What voxel and train follow: parts of one group can share a bucket. */
  readonly group: number;
  readonly encoded: number;
  /** Acquired with no acceleration along the other direction. */
  readonly acquired: number;
  /** Acceleration along this direction. */
  readonly factor: number;
  /** Reference lines as set, and those of them that count along this direction. */
  readonly reference: number;
  readonly referenceKept: number;
}

/** Some of the bands and must-keeps. */
interface Keeping {
  readonly bands: readonly BandLimit[];
  readonly mustKeeps: readonly MustKeep[];
}

/** Names that follow the lines of one direction, and those that follow the voxel, which a bucket shares. */
const phaseNames: readonly string[] = [
  'linesPhase',
  'phaseFieldOfViewPercent',
  'phaseOversamplingPercent',
  'partialFourierPhase',
  'parallelFactorPhase',
  'referenceLines',
  'phaseDirection',
];
const phaseVoxelNames: readonly string[] = [
  'fieldOfViewMm',
  'matrixPhase',
  'displayMatrix',
  'voxelReadMm',
  'voxelPhaseMm',
  'displayedVoxelReadMm',
  'displayedVoxelPhaseMm',
];
const sliceNames: readonly string[] = ['linesSlice', 'sliceOversamplingPercent', 'partialFourierSlice', 'parallelFactorSlice'];
const sliceVoxelNames: readonly string[] = [
  'sliceThicknessMm',
  'sliceCount',
  'sliceGapMm',
  'averages',
  'ellipticalSampling',
  'voxelSliceMm',
  'coverageMm',
];
const bothVoxelNames: readonly string[] = ['voxelVolumeMm3'];

/** Working copy of parameters that variables are written into. */
type Scratch = { -readonly [K in keyof Parameters]: Parameters[K] };

/** Computes lines and voxels of a setting. The same numbers as `evaluate`, by the same functions. */
export class LineTable {
  readonly #setting: SearchSetting;
  readonly #start: Parameters;
  readonly #scratch: Scratch;
  readonly #bands: readonly BandLimit[];
  readonly #mustKeeps: readonly MustKeep[];
  readonly #series: { readonly plane: string; readonly parameters: Parameters };
  readonly #lineSets: readonly number[];
  /** Bands and must-keeps by what they look at: lines along phase, along slices, or the voxel and averages that a bucket shares. */
  readonly #apart: { readonly phase: Keeping; readonly slice: Keeping };
  /** False where a must-keep looks at lines of both directions together: then they are gone through together. */
  readonly factors: boolean;
  readonly #parameterNamed: (name: string) => number | boolean | null;
  #lines: Lines;
  #geometry: Geometry;
  #wraps = false;
  readonly #ids = new NumberIds();
  readonly #parts = new NumberIds();
  readonly #partGroups = new NumberIds();

  constructor(setting: SearchSetting, groups: Groups, start: Parameters) {
    const { problem, bands } = setting;
    const { series, rules } = problem;
    this.#setting = setting;
    this.#start = start;
    this.#scratch = { ...start };
    this.#parameterNamed = namedValues(this.#scratch, {} as Figures);
    this.#series = { plane: series.plane, parameters: this.#scratch };
    this.#lines = setting.baseline.model.lines;
    this.#geometry = setting.baseline.model.geometry;
    this.#bands = bands.filter(({ figure }) => levelOf([figure], groups, setting) === 'lines');
    this.#mustKeeps = series.mustKeep.filter((mustKeep) => {
      const level = levelOf(namesOfMustKeep(mustKeep, rules), groups, setting);
      return !isTimeCap(mustKeep, rules) && (level === 'lines' || level === 'either');
    });
    this.#lineSets = [...groups.shared, ...groups.lines];
    const only = (known: readonly string[]): Keeping => ({
      bands: this.#bands.filter(({ figure }) => known.includes(figure)),
      mustKeeps: this.#mustKeeps.filter((one) => this.#variableNames(one).every((name) => known.includes(name))),
    });
    this.#apart = { phase: only([...phaseNames, ...phaseVoxelNames]), slice: only([...sliceNames, ...sliceVoxelNames]) };
    const referenced = start.referenceLines > 0 || setting.variables.some(({ key }) => key === 'referenceLines');
    this.factors = this.#mustKeeps.every((one) => {
      const names = this.#variableNames(one);
      // Reference lines count along slices only where both directions are accelerated.
      if (referenced && names.includes('linesSlice')) return false;
      const alongPhase = names.some((name) => phaseNames.includes(name));
      const alongSlice = names.some((name) => sliceNames.includes(name));
      const voxel = (phase: boolean) =>
        names.some((name) => (phase ? phaseVoxelNames : sliceVoxelNames).includes(name) || bothVoxelNames.includes(name));
      return !(alongPhase && (alongSlice || voxel(false))) && !(alongSlice && voxel(true));
    });
  }

  /** Names of a must-keep that line variables move; values that stay are no tie. */
  #variableNames(mustKeep: MustKeep): string[] {
    const { variables, problem } = this.#setting;
    const moves = (name: string) =>
      Object.hasOwn(figureTable, name) ||
      variables.some(({ key, sliceCounts }) => key === name || (name === 'sliceCount' && sliceCounts !== null));
    return namesOfMustKeep(mustKeep, problem.rules).filter(moves);
  }

  /**
   * One direction of a point by itself, the other where `point` has it: what tells it apart for time and noise, and what its bucket follows.
   * Null where a band or a must-keep of this direction alone is broken, or the body wraps into the picture.
   */
  partAt(point: ArrayLike<number>, direction: 'phase' | 'slice'): LinePart | null {
    const { problem, baseline } = this.#setting;
    const { key } = baseline.model;
    this.#write(point);
    const p = this.#scratch;
    this.#geometry = geometryOf(problem.series.acquisition, p);
    const lines = acquiredLines(key, p);
    this.#lines = lines;
    if (!this.#keeps(this.#apart[direction], direction === 'phase')) return null;
    const train = this.#train(direction);
    const reference = p.referenceLines;
    const factorPhase = p.parallelFactorPhase;
    if (direction === 'phase') {
      return {
        key: this.#parts.of('phase', lines.encodedPhase, lines.phase, factorPhase, reference),
        group: this.#partGroups.of(train, p.fieldOfViewMm, p.matrixPhase, p.displayMatrix ?? 0, 0),
        encoded: lines.encodedPhase,
        acquired: lines.phase,
        factor: factorPhase,
        reference,
        referenceKept: factorPhase > 1 ? Math.min(reference, lines.encodedPhase) : 0,
      };
    }
    // Lines along slices follow the acceleration along phase only where both are accelerated.
    p.parallelFactorPhase = 1;
    const { slice, encodedSlice } = acquiredLines(key, p);
    p.parallelFactorPhase = factorPhase;
    const factor = p.parallelFactorSlice;
    const elliptical = Number(p.ellipticalSampling);
    return {
      key: this.#parts.of('slice', encodedSlice, slice, factor, elliptical),
      group: this.#partGroups.of(
        elliptical === 1 ? `${train} elliptical` : train,
        p.averages,
        p.sliceThicknessMm,
        p.sliceCount,
        p.sliceGapMm,
      ),
      encoded: encodedSlice,
      acquired: slice,
      factor,
      reference,
      referenceKept: 0,
    };
  }

  /** Lines and noise of the point asked for last. */
  noise(): LineNoise {
    const { problem, baseline } = this.#setting;
    const { key } = baseline.model;
    const p = this.#scratch;
    const volume = problem.series.acquisition === '3D';
    const lines = this.#lines;
    const g = parallelNoiseFactor(problem.scanner.coil, p.parallelFactorPhase, volume ? p.parallelFactorSlice : 1);
    return {
      lineCount: volume && key !== 'inversion-prepared-gradient-echo/3D' ? lines.total : lines.phase,
      averagingLines: g === null ? null : noiseAveragingLines(key, p, lines, g),
    };
  }

  /** The parameters of the point asked for last: lines and voxel are right, carried timing is not. */
  get parameters(): Parameters {
    return this.#scratch;
  }

  #write(point: ArrayLike<number>): void {
    const scratch = this.#scratch as unknown as Record<string, unknown>;
    const start = this.#start as unknown as Record<string, unknown>;
    for (const at of this.#lineSets) {
      const { key, values, sliceCounts } = this.#setting.variables[at] as LatticeVariable;
      const i = point[at] as number;
      scratch[key] = i === 0 ? start[key] : values[i];
      if (sliceCounts !== null) scratch['sliceCount'] = i === 0 ? start['sliceCount'] : sliceCounts[i];
    }
  }

  /** Voxel and averages of a point, or null where a band or a must-keep of voxel and lines is broken, or the body wraps into the picture. */
  voxelAt(point: ArrayLike<number>): LineVoxel | null {
    const { problem, baseline } = this.#setting;
    this.#write(point);
    const p = this.#scratch;
    this.#geometry = geometryOf(problem.series.acquisition, p);
    this.#lines = acquiredLines(baseline.model.key, p);
    if (!this.#keeps()) return null;
    const geometry = this.#geometry;
    const train = this.#train();
    const { voxelVolumeMm3 } = geometry;
    return {
      train,
      voxelId: this.#voxelId(train, p),
      timeId: this.#timeId(p),
      volumeMm3: voxelVolumeMm3,
      geometryLoss: geometryLoss(geometry, baseline.model.geometry),
    };
  }

  /** What tells buckets apart: voxel, averages, train; of the point asked for last. */
  bucketWord(): string {
    const p = this.#scratch;
    return `${this.#train()}|${p.averages}|${p.ellipticalSampling}|${p.fieldOfViewMm}|${p.matrixPhase}|${p.sliceThicknessMm}|${p.sliceCount}|${this.#geometry.coverageMm}`;
  }

  #timeId({ averages, ellipticalSampling, matrixPhase, parallelFactorPhase }: Parameters): number {
    // Blades follow matrix and acceleration besides their lines; elsewhere lines say all.
    const blades = this.#setting.problem.series.family === 'rotating-strip-fast-spin-echo';
    return this.#ids.of('time', averages, Number(ellipticalSampling), blades ? matrixPhase : 0, blades ? parallelFactorPhase : 0);
  }

  #voxelId(train: string, { fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount }: Parameters): number {
    return this.#ids.of(train, fieldOfViewMm, matrixPhase, sliceThicknessMm, sliceCount);
  }

  /** What trains that read all their lines in one go need to know of them. */
  #train(direction: 'phase' | 'slice' | 'both' = 'both'): string {
    const alongSlices = this.#setting.problem.series.family === 'inversion-prepared-gradient-echo';
    if (direction !== 'both' && alongSlices === (direction === 'phase')) return '';
    const p = this.#scratch;
    const lines = this.#lines;
    switch (this.#setting.problem.series.family) {
      case 'single-shot-fast-spin-echo':
        return `${lines.phase}`;
      case 'rotating-strip-fast-spin-echo':
        // Blades, and so time, follow acceleration by more than their lines.
        return `${p.parallelFactorPhase}`;
      case 'inversion-prepared-gradient-echo':
        return `${lines.slice}/${lines.fullSlice}/${p.parallelFactorSlice}/${p.partialFourierSlice}`;
      case 'echo-planar-gradient-echo':
      case 'echo-planar-spin-echo':
        return `${lines.fullPhase}/${lines.phase}/${p.matrixPhase}/${p.partialFourierPhase}/${p.parallelFactorPhase}`;
      default:
        return '';
    }
  }

  /** Value of a name that follows lines and voxel. */
  readonly #valueNamed = (name: string): number | boolean | null => {
    switch (name) {
      case 'linesPhase':
        return this.#lines.phase;
      case 'linesSlice':
        return this.#setting.problem.series.acquisition === '3D' ? this.#lines.slice : null;
      case 'voxelReadMm':
      case 'voxelPhaseMm':
      case 'voxelSliceMm':
      case 'voxelVolumeMm3':
      case 'displayedVoxelReadMm':
      case 'displayedVoxelPhaseMm':
      case 'coverageMm':
        return this.#geometry[name];
      default:
        return this.#parameterNamed(name);
    }
  };

  #keeps({ bands, mustKeeps }: Keeping = { bands: this.#bands, mustKeeps: this.#mustKeeps }, withWrap = true): boolean {
    for (const band of bands) if (!withinBand(band, this.#valueNamed(band.figure) as number | null)) return false;
    const { problem, baseline, startWraps } = this.#setting;
    for (const mustKeep of mustKeeps) if (isCrossed(mustKeep, this.#valueNamed, problem.rules)) return false;
    if (!withWrap) return true;
    this.#wraps = false;
    // Wrap needs geometry, phase direction, acceleration and bands only: the rest of a model is not formed for it.
    const model = {
      key: baseline.model.key,
      series: this.#series,
      scanner: problem.scanner,
      geometry: this.#geometry,
    } as unknown as SeriesModel;
    wrapCautions(model, problem.body, baseline, (code, level) => {
      if (level === 'error' || (code === 'wrap' && level === 'caution' && !startWraps)) this.#wraps = true;
    });
    return !this.#wraps;
  }
}
