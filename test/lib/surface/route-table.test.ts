// Each key value beside the same one by every other route that it names, where the arguments are inconvenient.
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { exact } from "../../../lib/number/convert.ts";
import type { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { carlson } from "../../../lib/surface/carlson.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import { modular } from "../../../lib/surface/modular.ts";
import { routesOf, secondRoute } from "../../../lib/surface/second-route.ts";
import { theta, thetaLogarithmic } from "../../../lib/surface/theta.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(16);
});
afterEach(() => {
  provedDigits(before);
});

const left = exact`-7/3 + 1/5 i`;
const low = exact`-2/3 - 3/2 i`;
const tau = exact`-2/7 + 1/9 i`;
const tall = exact`1/3 + 19 i`;
const L = lattice({ tau: exact`1/3 + 5/4 i` });
const J = jacobi({ m: exact`2/5 + 3/2 i` });

/** The value, and the number of routes that answer at these arguments. */
const VALUES: readonly (readonly [string, number, () => Real | Complex])[] = [
  ["RF, arguments round the origin", 2, () => carlson.RF(left, low, exact`2 i`)],
  ["RF with a zero, one left of the axis", 2, () => carlson.RF(0, left, 3)],
  ["RC, principal value", 2, () => carlson.RC(2, "-3/7")],
  ["RC of complex arguments", 2, () => carlson.RC(left, low)],
  ["RD of complex arguments", 2, () => carlson.RD(left, exact`1 + i`, low)],
  ["RJ, principal value", 1, () => carlson.RJ("1/3", 2, 5, "-7/2")],
  ["RJ, principal value with a zero", 1, () => carlson.RJ(0, 2, 5, "-7/2")],
  ["RJ, arguments round the origin", 1, () => carlson.RJ(left, low, exact`2 i`, exact`-1 + i/3`)],
  ["RG of complex arguments", 2, () => carlson.RG(left, low, 0)],
  ["RG with two zeros", 1, () => carlson.RG(exact`1 + i`, exact`1 - i`, "1e-20")],
  ["K on the cut from above", 2, () => legendre.K({ m: "7/2", side: "above" })],
  ["E on the cut from below", 2, () => legendre.E({ m: "7/2", side: "below" })],
  ["D on the cut from below", 2, () => legendre.D({ m: "7/2", side: "below" })],
  ["B on the cut from above", 2, () => legendre.B({ m: "7/2", side: "above" })],
  ["Π", 1, () => legendre.Pi({ n: "-9/4", m: "4/5" })],
  ["Π, principal value", 1, () => legendre.Pi({ n: "9/4", m: "4/5" })],
  ["Π on the cut", 1, () => legendre.Pi({ n: "-9/4", m: "7/2", side: "below" })],
  ["Π of complex n and m", 1, () => legendre.Pi({ n: exact`3 + i`, m: exact`1/2 - 2 i` })],
  ["F beyond three half turns", 1, () => legendre.F({ phi: "11/2", m: "4/5" })],
  ["F of complex φ and m", 1, () => legendre.F({ phi: exact`1 - 2 i`, m: exact`3 + i` })],
  ["F on the cut", 1, () => legendre.F({ phi: "6/5", m: "7/2", side: "above" })],
  ["E(φ) beyond a half turn", 2, () => legendre.E({ phi: "-9/2", m: "-4/5" })],
  ["E(φ) of complex φ and m", 2, () => legendre.E({ phi: exact`1 - 2 i`, m: exact`3 + i` })],
  ["E(φ) on the cut", 2, () => legendre.E({ phi: "6/5", m: "7/2", side: "below" })],
  ["D(φ)", 1, () => legendre.D({ phi: exact`1/2 + i`, m: "1/3" })],
  ["B(φ)", 1, () => legendre.B({ phi: exact`1/2 + i`, m: "1/3" })],
  ["Π(φ)", 1, () => legendre.Pi({ n: "2/3", phi: "9/4", m: "1/3" })],
  ["Π(φ), principal value", 1, () => legendre.Pi({ n: "9/4", phi: "5/4", m: "1/3" })],
  ["am, real", 2, () => jacobi({ m: "1/3" }).am(7)],
  ["am outside the strip", 1, () => J.am(exact`3 + 2 i`)],
  ["am, m > 1", 1, () => jacobi({ m: "7/2" }).am(2)],
  ["ε", 1, () => J.epsilon(exact`3 + 2 i`)],
  ["ε, m > 1", 1, () => jacobi({ m: "7/2" }).epsilon(2)],
  ["Z", 1, () => J.zeta(exact`3 + 2 i`)],
  ["arcsn", 1, () => J.arcsn(exact`3 + 2 i`)],
  ["arccn of a number on the left", 1, () => J.arccn(exact`-3 + 2 i`)],
  ["arcdc", 1, () => J.arcdc(exact`-1 + 2 i`)],
  ["θ″ far from the cell", 1, () => theta(2, { v: exact`7/3 + 2 i`, tau: exact`1/3 + i` }, { derivative: 2 })],
  ["(ln θ)‴", 1, () => thetaLogarithmic(4, { v: exact`1/3 + 1/5 i`, tau }, { derivative: 3 })],
  ["η", 2, () => modular.eta(tau)],
  ["η far up", 2, () => modular.eta(tall)],
  ["Δ", 2, () => modular.delta(tau)],
  ["the discriminant of Z + Zτ", 2, () => modular.discriminant(tau)],
  ["the discriminant far up", 2, () => modular.discriminant(tall)],
  ["j", 2, () => modular.j(tau)],
  ["λ", 1, () => modular.lambda(tau)],
  ["E_2", 1, () => modular.E(2, tau)],
  ["E_14", 1, () => modular.E(14, tau)],
  ["G_10", 1, () => modular.G(10, tau)],
  ["G_2 by columns", 1, () => modular.G(2, tau, { order: "columns" })],
  ["G_2, symmetric", 1, () => modular.G(2, tau, { order: "symmetric" })],
  ["f", 2, () => modular.weberF(tau)],
  ["f1", 2, () => modular.weberF1(tau)],
  ["f2", 2, () => modular.weberF2(tau)],
  ["℘", 2, () => L.wp(exact`1/3 + 2/7 i`)],
  ["℘‴", 1, () => L.wp.derivative(3)(exact`1/3 + 2/7 i`)],
  ["℘² + ℘′ at a point", 1, () => L.wp.pow(2).plus(L.wp.prime)(L.at("1/3", "2/5"))],
  ["ζ", 1, () => L.zeta(exact`1/3 + 2/7 i`)],
  ["σ", 1, () => L.sigma(exact`1/3 + 2/7 i`)],
];

describe("second routes at inconvenient arguments — oracle: other formulas for the same value", () => {
  it.each(VALUES)("%s: %i or more agree to 12 places", (_name, count, make) => {
    const value = make();
    const opinions = routesOf(value).flatMap((name) => {
      try {
        return [secondRoute(value, name)];
      } catch (error) {
        // A route may hold for fewer arguments, and says so.
        if (error instanceof DomainError) return [];
        throw error;
      }
    });
    const size = Math.max(0, value.abs().toString().split(".")[0]!.length - 1);
    for (const { agree, digits, route } of opinions) {
      expect(agree, route).toBe(true);
      expect(digits, route).toBeGreaterThanOrEqual(12 - size);
    }
    expect(opinions.length).toBeGreaterThanOrEqual(count);
  });

  it("refuses a route where its formula does not hold, and names one that does", () => {
    const value = J.epsilon(exact`3 + 2 i`);
    expect(() => secondRoute(value, "E of the amplitude")).toThrow(/expected real u and m < 1.*"Fourier series"/);
  });
});
