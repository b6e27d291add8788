import { answers, type Candidate, compareCandidates, compareMeasures, type WayKind, wayKinds } from './candidate.js';
import type { Pulse } from './control.js';
import { type FewBucket, type FewLine, fewBuckets } from './few-changes.js';
import type { LineBucket } from './line-buckets.js';
import { walkPoints } from './point-walk.js';
import type { SearchTables } from './search-tables.js';
import { joinedPoint, type SignalEntry, SignalLists } from './signal-lists.js';
import type { Timely } from './signal-state.js';
import type { TimeFamily } from './time-family.js';

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

  /** Best way of one set of changed settings (a bit for each variable): its least balanced loss. Only fewest changes make a route. */
  offerRoute(maskOf: () => number, measures: Measures, rank: 0 | 1, pointOf: () => number[]): void {
    const fewest = this.best('fewest-changes', rank)?.changes;
    if (fewest !== undefined && measures.changes > fewest) return;
    const key = maskOf() * 2 + rank;
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
  const { setting, groups, signals, join } = tables;
  const point = setting.variables.map(() => 0);
  walkPoints(setting.variables, groups.shared, mostChanges, point, (sharedChanges) => {
    const left = mostChanges - sharedChanges;
    const buckets = fewBuckets(tables, point, left, pulse);
    const lists = new SignalLists(setting, groups, signals, left, pulse, timelyFor(tables, buckets, left));
    const timings = new Map<string, readonly Timing[]>();
    for (const bucket of buckets) {
      const { train } = bucket.bucket;
      const ofTrain = timings.get(train) ?? timingsOf(lists.of(bucket.bucket));
      timings.set(train, ofTrain);
      bestsOfBucket(tables, bucket, ofTrain, sharedChanges, left, bests, pulse);
    }
    join.forget();
  });
}

/** Tells whether some bucket has few enough lines for a timing that takes so many changes: a signal without such lines is of no use. */
function timelyFor({ join }: SearchTables, buckets: readonly FewBucket[], left: number): Timely {
  const byTime = new Map<number, { readonly bucket: LineBucket; readonly fewest: number[] }>();
  for (const { bucket, fewestLines } of buckets) {
    const known = byTime.get(bucket.timeId);
    if (known === undefined) byTime.set(bucket.timeId, { bucket, fewest: [...fewestLines] });
    else for (const [i, lines] of fewestLines.entries()) known.fewest[i] = Math.min(known.fewest[i] as number, lines);
  }
  /** Most changes that leave a timing lines for which there is time; -1 where none do. */
  const mostChanges = new Map<number, number>();
  return (timing, changes) => {
    let most = mostChanges.get(timing.timeId);
    if (most === undefined) {
      most = -1;
      for (const { bucket, fewest } of byTime.values()) {
        const times = join.times(timing, bucket);
        for (let own = left; own > most; own -= 1) {
          const lines = fewest[left - own] as number;
          if (Number.isFinite(lines) && times.allows(Math.ceil(lines))) most = own;
        }
      }
      mostChanges.set(timing.timeId, most);
    }
    return changes <= most;
  };
}

/** Signals that play their lines in the same time, fewest changes first. */
interface Timing {
  readonly entries: readonly SignalEntry[];
  readonly fewestChanges: number;
}

/** The timings of signals that RF allows, those that take fewest changes first. */
function timingsOf(signals: readonly SignalEntry[]): Timing[] {
  const groups = new Map<number, SignalEntry[]>();
  for (const signal of [...signals].sort((a, b) => a.changes - b.changes)) {
    if (signal.state.rfRank === 2) continue;
    const group = groups.get(signal.state.timeId);
    if (group === undefined) groups.set(signal.state.timeId, [signal]);
    else group.push(signal);
  }
  return [...groups.values()].map((entries) => ({ entries, fewestChanges: (entries[0] as SignalEntry).changes }));
}

/** Offers the ways of one bucket: lines that leave time for some signal, with the signals that leave room for their changes. */
function bestsOfBucket(
  tables: SearchTables,
  { bucket, fewestChanges, fewestLines, lines: linesWithin }: FewBucket,
  timings: readonly Timing[],
  sharedChanges: number,
  left: number,
  bests: Bests,
  pulse: Pulse,
): void {
  const { groups, join, shortest } = tables;
  const room = left - fewestChanges;
  const usable: { readonly entries: readonly SignalEntry[]; readonly times: TimeFamily }[] = [];
  let most = 0;
  for (const timing of timings) {
    if (timing.fewestChanges > room) break;
    const times = join.times((timing.entries[0] as SignalEntry).state, bucket);
    // One time is asked before the most lines are sought.
    const fewest = fewestLines[left - timing.fewestChanges] as number;
    if (!times.allows(Math.ceil(fewest)) || times.mostLines < fewest) continue;
    most = Math.max(most, times.mostLines);
    usable.push({ entries: timing.entries, times });
  }
  const all = most === 0 ? [] : linesWithin(most, left);
  if (all.length === 0) return;
  // Lines that leave room for so many changes of the signal.
  const rooms = Array.from({ length: left + 1 }, (_, changes) =>
    changes === 0 ? all : all.filter((line) => line.changes <= left - changes),
  );
  const signalAndShared = [...groups.shared, ...groups.signal];
  const offer = (signal: SignalEntry, line: FewLine, times: TimeFamily) => {
    const { state } = signal;
    pulse.formed += 1;
    const noise = join.noise(state, line.signalFreeSnr);
    if (!join.audible(noise)) return;
    const time = times.at(line.lineCount);
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
    const pointOf = () => joinedPoint(groups, line.point(), signal.point);
    bests.offer(measures, rank, pointOf);
    if (measures.changes <= mostInRoute)
      bests.offerRoute(() => maskOf(groups.lines, line.point()) + maskOf(signalAndShared, signal.point), measures, rank, pointOf);
  };
  for (const { entries, times } of usable) {
    const within = times.mostLines;
    for (const signal of entries) {
      if (signal.changes > room) break;
      const lines = rooms[signal.changes] as readonly FewLine[];
      if (lines.length === 0 || (lines[0] as FewLine).lineCount > within || !shortest.playable(signal.state, bucket)) continue;
      for (const line of lines) {
        if (line.lineCount > within) break;
        pulse.beat();
        offer(signal, line, times);
      }
    }
  }
}
