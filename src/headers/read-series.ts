import { type ClassKey, classRow } from '../calc/classes.js';
import { gammaBarMhzPerT } from '../calc/constants.js';
import { parameterKeys } from '../calc/parameters.js';
import type { GivenParameters } from '../calc/series.js';
import { type ClassDecision, classOfHeaders } from './class-of-headers.js';
import type { CollectedSeries } from './collected-series.js';
import { derivedAs, type Found, missingFor, type ReadValue, readAs } from './found.js';
import { guessFromDuration } from './guess-from-duration.js';
import type { HeaderSource } from './header.js';
import { lackingForTime, timeOfValues } from './time-of-values.js';
import { valueRules } from './value-rules.js';
import { cross, directionsOf, nearestAxis } from './vector.js';
import { withinRange } from './within-range.js';

/** One series as its headers tell it, parameter by parameter. */
export interface ReadSeries {
  /** `s1`, `s2`... in the order of the series numbers. */
  readonly id: string;
  readonly seriesNumber: number | null;
  readonly source: HeaderSource;
  readonly images: number;
  /** Images made from others: projections, maps. */
  readonly isDerived: boolean;
  readonly decision: ClassDecision;
  readonly plane: Found;
  readonly fieldT: Found;
  readonly bodyPart: string | null;
  /** Slices cover so much, mm; null where thickness or places are not stated. */
  readonly coverageMm: number | null;
  /** Different echo times, ms, and b-values, s/mm2, among its images. */
  readonly echoTimesMs: readonly number[];
  readonly bValues: readonly number[];
  readonly durationS: number | null;
  /** What the values give by the model's rules, s; null where something that time hangs on is not known. */
  readonly computedS: number | null;
  /** Parameters of the class in the order of the table; all where the class is not decided. */
  readonly values: readonly ReadValue[];
}

const planes = { HF: 'axial', RL: 'sagittal', AP: 'coronal' } as const;
/** A picture tilted by more than 11 degrees against all planes is oblique (common practice). */
const straight = 0.98;

function planeOf({ attributes: a }: CollectedSeries): Found {
  const directions = directionsOf(a.ImageOrientationPatient);
  if (directions === null) return missingFor('ImageOrientationPatient is not stated');
  const { axis, share } = nearestAxis(cross(directions.row, directions.column));
  return derivedAs(`${planes[axis]}${share > straight ? '' : ' oblique'}`, 'ImageOrientationPatient');
}

/** Values over this are in gauss: a scanner of 100 T is not known. */
const largestFieldT = 100;

function fieldOf({ attributes: a }: CollectedSeries): Found {
  const stated = a.MagneticFieldStrength?.[0] ?? 0;
  if (stated > largestFieldT) return derivedAs(stated / 10_000, 'MagneticFieldStrength, in gauss');
  if (stated > 0) return readAs(stated, 'MagneticFieldStrength');
  const frequency = a.ImagingFrequency?.[0] ?? 0;
  if (frequency > 0) return derivedAs(Number((frequency / gammaBarMhzPerT).toFixed(2)), 'ImagingFrequency of hydrogen');
  return missingFor('MagneticFieldStrength is not stated');
}

/** What the headers say of each parameter of a class (of every parameter where there is none). */
export function valuesOfHeaders(series: CollectedSeries, key: ClassKey | null): readonly ReadValue[] {
  const names = key === null ? parameterKeys : parameterKeys.filter((name) => classRow(key).parameters.includes(name));
  const values = names.map((name) => ({ key: name, ...withinRange(name, valueRules[name].find(series, key)) }));
  return key === null ? values : guessFromDuration(key, values, series.attributes.AcquisitionDuration?.[0], fieldOf(series).value);
}

function computedTimeS(key: ClassKey, values: readonly ReadValue[], fieldT: unknown): number | null {
  if (values.some(({ some }) => some === true)) return null;
  const given = Object.fromEntries(values.flatMap((one) => (one.value === undefined ? [] : [[one.key, one.value]]))) as GivenParameters;
  return lackingForTime(key, given).length > 0 ? null : timeOfValues(key, given, fieldT);
}

function coverageOf({ places, attributes: a }: CollectedSeries): number | null {
  const thickness = a.SliceThickness?.[0];
  if (places.length === 0 || thickness === undefined) return null;
  return Number(((places.at(-1) as number) - (places[0] as number) + thickness).toFixed(2));
}

/**
 * Reads a series from what was collected of its headers: class, plane, field, and every parameter with where it comes from.
 *
 * @param id What the series is called here.
 * @param key The class a person typed; the headers' own where it is left out.
 */
export function readSeries(series: CollectedSeries, id: string, key?: ClassKey): ReadSeries {
  const { attributes: a, source, images } = series;
  const decision = key === undefined ? classOfHeaders(series) : { key, reason: 'typed' };
  const number = a.SeriesNumber?.[0];
  const duration = a.AcquisitionDuration?.[0];
  const values = valuesOfHeaders(series, decision.key);
  return {
    id,
    seriesNumber: number !== undefined && Number.isInteger(number) && number >= 0 && number < 1e9 ? number : null,
    source,
    images,
    isDerived: a.ImageType?.includes('DERIVED') === true,
    decision,
    plane: planeOf(series),
    fieldT: fieldOf(series),
    bodyPart: a.BodyPartExamined?.[0] ?? null,
    coverageMm: coverageOf(series),
    echoTimesMs: series.echoTimes,
    bValues: series.bValues.map(({ b }) => b),
    durationS: duration !== undefined && duration > 0 ? duration : null,
    computedS: decision.key === null ? null : computedTimeS(decision.key, values, fieldOf(series).value),
    values,
  };
}
