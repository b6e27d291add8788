import type { CollectedSeries } from './collected-series.js';
import { encodedMatrix, isTiled, phaseRunsAlong, pictureGrid } from './encoded-matrix.js';
import { derivedAs, type Found, missingFor, plainNumber, readAs, someOf } from './found.js';
import { squareLines } from './square-lines.js';
import { says, type ValueRule } from './value-rule.js';
import { directionsOf, nearestAxis } from './vector.js';

/** Extents that differ by less are the same: spacings are written with few digits. */
const sameExtent = 0.02;

function pictureReadMm({ attributes: a }: CollectedSeries): number | null {
  const grid = pictureGrid(a);
  if (grid?.readSpacingMm != null && grid.readSpacingMm > 0) return plainNumber(grid.readSpacingMm * grid.readPoints);
  // Slices side by side in one picture keep the spacing; each has the acquired points.
  const [spacing] = a.PixelSpacing ?? [];
  const matrix = encodedMatrix(a);
  return isTiled(a) && spacing !== undefined && matrix !== null ? plainNumber(spacing * matrix.read) : null;
}

function findFieldOfView(series: CollectedSeries): Found {
  const stated = series.attributes.ReconstructionDiameter?.[0];
  const picture = pictureReadMm(series);
  if (stated !== undefined && stated > 0) {
    const differs = picture !== null && Math.abs(picture - stated) > sameExtent * stated;
    return readAs(stated, differs ? `ReconstructionDiameter; PixelSpacing gives ${picture} mm along readout` : 'ReconstructionDiameter');
  }
  if (picture !== null) return derivedAs(picture, 'PixelSpacing times the points of the picture along readout');
  return missingFor('neither ReconstructionDiameter nor PixelSpacing with the phase direction is stated');
}

function findPhaseField({ attributes: a }: CollectedSeries): Found {
  const stated = a.PercentPhaseFieldOfView?.[0];
  if (stated !== undefined && stated > 0) return readAs(stated, 'PercentPhaseFieldOfView');
  const grid = pictureGrid(a);
  if (grid?.readSpacingMm != null && grid.phaseSpacingMm != null) {
    const share = (grid.phasePoints * grid.phaseSpacingMm) / (grid.readPoints * grid.readSpacingMm);
    // A square picture may be a filled-up rectangular one.
    if (share < 0.99) return derivedAs(plainNumber(100 * share), 'extent of the picture along phase over that along readout');
  }
  return missingFor('PercentPhaseFieldOfView is not stated; a square picture may be a filled-up rectangular one');
}

function findPhaseDirection({ attributes: a, source }: CollectedSeries): Found {
  const along = phaseRunsAlong(a);
  if (along === null) return missingFor('InPlanePhaseEncodingDirection is not stated');
  const directions = directionsOf(a.ImageOrientationPatient);
  if (directions === null) {
    const why = source === 'sidecar' ? 'a sidecar names axes of the picture, not of the body' : 'ImageOrientationPatient is not stated';
    return missingFor(why);
  }
  const { axis, share } = nearestAxis(along === 'rows' ? directions.row : directions.column);
  const tilt = share > 0.98 ? '' : `; ${Math.round((Math.acos(Math.min(1, share)) * 180) / Math.PI)} degrees off that axis`;
  return derivedAs(axis, `phase runs along the ${along} of the picture, and these along ${axis} by ImageOrientationPatient${tilt}`);
}

function findPhaseOversampling({ attributes: a }: CollectedSeries): Found {
  const stated = a.OversamplingPhase?.[0];
  if (stated === 'NONE' || stated === '3D') return derivedAs(0, `OversamplingPhase ${stated}`);
  if (stated !== undefined) return someOf(`OversamplingPhase ${stated}: there is some`);
  if (says(a.SequenceVariant, 'OSP')) return someOf('SequenceVariant OSP: there is some');
  return missingFor('OversamplingPhase is not stated');
}

function findMatrixRead({ attributes: a }: CollectedSeries): Found {
  const matrix = encodedMatrix(a);
  return matrix === null ? missingFor('AcquisitionMatrix is not stated') : readAs(matrix.read, matrix.by);
}

function findMatrixPhase({ attributes: a }: CollectedSeries): Found {
  const matrix = encodedMatrix(a);
  if (matrix === null) return missingFor('AcquisitionMatrix is not stated');
  return squareLines({ ...matrix, phaseFieldPercent: a.PercentPhaseFieldOfView?.[0], percentSampling: a.PercentSampling?.[0] });
}

function findDisplayMatrix({ attributes: a }: CollectedSeries): Found {
  if (isTiled(a)) return missingFor('several slices are tiled in one picture');
  const matrix = encodedMatrix(a);
  const points = pictureGrid(a)?.readPoints ?? Math.max(a.Rows?.[0] ?? 0, a.Columns?.[0] ?? 0);
  if (points < 1 || matrix === null) return missingFor('Rows and Columns, or the acquired matrix, are not stated');
  if (points === matrix.read) return derivedAs(undefined, 'the picture has as many points as were acquired: not interpolated');
  if (points < matrix.read) return missingFor(`the picture has ${points} points along readout, fewer than the ${matrix.read} acquired`);
  return readAs(points, 'Rows or Columns, along readout');
}

export const extentRules = {
  fieldOfViewMm: {
    from: ['ReconstructionDiameter', 'PixelSpacing', 'Rows', 'Columns'],
    fields: [],
    how: 'ReconstructionDiameter, else spacing times points along readout',
    find: findFieldOfView,
  },
  phaseFieldOfViewPercent: {
    from: ['PercentPhaseFieldOfView', 'Rows', 'Columns', 'PixelSpacing'],
    fields: [],
    how: 'as it stands, else from a picture that is not square',
    find: findPhaseField,
  },
  phaseDirection: {
    from: ['InPlanePhaseEncodingDirection', 'AcquisitionMatrix', 'ImageOrientationPatient'],
    fields: [],
    how: 'rows or columns of the picture, turned into the nearest body axis',
    find: findPhaseDirection,
  },
  phaseOversamplingPercent: {
    from: ['OversamplingPhase', 'SequenceVariant'],
    fields: [],
    how: 'NONE is 0; that there is some is coded, how much is not: asked for, or guessed from AcquisitionDuration',
    find: findPhaseOversampling,
  },
  matrixRead: {
    from: ['AcquisitionMatrix', 'MRAcquisitionFrequencyEncodingSteps'],
    fields: [],
    how: 'samples along readout',
    find: findMatrixRead,
  },
  matrixPhase: {
    from: ['AcquisitionMatrix', 'MRAcquisitionPhaseEncodingStepsInPlane', 'PercentPhaseFieldOfView', 'PercentSampling'],
    fields: [],
    how: 'lines of the rectangular field / PercentPhaseFieldOfView; over a square field where PercentSampling says so',
    find: findMatrixPhase,
  },
  displayMatrix: {
    from: ['Rows', 'Columns', 'AcquisitionMatrix'],
    fields: [],
    how: 'points along readout; absent when as many as acquired',
    find: findDisplayMatrix,
  },
} as const satisfies Readonly<Record<string, ValueRule>>;
