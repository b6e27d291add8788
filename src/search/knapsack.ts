/** One choice for an item: whole microseconds and what it is worth. */
export interface PlanOption {
  readonly timeUs: number;
  readonly value: number;
  /** False where the choice is to leave the item out. */
  readonly kept: boolean;
  /** Settings that the choice changes. */
  readonly changes: number;
}

/** Time that a plan may take, whole microseconds: at most `limitUs`, and within `roomyUs` there is enough to spare. */
export interface PlanLimits {
  readonly limitUs: number;
  readonly roomyUs: number;
}

/** One thing to choose for: exactly one option is taken. */
export interface PlanItem {
  readonly ids: readonly string[];
  readonly options: readonly PlanOption[];
}

/** A partial plan: the options of the items so far. */
interface State {
  readonly timeUs: number;
  readonly value: number;
  readonly changes: number;
  readonly option: number;
  readonly before: State | null;
}

/**
 * Multiple-choice knapsack over whole microseconds, exactly (dynamic programming over undominated states; Kellerer, Pferschy & Pisinger,
 * Knapsack Problems, 2004, ch. 11): of the plans that fit, first those that serve most items of the minimum set, then most value, then those with
 * enough to spare, then fewest changes, then least time.
 * Answers the index of the option of each item; where nothing fits, leaving everything out always does.
 *
 * @example bestPlan([{ ids: ['a'], options: [{ timeUs: 5, value: 1, kept: true, changes: 0 }, ...] }], { limitUs: 4, roomyUs: 4 }, [], new Set()) //=> [1]
 */
export function bestPlan(
  items: readonly PlanItem[],
  { limitUs, roomyUs }: PlanLimits,
  minimumSet: readonly (string | readonly string[])[],
  done: ReadonlySet<string>,
): number[] {
  // Plans are told apart by which items of the minimum set they serve: those that later items cannot change could be merged, but few are given.
  let layers = new Map<number, State[]>([[bits(minimumSet, [...done]), [{ timeUs: 0, value: 0, changes: 0, option: -1, before: null }]]]);
  for (const { ids, options } of items) {
    const own = bits(minimumSet, ids);
    const next = new Map<number, State[]>();
    for (const [mask, states] of layers) {
      options.forEach((option, i) => {
        const served = option.kept ? mask | own : mask;
        const list = next.get(served) ?? [];
        next.set(served, list);
        for (const state of states) {
          const timeUs = state.timeUs + option.timeUs;
          const changes = state.changes + option.changes;
          if (timeUs <= limitUs) list.push({ timeUs, value: state.value + option.value, changes, option: i, before: state });
        }
      });
    }
    layers = new Map([...next].map(([mask, states]) => [mask, undominated(states)]));
  }
  let best: { readonly served: number; readonly state: State } | null = null;
  for (const [mask, states] of layers) {
    const served = countBits(mask);
    for (const state of states) {
      if (best === null || served > best.served || (served === best.served && better(state, best.state, roomyUs))) best = { served, state };
    }
  }
  const chosen: number[] = [];
  for (let state = best?.state ?? null; state !== null && state.before !== null; state = state.before) chosen.push(state.option);
  return chosen.reverse();
}

/** True when a plan that serves as much is the better one. */
function better(a: State, b: State, roomyUs: number): boolean {
  if (a.value !== b.value) return a.value > b.value;
  const [aRoomy, bRoomy] = [a.timeUs <= roomyUs, b.timeUs <= roomyUs];
  if (aRoomy !== bRoomy) return aRoomy;
  return a.changes < b.changes || (a.changes === b.changes && a.timeUs < b.timeUs);
}

/** True when a state keeps more, or as much with fewer changes. */
function keepsMore(a: State, b: State): boolean {
  return a.value > b.value || (a.value === b.value && a.changes < b.changes);
}

/** States that no other of the same mask beats: none is as quick, keeps as much and changes as little. */
function undominated(states: State[]): State[] {
  states.sort((a, b) => a.timeUs - b.timeUs || b.value - a.value || a.changes - b.changes);
  const kept: State[] = [];
  for (const state of states) if (kept.length === 0 || keepsMore(state, kept[kept.length - 1] as State)) kept.push(state);
  return kept;
}

/** A bit for each item of the minimum set that these ids serve. */
function bits(minimumSet: readonly (string | readonly string[])[], ids: readonly string[]): number {
  return minimumSet.reduce<number>(
    (mask, item, i) => (ids.some((id) => (typeof item === 'string' ? item === id : item.includes(id))) ? mask | (1 << i) : mask),
    0,
  );
}

function countBits(mask: number): number {
  let count = 0;
  for (let rest = mask; rest !== 0; rest &= rest - 1) count += 1;
  return count;
}
