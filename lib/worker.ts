/// <reference no-default-lib="true" />
/// <reference lib="deno.worker" />
/** The one entry of worker threads: receives an order, runs its job, answers. */
import { type Order, type Reply, serve } from "./run/aside.ts";
import { solveJob } from "./solve/solve.ts";

self.onmessage = ({ data }: MessageEvent<Order>) => {
  serve(data, { solve: solveJob }, (reply: Reply) => self.postMessage(reply));
};
