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

it("the list says once that its places are cited from memory, and no source says it again — oracle: every source of the workings", () => {
  working(curve`y^2 + y = x^3 - x`.lattice());
  expect(sources().caption).toMatch(/from memory/);
  expect(sources().rows.length).toBeGreaterThan(3);
  for (const [, source] of sources().rows) expect(source).not.toMatch(/from memory|common practice/);
});
