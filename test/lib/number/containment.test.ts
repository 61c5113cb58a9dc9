import fc from "fast-check";
import { describe, it } from "vitest";
import { properties } from "./containment.ts";
import { discProperties } from "./disc-cases.ts";

// The long run is containment.slow.test.ts; here each operation gets enough cases to catch a gross slip at once.
describe("operations on enclosures hold what they enclose — oracle: exact arithmetic or three times the precision", () => {
  for (const { name, property } of [...properties, ...discProperties]) {
    it(name, () => {
      fc.assert(property, { numRuns: 120, seed: 20_230_613 });
    });
  }
});
