/** What a call refuses. */
import { InstanceError } from "../../lib/run/errors.ts";

/** The problems of the InstanceError that a call throws; other outcomes fail the test. */
export async function problemsOf(call: () => unknown): Promise<readonly string[]> {
  try {
    await call();
  } catch (error) {
    if (error instanceof InstanceError) return error.problems;
    throw error;
  }
  throw new Error("expected an InstanceError, but the call went through");
}
