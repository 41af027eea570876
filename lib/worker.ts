/// <reference no-default-lib="true" />
/// <reference lib="deno.worker" />
/** The one entry of worker threads: receives an order, runs its job, answers. */
import { type Order, type Reply, serve } from "./run/aside.ts";
import { highsJob } from "./polytope/highs-aside.ts";
import { classifyJob } from "./reduce/classify.ts";
import { decomposeJob } from "./reduce/decompose.ts";
import { replaceBlocksJob } from "./reduce/replace-blocks.ts";
import { solveJob } from "./solve/solve.ts";

self.onmessage = ({ data }: MessageEvent<Order>) => {
  serve(
    data,
    {
      solve: solveJob,
      highs: highsJob,
      classify: classifyJob,
      decompose: decomposeJob,
      "replace blocks": replaceBlocksJob,
    },
    (reply: Reply) => self.postMessage(reply),
  );
};
