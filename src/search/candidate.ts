/** What a search compares of one point of the lattice. */
export interface Candidate {
  /** Index of the value of each variable; 0 leaves it as it is. */
  readonly point: readonly number[];
  /** 0 fits, 1 too close, 2 over a limit. */
  readonly rank: 0 | 1 | 2;
  readonly changes: number;
  readonly timeS: number;
  readonly snr: number | null;
  readonly contrast: number | null;
  readonly volumeMm3: number;
  readonly blurPx: number | null;
  /** RF power against the preset. */
  readonly power: number | null;
  readonly loss: number;
}

/** The questions a search answers, each with the exact best of its own. */
export const wayKinds = ['closest', 'best-signal', 'sharpest', 'shortest', 'best-contrast', 'fewest-changes', 'least-rf'] as const;
export type WayKind = (typeof wayKinds)[number];

/** What is told apart: a billionth. Ratios and losses are of the order of 1, times of seconds. */
export function grain(value: number): number {
  return Math.round(value * 1e9);
}

type Measures = Omit<Candidate, 'point' | 'rank'>;

/** The number a kind wants small; infinite where it cannot be told. */
function wanted(kind: WayKind, c: Measures): number {
  switch (kind) {
    case 'closest':
      return c.loss;
    case 'best-signal':
      return c.snr === null ? Number.POSITIVE_INFINITY : -c.snr;
    case 'sharpest':
      return c.volumeMm3;
    case 'shortest':
      return c.timeS;
    case 'best-contrast':
      return c.contrast === null ? Number.POSITIVE_INFINITY : -c.contrast;
    case 'fewest-changes':
      return c.changes;
    case 'least-rf':
      return c.power ?? Number.POSITIVE_INFINITY;
  }
}

/** True where a kind has an answer for this candidate at all. */
export function answers(kind: WayKind, candidate: Measures): boolean {
  return Number.isFinite(wanted(kind, candidate));
}

/**
 * Order of two candidates for one kind, without their points: the kind's own number; for the sharpest then less blur;
 * then fewer changes, then less balanced loss. Differences under a billionth are none.
 */
export function compareMeasures(kind: WayKind, a: Measures, b: Measures): number {
  const own = grain(wanted(kind, a)) - grain(wanted(kind, b));
  if (own !== 0) return own;
  if (kind === 'sharpest') {
    const blur = grain(a.blurPx ?? 0) - grain(b.blurPx ?? 0);
    if (blur !== 0) return blur;
  }
  return a.changes - b.changes || grain(a.loss) - grain(b.loss);
}

/** True when a candidate answers the question of a kind better than another, whatever their verdicts, changes and losses. */
export function outdoes(kind: WayKind, a: Measures, b: Measures): boolean {
  return grain(wanted(kind, a)) < grain(wanted(kind, b));
}

/** Order of points: the first variable on which they differ decides, its earlier value first. */
export function comparePoints(a: ArrayLike<number>, b: ArrayLike<number>): number {
  for (let i = 0; i < a.length; i += 1) {
    const difference = (a[i] as number) - (b[i] as number);
    if (difference !== 0) return difference;
  }
  return 0;
}

/** The total order of candidates for one kind. Ranks are compared before it: what fits comes before what is too close. */
export function compareCandidates(kind: WayKind, a: Candidate, b: Candidate): number {
  return a.rank - b.rank || compareMeasures(kind, a, b) || comparePoints(a.point, b.point);
}
