/** Thrown inside the checker at the first thing that is wrong; `check` turns it into a verdict. */
export class Rejected extends Error {
  override readonly name = "Rejected";
}
