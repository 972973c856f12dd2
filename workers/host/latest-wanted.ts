/**
 * One request at a time to something slow: while it is busy only the latest wish is kept. Busy at first, until the
 * first `free`.
 */
export class LatestWanted {
  #busy = true;
  #wish: number | null = null;

  /** @param ask Sends a request. */
  constructor(private readonly ask: (wish: number) => void) {}

  /** Asks at once when free, else remembers the wish in place of an earlier one. */
  want(wish: number): void {
    if (this.#busy) {
      this.#wish = wish;
      return;
    }
    this.#busy = true;
    this.ask(wish);
  }

  /** The last request is answered; the wish that waited, if any, is asked for now. */
  free(): void {
    const wish = this.#wish;
    this.#wish = null;
    this.#busy = wish !== null;
    if (wish !== null) this.ask(wish);
  }
}
