import type { ObjectShape, PlanePoint } from './object-file.js';

/** An ellipse in the picture plane. */
export interface PlaneEllipse {
  readonly atMm: PlanePoint;
  readonly halfAxesMm: readonly [number, number];
  readonly turnDeg: number;
}

/** The ellipses of a shape, one for each repetition, at a height along the slice where it leans. */
export function ellipsesOf(shape: ObjectShape, alongSliceMm = 0): PlaneEllipse[] {
  const { atMm, halfAxesMm, turnDeg = 0, leanMmPerMm = [0, 0], repeat } = shape;
  const [stepX, stepY] = repeat?.stepMm ?? [0, 0];
  return Array.from({ length: repeat?.count ?? 1 }, (_, i) => ({
    atMm: [atMm[0] + leanMmPerMm[0] * alongSliceMm + i * stepX, atMm[1] + leanMmPerMm[1] * alongSliceMm + i * stepY],
    halfAxesMm: [halfAxesMm[0] as number, halfAxesMm[1] as number],
    turnDeg,
  }));
}

/** Points on the rim of an ellipse: enough to tell whether it leaves another one or runs into it. */
function rimOf({ atMm: [x, y], halfAxesMm: [a, b], turnDeg }: PlaneEllipse): PlanePoint[] {
  const turn = (turnDeg * Math.PI) / 180;
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  return Array.from({ length: 48 }, (_, i): PlanePoint => {
    const angle = (i * Math.PI) / 24;
    const [u, v] = [a * Math.cos(angle), b * Math.sin(angle)];
    return [x + u * c - v * s, y + u * s + v * c];
  });
}

/** Distance of a point from the middle of an ellipse in its half axes: 1 on the rim, less inside. */
function reach({ atMm, halfAxesMm: [a, b], turnDeg }: PlaneEllipse, [x, y]: PlanePoint): number {
  const turn = (turnDeg * Math.PI) / 180;
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  const [dx, dy] = [x - atMm[0], y - atMm[1]];
  return Math.hypot((dx * c + dy * s) / a, (dy * c - dx * s) / b);
}

/** True when one ellipse lies within another, touching allowed. */
export function liesWithin(inner: PlaneEllipse, outer: PlaneEllipse): boolean {
  return rimOf(inner).every((point) => reach(outer, point) <= 1 + 1e-6);
}

/** True when two ellipses share a part of the plane. */
export function overlap(a: PlaneEllipse, b: PlaneEllipse): boolean {
  const apart = Math.hypot(a.atMm[0] - b.atMm[0], a.atMm[1] - b.atMm[1]);
  if (apart >= Math.max(...a.halfAxesMm) + Math.max(...b.halfAxesMm)) return false;
  return (
    reach(a, b.atMm) < 1 ||
    reach(b, a.atMm) < 1 ||
    rimOf(a).some((p) => reach(b, p) < 1 - 1e-6) ||
    rimOf(b).some((p) => reach(a, p) < 1 - 1e-6)
  );
}
