// Lets one test file run under `deno test` and under Vitest: Deno's import map sends the name
// "vitest" here, while Vitest resolves it to itself.
export {
  after as afterAll,
  afterEach,
  before as beforeAll,
  beforeEach,
  describe,
  it,
} from "node:test";
export { expect } from "expect";
