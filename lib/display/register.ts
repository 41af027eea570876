/** Names the renderer of each kind of result; `lib/mod.ts` calls this once when it is loaded. */
import type { Solution } from "../certify/solution.ts";
import type { Verdict } from "../certify/verdict.ts";
import type { Instance } from "../instance/instance.ts";
import type { Decomposition } from "../reduce/decomposition.ts";
import type { Replacement } from "../reduce/replacement.ts";
import type { Classification } from "../reduce/classify.ts";
import { registerRenderer } from "../run/displayable.ts";
import { renderClassification } from "./classification.ts";
import { renderDecomposition } from "./decomposition.ts";
import { renderInstance } from "./instance.ts";
import { type Picture, renderPicture } from "./picture.ts";
import { renderReplacement } from "./replacement.ts";
import { renderSolution } from "./solution.ts";
import { renderVerdict } from "./verdict.ts";
import { renderWeightChart, type WeightChart } from "./weight-chart.ts";

/** Fills the registry of renderers. Calling it twice does no harm. */
export function registerRenderers(): void {
  registerRenderer<Classification>("classification", renderClassification);
  registerRenderer<Instance>("instance", renderInstance);
  registerRenderer<Decomposition>("decomposition", renderDecomposition);
  registerRenderer<Replacement>("replacement", renderReplacement);
  registerRenderer<Solution>("solution", renderSolution);
  registerRenderer<Verdict>("verdict", renderVerdict);
  registerRenderer<Picture>("picture", renderPicture);
  registerRenderer<WeightChart>("weight-chart", renderWeightChart);
}
