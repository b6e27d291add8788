import { answers, type Candidate, compareCandidates, grain, type WayKind, wayKinds } from '../../src/search/candidate.js';
import { judgePoint } from '../../src/search/judge.js';
import { mostChanges } from '../../src/search/search.js';
import type { SearchSetting } from '../../src/search/setting.js';

/** What going through every point of a lattice with `evaluate` finds. */
export interface Enumerated {
  readonly size: number;
  readonly fitting: number;
  readonly best: ReadonlyMap<string, Candidate>;
  readonly timeSnr: readonly (readonly [number, number])[];
  readonly timeLoss: readonly (readonly [number, number])[];
  /** Smallest number of changes that fits or is too close, null where nothing is. */
  readonly fewest: number | null;
}

/** Points that no other beats, by sorting: an independent way to the same fronts. Values are in grains, larger is better. */
function frontOf(points: readonly (readonly [number, number])[]): [number, number][] {
  const sorted = [...points].sort((a, b) => a[0] - b[0] || b[1] - a[1]);
  const front: [number, number][] = [];
  for (const [time, value] of sorted)
    if (front.length === 0 || value > (front[front.length - 1] as [number, number])[1]) front.push([time, value]);
  return front;
}

/** Goes through every point. */
export function enumerate(setting: SearchSetting): Enumerated {
  const { variables, problem } = setting;
  const point = variables.map(() => 0);
  const within: Candidate[] = [];
  const snr: [number, number][] = [];
  const loss: [number, number][] = [];
  const rf = problem.limits.rfRatio !== undefined;
  let size = 0;
  for (;;) {
    size += 1;
    const judged = judgePoint(setting, point);
    if (judged.isWay) {
      const { candidate } = judged;
      const overRf =
        rf && judged.figures.sarTrendHigh !== null && judged.figures.sarTrendHigh > (problem.limits.rfRatio as number) * (1 + 1e-9);
      if (!overRf) {
        if (candidate.snr !== null) snr.push([candidate.timeS, grain(candidate.snr)]);
        loss.push([candidate.timeS, -grain(candidate.loss)]);
      }
      if (candidate.rank < 2) within.push(candidate);
    }
    let at = variables.length - 1;
    while (at >= 0 && point[at] === (variables[at]?.values.length ?? 1) - 1) {
      point[at] = 0;
      at -= 1;
    }
    if (at < 0) break;
    point[at] = (point[at] as number) + 1;
  }
  const fewest = within.length === 0 ? null : Math.min(...within.map(({ changes }) => changes));
  const most = Math.max(mostChanges, fewest ?? 0);
  const best = new Map<string, Candidate>();
  for (const kind of wayKinds) {
    for (const rank of [0, 1] as const) {
      const ofKind = within.filter((candidate) => candidate.rank === rank && candidate.changes <= most && answers(kind, candidate));
      const first = ofKind.reduce<Candidate | null>(
        (held, next) => (held === null || compareCandidates(kind, next, held) < 0 ? next : held),
        null,
      );
      if (first !== null) best.set(nameOf(kind, rank), first);
    }
  }
  return { size, fitting: within.length, best, timeSnr: frontOf(snr), timeLoss: frontOf(loss), fewest };
}

export function nameOf(kind: WayKind, rank: 0 | 1): string {
  return `${kind}, ${rank === 0 ? 'fits' : 'too close'}`;
}
