import type { ParameterKey } from '../calc/parameters.js';
import type { Pulse } from './control.js';
import type { Groups } from './groups.js';
import type { LatticeVariable } from './lattice.js';
import type { LineBucket } from './line-buckets.js';
import { walkPoints } from './point-walk.js';
import type { SearchSetting } from './setting.js';
import type { SignalState, Timely } from './signal-state.js';
import type { SignalTable } from './signal-states.js';

/** A signal state with the settings it changes; its point is put together when asked for. */
export class SignalEntry {
  readonly #code: number;
  readonly #list: SignalPoints;

  constructor(
    readonly state: SignalState,
    readonly changes: number,
    code: number,
    list: SignalPoints,
  ) {
    this.#code = code;
    this.#list = list;
  }

  /** Whole point: shared and signal variables are right, line variables stand for the train. */
  get point(): number[] {
    return this.#list.pointOf(this.#code);
  }
}

/** Points of one list as numbers. */
class SignalPoints {
  constructor(
    private readonly variables: readonly LatticeVariable[],
    private readonly which: readonly number[],
    private readonly start: readonly number[],
  ) {}

  codeOf(point: readonly number[]): number {
    let code = 0;
    for (const at of this.which) code = code * (this.variables[at] as LatticeVariable).values.length + (point[at] as number);
    return code;
  }

  pointOf(code: number): number[] {
    const point = [...this.start];
    let rest = code;
    for (let k = this.which.length - 1; k >= 0; k -= 1) {
      const at = this.which[k] as number;
      const count = (this.variables[at] as LatticeVariable).values.length;
      point[at] = rest % count;
      rest = Math.floor(rest / count);
    }
    return point;
  }
}

/** What only takes time or power: of states that differ in these alone, and are split alike, none beats the one with the least of them. */
const onlyCosts: readonly ParameterKey[] = ['dummyShots', 'saturationBands'];

/** One choice of what only costs: indices of values, and the choices before it that cost no more of anything. */
interface CostChoice {
  readonly values: readonly number[];
  readonly beatenBy: readonly number[];
  /** Those of them that are split alike whatever the slots: they differ in dummies alone. */
  readonly splitAs: readonly number[];
}

/** All choices of some variables whose values only cost, those that cost less first. */
function costChoices(variables: readonly LatticeVariable[], costs: readonly number[]): CostChoice[] {
  const costOf = (values: readonly number[], k: number) =>
    (variables[costs[k] as number] as LatticeVariable).values[values[k] as number] as number;
  const all: number[][] = [];
  const point: number[] = [];
  walkPoints(variables, costs, costs.length, point, () => {
    all.push(costs.map((at) => point[at] as number));
  });
  const total = (values: readonly number[]) => values.reduce((sum, _, k) => sum + costOf(values, k), 0);
  all.sort((a, b) => total(a) - total(b));
  const isDummies = (v: number) => (variables[costs[v] as number] as LatticeVariable).key === 'dummyShots';
  return all.map((values, i) => {
    const beatenBy = all.slice(0, i).flatMap((other, k) => (costs.every((_, v) => costOf(other, v) <= costOf(values, v)) ? [k] : []));
    const splitAs = beatenBy.filter((k) => costs.every((_, v) => isDummies(v) || all[k]?.[v] === values[v]));
    return { values, beatenBy, splitAs };
  });
}

/** Signal states of one choice of the shared variables, by the train that the lines ask for, changing at most so many signal variables. */
export class SignalLists {
  readonly #lists = new Map<string, SignalEntry[]>();
  readonly #best = new Map<string, SignalEntry[]>();

  constructor(
    private readonly setting: SearchSetting,
    private readonly groups: Groups,
    private readonly table: SignalTable,
    private readonly mostChanges: number,
    private readonly pulse: Pulse,
    /** Where it is known that a timing leaves no time for any lines, its signals are left out. */
    private readonly timely: Timely = () => true,
  ) {}

  of(bucket: Pick<LineBucket, 'train' | 'point'>): readonly SignalEntry[] {
    const known = this.#lists.get(bucket.train);
    if (known !== undefined) return known;
    const entries: SignalEntry[] = [];
    const point = [...bucket.point];
    const { variables } = this.setting;
    const points = new SignalPoints(variables, this.groups.signal, bucket.point);
    // What time follows comes first: where it leaves no time for any lines, nothing else helps.
    const timed = this.table.timedAlone(this.groups.signal);
    const others = this.table.inOrder(this.groups.signal.filter((at) => !timed.includes(at)));
    walkPoints(variables, timed, this.mostChanges, point, (changes) => {
      if (timed.length > 0 && !this.table.mayBeTimely(point, changes, this.timely)) return;
      walkPoints(variables, others, this.mostChanges - changes, point, (more) => {
        this.pulse.beat();
        const state = this.table.stateAt(point, changes + more, this.timely);
        if (state !== null) entries.push(new SignalEntry(state, changes + more, points.codeOf(point), points));
      });
    });
    this.#lists.set(bucket.train, entries);
    return entries;
  }

  /** Of all these states at least those that no other beats in time, signal, contrast and train. */
  best(bucket: Pick<LineBucket, 'train' | 'point'>): readonly SignalEntry[] {
    const { variables } = this.setting;
    const isCost = (at: number) => onlyCosts.includes((variables[at] as LatticeVariable).key);
    const costs = this.groups.signal.filter(isCost);
    if (!this.table.splitsApart || costs.length === 0) return this.of(bucket);
    const known = this.#best.get(bucket.train);
    if (known !== undefined) return known;
    const others = this.table.inOrder(this.groups.signal.filter((at) => !isCost(at)));
    const entries: SignalEntry[] = [];
    const point = [...bucket.point];
    const points = new SignalPoints(variables, this.groups.signal, bucket.point);
    const choices = costChoices(variables, costs);
    const splits = new Int32Array(choices.length);
    walkPoints(variables, others, others.length, point, () => {
      for (let i = 0; i < choices.length; i += 1) {
        this.pulse.beat();
        const { values, beatenBy, splitAs } = choices[i] as CostChoice;
        splits[i] = 0;
        if (splitAs.some((k) => (splits[k] as number) > 0)) continue;
        for (let k = 0; k < costs.length; k += 1) point[costs[k] as number] = values[k] as number;
        const rounds = this.table.splitAt(point);
        if (rounds === null || beatenBy.some((k) => splits[k] === rounds)) continue;
        const state = this.table.stateAsked(point);
        if (state === null || state.rfRank === 2) continue;
        splits[i] = rounds;
        entries.push(new SignalEntry(state, 0, points.codeOf(point), points));
      }
      for (const at of costs) point[at] = 0;
    });
    this.#best.set(bucket.train, entries);
    return entries;
  }
}

/** The point that joins line variables of one with shared and signal variables of the other. */
export function joinedPoint(groups: Groups, line: readonly number[], signal: readonly number[]): number[] {
  const point = [...signal];
  for (const at of groups.lines) point[at] = line[at] as number;
  return point;
}
