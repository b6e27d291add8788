/** How a search reports and is ended from outside: no clock, no thread of its own. */
export interface SearchControl {
  /** Asked often; true ends the search with what it has. */
  readonly stopped?: () => boolean;
  /** Told now and then: share of the work done, 0 to 1. */
  readonly progress?: (share: number) => void;
}

/** Thrown inside the search room alone, to leave deep loops when the search is stopped; `search` catches it. */
export class SearchStopped extends Error {}

/** Counts work and asks every so often whether to go on. */
export class Pulse {
  readonly #control: SearchControl;
  #count = 0;
  /** Ways formed: pairs of a line state and a signal state whose figures were computed. */
  formed = 0;

  constructor(control: SearchControl) {
    this.#control = control;
  }

  /** One piece of work done. */
  beat(): void {
    this.#count += 1;
    if ((this.#count & 255) === 0 && this.#control.stopped?.() === true) throw new SearchStopped();
  }

  report(share: number): void {
    if (this.#control.stopped?.() === true) throw new SearchStopped();
    this.#control.progress?.(share);
  }
}
