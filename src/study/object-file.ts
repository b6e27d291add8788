/** A point of the picture plane, mm from the middle of the field: to the right, downwards. */
export type PlanePoint = readonly [number, number];

/** Words that stand for the series' own pair, whatever it is. */
export const tissueRoles = ['target', 'comparison'] as const;

/**
 * One shape of an invented object: an ellipse that goes on along the slice, or with three half axes an ellipsoid. It takes the place of
 * what `inside` names; of the body where that is left out.
 */
export interface ObjectShape {
  readonly id: string;
  /** A name of the tissue table, or a role. */
  readonly tissue: string;
  readonly inside?: string;
  readonly atMm: PlanePoint;
  /** Half axes in the plane; a third one along the slice. */
  readonly halfAxesMm: readonly number[];
  /** Clockwise in the picture. */
  readonly turnDeg?: number;
  /** Length along the slice, centred in it; left out: through everything. */
  readonly lengthMm?: number;
  /** How far the shape moves in the plane with each mm along the slice: an edge that the slice cuts obliquely. */
  readonly leanMmPerMm?: PlanePoint;
  /** The same shape again and again. */
  readonly repeat?: { readonly count: number; readonly stepMm: PlanePoint };
}

/** A place in which the picture is measured. */
export interface ObjectCircle {
  readonly atMm: PlanePoint;
  readonly radiusMm: number;
}

/** An invented object of one body region: outline, fat rim, plain shapes, and where to look. */
export interface ObjectFile {
  readonly format: 'holdfast object';
  readonly version: 1;
  readonly id: string;
  readonly title: string;
  readonly notes: string;
  /** Body regions of the presets it is for; none: any region that has no object of its own. */
  readonly regions: readonly string[];
  /** Extents of the body where none are typed, the thickness of its fat rim, and the tissue inside. */
  readonly body: {
    readonly frontBackMm: number;
    readonly leftRightMm: number;
    readonly headFeetMm: number;
    readonly fatRimMm: number;
    readonly tissue: string;
  };
  readonly shapes: readonly ObjectShape[];
  readonly look: {
    /** Circles in plain target and plain comparison, for signal to noise and contrast. */
    readonly target: ObjectCircle;
    readonly comparison: ObjectCircle;
    /** Square that is shown larger. */
    readonly zoom: { readonly atMm: PlanePoint; readonly sideMm: number };
    /** Line of the profile. */
    readonly profile: { readonly fromMm: PlanePoint; readonly toMm: PlanePoint };
  };
}

/** Bounds on an object file. `shapes` counts repeated ones singly. */
export const objectLimits = { bytes: 200_000, nesting: 8, shapes: 300, repeats: 40, placeMm: 1000, halfAxisMm: 1000, word: 60 } as const;
