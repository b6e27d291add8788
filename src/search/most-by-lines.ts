/** One choice for some counts of lines, fewest lines first. */
export interface Reached {
  readonly lineCounts: Float64Array;
  readonly at: Int32Array;
}

/** Room to find for each count of lines the choice that averages most; kept from one use to the next. */
export class MostByLines {
  #most = new Float64Array(1024);
  #at = new Int32Array(1024);
  #touched: number[] = [];
  #highest = 0;
  /** Of the choices whose noise is not known the one with fewest lines, -1 where there is none. */
  unknownLines = Number.POSITIVE_INFINITY;
  unknownAt = -1;

  /** A choice; `value` negative where it is not known. */
  offer(lines: number, value: number, at: number): void {
    if (lines < this.#most.length && value > 0) {
      const held = this.#most[lines] as number;
      if (value <= held) return;
      this.#most[lines] = value;
      this.#at[lines] = at;
      if (held === 0) {
        this.#touched.push(lines);
        if (lines > this.#highest) this.#highest = lines;
      }
    } else if (value < 0) {
      if (lines >= this.unknownLines) return;
      this.unknownLines = lines;
      this.unknownAt = at;
    } else if (value > 0) {
      this.#grow(lines);
      this.offer(lines, value, at);
    }
  }

  /** Choices that no other beats in fewer lines and a higher value; empties the room. */
  take(): Reached {
    const most = this.#most;
    let touched = this.#touched;
    // Going through all counts is quicker than sorting those that were touched, unless they are few.
    if (touched.length * 12 < this.#highest) touched.sort((a, b) => a - b);
    else {
      touched = [];
      for (let lines = 1; lines <= this.#highest; lines += 1) if ((most[lines] as number) > 0) touched.push(lines);
    }
    let count = 0;
    let reached = 0;
    for (const lines of touched) {
      const value = most[lines] as number;
      most[lines] = 0;
      if (value <= reached) continue;
      reached = value;
      touched[count++] = lines;
    }
    const lineCounts = new Float64Array(count);
    const at = new Int32Array(count);
    for (let i = 0; i < count; i += 1) {
      const lines = touched[i] as number;
      lineCounts[i] = lines;
      at[i] = this.#at[lines] as number;
    }
    this.#touched.length = 0;
    this.#highest = 0;
    this.unknownLines = Number.POSITIVE_INFINITY;
    this.unknownAt = -1;
    return { lineCounts, at };
  }

  #grow(lines: number): void {
    const [most, at] = [this.#most, this.#at];
    this.#most = new Float64Array(lines * 2);
    this.#at = new Int32Array(lines * 2);
    this.#most.set(most);
    this.#at.set(at);
  }
}
