import fc from "fast-check";
import { expect, it } from "vitest";
import { toCodePoints, toUnits } from "../../../kernel/service/positions.ts";

it("counts code points as the string iterator does — oracle: Array.from", () => {
  fc.assert(
    fc.property(fc.string({ unit: "binary" }), fc.nat(60), (text, position) => {
      const points = Array.from(text);
      const prefix = points.slice(0, position).join("");
      expect(toUnits(text, position)).toBe(prefix.length);
      expect(toCodePoints(text, prefix.length)).toBe(Math.min(position, points.length));
    }),
    { numRuns: 500, seed: 7 },
  );
});

it.each([
  [0, 0],
  [1, 2],
  [2, 3],
  [4, 6],
  [9, 6],
  [1e300, 6],
  [-1, 0],
  [1.9, 2],
  [Number.NaN, 6],
  [Number.POSITIVE_INFINITY, 6],
  [Number.NEGATIVE_INFINITY, 0],
  [undefined, 6],
  ["1", 6],
])("position %s of 😀a\\r😀 is unit %s — oracle: counted by hand", (position, units) => {
  expect(toUnits("😀a\r😀", position)).toBe(units);
});

it("an offset inside a pair counts the pair — oracle: by hand", () => {
  expect([0, 1, 2, 3].map((units) => toCodePoints("😀a", units))).toEqual([0, 1, 1, 2]);
});
