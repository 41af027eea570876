/**
 * An instance: items with exact weights, conflicts with reasons, as arrays. Building takes
 * O(n + m) time beside hashing ids; fingerprint and canonical order are computed when asked for.
 */
import { UndirectedGraph } from "graphology";
import type { Graph } from "../graph/graph.ts";
import { Displayable } from "../run/displayable.ts";
import { assemble, type InstanceParts } from "./assemble.ts";
import { type CanonicalOrder, canonicalOrder, fingerprintOf } from "./fingerprint.ts";
import type { InstanceInput, Row } from "./item.ts";
import { formatScaled } from "./weights.ts";

/** Attributes of a node of `Instance.toGraph`. */
export type NodeAttributes = { weight: number } & Record<string, unknown>;
/** Attributes of an edge of `Instance.toGraph`. */
export type EdgeAttributes = { reasons: string[] };

/**
 * Items, each with a worth, and conflicts between two of them. Nothing changes after building.
 *
 * @example
 * ```ts
 * import { Instance } from "./mod.ts";
 * const instance = Instance.from({
 *   unit: "euros",
 *   items: [{ id: "a", weight: "12.50" }, { id: "b", weight: 7 }],
 *   conflicts: [{ between: ["a", "b"], reason: "same table" }],
 * });
 * console.assert(instance.scale === 10 && instance.weights[0] === 125);
 * ```
 */
export class Instance extends Displayable {
  /** Names the renderer. */
  readonly kind = "instance";
  /** Shown in titles. */
  readonly name: string;
  /** Unit of the weights, such as "euros"; may be empty. */
  readonly unit: string;
  /** Names of the columns that hold id and weight in `items`. */
  readonly columns: { readonly id: string; readonly weight: string };
  /** Length n: the rows as they came, in input order. */
  readonly items: readonly Row[];
  /** Length n: the ids, distinct and not empty. */
  readonly ids: readonly string[];
  /** Length n: weight times `scale`, integers of any sign; their sizes add up to less than 2^53. */
  readonly weights: Float64Array;
  /** Power of ten, the least that makes all weights whole; `weights[i] / scale` is in `unit`. */
  readonly scale: number;
  /** Simple; vertex i is item i, edges by (lesser, greater) end. */
  readonly graph: Graph;
  /** What was done to the input or is worth knowing about it, in sentences. */
  readonly notes: readonly string[];
  readonly #parts: InstanceParts;
  #canonical: CanonicalOrder | undefined;
  #fingerprint: string | undefined;

  /**
   * For readers; callers use `Instance.from`.
   *
   * @param parts as `assemble` gives them
   */
  constructor(parts: InstanceParts) {
    super();
    this.name = parts.name;
    this.unit = parts.unit;
    this.columns = parts.columns;
    this.items = parts.items;
    this.ids = parts.ids;
    this.weights = parts.weights;
    this.scale = parts.scale;
    this.graph = parts.graph;
    this.notes = parts.notes;
    this.#parts = parts;
  }

  /**
   * Builds an instance from rows and pairs of ids.
   *
   * @param input rows with id (non-empty text; a number is taken by its decimal form) and weight
   *   (number, bigint or decimal text), and conflicts between ids
   * @returns the instance; its `notes` tell of merged duplicates and of items worth nothing
   * @throws {InstanceError} listing all problems, each with its row or id
   */
  static from(input: InstanceInput): Instance {
    return new Instance(assemble(input));
  }

  /** Number of items. */
  get size(): number {
    return this.ids.length;
  }

  /** Number of conflicts, duplicates merged. */
  get conflictCount(): number {
    return this.graph.m;
  }

  /** The index of an id, -1 if there is none. O(1) time. */
  indexOf(id: string): number {
    return this.#parts.index.get(id) ?? -1;
  }

  /** The reasons of a conflict, by edge number of `graph`; distinct, in order of the rows. */
  reasonsOf(edge: number): readonly string[] {
    const { start, index, texts } = this.#parts.reasons;
    return Array.from(index.subarray(start[edge], start[edge + 1]), (r) => texts[r]);
  }

  /** Items by id, compared by UTF-16 code units; certificates number items by this rank. */
  get canonical(): CanonicalOrder {
    return this.#canonical ??= canonicalOrder(this.ids, (id) => this.indexOf(id));
  }

  /** SHA-256 of the canonical form, 64 hexadecimal digits; `fingerprint.ts` describes the form. */
  get fingerprint(): string {
    return this.#fingerprint ??= fingerprintOf(
      this.ids,
      this.weights,
      this.scale,
      this.graph,
      this.canonical,
    );
  }

  /** A scaled integer, such as a sum of `weights`, as an exact decimal: 125 at scale 10 is "12.5". */
  decimal(scaled: number): string {
    return formatScaled(scaled, this.scale);
  }

  /** As `decimal`, with the unit where there is one. */
  amount(scaled: number): string {
    return this.unit === "" ? this.decimal(scaled) : `${this.decimal(scaled)} ${this.unit}`;
  }

  /**
   * A graphology graph: one node for each id with the columns of its row and `weight` in units, one
   * undirected edge for each conflict with its `reasons`.
   */
  toGraph(): UndirectedGraph<NodeAttributes, EdgeAttributes> {
    const graph = new UndirectedGraph<NodeAttributes, EdgeAttributes>({ multi: false });
    for (let i = 0; i < this.size; i++) {
      graph.addNode(this.ids[i], { ...this.items[i], weight: this.weights[i] / this.scale });
    }
    const { m, tails, heads } = this.graph;
    for (let e = 0; e < m; e++) {
      graph.addEdge(this.ids[tails[e]], this.ids[heads[e]], { reasons: [...this.reasonsOf(e)] });
    }
    return graph;
  }

  /**
   * The instance as plain data, which `Instance.from` reads back to the same fingerprint: ids as text,
   * weights as exact decimals, other columns as they are (a bigint among them as text).
   */
  toJSON(): InstanceInput & { readonly kind: "instance" } {
    const { id, weight } = this.columns;
    const { m, tails, heads } = this.graph;
    return {
      kind: this.kind,
      name: this.name,
      unit: this.unit,
      id,
      weight,
      items: this.items.map((row, i) => ({
        ...Object.fromEntries(
          Object.entries(row).map(([k, v]) => [k, typeof v === "bigint" ? String(v) : v]),
        ),
        [id]: this.ids[i],
        [weight]: this.decimal(this.weights[i]),
      })),
      conflicts: Array.from({ length: m }, (_, e) => ({
        between: [this.ids[tails[e]], this.ids[heads[e]]] as const,
        reason: this.reasonsOf(e),
      })),
    };
  }

  /** Name, sizes, total worth, the start of the fingerprint, and the notes. */
  override toString(): string {
    let total = 0;
    for (const w of this.weights) if (w > 0) total += w;
    return [
      `${this.name}: ${this.size} items, ${this.conflictCount} conflicts, ` +
      `${this.amount(total)} in all`,
      `fingerprint ${this.fingerprint.slice(0, 16)}`,
      ...this.notes.map((note) => `note: ${note}`),
    ].join("\n");
  }
}
