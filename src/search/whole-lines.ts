import { ellipticalShare } from '../calc/lines.js';
import { signalFreeSnr } from '../calc/noise.js';
import { parallelNoiseFactor } from '../calc/parallel-noise.js';
import type { ParameterKey } from '../calc/parameters.js';
import type { Pulse } from './control.js';
import type { Groups } from './groups.js';
import { type BucketBound, compareEntries, type LineBucket, type LineEntry, lineBuckets } from './line-buckets.js';
import type { LineTable } from './line-states.js';
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

/** Entries of a bucket that are formed without asking for bounds first. */
const fewEntries = 500;

/** Choices along one direction that time and noise cannot tell apart. */
interface Part {
  /** The first such choice, a whole point of which only this direction's variables count. */
  readonly point: readonly number[];
  multiplicity: number;
  /** What both voxel and train follow: parts of one group can share a bucket. */
  readonly group: string;
  /** Lines over acceleration: no fewer are acquired. */
  readonly least: number;
  readonly most: number;
  readonly factor: number;
  /** Some lines are fully sampled. */
  readonly referenced: boolean;
}

/** An entry whose point is put together when it is asked for: few ever are. */
class JoinedEntry implements LineEntry {
  readonly changes = 0;

  constructor(
    readonly lineCount: number,
    readonly signalFreeSnr: number | null,
    private readonly plane: Part,
    private readonly slice: Part,
    private readonly pointOf: (plane: Part, slice: Part) => readonly number[],
  ) {}

  get multiplicity(): number {
    return this.plane.multiplicity * this.slice.multiplicity;
  }

  get point(): readonly number[] {
    return this.pointOf(this.plane, this.slice);
  }
}

/** Line states of whole lattices: phase and slice directions are gone through apart, and buckets form their entries when asked. */
export class WholeLines {
  readonly #setting: SearchSetting;
  readonly #groups: Groups;
  readonly #table: LineTable;
  readonly #pulse: Pulse;
  readonly #plane: readonly number[];
  readonly #others: readonly number[];
  readonly #planeShared: readonly number[];
  readonly #boundedFrom: number;
  readonly #planes = new Map<string, Map<string, Part[]>>();

  constructor(setting: SearchSetting, groups: Groups, table: LineTable, pulse: Pulse, boundedFrom: number = fewEntries) {
    const keyOf = (at: number) => setting.variables[at]?.key as ParameterKey;
    this.#setting = setting;
    this.#groups = groups;
    this.#table = table;
    this.#pulse = pulse;
    this.#boundedFrom = boundedFrom;
    this.#plane = groups.lines.filter((at) => planeKeys.includes(keyOf(at)));
    this.#others = groups.lines.filter((at) => !planeKeys.includes(keyOf(at)));
    this.#planeShared = groups.shared.filter((at) => !apartFromPlane.includes(keyOf(at)));
  }

  /** The buckets of one choice of the shared variables, which `point` holds. */
  buckets(point: number[]): readonly LineBucket[] {
    const all = this.#setting.variables.length;
    if (!this.#table.factors) return lineBuckets(this.#setting, this.#groups, this.#table, point, all, this.#pulse);
    const planes = this.#planesAt(point);
    const slices = this.#partsOf(this.#others, point, 'slice');
    const buckets: LineBucket[] = [];
    for (const plane of planes.values()) for (const slice of slices.values()) this.#join(plane, slice, point, buckets);
    return buckets;
  }

  #planesAt(point: number[]): Map<string, Part[]> {
    const key = this.#planeShared.map((at) => point[at]).join(',');
    const known = this.#planes.get(key);
    if (known !== undefined) return known;
    const parts = this.#partsOf(this.#plane, point, 'phase');
    this.#planes.set(key, parts);
    return parts;
  }

