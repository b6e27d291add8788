import { classRow } from '../calc/classes.js';
import type { CollectedSeries } from './collected-series.js';
import { isTiled } from './encoded-matrix.js';
import { derivedAs, type Found, missingFor, plainNumber, readAs, someOf } from './found.js';
import { gatedWords } from './gated-words.js';
import { firstNumber, heldNowhere, numberIn, type ValueRule } from './value-rule.js';

/** Distance of neighbouring slices by their places, mm; null where there is none, or it is not even. */
function placeSpacingMm(places: readonly number[]): number | null {
  if (places.length < 2) return null;
  const mean = ((places.at(-1) as number) - (places[0] as number)) / (places.length - 1);
  const isEven = places.every((place, i) => Math.abs(place - (places[0] as number) - i * mean) < Math.max(0.05, 0.05 * mean));
  return isEven && mean > 0 ? Math.round(mean * 100) / 100 : null;
}

function findSliceCount(series: CollectedSeries): Found {
  const { attributes: a } = series;
  if (series.source === 'sidecar') {
    const count = a.SliceTimingCount?.[0];
    return count === undefined ? missingFor('no times of slices are stated') : derivedAs(count, 'SliceTiming has one time a slice');
  }
  if (isTiled(a)) return missingFor('several slices are tiled in one picture; standard attributes do not say how many');
  const count = series.places.length;
  if (count > 0)
    return derivedAs(
      count,
      `${count === 1 ? 'one place' : `${count} different places`} of ${series.images === 1 ? 'one image' : `${series.images} images`}`,
    );
  return missingFor('neither ImagePositionPatient nor SliceLocation is stated');
}

function findSliceGap(series: CollectedSeries): Found {
  const { attributes: a } = series;
  const thickness = a.SliceThickness?.[0];
  const stated = a.SpacingBetweenSlices?.[0];
  const places = placeSpacingMm(series.places);
  const spacing = stated ?? places;
  if (thickness === undefined || spacing == null) return missingFor('SpacingBetweenSlices or SliceThickness is not stated');
  const by = stated === undefined ? 'places of the slices' : 'SpacingBetweenSlices';
  const gap = plainNumber(spacing - thickness);
  const differs = stated !== undefined && places !== null && Math.abs(places - stated) > 0.05 * stated;
  const words = `${by} ${plainNumber(spacing)} - SliceThickness ${thickness}${differs ? `; the places are ${places} mm apart` : ''}`;
  if (gap < -0.005 * thickness - 0.0005) return missingFor(`${words}: the slices overlap, which a series here cannot say`);
  return derivedAs(Math.max(0, gap), words);
}

function findSliceOversampling({ attributes: a }: CollectedSeries): Found {
  const stated = a.OversamplingPhase?.[0];
  if (stated === 'NONE' || stated === '2D') return derivedAs(0, `OversamplingPhase ${stated}`);
  if (stated !== undefined) return someOf(`OversamplingPhase ${stated}: there is some`);
  return missingFor('OversamplingPhase is not stated');
}

function findAverages(series: CollectedSeries): Found {
  if (series.bValues.some(({ b }) => b > 0)) return derivedAs(1, 'each b-value has averages of its own');
  return firstNumber(series, 'NumberOfAverages');
}

function findVolumes(series: CollectedSeries): Found {
  const { attributes: a } = series;
  if (series.bValues.some(({ b }) => b > 0)) return derivedAs(1, 'images of one place differ in b-value');
  const stated = a.NumberOfTemporalPositions?.[0];
  if (stated !== undefined && stated >= 1) return readAs(stated, 'NumberOfTemporalPositions');
  if (series.source === 'sidecar' || isTiled(a)) return missingFor('NumberOfTemporalPositions is not stated');
  if (series.temporalPositions > 1) return derivedAs(series.temporalPositions, 'different TemporalPositionIdentifier');
  if (series.places.length === 0) return missingFor('neither positions in time nor places of slices are stated');
  const perPlace = Math.max(1, series.repeats);
  // Images of one place at as many times after the trigger are phases of a beat, not volumes.
  if (perPlace > 1 && series.triggerTimes >= perPlace && gatedWords(a) !== null)
    return derivedAs(1, 'images of one place are phases of a beat');
  return derivedAs(perPlace, perPlace === 1 ? 'each place was imaged once' : `each place was imaged ${perPlace} times`);
}

function findDiffusion(series: CollectedSeries): Found {
  const seen = series.bValues;
  if (seen.length === 0) return missingFor('DiffusionBValue is not stated');
  if (seen.every(({ b }) => b === 0)) return derivedAs(undefined, 'DiffusionBValue 0 alone');
  const values = `DiffusionBValue ${seen.map(({ b }) => b).join(', ')}`;
  const directions = Math.max(...seen.map((one) => one.directions));
  if (directions === 0) {
    const mean = seen.some(({ isMean }) => isMean) ? 'the images are means over directions' : 'no direction is stated';
    return missingFor(`${values}; ${mean}: type directions and averages`);
  }
  const averages = seen.map((one) => (one.averages === null ? null : one.averages * one.repeats));
  if (averages.includes(null)) return missingFor(`${values}, ${directions} directions; NumberOfAverages is not stated: type averages`);
  return derivedAs(
    { bValuesSPerMm2: seen.map(({ b }) => b), directions, averages },
    `${values}; ${directions} different DiffusionGradientOrientation; NumberOfAverages of each b-value`,
  );
}

function findDummies(series: CollectedSeries, key: Parameters<ValueRule['find']>[1]): Found {
  const stated = series.attributes.NumberOfVolumesDiscardedByScanner?.[0];
  if (stated === undefined || key === null || !classRow(key).echoPlanar) return missingFor('no standard attribute holds it');
  return readAs(stated, 'NumberOfVolumesDiscardedByScanner');
}

export const sliceRules = {
  sliceCount: {
    from: ['ImagePositionPatient', 'ImageOrientationPatient', 'SliceLocation'],
    fields: ['SliceTiming'],
    how: 'different places along the normal of the picture',
    find: findSliceCount,
  },
  sliceThicknessMm: numberIn('SliceThickness', ['SliceThickness']),
  sliceGapMm: {
    from: ['SpacingBetweenSlices', 'SliceThickness', 'ImagePositionPatient'],
    fields: ['SpacingBetweenSlices'],
    how: 'spacing of centres less thickness',
    find: findSliceGap,
  },
  sliceOversamplingPercent: {
    from: ['OversamplingPhase'],
    fields: [],
    how: 'NONE is 0; that there is some is coded, how much is not: asked for, or guessed from AcquisitionDuration',
    find: findSliceOversampling,
  },
  slabs: heldNowhere(),
  rounds: heldNowhere(),
  averages: { ...numberIn('NumberOfAverages', ['NumberOfAverages']), how: 'as it stands; 1 beside b-values', find: findAverages },
  volumes: {
    from: ['NumberOfTemporalPositions', 'TemporalPositionIdentifier', 'ImagePositionPatient'],
    fields: ['NumberOfTemporalPositions'],
    how: 'as it stands, else how often one place was imaged',
    find: findVolumes,
  },
  dummyShots: { ...heldNowhere(['NumberOfVolumesDiscardedByScanner']), find: findDummies },
  diffusion: {
    from: ['DiffusionBValue', 'DiffusionGradientOrientation', 'DiffusionDirectionality', 'NumberOfAverages'],
    fields: [],
    how: 'different b-values and directions; averages of each b-value',
    find: findDiffusion,
  },
} as const satisfies Readonly<Record<string, ValueRule>>;
