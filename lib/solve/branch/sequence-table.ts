/** Numbers sequences of integers: equal sequences get equal numbers. A flat hash table. */

export class SequenceTable {
  /** Sequence i stands at starts[i] … starts[i+1]-1 of `data`. */
  #data = new Int32Array(1024);
  #starts = new Int32Array(256);
  #count = 0;
  /** Open addressing; entries are numbers plus one, zero is empty. Length a power of two. */
  #slots = new Int32Array(512);

  get count(): number {
    return this.#count;
  }

  /** The sequence with this number; a view that is valid until the next `number`. */
  at(i: number): Int32Array {
    return this.#data.subarray(this.#starts[i], this.#starts[i + 1]);
  }

  /**
   * Numbers a sequence, from 0 in order of first appearance.
   *
   * @param list its first `size` entries are the sequence
   */
  number(list: ArrayLike<number>, size: number = list.length): number {
    let hash = size;
    for (let i = 0; i < size; i++) hash = Math.imul(hash ^ list[i], 0x9e3779b1) + (hash >>> 15) | 0;
    const mask = this.#slots.length - 1;
    let slot = (hash ^ (hash >>> 16)) & mask;
    for (;;) {
      const entry = this.#slots[slot];
      if (entry === 0) break;
      if (this.#equals(entry - 1, list, size)) return entry - 1;
      slot = (slot + 1) & mask;
    }
    this.#slots[slot] = this.#append(list, size) + 1;
    if (2 * this.#count > this.#slots.length) this.#rehash();
    return this.#count - 1;
  }

  #equals(i: number, list: ArrayLike<number>, size: number): boolean {
    const start = this.#starts[i];
    if (this.#starts[i + 1] - start !== size) return false;
    for (let k = 0; k < size; k++) if (this.#data[start + k] !== list[k]) return false;
    return true;
  }

  #append(list: ArrayLike<number>, size: number): number {
    const start = this.#starts[this.#count];
    if (start + size > this.#data.length) {
      const larger = new Int32Array(2 * (start + size));
      larger.set(this.#data);
      this.#data = larger;
    }
    for (let k = 0; k < size; k++) this.#data[start + k] = list[k];
    if (this.#count + 2 > this.#starts.length) {
      const longer = new Int32Array(2 * this.#starts.length);
      longer.set(this.#starts);
      this.#starts = longer;
    }
    this.#starts[this.#count + 1] = start + size;
    return this.#count++;
  }

  #rehash(): void {
    this.#slots = new Int32Array(2 * this.#slots.length);
    const mask = this.#slots.length - 1;
    for (let i = 0; i < this.#count; i++) {
      const list = this.at(i);
      let hash = list.length;
      for (let k = 0; k < list.length; k++) {
        hash = Math.imul(hash ^ list[k], 0x9e3779b1) + (hash >>> 15) | 0;
      }
      let slot = (hash ^ (hash >>> 16)) & mask;
      while (this.#slots[slot] !== 0) slot = (slot + 1) & mask;
      this.#slots[slot] = i + 1;
    }
  }
}
