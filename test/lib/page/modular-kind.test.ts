import { describe, expect, it } from "vitest";
import { exact } from "../../../lib/number/convert.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { modular } from "../../../lib/surface/modular.ts";

describe("class polynomials, expansions and moved points on a page", () => {
  it("a class polynomial is one formula with grouped digits and its discriminant", () => {
    const shown = bundle(modular.classPolynomial(-15))!;
    expect(shown["text/plain"]).toBe("X^2 + 191025 X - 121287375");
    expect(shown["text/latex"]).toContain("H_{-15}(X) = X^{2} + 191\\,025\\, X - 121\\,287\\,375");
  });

  it("a long expansion is broken into lines and names its nome", () => {
    const shown = bundle(modular.expansion("delta", { terms: 30 }))!;
    expect(shown["text/plain"]).toMatch(/^q_mod - 24 q_mod\^2 \+ 252 q_mod\^3[^\n]*O\(q_mod\^31\)\nnome: /);
    expect(String(shown["text/latex"]).split("\\quad").length).toBeGreaterThan(3);
  });

  it("a moved point shows matrix, image, factor and the multiplier of η", () => {
    const shown = String(
      bundle(
        modular.act(
          [
            [0, -1],
            [1, 0],
          ],
          exact`1/2 + i`,
        ),
      )!["text/plain"],
    );
    expect(shown).toContain("M = [[0, -1], [1, 0]]");
    expect(shown).toContain("Mτ = -2/5 + 4/5 i");
    expect(shown).toContain("η(Mτ) = exp(2πi·21/24) (cτ + d)^(1/2) η(τ)");
  });

  it("values of integrals name the convention of the modulus", () => {
    expect(String(bundle(jacobi({ m: "1/2" }).sn(1))!["text/plain"])).toMatch(/\nmodulus: parameter m = k²/);
    expect(String(bundle(jacobi({ m: "1/2" }))!["text/plain"])).toMatch(/^Jacobi functions with m = 1\/2, m1 = 1\/2/);
  });
});
