import type { ParameterKey } from '../calc/parameters.js';
import type { Pulse } from './control.js';
import type { Groups } from './groups.js';
import { LineBucket } from './line-buckets.js';
import { LinePairs } from './line-pairs.js';
import { type Part, partsOf } from './line-parts.js';
import { LineShape, pairSource } from './line-shapes.js';
import type { LineTable, LineVoxel } from './line-states.js';
import { walkPoints } from './point-walk.js';
import type { SearchSetting } from './setting.js';

/** Parameters along the phase direction: with those of the slices they make lines, and nothing else joins the two. */
const planeKeys: readonly ParameterKey[] = [
  'fieldOfViewMm',
  'matrixPhase',
  'phaseFieldOfViewPercent',
  'phaseOversamplingPercent',
  'partialFourierPhase',
  'parallelFactorPhase',
  'referenceLines',
  'phaseDirection',
  'displayMatrix',
];
/** Shared parameters that lines along phase do not follow. */
const apartFromPlane: readonly ParameterKey[] = [
  'sliceThicknessMm',
  'sliceCount',
  'rounds',
  'pixelBandwidthHz',
  'simultaneousSlices',
  'averages',
];

/** Which line variables lie along phase, and which do not. */
export function directionsOf(
  setting: SearchSetting,
  groups: Groups,
): { readonly plane: readonly number[]; readonly slice: readonly number[] } {
  const along = (at: number) => planeKeys.includes(setting.variables[at]?.key as ParameterKey);
  return { plane: groups.lines.filter(along), slice: groups.lines.filter((at) => !along(at)) };
}

/** Line states of whole lattices: phase and slice directions are gone through apart, and buckets share the shapes of their lines. */
export class WholeLines {
  readonly #setting: SearchSetting;
  readonly #groups: Groups;
  readonly #table: LineTable;
  readonly #pulse: Pulse;
  readonly #plane: readonly number[];
  readonly #slice: readonly number[];
  readonly #planeShared: readonly number[];
  readonly #planes = new Map<string, Part[][]>();
  readonly #words = new Map<string, number>();
  readonly #wordOf = new WeakMap<readonly Part[], number>();
  readonly #shapes = new Map<string, LineShape>();

  constructor(setting: SearchSetting, groups: Groups, table: LineTable, pulse: Pulse) {
    const { plane, slice } = directionsOf(setting, groups);
    this.#setting = setting;
    this.#groups = groups;
    this.#table = table;
    this.#pulse = pulse;
    this.#plane = plane;
    this.#slice = slice;
    this.#planeShared = groups.shared.filter((at) => !apartFromPlane.includes(setting.variables[at]?.key as ParameterKey));
  }

  /** The buckets of one choice of the shared variables, which `point` holds. */
  buckets(point: number[]): readonly LineBucket[] {
    if (!this.#table.factors) return this.#together(point);
    const planes = this.#planesAt(point);
    const slices = partsOf(this.#setting, this.#table, this.#slice, this.#slice.length, point, 'slice', true, this.#pulse);
    const buckets: LineBucket[] = [];
    for (const plane of planes) {
      for (const slice of slices) {
        const bucket = this.#join(plane, slice, point);
        if (bucket !== null) buckets.push(bucket);
      }
    }
    return buckets;
  }

  #planesAt(point: number[]): Part[][] {
    const key = this.#planeShared.map((at) => point[at]).join(',');
    const known = this.#planes.get(key);
    if (known !== undefined) return known;
    const parts = partsOf(this.#setting, this.#table, this.#plane, this.#plane.length, point, 'phase', true, this.#pulse);
    this.#planes.set(key, parts);
    return parts;
  }

  /** The bucket of one group of each direction, if voxel and averages keep within bands and must-keeps. */
  #join(planes: readonly Part[], slices: readonly Part[], shared: readonly number[]): LineBucket | null {
    const plane = planes[0] as Part;
    const slice = slices[0] as Part;
    const own = [...shared];
    const pointOf = (a: Part, b: Part) => {
      const point = [...own];
      for (const at of this.#plane) point[at] = a.point[at] as number;
      for (const at of this.#slice) point[at] = b.point[at] as number;
      return point;
    };
    const point = pointOf(plane, slice);
    const voxel = this.#table.voxelAt(point);
    if (voxel === null) return null;
    const parameters = { ...this.#table.parameters };
    const key = `${this.#word(planes)}|${this.#word(slices)}`;
    let shape = this.#shapes.get(key);
    if (shape === undefined) {
      const { baseline, problem } = this.#setting;
      shape = new LineShape(pairSource(planes, slices, new LinePairs(baseline.model.key, problem.scanner.coil, parameters)));
      this.#shapes.set(key, shape);
    }
    const pointAt = (at: number) => pointOf(planes[at % planes.length] as Part, slices[Math.floor(at / planes.length)] as Part);
    return new LineBucket(voxel, point, parameters, shape, this.#setting.problem.scanner, pointAt);
  }

  /** A number for what the lines of some parts follow: equal for parts of another voxel. */
  #word(parts: readonly Part[]): number {
    let number = this.#wordOf.get(parts);
    if (number === undefined) {
      const word = parts.map(({ key, multiplicity }) => `${key}x${multiplicity}`).join(' ');
      number = this.#words.get(word) ?? this.#words.size;
      this.#words.set(word, number);
      this.#wordOf.set(parts, number);
    }
    return number;
  }

  /** Where something ties both directions, their choices are gone through together. */
  #together(point: number[]): LineBucket[] {
    const { variables, problem } = this.#setting;
    const table = this.#table;
    const found = new Map<
      string,
      { voxel: LineVoxel; parameters: LineTable['parameters']; points: number[][]; lines: number[]; averaging: number[] }
    >();
    walkPoints(variables, this.#groups.lines, variables.length, point, () => {
      this.#pulse.beat();
      const voxel = table.voxelAt(point);
      if (voxel === null) return;
      const word = table.bucketWord();
      let one = found.get(word);
      if (one === undefined) {
        one = { voxel, parameters: { ...table.parameters }, points: [], lines: [], averaging: [] };
        found.set(word, one);
      }
      const { lineCount, averagingLines } = table.noise();
      one.points.push([...point]);
      one.lines.push(lineCount);
      one.averaging.push(averagingLines ?? -1);
    });
    return [...found.values()].map(({ voxel, parameters, points, lines, averaging }) => {
      const shape = new LineShape({
        size: points.length,
        reach: (into) => {
          lines.forEach((lineCount, at) => {
            into.offer(lineCount, averaging[at] as number, at);
          });
        },
        averagingAt: (at) => averaging[at] as number,
        lineCountAt: (at) => lines[at] as number,
        multiplicityAt: () => 1,
      });
      return new LineBucket(voxel, points[0] as number[], parameters, shape, problem.scanner, (at) => points[at] as number[]);
    });
  }
}
