type Level = Map<number, Level | number>;

/** Small numbers for a word with four numbers: equal ones have the same, without a text being put together for each. */
export class NumberIds {
  readonly #words = new Map<string, Level>();
  #count = 0;

  of(word: string, a: number, b: number, c: number, d: number): number {
    let level = this.#words.get(word);
    if (level === undefined) {
      level = new Map();
      this.#words.set(word, level);
    }
    const last = below(below(below(level, a), b), c);
    let id = last.get(d) as number | undefined;
    if (id === undefined) {
      id = this.#count;
      this.#count += 1;
      last.set(d, id);
    }
    return id;
  }
}

function below(level: Level, key: number): Level {
  let next = level.get(key) as Level | undefined;
  if (next === undefined) {
    next = new Map();
    level.set(key, next);
  }
  return next;
}
