import fc from "fast-check";
import { describe, it } from "vitest";
import { properties } from "./containment.ts";
import { discProperties } from "./disc-cases.ts";

const SEEDS = [7, 1_729, 20_231_117];
const all = [...properties, ...discProperties];
/** At least 100,000 cases over all operations. */
const RUNS = Math.ceil(105_000 / (all.length * SEEDS.length));

describe("operations on enclosures hold what they enclose, 100,000 cases — oracle: exact arithmetic or three times the precision", () => {
  for (const { name, property } of all) {
    it(name, () => {
      for (const seed of SEEDS) fc.assert(property, { numRuns: RUNS, seed });
    });
  }
});
