import type { Body } from '../calc/body.js';
import type { Outcome } from '../calc/problem.js';
import type { PhaseDirection, Series } from '../calc/series.js';
import { fatTissue } from '../calc/tissues.js';
import type { ObjectFile, ObjectShape } from '../study/object-file.js';
import { ellipsesOf, liesWithin, type PlaneEllipse } from '../study/shape-geometry.js';
import type { PicturePlane } from './picture-plane.js';

/** A shape in its place: the tissue that it holds, and the one it takes the place of (null: nothing, outside the body). */
export interface PlacedShape {
  readonly tissue: string;
  readonly insteadOf: string | null;
  readonly shape: ObjectShape;
}

/** An object as one series sees it: body at its size, tissues by their names. */
export interface PlacedObject {
  readonly shapes: readonly PlacedShape[];
  /** Extents of the body in the picture: across, down, mm. */
  readonly bodyMm: readonly [number, number];
  /** True where the body is drawn larger than it was typed. */
  readonly enlarged: boolean;
  readonly tissues: readonly string[];
}

/** Extent of the body along an axis: as typed, else the object's own. Head to feet it reaches as far as the coil sees. */
function extentMm(object: ObjectFile, body: Body, axis: PhaseDirection): number {
  if (axis === 'AP') return body.frontBackMm ?? object.body.frontBackMm;
  return axis === 'RL' ? (body.leftRightMm ?? object.body.leftRightMm) : object.body.headFeetMm;
}

/** A tissue by its name, or the one of the series that a role stands for. */
function tissueNamed(word: string, series: Pick<Series, 'target' | 'comparison'>): string {
  return word === 'target' ? series.target : word === 'comparison' ? series.comparison : word;
}

/** A body that is a little too small for the shapes is drawn larger, by at most this; beyond, the picture would be of another body. */
const mostEnlarged = 1.6;

/**
 * Puts an object into the plane of a series, its body at the typed size, or larger where the shapes inside need it. A body far too small for them
 * is refused.
 */
export function placeObject(object: ObjectFile, series: Series, plane: PicturePlane, body: Body): Outcome<PlacedObject> {
  const typedMm = [extentMm(object, body, plane.across), extentMm(object, body, plane.down)] as const;
  const bodyMm = roomyBody(object, typedMm);
  const outline = ellipseOf(bodyMm, 0);
  const within = ellipseOf(bodyMm, object.body.fatRimMm);
  const lost = within === null ? undefined : lostShape(object, within);
  if (lost !== undefined || within === null || outline === null) {
    const message = `a body of ${bodyMm[0]} x ${bodyMm[1]} mm is too small for "${lost?.id ?? 'its fat rim'}" of the object ${object.id}.`;
    return {
      ok: false,
      problems: [
        {
          code: 'body-too-small',
          path: 'body',
          message: `${message.charAt(0).toUpperCase()}${message.slice(1)}`,
          hint: 'Type a larger body, or leave it away.',
        },
      ],
    };
  }
  const inner = tissueNamed(object.body.tissue, series);
  const tissueOfId = new Map<string, string>();
  const shapes: PlacedShape[] = [
    { tissue: fatTissue, insteadOf: null, shape: plainShape('outline', outline) },
    { tissue: inner, insteadOf: fatTissue, shape: plainShape('inner', within) },
  ];
  for (const shape of object.shapes) {
    const tissue = tissueNamed(shape.tissue, series);
    tissueOfId.set(shape.id, tissue);
    shapes.push({ tissue, insteadOf: shape.inside === undefined ? inner : (tissueOfId.get(shape.inside) ?? inner), shape });
  }
  const tissues = [...new Set(shapes.map(({ tissue }) => tissue))];
  return { ok: true, value: { shapes, bodyMm, enlarged: bodyMm !== typedMm, tissues } };
}

/** A shape that leaves the inside of the body. */
function lostShape(object: ObjectFile, within: PlaneEllipse): ObjectShape | undefined {
  return object.shapes.find(
    (shape) => shape.inside === undefined && [-4, 0, 4].some((mm) => ellipsesOf(shape, mm).some((one) => !liesWithin(one, within))),
  );
}

/** The typed extents, or in the same proportion the smallest ones in steps of 5 % that hold every shape; the typed ones where none do. */
function roomyBody(object: ObjectFile, typedMm: readonly [number, number]): readonly [number, number] {
  for (let factor = 1; factor <= mostEnlarged + 1e-9; factor += 0.05) {
    const bodyMm = factor === 1 ? typedMm : ([typedMm[0] * factor, typedMm[1] * factor] as const);
    const within = ellipseOf(bodyMm, object.body.fatRimMm);
    if (within !== null && lostShape(object, within) === undefined) return bodyMm;
  }
  return typedMm;
}

function ellipseOf([across, down]: readonly [number, number], rimMm: number): PlaneEllipse | null {
  const halfAxesMm = [across / 2 - rimMm, down / 2 - rimMm] as const;
  return Math.min(...halfAxesMm) <= 0 ? null : { atMm: [0, 0], halfAxesMm, turnDeg: 0 };
}

function plainShape(id: string, { atMm, halfAxesMm }: PlaneEllipse): ObjectShape {
  return { id, tissue: fatTissue, atMm, halfAxesMm };
}
