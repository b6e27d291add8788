import type { Pulse } from './control.js';
import type { LinePart, LineTable } from './line-states.js';
import { walkPoints } from './point-walk.js';
import type { SearchSetting } from './setting.js';

/** Choices along one direction that time and noise cannot tell apart, or one of them. */
export interface Part extends LinePart {
  /** The first such choice, a whole point of which only this direction's variables count. */
  readonly point: readonly number[];
  readonly changes: number;
  multiplicity: number;
}

/**
 * The parts of one direction, by what voxel and train follow: every choice that changes at most so many of its variables.
 * `merged` makes one part of choices that time and noise cannot tell apart.
 */
export function partsOf(
  setting: SearchSetting,
  table: LineTable,
  which: readonly number[],
  mostChanges: number,
  point: number[],
  direction: 'phase' | 'slice',
  merged: boolean,
  pulse: Pulse,
): Part[][] {
  const groups = new Map<number, Part[]>();
  const known = new Map<number, Map<number, Part>>();
  walkPoints(setting.variables, which, mostChanges, point, (changes) => {
    pulse.beat();
    const part = table.partAt(point, direction);
    if (part === null) return;
    let group = groups.get(part.group);
    if (group === undefined) {
      group = [];
      groups.set(part.group, group);
      if (merged) known.set(part.group, new Map());
    }
    const same = merged ? known.get(part.group)?.get(part.key) : undefined;
    if (same !== undefined) {
      same.multiplicity += 1;
      return;
    }
    const { key, encoded, acquired, factor, reference, referenceKept } = part;
    const one = {
      key,
      group: part.group,
      encoded,
      acquired,
      factor,
      reference,
      referenceKept,
      point: [...point],
      changes,
      multiplicity: 1,
    };
    group.push(one);
    known.get(part.group)?.set(part.key, one);
  });
  return [...groups.values()];
}
