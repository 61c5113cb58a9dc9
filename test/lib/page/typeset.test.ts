import { afterEach, expect, it } from "vitest";
import { type DisplayOptions, setPageHost } from "../../../lib/page/host.ts";
import { tex, typeset } from "../../../lib/page/typeset.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

afterEach(() => setPageHost());

it("typeset hands the bundle and its options to the host — oracle: a host that keeps what it is given", () => {
  const seen: [string, DisplayOptions][] = [];
  setPageHost({ display: (bundle, options) => void seen.push([bundle["text/plain"], options]) });
  expect(typeset(curve`y^2 = x^3 - x`)).toBeUndefined();
  typeset(7, { displayId: "seven", update: true });
  expect(seen[0]![0]).toBe("y^2 = x^3 - x over Q");
  expect(seen[1]).toEqual(["7", { displayId: "seven", update: true }]);
});

it("tex is a formula without delimiters", () => {
  expect(tex(curve`y^2 = x^3 - x`)).toBe("y^{2} = x^{3} - x \\quad \\text{over } \\mathbb{Q}");
});
