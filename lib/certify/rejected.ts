/** Thrown inside the checker at the first thing that is wrong; `check` turns it into a verdict. */
export class Rejected extends Error {
  override readonly name = "Rejected";
}

/** What `run` returns; a rejection in it says where it was. @throws what `run` throws */
export function within<T>(where: string, run: () => T): T {
  try {
    return run();
  } catch (error) {
    throw error instanceof Rejected ? new Rejected(`${where}: ${error.message}`) : error;
  }
}
