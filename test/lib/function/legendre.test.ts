import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { carlsonRG } from "../../../lib/function/carlson-second.ts";
import { carlsonRD } from "../../../lib/function/carlson-third.ts";
import {
  completeB,
  completeD,
  completeE,
  completeK,
  completePi,
  type Modulus,
} from "../../../lib/function/legendre-complete.ts";
import {
  incompleteB,
  incompleteD,
  incompleteE,
  incompleteF,
  incompletePi,
} from "../../../lib/function/legendre-incomplete.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { DomainError, PoleError } from "../../../lib/proof/errors.ts";
import { entries, expectDigits, read, readWithComplement, type Text } from "./reference.ts";

const PREC = 200;

function modulus(text: Text): Modulus {
  const { x, x1 } = readWithComplement(text, 2 * PREC);
  return { m: x, m1: x1 };
}
function characteristic(text: Text) {
  const { x, x1 } = readWithComplement(text, 2 * PREC);
  return { n: x, n1: x1 };
}
const angle = (text: Text) => read(text, 2 * PREC);

describe("Legendre's integrals — oracle: Abramowitz & Stegun and independent programs, 50 digits", () => {
  it.each(entries("integrals", "complete_K"))("K $id", ({ input, expected, digits }) => {
    expectDigits(completeK(modulus(input.m), PREC), expected, digits);
  });
  it.each(entries("integrals", "complete_E"))("E $id", ({ input, expected, digits }) => {
    expectDigits(completeE(modulus(input.m), PREC), expected, digits);
  });
  it.each(entries("integrals", "complete_Pi"))("Π $id", ({ input, expected, digits }) => {
    expectDigits(completePi(characteristic(input.n), modulus(input.m), PREC), expected, digits);
  });
  it.each(entries("integrals", "incomplete_F"))("F(φ) $id", ({ input, expected, digits }) => {
    expectDigits(incompleteF(angle(input.phi), modulus(input.m), PREC), expected, digits);
  });
  it.each(entries("integrals", "incomplete_E"))("E(φ) $id", ({ input, expected, digits }) => {
    expectDigits(incompleteE(angle(input.phi), modulus(input.m), PREC), expected, digits);
  });
  it.each(entries("integrals", "incomplete_Pi"))("Π(φ) $id", ({ input, expected, digits }) => {
    expectDigits(incompletePi(characteristic(input.n), angle(input.phi), modulus(input.m), PREC), expected, digits);
  });
});

/** m with 1 − m from a fraction of 2^bits, so that both ends are met. */
const near01 = fc
  .tuple(fc.integer({ min: 1, max: 999 }), fc.integer({ min: 10, max: 200 }), fc.boolean())
  .map(([n, bits, swap]): Modulus => {
    const small: Disc = { re: BigInt(n), im: 0n, exp: -bits, rad: 0, axis: "real" };
    const large = disc.sub(disc.one, small, 400);
    return swap ? { m: small, m1: large } : { m: large, m1: small };
  });
const complexModulus = fc
  .tuple(fc.integer({ min: -4000, max: 4000 }), fc.integer({ min: 1, max: 4000 }), fc.boolean())
  .map(([re, im, up]): Modulus => {
    const m: Disc = {
      re: BigInt(re),
      im: BigInt(up ? im : -im),
      exp: -10,
      rad: 0,
      axis: re === 0 ? "imaginary" : "plane",
    };
    return { m, m1: disc.sub(disc.one, m, 400) };
  });
const phi = fc
  .integer({ min: -6000, max: 6000 })
  .filter((n) => n !== 0)
  .map((n): Disc => ({ re: BigInt(n), im: 0n, exp: -10, rad: 0, axis: "real" }));
const smallPhi = fc
  .tuple(fc.integer({ min: 1, max: 1500 }), fc.integer({ min: -1000, max: 1000 }))
  .map(([re, im]): Disc => ({ re: BigInt(re), im: BigInt(im), exp: -10, rad: 0, axis: im === 0 ? "real" : "plane" }));
const RUNS = { numRuns: 100, seed: 1_825 };
const swap = ({ m, m1 }: Modulus): Modulus => ({ m: m1, m1: m });
const product = (x: Disc, y: Disc) => disc.mul(x, y, PREC);
const sum = (x: Disc, y: Disc) => disc.add(x, y, PREC);

