import { describe, expect, it } from 'vitest';
import { bestPlan, type PlanItem, type PlanLimits } from '../../src/search/knapsack.js';
import { Random } from './random.js';

/** Every choice of every item, by going through them all. */
function byEnumeration(
  items: readonly PlanItem[],
  { limitUs, roomyUs }: PlanLimits,
  minimumSet: readonly (string | readonly string[])[],
): number[] | null {
  let best: number[] | null = null;
  const walk = (at: number, timeUs: number, value: number, changes: number, kept: readonly string[]): void => {
    if (timeUs > limitUs) return;
    const item = items[at];
    if (item === undefined) {
      const served = minimumSet.filter((one) =>
        typeof one === 'string' ? kept.includes(one) : one.some((id) => kept.includes(id)),
      ).length;
      // Most served, most value, enough to spare, fewest changes, least time: larger is better.
      const found = [served, value, timeUs <= roomyUs ? 1 : 0, -changes, -timeUs];
      const differs = found.findIndex((number, i) => number !== best?.[i]);
      if (best === null || (differs >= 0 && (found[differs] as number) > (best[differs] as number))) best = found;
      return;
    }
    for (const option of item.options)
      walk(at + 1, timeUs + option.timeUs, value + option.value, changes + option.changes, option.kept ? [...kept, ...item.ids] : kept);
  };
  walk(0, 0, 0, 0, []);
  return best;
}

describe('bestPlan(items, limit, minimum set)', () => {
  it('equals going through every plan, on random sessions', () => {
    for (let seed = 1; seed <= 300; seed += 1) {
      const random = new Random(seed);
      const items: PlanItem[] = Array.from({ length: random.whole(1, 6) }, (_, i) => ({
        ids: [`s${i}`],
        options: [
          ...Array.from({ length: random.whole(1, 5) }, () => ({
            timeUs: random.whole(1, 200) * 1_000_000,
            // Few values, so that many plans keep as much.
            value: random.whole(1, 8) / 4,
            kept: true,
            changes: random.whole(0, 3),
          })),
          { timeUs: 0, value: 0, kept: false, changes: 0 },
        ],
      }));
      const ids = items.map(({ ids: [id] }) => id as string);
      const minimumSet = random.chance(0.7) ? [random.pick(ids), [random.pick(ids), random.pick(ids)]] : [];
      const limitUs = random.whole(20, 600) * 1_000_000;
      const limits = { limitUs, roomyUs: limitUs - 20_000_000 };
      const chosen = bestPlan(items, limits, minimumSet, new Set());
      const options = chosen.map((option, i) => (items[i] as PlanItem).options[option] as PlanItem['options'][number]);
      const kept = ids.filter((_, i) => options[i]?.kept === true);
      const served = minimumSet.filter((one) =>
        typeof one === 'string' ? kept.includes(one) : one.some((id) => kept.includes(id)),
      ).length;
      const timeUs = options.reduce((sum, option) => sum + option.timeUs, 0);
      const changes = options.reduce((sum, option) => sum + option.changes, 0);
      const value = options.reduce((sum, option) => sum + option.value, 0);
      expect([served, value, timeUs <= limits.roomyUs ? 1 : 0, -changes, -timeUs], `seed ${seed}`).toEqual(
        byEnumeration(items, limits, minimumSet),
      );
    }
  });

  it('changes nothing that need not be changed: an equal plan that is quicker is chosen only where it then has enough to spare', () => {
    const item: PlanItem = {
      ids: ['a'],
      options: [
        { timeUs: 90, value: 1, kept: true, changes: 0 },
        { timeUs: 85, value: 1, kept: true, changes: 2 },
        { timeUs: 0, value: 0, kept: false, changes: 0 },
      ],
    };
    expect(bestPlan([item], { limitUs: 100, roomyUs: 80 }, [], new Set())).toEqual([0]);
    expect(bestPlan([item], { limitUs: 100, roomyUs: 95 }, [], new Set())).toEqual([0]);
    expect(bestPlan([item], { limitUs: 100, roomyUs: 86 }, [], new Set())).toEqual([1]);
  });

  it('leaves everything out where nothing fits', () => {
    const item: PlanItem = {
      ids: ['a'],
      options: [
        { timeUs: 5, value: 1, kept: true, changes: 0 },
        { timeUs: 0, value: 0, kept: false, changes: 0 },
      ],
    };
    expect(bestPlan([item], { limitUs: 4, roomyUs: 4 }, ['a'], new Set())).toEqual([1]);
    expect(bestPlan([item], { limitUs: 5, roomyUs: 5 }, ['a'], new Set())).toEqual([0]);
  });
});
