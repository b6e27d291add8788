import type { Pulse } from './control.js';
import type { Groups } from './groups.js';
import type { LineBucket } from './line-buckets.js';
import { walkPoints } from './point-walk.js';
import type { SearchSetting } from './setting.js';
import type { SignalState, SignalTable } from './signal-states.js';

/** A signal state with the point that gives it and the settings it changes. */
export interface SignalEntry {
  readonly state: SignalState;
  readonly changes: number;
  /** Whole point: shared and signal variables are right, line variables stand for the train. */
  readonly point: readonly number[];
}

/** Signal states of one choice of the shared variables, by the train that the lines ask for, changing at most so many signal variables. */
export class SignalLists {
  readonly #lists = new Map<string, SignalEntry[]>();

  constructor(
    private readonly setting: SearchSetting,
    private readonly groups: Groups,
    private readonly table: SignalTable,
    private readonly mostChanges: number,
    private readonly pulse: Pulse,
  ) {}

  of(bucket: LineBucket): readonly SignalEntry[] {
    const known = this.#lists.get(bucket.train);
    if (known !== undefined) return known;
    const entries: SignalEntry[] = [];
    const point = [...bucket.point];
    walkPoints(this.setting.variables, this.groups.signal, this.mostChanges, point, (changes) => {
      this.pulse.beat();
      const state = this.table.stateAt(point);
      if (state !== null) entries.push({ state, changes, point: [...point] });
    });
    this.#lists.set(bucket.train, entries);
    return entries;
  }
}

/** The point that joins line variables of one with shared and signal variables of the other. */
export function joinedPoint(groups: Groups, line: readonly number[], signal: readonly number[]): number[] {
  const point = [...signal];
  for (const at of groups.lines) point[at] = line[at] as number;
  return point;
}

/**
 * States that can be best for some lines: of those with the same timing and the same shortest timing, no other has at least
 * the signal, the contrast and the train. What neither time nor playability tells apart is only compared in these three.
 */
export function undominated(entries: readonly SignalEntry[]): SignalEntry[] {
  const groups = new Map<number, SignalEntry[]>();
  for (const entry of entries) {
    if (entry.state.rfRank === 2) continue;
    const key = entry.state.timeId * 2 ** 24 + entry.state.minimumId;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [entry]);
    else if (!group.some((other) => dominates(other.state, entry.state))) {
      groups.set(key, [...group.filter((other) => !dominates(entry.state, other.state)), entry]);
    }
  }
  return [...groups.values()].flat();
}

function contrastOf({ target, comparison }: SignalState): number {
  return target === null || comparison === null ? -1 : Math.abs(target - comparison);
}

function dominates(a: SignalState, b: SignalState): boolean {
  return (a.target ?? -1) >= (b.target ?? -1) && contrastOf(a) >= contrastOf(b) && a.trainLoss <= b.trainLoss;
}
