/** One choice for an item: whole microseconds and what it is worth. */
export interface PlanOption {
  readonly timeUs: number;
  readonly value: number;
  /** False where the choice is to leave the item out. */
  readonly kept: boolean;
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
  readonly option: number;
  readonly before: State | null;
}

/**
 * Multiple-choice knapsack over whole microseconds, exactly (dynamic programming over undominated states; Kellerer, Pferschy & Pisinger,
 * Knapsack Problems, 2004, ch. 11): of the plans that fit, first those that serve most items of the minimum set, then most value, then least time.
 * Answers the index of the option of each item; where nothing fits, leaving everything out always does.
 *
 * @example bestPlan([{ ids: ['a'], options: [{ timeUs: 5, value: 1, kept: true }, { timeUs: 0, value: 0, kept: false }] }], 4, [], new Set()) //=> [1]
 */
export function bestPlan(
  items: readonly PlanItem[],
  limitUs: number,
  minimumSet: readonly (string | readonly string[])[],
  done: ReadonlySet<string>,
): number[] {
  // Plans are told apart by which items of the minimum set they serve: those that later items cannot change could be merged, but few are given.
  let layers = new Map<number, State[]>([[bits(minimumSet, [...done]), [{ timeUs: 0, value: 0, option: -1, before: null }]]]);
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
          if (timeUs <= limitUs) list.push({ timeUs, value: state.value + option.value, option: i, before: state });
        }
      });
    }
    layers = new Map([...next].map(([mask, states]) => [mask, undominated(states)]));
  }
  let best: { readonly served: number; readonly state: State } | null = null;
  for (const [mask, states] of layers) {
    const served = countBits(mask);
    for (const state of states) {
      if (best === null || served > best.served || (served === best.served && better(state, best.state))) best = { served, state };
    }
  }
  const chosen: number[] = [];
  for (let state = best?.state ?? null; state !== null && state.before !== null; state = state.before) chosen.push(state.option);
  return chosen.reverse();
}

function better(a: State, b: State): boolean {
  return a.value > b.value || (a.value === b.value && a.timeUs < b.timeUs);
}

/** States that no other of the same mask beats in time and value. */
function undominated(states: State[]): State[] {
  states.sort((a, b) => a.timeUs - b.timeUs || b.value - a.value);
  const kept: State[] = [];
  for (const state of states) if (kept.length === 0 || state.value > (kept[kept.length - 1] as State).value) kept.push(state);
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
