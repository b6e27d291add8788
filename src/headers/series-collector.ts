import { CollectedSeries } from './collected-series.js';
import type { Header } from './header.js';

/** Series beyond this are not told apart: no exam has more. */
const mostSeries = 2000;

/** Groups headers into series as they come; holds sums, not headers, so that memory follows the number of series. */
export class SeriesCollector {
  readonly #groups = new Map<string, CollectedSeries>();
  #left = 0;

  add(header: Header): void {
    const key = groupKey(header);
    let group = this.#groups.get(key);
    if (group === undefined) {
      if (this.#groups.size >= mostSeries) {
        this.#left += 1;
        return;
      }
      group = new CollectedSeries(header);
      this.#groups.set(key, group);
    }
    group.add(header);
  }

  /** Images that were left out because there were too many series. */
  get leftOut(): number {
    return this.#left;
  }

  /** The series by their number, else in the order they came in. */
  series(): readonly CollectedSeries[] {
    const numberOf = (one: CollectedSeries) => one.attributes.SeriesNumber?.[0] ?? Number.POSITIVE_INFINITY;
    return [...this.#groups.values()].sort((a, b) => {
      const [first, second] = [numberOf(a), numberOf(b)];
      return first === second ? 0 : first - second;
    });
  }
}

/** One UID may hold images of several orientations or sizes, and images made from others: each is a series of its own here. */
function groupKey({ source, seriesKey, attributes: a }: Header): string {
  const orientation = a.ImageOrientationPatient?.map((part) => Math.round(part * 50)).join(' ') ?? '';
  return [source, seriesKey, orientation, a.Rows?.[0], a.Columns?.[0], a.ImageType?.includes('DERIVED') === true ? 'derived' : ''].join(
    '|',
  );
}
