import type { Attributes, Keyword } from './attribute-table.js';
import type { Header, HeaderSource } from './header.js';
import { cross, directionsOf, dot, type Vector } from './vector.js';

/** Different places, echoes, b-values or directions of one series beyond these are no longer told apart. */
const mostPlaces = 8192;
const mostKinds = 512;

/** Attributes of which it matters whether all images of a series agree. */
const watched: readonly Keyword[] = [
  'RepetitionTime',
  'InversionTime',
  'FlipAngle',
  'NumberOfAverages',
  'SliceThickness',
  'SpacingBetweenSlices',
  'PixelBandwidth',
  'EchoTrainLength',
  'ScanningSequence',
];

/** One b-value as its images show it. */
export interface SeenBValue {
  readonly b: number;
  /** Different gradient directions; 0 where no image says one. */
  readonly directions: number;
  /** True where an image is a mean over directions. */
  readonly isMean: boolean;
  readonly averages: number | null;
  /** How often one place was imaged with one direction. */
  readonly repeats: number;
}

/** Sums over the images of one series; one image after the other, none is kept. */
export class CollectedSeries {
  readonly source: HeaderSource;
  /** The attributes of the first image. */
  readonly attributes: Attributes;
  images = 0;
  readonly #normal: Vector | null;
  readonly #places = new Set<number>();
  readonly #echoTimes = new Set<number>();
  readonly #bValues = new Map<number, { directions: Set<string>; isMean: boolean; averages: number | null; repeats: number }>();
  readonly #temporal = new Set<number>();
  readonly #triggers = new Set<number>();
  readonly #repeats = new Map<string, number>();
  readonly #varied = new Set<Keyword>();

  constructor({ source, attributes }: Header) {
    this.source = source;
    this.attributes = attributes;
    const directions = directionsOf(attributes.ImageOrientationPatient);
    this.#normal = directions === null ? null : cross(directions.row, directions.column);
  }

  add({ attributes: a }: Header): void {
    this.images += 1;
    const place = this.#placeOf(a);
    if (place !== null && this.#places.size < mostPlaces) this.#places.add(place);
    const echo = (a.EffectiveEchoTime ?? a.EchoTime)?.[0];
    for (const time of a.EffectiveEchoTime ?? a.EchoTime ?? []) if (this.#echoTimes.size < mostKinds) this.#echoTimes.add(time);
    const b = a.DiffusionBValue?.[0];
    addTo(this.#temporal, a.TemporalPositionIdentifier?.[0]);
    addTo(this.#triggers, (a.NominalCardiacTriggerDelayTime ?? a.TriggerTime)?.[0]);
    const component = a.ComplexImageComponent?.[0] ?? a.ImageType?.find((word) => 'MPRI'.includes(word)) ?? '';
    const key = `${place} ${echo} ${b} ${a.DiffusionGradientOrientation?.join(' ')} ${component}`;
    const repeat = (this.#repeats.get(key) ?? 0) + 1;
    if (this.#repeats.size < mostPlaces || repeat > 1) this.#repeats.set(key, repeat);
    if (b !== undefined && b >= 0) this.#addBValue(b, a, repeat);
    for (const keyword of watched) if (!sameValues(a[keyword], this.attributes[keyword])) this.#varied.add(keyword);
  }

  #addBValue(b: number, a: Attributes, repeat: number): void {
    let seen = this.#bValues.get(b);
    if (seen === undefined) {
      if (this.#bValues.size >= mostKinds) return;
      seen = { directions: new Set(), isMean: false, averages: a.NumberOfAverages?.[0] ?? null, repeats: 1 };
      this.#bValues.set(b, seen);
    }
    seen.repeats = Math.max(seen.repeats, repeat);
    if (a.DiffusionDirectionality?.[0] === 'ISOTROPIC') seen.isMean = true;
    const direction = a.DiffusionGradientOrientation;
    // A direction without length is none.
    if (b > 0 && direction?.length === 3 && direction.some((part) => part !== 0) && seen.directions.size < mostKinds) {
      seen.directions.add(direction.map((part) => part.toFixed(3)).join(' '));
    }
  }

  #placeOf(a: Attributes): number | null {
    const position = a.ImagePositionPatient;
    if (this.#normal !== null && position?.length === 3) return hundredths(dot(position as unknown as Vector, this.#normal));
    const location = a.SliceLocation?.[0];
    return location === undefined ? null : hundredths(location);
  }

  /** Places of slices along the normal, mm, ascending; empty where no image says one. */
  get places(): readonly number[] {
    return [...this.#places].sort((a, b) => a - b).map((place) => place / 100);
  }

  /** Different echo times, ms, ascending. */
  get echoTimes(): readonly number[] {
    return [...this.#echoTimes].sort((a, b) => a - b);
  }

  get bValues(): readonly SeenBValue[] {
    return [...this.#bValues]
      .sort(([a], [b]) => a - b)
      .map(([b, { directions, isMean, averages, repeats }]) => ({ b, directions: directions.size, isMean, averages, repeats }));
  }

  /** Different positions in time that images name. */
  get temporalPositions(): number {
    return this.#temporal.size;
  }

  /** Different times after the trigger: phases of a beat, or one a slice. */
  get triggerTimes(): number {
    return this.#triggers.size;
  }

  /** How often one place was imaged with one echo, b-value and direction. */
  get repeats(): number {
    return Math.max(0, ...this.#repeats.values());
  }

  /** True where not all images have the value of the first. */
  varies(keyword: Keyword): boolean {
    return this.#varied.has(keyword);
  }
}

function hundredths(mm: number): number {
  return Math.round(mm * 100);
}

function addTo(set: Set<number>, value: number | undefined): void {
  if (value !== undefined && set.size < mostPlaces) set.add(value);
}

function sameValues(a: readonly unknown[] | undefined, b: readonly unknown[] | undefined): boolean {
  return a === b || (a !== undefined && b !== undefined && a.length === b.length && a.every((value, i) => value === b[i]));
}
