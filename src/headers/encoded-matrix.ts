import type { Attributes } from './attribute-table.js';

/** Samples and lines as a header counts them. */
export interface EncodedMatrix {
  readonly read: number;
  readonly phase: number;
  readonly by: string;
}

/**
 * The acquired matrix: AcquisitionMatrix (frequency rows, frequency columns, phase rows, phase columns; two of them 0), or the steps
 * that enhanced objects count. Null where neither is whole.
 *
 * @example encodedMatrix({ AcquisitionMatrix: [256, 0, 0, 192] }) //=> { read: 256, phase: 192, by: 'AcquisitionMatrix' }
 */
export function encodedMatrix(a: Attributes): EncodedMatrix | null {
  const matrix = a.AcquisitionMatrix;
  if (matrix?.length === 4) {
    const read = Math.max(matrix[0]!, matrix[1]!);
    const phase = Math.max(matrix[2]!, matrix[3]!);
    if (read > 0 && phase > 0) return { read, phase, by: 'AcquisitionMatrix' };
  }
  const [read, phase] = [a.MRAcquisitionFrequencyEncodingSteps?.[0] ?? 0, a.MRAcquisitionPhaseEncodingStepsInPlane?.[0] ?? 0];
  return read > 0 && phase > 0 ? { read, phase, by: 'the steps of frequency and phase encoding' } : null;
}

/**
 * Which way phase encoding runs in the picture: along its rows or along its columns; null where that is not said.
 * InPlanePhaseEncodingDirection says it, else the place of the zeros in AcquisitionMatrix.
 */
export function phaseRunsAlong(a: Attributes): 'rows' | 'columns' | null {
  const stated = a.InPlanePhaseEncodingDirection?.[0];
  if (stated === 'ROW') return 'rows';
  if (stated === 'COL' || stated === 'COLUMN') return 'columns';
  if (stated === 'OTHER') return null;
  const matrix = a.AcquisitionMatrix;
  if (matrix?.length !== 4) return null;
  const [phaseRows, phaseColumns] = [matrix[2]!, matrix[3]!];
  if (phaseRows > 0 === phaseColumns > 0) return null;
  return phaseRows > 0 ? 'rows' : 'columns';
}

/** The picture along readout and along phase: points and mm a point. */
export interface PictureGrid {
  readonly readPoints: number;
  readonly phasePoints: number;
  readonly readSpacingMm: number | null;
  readonly phaseSpacingMm: number | null;
}

/** True for one picture that holds several slices side by side: its size is that of no slice. */
export function isTiled(a: Attributes): boolean {
  return a.ImageType?.includes('MOSAIC') === true;
}

/** Rows and columns by their role; null where they are not given, the roles are not said and differ, or slices are tiled. */
export function pictureGrid(a: Attributes): PictureGrid | null {
  const [rows, columns] = [a.Rows?.[0] ?? 0, a.Columns?.[0] ?? 0];
  if (rows < 1 || columns < 1 || isTiled(a)) return null;
  // PixelSpacing: between rows, then between columns.
  const [betweenRows = null, betweenColumns = null] = a.PixelSpacing?.length === 2 ? a.PixelSpacing : [];
  const along = phaseRunsAlong(a);
  if (along === null && (rows !== columns || betweenRows !== betweenColumns)) return null;
  return along === 'rows'
    ? { readPoints: rows, phasePoints: columns, readSpacingMm: betweenRows, phaseSpacingMm: betweenColumns }
    : { readPoints: columns, phasePoints: rows, readSpacingMm: betweenColumns, phaseSpacingMm: betweenRows };
}
