/** A direction or place in the patient, mm: towards left, back, head (DICOM PS3.3, C.7.6.2.1.1). */
export type Vector = readonly [number, number, number];

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/** Right-handed product: of row and column direction, the normal of the image. */
export function cross(a: Vector, b: Vector): Vector {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

/** The row and column direction of an image, or null where they are not two directions at right angles. */
export function directionsOf(orientation: readonly number[] | undefined): { readonly row: Vector; readonly column: Vector } | null {
  if (orientation?.length !== 6) return null;
  const row = orientation.slice(0, 3) as unknown as Vector;
  const column = orientation.slice(3) as unknown as Vector;
  const isUnit = (v: Vector) => Math.abs(dot(v, v) - 1) < 0.02;
  return isUnit(row) && isUnit(column) && Math.abs(dot(row, column)) < 0.02 ? { row, column } : null;
}

const axes = ['RL', 'AP', 'HF'] as const;

/**
 * The body axis that a direction lies nearest to, and how much of it lies along that axis (0.58 to 1).
 *
 * @example nearestAxis([0, 0.99, -0.1]) //=> { axis: 'AP', share: 0.99 }
 */
export function nearestAxis(v: Vector): { readonly axis: (typeof axes)[number]; readonly share: number } {
  const shares = v.map(Math.abs) as [number, number, number];
  const largest = shares.indexOf(Math.max(...shares)) as 0 | 1 | 2;
  return { axis: axes[largest], share: shares[largest] };
}
