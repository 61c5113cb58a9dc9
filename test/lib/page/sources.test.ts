import { expect, it } from "vitest";
import { derivation } from "../../../lib/page/derivation.ts";
import { sources } from "../../../lib/page/sources.ts";
import { working } from "../../../lib/page/working.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

it("sources are listed once, in the order of their first use", () => {
  derivation("a")
    .step("one", { source: "a letter" })
    .step("two", { source: "a book" })
    .step("three", { source: "a letter" });
  expect(sources().rows.map(([, source]) => source)).toEqual(["a letter", "a book"]);
  working(curve`y^2 + y = x^3 - x`.torsion());
  expect(sources().rows.length).toBeGreaterThan(2);
});

it("a place in a book that was not looked up says so — oracle: every source of the workings", () => {
  working(curve`y^2 + y = x^3 - x`.lattice());
  for (const [, source] of sources().rows.slice(2)) expect(source).toMatch(/^common practice.*from memory/);
});
