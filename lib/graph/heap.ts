/**
 * Monotone priority queues of (key, item) pairs for shortest paths, with lazy deletion: an item may
 * be pushed again with a smaller key, and the reader drops what is out of date. A binary heap for any
 * keys, and circular buckets for small integer costs, where push and pop take constant time.
 */

/** What a shortest-path search needs of a queue; keys popped never decrease. */
export interface MonotoneQueue {
  /** The key of the item popped last; 0 after `clear`. */
  key: number;
  /** Adds an item; `key` must be at least the key popped last. */
  push(key: number, item: number): void;
  /** Takes an item with the least key out, or answers -1 when the queue is empty. */
  pop(): number;
  /** Empties the queue and starts again from key 0. */
  clear(): void;
}

/** A binary heap in two typed arrays that grow. O(log n) for each push and pop. */
export class HeapQueue implements MonotoneQueue {
  key = 0;
  #keys = new Float64Array(64);
  #items = new Int32Array(64);
  #size = 0;

  push(key: number, item: number): void {
    if (this.#size === this.#keys.length) this.#grow();
    const keys = this.#keys, items = this.#items;
    let i = this.#size++;
    while (i > 0) {
      const parent = (i - 1) >> 1;
      if (keys[parent] <= key) break;
      keys[i] = keys[parent];
      items[i] = items[parent];
      i = parent;
    }
    keys[i] = key;
    items[i] = item;
  }

  pop(): number {
    if (this.#size === 0) return -1;
    const keys = this.#keys, items = this.#items;
    const top = items[0];
    this.key = keys[0];
    const size = --this.#size;
    const key = keys[size], item = items[size];
    let i = 0;
    for (let child = 1; child < size; child = 2 * i + 1) {
      if (child + 1 < size && keys[child + 1] < keys[child]) child++;
      if (keys[child] >= key) break;
      keys[i] = keys[child];
      items[i] = items[child];
      i = child;
    }
    keys[i] = key;
    items[i] = item;
    return top;
  }

  clear(): void {
    this.#size = 0;
    this.key = 0;
  }

  #grow(): void {
    const keys = new Float64Array(2 * this.#keys.length);
    const items = new Int32Array(2 * this.#items.length);
    keys.set(this.#keys);
    items.set(this.#items);
    this.#keys = keys;
    this.#items = items;
  }
}

/**
 * Circular buckets (R. B. Dial, "Algorithm 360: shortest-path forest with topological ordering",
 * Comm. ACM 12, 1969). Keys are integers below 2^31, and the keys in the queue at any time differ by
 * at most `span`. O(1) for each push; popping takes O(1) and one step for each key passed over.
 */
export class BucketQueue implements MonotoneQueue {
  key = 0;
  #mask: number;
  /**
   * First and last entry of bucket b at 2b and 2b + 1; the first is -1 in an empty bucket. Entries are
   * linked through #next and leave in the order in which they came: a search that goes forth along
   * a whole front of equal keys finds more of its memory at hand than one that runs ahead.
   */
  #ends: Int32Array;
  #items = new Int32Array(1024);
  #next = new Int32Array(1024);
  #free = -1;
  #used = 0;
  #size = 0;

  /** @param span the largest difference between two keys in the queue, below 2^30 */
  constructor(span: number) {
    let size = 1;
    while (size <= span) size *= 2;
    this.#mask = size - 1;
    this.#ends = new Int32Array(2 * size).fill(-1);
  }

  push(key: number, item: number): void {
    let entry = this.#free;
    if (entry >= 0) this.#free = this.#next[entry];
    else {
      entry = this.#used++;
      if (entry === this.#items.length) this.#grow();
    }
    const ends = this.#ends, bucket = 2 * (key & this.#mask);
    this.#items[entry] = item;
    if (ends[bucket] < 0) ends[bucket] = entry;
    else this.#next[ends[bucket + 1]] = entry;
    this.#next[entry] = -1;
    ends[bucket + 1] = entry;
    this.#size++;
  }

  pop(): number {
    if (this.#size === 0) return -1;
    const ends = this.#ends, mask = this.#mask;
    let key = this.key;
    while (ends[2 * (key & mask)] < 0) key++;
    this.key = key;
    const bucket = 2 * (key & mask), entry = ends[bucket];
    ends[bucket] = this.#next[entry];
    this.#next[entry] = this.#free;
    this.#free = entry;
    this.#size--;
    return this.#items[entry];
  }

  clear(): void {
    if (this.#size > 0) this.#ends.fill(-1);
    this.#free = -1;
    this.#used = this.#size = this.key = 0;
  }

  #grow(): void {
    const items = new Int32Array(2 * this.#items.length);
    const next = new Int32Array(2 * this.#next.length);
    items.set(this.#items);
    next.set(this.#next);
    this.#items = items;
    this.#next = next;
  }
}
