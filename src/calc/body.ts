/** Widest extents of this patient at the level scanned, arms included; null is not known. */
export interface Body {
  readonly frontBackMm: number | null;
  readonly leftRightMm: number | null;
}

/** Nothing known about the patient's size. */
export const unknownBody: Body = { frontBackMm: null, leftRightMm: null };