describe("Legendre's integrals against each other", () => {
  it("E K′ + E′ K − K K′ = π/2 — oracle: Legendre's relation, DLMF 19.7.1", () => {
    fc.assert(
      fc.property(fc.oneof(near01, complexModulus), (k) => {
        const [K, E] = [completeK(k, PREC), completeE(k, PREC)];
        const [K1, E1] = [completeK(swap(k), PREC), completeE(swap(k), PREC)];
        const left = disc.sub(sum(product(E, K1), product(E1, K)), product(K, K1), PREC);
        expect(disc.overlaps(left, disc.fromBall(ball.ldexp(ball.pi(PREC), -1)))).toBe(true);
        expect(disc.bits(E)).toBeGreaterThan(190);
      }),
      RUNS,
    );
  });

  it("near m = 1 and m = 0 every complete integral keeps its digits, and K = B + D, E = B + m1 D — oracle: identity of integrands", () => {
    fc.assert(
      fc.property(near01, (k) => {
        const [B, D] = [completeB(k, PREC), completeD(k, PREC)];
        for (const x of [B, D]) expect(disc.bits(x)).toBeGreaterThan(190);
        expect(disc.overlaps(completeK(k, PREC), sum(B, D))).toBe(true);
      }),
      RUNS,
    );
  });

  it("F = B + D, E = F − m D at any real φ and m in (0, 1) — oracle: identity of integrands, two routes of Carlson's", () => {
    fc.assert(
      fc.property(phi, near01, (x, k) => {
        const [F, E, B, D] = [incompleteF, incompleteE, incompleteB, incompleteD].map((f) => f(x, k, PREC)) as [
          Disc,
          Disc,
          Disc,
          Disc,
        ];
        expect(disc.overlaps(F, sum(B, D))).toBe(true);
        expect(disc.overlaps(E, disc.sub(F, product(k.m, D), PREC))).toBe(true);
        for (const value of [F, E, B, D]) expect(disc.bits(value)).toBeGreaterThan(180);
      }),
      RUNS,
    );
  });

  it("Π(0) = F, Π(m) = (E − m sin φ cos φ/Δ)/m1 — oracle: DLMF 19.6.12, 19.6.13", () => {
    fc.assert(
      fc.property(smallPhi, complexModulus, (x, k) => {
        const wp = 260;
        const none = { n: disc.zero, n1: disc.one };
        expect(disc.overlaps(incompletePi(none, x, k, PREC), incompleteF(x, k, PREC))).toBe(true);
        const { sin, cos } = disc.sinCos(x, wp);
        const delta = disc.sqrt(disc.sub(disc.one, disc.mul(k.m, disc.sqr(sin, wp), wp), wp), wp);
        const part = disc.div(disc.mul(k.m, disc.mul(sin, cos, wp), wp), delta, wp);
        const right = disc.div(disc.sub(incompleteE(x, k, wp), part, wp), k.m1, wp);
        expect(disc.overlaps(incompletePi({ n: k.m, n1: k.m1 }, x, k, PREC), right)).toBe(true);
      }),
      RUNS,
    );
  });

  it("φ = π/2, known to 200 bits only, meets the complete integrals — oracle: the complete routes (mean, Carlson at 0)", () => {
    fc.assert(
      fc.property(near01, (k) => {
        const half = disc.fromBall(ball.ldexp(ball.pi(PREC), -1));
        expect(disc.overlaps(incompleteF(half, k, PREC), completeK(k, PREC))).toBe(true);
        expect(disc.overlaps(incompleteE(half, k, PREC), completeE(k, PREC))).toBe(true);
        const n = { n: read("-3/7", PREC), n1: read("10/7", PREC) };
        expect(disc.overlaps(incompletePi(n, half, k, PREC), completePi(n, k, PREC))).toBe(true);
      }),
      RUNS,
    );
  });
});

describe("second routes of the complete integrals", () => {
  it("E = 2 RG(0, m1, 1), D = RD(0, m1, 1)/3, B = m1 RD(0, 1, m1)/3 — oracle: Carlson's duplication against the mean, DLMF 19.25.1", () => {
    fc.assert(
      fc.property(fc.oneof(near01, complexModulus), (k) => {
        const third = (x: Disc) => disc.divBall(x, ball.fromInt(3), PREC);
        const E = disc.ldexp(carlsonRG(disc.zero, k.m1, disc.one, PREC), 1);
        expect(disc.overlaps(completeE(k, PREC), E)).toBe(true);
        expect(disc.overlaps(completeD(k, PREC), third(carlsonRD(disc.zero, k.m1, disc.one, PREC)))).toBe(true);
        const B = third(product(k.m1, carlsonRD(disc.zero, disc.one, k.m1, PREC)));
        expect(disc.overlaps(completeB(k, PREC), B)).toBe(true);
      }),
      RUNS,
    );
  });

  it("coarse real enclosures of m are taken at their ends: E([0.3, 0.7]) — oracle: sharp values inside and at the ends", () => {
    const wide: Modulus = {
      m: { re: 5n << 20n, im: 0n, exp: -20, rad: 2 * 2 ** 20, axis: "real" },
      m1: disc.zero,
    };
    const tenth = (d: Disc) => disc.divBall(d, ball.fromInt(10), 60);
    const k = { m: tenth(wide.m), m1: tenth({ ...wide.m }) };
    for (const f of [completeE, completeD, completeB]) {
      const value = f(k, 60);
      for (const m of ["0.3", "0.5", "0.7"]) expect(disc.overlaps(value, f(modulus(m), 100)), m).toBe(true);
      const spread = disc.sub(f(modulus("0.3"), 60), f(modulus("0.7"), 60), 60);
      expect(2 * value.rad * 2 ** value.exp).toBeLessThan(1.01 * Math.abs(disc.toDouble(spread)[0]));
    }
  });
});

describe("Legendre's integrals refuse, and say why", () => {
  it("m = 1 is a pole of K, and E(1) = 1", () => {
    expect(() => completeK(modulus("1"), 60)).toThrow(PoleError);
    expect(completeE(modulus("1"), 60)).toEqual(disc.one);
  });
  it("a real m > 1 names the cut and its sides", () => {
    expect(() => completeK(modulus("1.5"), 60)).toThrow(DomainError);
    expect(() => completeE(modulus("1.5"), 60)).toThrow(/side: "above"/);
  });
  it("m sin²φ > 1", () => {
    expect(() => incompleteF(angle("1.5"), modulus("2"), 60)).toThrow(/branch point/);
  });
});
