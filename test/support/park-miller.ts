/**
 * The generator "minimal standard" (S. K. Park and K. W. Miller, "Random number generators: good ones
 * are hard to find", Commun. ACM 31, 1988; multiplier 48271): short enough to be repeated in another
 * language, so that recorded values need no recorded input. Mirrors test/fixtures/record-flows.py.
 */
export class ParkMiller {
  #state: number;

  /** @param seed an integer from 1 to 2^31 - 2 */
  constructor(seed: number) {
    this.#state = seed;
    for (let i = 0; i < 8; i++) this.below(1);
  }

  /** An integer from 0 to n - 1; the products stay below 2^53. */
  below(n: number): number {
    this.#state = (this.#state * 48271) % 2147483647;
    return this.#state % n;
  }
}

/** The values that networkx found, by seed - 1; see test/fixtures/record-flows.py. */
export interface RecordedFlows {
  readonly networkx: string;
  readonly flows: readonly number[];
  readonly matchings: readonly number[];
  readonly relaxations: readonly number[];
}
