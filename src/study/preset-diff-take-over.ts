import { parameterKeys } from '../calc/parameters.js';
import type { Parameters } from '../calc/series.js';
import { equalValues, headKeys, seriesKeys } from './preset-diff.js';
import type { Study, StudySeries } from './study.js';

/** One value of one's own, set on top of somebody else's revision, or standing against it. */
export interface OwnChange {
  /** Null: of the study itself. */
  readonly series: string | null;
  readonly key: string;
  readonly from: unknown;
  readonly mine: unknown;
  /** What the other revision has there. */
  readonly theirs: unknown;
}

export interface TakenOver {
  /** Their revision with one's own changes on top; where both changed the same value, theirs stands. */
  readonly study: Study;
  readonly taken: readonly OwnChange[];
  /** Both changed the same value, to different ones: a person decides. */
  readonly conflicts: readonly OwnChange[];
}

/** Keys of the study that a person edits; the others belong to the revision. */
const editedHeadKeys = headKeys.filter((key) => !['id', 'status', 'revision', 'released'].includes(key));

/** Stands for a series that is not there. */
const absent = 'not there';

/**
 * Takes one's own changes over on top of a revision that somebody else made meanwhile: what differs between `base` (where both
 * started) and `mine` is set on `theirs`, value by value, unless they changed the same value to another one.
 */
export function takeOver(base: Study, mine: Study, theirs: Study): TakenOver {
  const taken: OwnChange[] = [];
  const conflicts: OwnChange[] = [];
  /** The value that stands after the merge. */
  const merged = (series: string | null, key: string, from: unknown, own: unknown, other: unknown): unknown => {
    if (equalValues(from, own) || equalValues(own, other)) return other;
    const change: OwnChange = { series, key, from, mine: own, theirs: other };
    if (!equalValues(from, other)) {
      conflicts.push(change);
      return other;
    }
    taken.push(change);
    return own;
  };

  const head = Object.fromEntries(editedHeadKeys.map((key) => [key, merged(null, key, base[key], mine[key], theirs[key])]));
  const ids = [...new Set([...theirs.series, ...mine.series].map(({ id }) => id))];
  const series = ids.flatMap((id): StudySeries[] => {
    const [from, own, other] = [seriesOf(base, id), seriesOf(mine, id), seriesOf(theirs, id)];
    if (other === undefined || own === undefined || from === undefined) {
      const kept = merged(null, `series ${id}`, from ?? absent, own ?? absent, other ?? absent);
      return kept === absent ? [] : [kept as StudySeries];
    }
    const fields = Object.fromEntries(seriesKeys.map((key) => [key, merged(id, key, from[key], own[key], other[key])]));
    const parameters = Object.fromEntries(
      parameterKeys.map((key) => [key, merged(id, key, from.parameters[key], own.parameters[key], other.parameters[key])]),
    ) as unknown as Parameters;
    return [{ ...other, ...fields, parameters }];
  });
  return { study: { ...theirs, ...head, series }, taken, conflicts };
}

function seriesOf(study: Study, id: string): StudySeries | undefined {
  return study.series.find((series) => series.id === id);
}
