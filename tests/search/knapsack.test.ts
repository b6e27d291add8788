import { describe, expect, it } from 'vitest';
import { bestPlan, type PlanItem } from '../../src/search/knapsack.js';
import { Random } from './random.js';

/** Every choice of every item, by going through them all. */
function byEnumeration(
  items: readonly PlanItem[],
  limitUs: number,
  minimumSet: readonly (string | readonly string[])[],
): { served: number; value: number; timeUs: number } | null {
  let best: { served: number; value: number; timeUs: number } | null = null;
  const walk = (at: number, timeUs: number, value: number, kept: readonly string[]): void => {
    if (timeUs > limitUs) return;
    const item = items[at];
    if (item === undefined) {
      const served = minimumSet.filter((one) =>
        typeof one === 'string' ? kept.includes(one) : one.some((id) => kept.includes(id)),
      ).length;
      const better =
        best === null ||
        served > best.served ||
        (served === best.served && (value > best.value || (value === best.value && timeUs < best.timeUs)));
      if (better) best = { served, value, timeUs };
      return;
    }
    for (const option of item.options)
      walk(at + 1, timeUs + option.timeUs, value + option.value, option.kept ? [...kept, ...item.ids] : kept);
  };
  walk(0, 0, 0, []);
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
            value: random.whole(1, 40) / 8,
            kept: true,
          })),
          { timeUs: 0, value: 0, kept: false },
        ],
      }));
      const ids = items.map(({ ids: [id] }) => id as string);
      const minimumSet = random.chance(0.7) ? [random.pick(ids), [random.pick(ids), random.pick(ids)]] : [];
      const limitUs = random.whole(20, 600) * 1_000_000;
      const chosen = bestPlan(items, limitUs, minimumSet, new Set());
      const options = chosen.map((option, i) => (items[i] as PlanItem).options[option] as PlanItem['options'][number]);
      const kept = ids.filter((_, i) => options[i]?.kept === true);
      const served = minimumSet.filter((one) =>
        typeof one === 'string' ? kept.includes(one) : one.some((id) => kept.includes(id)),
      ).length;
      const found = {
        served,
        value: options.reduce((sum, { value }) => sum + value, 0),
        timeUs: options.reduce((sum, { timeUs }) => sum + timeUs, 0),
      };
      expect(found, `seed ${seed}`).toEqual(byEnumeration(items, limitUs, minimumSet));
    }
  });

  it('leaves everything out where nothing fits', () => {
    const item: PlanItem = {
      ids: ['a'],
      options: [
        { timeUs: 5, value: 1, kept: true },
        { timeUs: 0, value: 0, kept: false },
      ],
    };
    expect(bestPlan([item], 4, ['a'], new Set())).toEqual([1]);
    expect(bestPlan([item], 5, ['a'], new Set())).toEqual([0]);
  });
});