  #partsOf(which: readonly number[], point: number[], direction: 'phase' | 'slice'): Map<string, Part[]> {
    const byKey = new Map<string, Part>();
    walkPoints(this.#setting.variables, which, which.length, point, () => {
      this.#pulse.beat();
      const part = this.#table.partAt(point, direction);
      if (part === null) return;
      const known = byKey.get(part.key);
      if (known !== undefined) known.multiplicity += 1;
      else {
        const { group, least, most, factor } = part;
        byKey.set(part.key, {
          point: [...point],
          multiplicity: 1,
          group,
          least,
          most,
          factor,
          referenced: this.#table.parameters.referenceLines > 0,
        });
      }
    });
    const groups = new Map<string, Part[]>();
    for (const part of byKey.values()) groups.set(part.group, [...(groups.get(part.group) ?? []), part]);
    return groups;
  }

  /** The bucket of one group of each direction, if voxel and averages keep within bands and must-keeps. */
  #join(plane: readonly Part[], slice: readonly Part[], shared: readonly number[], into: LineBucket[]): void {
    const point = this.#pointOf(plane[0] as Part, slice[0] as Part, shared);
    const table = this.#table;
    const state = table.stateAt(point);
    if (state === null) return;
    const { volumeMm3, geometryLoss } = state;
    const parameters = { ...table.parameters };
    const common = { train: state.train, point, parameters, volumeMm3, geometryLoss, entryCount: plane.length * slice.length };
    const sharedCopy = [...shared];
    let formed: LineEntry[] | null = null;
    const form = () => this.#entries(plane, slice, sharedCopy);
    into.push({
      ...common,
      bound: this.#boundOf(plane, slice, common),
      release: () => {
        formed = null;
      },
      get entries() {
        formed ??= form();
        return formed;
      },
    });
  }

  #pointOf(plane: Part, slice: Part, shared: readonly number[]): number[] {
    const point = [...shared];
    for (const at of this.#plane) point[at] = plane.point[at] as number;
    for (const at of this.#others) point[at] = slice.point[at] as number;
    return point;
  }

  #entries(plane: readonly Part[], slice: readonly Part[], shared: readonly number[]): LineEntry[] {
    const entries: LineEntry[] = [];
    const scratch = [...shared];
    const pointOf = (one: Part, other: Part) => this.#pointOf(one, other, shared);
    for (const b of slice) {
      for (const at of this.#others) scratch[at] = b.point[at] as number;
      for (const a of plane) {
        this.#pulse.beat();
        for (const at of this.#plane) scratch[at] = a.point[at] as number;
        const { lineCount, signalFreeSnr: snr } = this.#table.noiseAt(scratch);
        entries.push(new JoinedEntry(lineCount, snr, a, b, pointOf));
      }
    }
    return entries.sort(compareEntries);
  }

  /**
   * Bounds of a bucket: lines are never fewer than those encoded over acceleration, and lines that average noise never more than those acquired
   * over g^2 (with reference lines g acts on a part only: then g is taken as 1; Cauchy-Schwarz on `S^2 / (C + g^2 R (S - C))` and `C + (S - C) / R`).
   */
  #boundOf(
    plane: readonly Part[],
    slice: readonly Part[],
    { parameters, volumeMm3 }: Pick<LineBucket, 'parameters' | 'volumeMm3'>,
  ): BucketBound | null {
    const { series, scanner } = this.#setting.problem;
    // Readouts of a cycle take no time of their own, and few entries are formed as quickly as bounded.
    if (series.family === 'inversion-prepared-gradient-echo' || plane.length * slice.length < this.#boundedFrom) return null;
    const share = ellipticalShare(parameters);
    const referenced = plane.some(({ referenced: lines }) => lines);
    const stretches = byFactor(plane).flatMap((a) =>
      byFactor(slice).flatMap((b) => {
        const g = parallelNoiseFactor(scanner.coil, a.factor, series.acquisition === '3D' ? b.factor : 1);
        return g === null ? [] : [{ least: a.least * b.least - 1e-6, most: a.most * b.most + 1, g: referenced ? 1 : Math.max(1, g) }];
      }),
    );
    return {
      fewestLines: Math.max(1, Math.min(...stretches.map(({ least }) => least))),
      mostLines: Math.max(1, ...stretches.map(({ most }) => most)),
      noiseWithin: (from, to) => {
        let best = 0;
        for (const { least, most, g } of stretches) if (least <= to && most >= from) best = Math.max(best, Math.min(to, most) / (g * g));
        return signalFreeSnr(volumeMm3, best * share, parameters, scanner.fieldT, 1) * (1 + 1e-9);
      },
    };
  }
}

/** Parts by acceleration: the fewest and the most lines of each. */
function byFactor(parts: readonly Part[]): { factor: number; least: number; most: number }[] {
  const byFactors = new Map<number, { factor: number; least: number; most: number }>();
  for (const { factor, least, most } of parts) {
    const known = byFactors.get(factor);
    if (known === undefined) byFactors.set(factor, { factor, least, most });
    else {
      known.least = Math.min(known.least, least);
      known.most = Math.max(known.most, most);
    }
  }
  return [...byFactors.values()];
}
