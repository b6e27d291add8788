/** Most different words that are counted apart. */
const mostWords = 400;

/** One word and how often it came. */
export interface CountedWord {
  readonly word: string;
  readonly count: number;
}

/**
 * How often each word came. Memory is bounded: where too many different ones come, those that came once so far are given up,
 * and `leftOut` says how many entries that were.
 */
export class Tally {
  private readonly counts = new Map<string, number>();
  private lost = 0;

  add(word: string, count = 1): void {
    const before = this.counts.get(word);
    if (before === undefined && this.counts.size >= mostWords) {
      this.giveUpRare();
      if (this.counts.size >= mostWords) {
        this.lost += count;
        return;
      }
    }
    this.counts.set(word, (before ?? 0) + count);
  }

  get(word: string): number {
    return this.counts.get(word) ?? 0;
  }

  get leftOut(): number {
    return this.lost;
  }

  /** Most frequent first; equals in the order of the alphabet. */
  sorted(): CountedWord[] {
    const rows = [...this.counts].map(([word, count]) => ({ word, count }));
    return rows.sort((a, b) => b.count - a.count || (a.word < b.word ? -1 : 1));
  }

  private giveUpRare(): void {
    for (const [word, count] of this.counts) {
      if (count > 1) continue;
      this.counts.delete(word);
      this.lost += count;
    }
  }
}
