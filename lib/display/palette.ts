/**
 * The colours of all pictures. Told apart by people with any of the common colour deficiencies, and
 * by lightness alone on a grey printer. Pictures bring their own light ground, so they read the same
 * in a dark notebook.
 */
export const PALETTE = {
  /** Ground of pictures. */
  ground: "#fbfaf6",
  /** Text, and lines that carry meaning. */
  ink: "#22303c",
  /** Text that explains. */
  faint: "#66717b",
  /** Conflicts, axes. */
  line: "#aab3ba",
  /** Chosen items. */
  chosen: "#12608c",
  /** Refused items. */
  refused: "#f0c987",
  /** Items that are neither: nothing was decided in this picture. */
  plain: "#cfd8de",
  /** What the reader should look at first: odd cycles, the least cut. */
  accent: "#bf3b21",
  /** Second thing to look at: another odd cycle. */
  second: "#6a3d9a",
  /** Blocks beside the core, by turns. */
  blocks: ["#7fb069", "#c792b8", "#d9a441", "#78b7b0", "#a59fd0", "#b8a07e"],
} as const;
