/**
 * What branching on a vertex has cost the bound so far, for each vertex and side, per unit of change:
 * side 0 with the vertex chosen, side 1 with it left.
 */
export class PseudoCosts {
  readonly #loss: readonly [Float64Array, Float64Array];
  readonly #trials: readonly [Int32Array, Int32Array];

  /** @param n number of vertices */
  constructor(n: number) {
    this.#loss = [new Float64Array(n), new Float64Array(n)];
    this.#trials = [new Int32Array(n), new Int32Array(n)];
  }

  /** Trials of the side that has been tried less often. */
  trials(v: number): number {
    return Math.min(this.#trials[0][v], this.#trials[1][v]);
  }

  /** The mean loss; `guess` while there has been no trial. */
  mean(side: 0 | 1, v: number, guess: number): number {
    const trials = this.#trials[side][v];
    return trials > 0 ? this.#loss[side][v] / trials : guess;
  }

  learn(side: 0 | 1, v: number, loss: number): void {
    this.#loss[side][v] += loss;
    this.#trials[side][v]++;
  }
}

/** One number for a pair of losses; a vertex is good when both of its cases lose. */
export function branchScore(chosen: number, left: number): number {
  return Math.max(chosen, 1e-9) * Math.max(left, 1e-9);
}
