import { answers, type Candidate, compareCandidates, compareMeasures, type WayKind, wayKinds } from './candidate.js';
import type { Pulse } from './control.js';
import { type LineEntry, lineBuckets } from './line-buckets.js';
import { walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { joinedPoint, SignalLists } from './signal-lists.js';

type Measures = Omit<Candidate, 'point' | 'rank'>;

/** The best way of each kind among those that fit, and among those that are too close. */
export class Bests {
  readonly #best = new Map<WayKind, [Candidate | null, Candidate | null]>(wayKinds.map((kind) => [kind, [null, null]]));

  readonly #routes = new Map<number, Candidate>();

  /** Takes a candidate that is within its limits; its point is asked for only where it is better or equal. */
  offer(measures: Measures, rank: 0 | 1, pointOf: () => number[]): void {
    let candidate: Candidate | null = null;
    for (const kind of wayKinds) {
      const held = this.#best.get(kind) as [Candidate | null, Candidate | null];
      const current = held[rank];
      if (current !== null && compareMeasures(kind, measures, current) > 0) continue;
      if (!answers(kind, measures)) continue;
      candidate ??= { ...measures, rank, point: pointOf() };
      if (current === null || compareCandidates(kind, candidate, current) < 0) held[rank] = candidate;
    }
  }

  best(kind: WayKind, rank: 0 | 1): Candidate | null {
    return (this.#best.get(kind) as [Candidate | null, Candidate | null])[rank];
  }

  /** Best way of one set of changed settings (a bit for each variable): its least balanced loss. */
  offerRoute(mask: number, measures: Measures, rank: 0 | 1, pointOf: () => number[]): void {
    const key = mask * 2 + rank;
    const current = this.#routes.get(key);
    if (current !== undefined && compareMeasures('closest', measures, current) > 0) return;
    const candidate = { ...measures, rank, point: pointOf() };
    if (current === undefined || compareCandidates('closest', candidate, current) < 0) this.#routes.set(key, candidate);
  }

  /**
   * The routes of a rank that change as few settings as anything of that rank does: for each set of settings the way of least balanced loss,
   * least loss first.
   */
  routes(rank: 0 | 1): Candidate[] {
    const fewest = this.best('fewest-changes', rank)?.changes;
    return [...this.#routes.values()]
      .filter((candidate) => candidate.rank === rank && candidate.changes === fewest)
      .sort((a, b) => compareCandidates('closest', a, b));
  }

  get any(): boolean {
    return this.best('fewest-changes', 0) !== null || this.best('fewest-changes', 1) !== null;
  }
}

/** Settings of the longest route that is kept apart by what it changes. */
const mostInRoute = 3;

/** A bit for each of these variables that a point changes. */
function maskOf(which: readonly number[], point: readonly number[]): number {
  let mask = 0;
  for (const at of which) if (point[at] !== 0) mask += 2 ** at;
  return mask;
}

/** Goes through every point that changes at most so many settings and is within bands and limits, and keeps the best of each kind. */
export function bestsWithin(tables: SearchTables, mostChanges: number, bests: Bests, pulse: Pulse): void {
  const { setting, groups, lines, signals, join } = tables;
  const point = setting.variables.map(() => 0);
  const signalAndShared = [...groups.shared, ...groups.signal];
  walkPoints(setting.variables, groups.shared, mostChanges, point, (sharedChanges) => {
    const left = mostChanges - sharedChanges;
    const buckets = lineBuckets(setting, groups, lines, point, left, pulse);
    const lists = new SignalLists(setting, groups, signals, left, pulse);
    for (const bucket of buckets) {
      // Lines that leave room for so many changes of the signal.
      const room = Array.from({ length: left + 1 }, (_, changes) => bucket.entries.filter((line) => line.changes <= left - changes));
      for (const signal of lists.of(bucket)) {
        const { state } = signal;
        const entries = room[signal.changes] as readonly LineEntry[];
        if (entries.length === 0 || state.rfRank === 2 || !signals.playable(state, bucket)) continue;
        for (const line of entries) {
          const time = join.time(state, bucket, line.lineCount);
          // More lines never take less time: the rest of the bucket is over as well.
          if (time.rank === 2 || !time.kept) break;
          pulse.beat();
          pulse.formed += 1;
          const noise = join.noise(state, line.signalFreeSnr);
          if (!join.audible(noise)) continue;
          const rank = Math.max(time.rank, state.rfRank) as 0 | 1;
          const measures = {
            changes: sharedChanges + line.changes + signal.changes,
            timeS: time.timeS,
            snr: noise.snr,
            contrast: noise.contrast,
            volumeMm3: bucket.volumeMm3,
            blurPx: state.blurPx,
            power: state.power,
            loss: join.loss(bucket, state, noise),
          };
          const pointOf = () => joinedPoint(groups, line.point, signal.point);
          bests.offer(measures, rank, pointOf);
          if (measures.changes <= mostInRoute)
            bests.offerRoute(maskOf(groups.lines, line.point) + maskOf(signalAndShared, signal.point), measures, rank, pointOf);
        }
      }
    }
    join.forget();
  });
}
