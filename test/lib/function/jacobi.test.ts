import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { jacobiAmplitude } from "../../../lib/function/jacobi-amplitude.ts";
import { jacobiInverse } from "../../../lib/function/jacobi-inverse.ts";
import { jacobiEpsilon, jacobiZeta } from "../../../lib/function/jacobi-second.ts";
import { type JacobiName, jacobiValues } from "../../../lib/function/jacobi-values.ts";
import { completeK, type Modulus } from "../../../lib/function/legendre-complete.ts";
import { incompleteE, incompleteF } from "../../../lib/function/legendre-incomplete.ts";
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

describe("Jacobi's functions — oracle: Abramowitz & Stegun chapter 16 and theta series of an independent program, 45 digits", () => {
  const names = ["sn", "cn", "dn"] as const;
  for (const { id, input, expected, digits } of entries("integrals", "jacobi_functions")) {
    const u = read(input.u, 2 * PREC);
    const k = modulus(input.m);
    it(`${id} ${JSON.stringify(input)}`, () => {
      const values = jacobiValues(names, u, k, PREC);
      names.forEach((name, n) => {
        expectDigits(values[n]!, expected[name], digits - 1);
      });
      if (expected.am) expectDigits(jacobiAmplitude(u, k, PREC), expected.am, digits - 1);
      if (expected.jacobi_epsilon) expectDigits(jacobiEpsilon(u, k, PREC), expected.jacobi_epsilon, digits - 1);
      if (expected.jacobi_zeta) expectDigits(jacobiZeta(u, k, PREC), expected.jacobi_zeta, digits - 1);
    });
  }
  for (const name of ["dn", "cs", "sn", "sc", "nc"] as const) {
    it.each(entries("integrals", `jacobi_${name}`))(`${name} $id`, ({ input, expected, digits }) => {
      const [value] = jacobiValues([name], read(input.u, 2 * PREC), modulus(input.m), PREC) as [Disc];
      expectDigits(value, expected, digits - 1);
    });
  }
});

const real = fc
  .integer({ min: -9000, max: 9000 })
  .map((n): Disc => ({ re: BigInt(n), im: 0n, exp: -10, rad: 0, axis: "real" }));
const plane = fc
  .tuple(fc.integer({ min: -4000, max: 4000 }), fc.integer({ min: -4000, max: 4000 }))
  .filter(([re, im]) => re !== 0 && im !== 0)
  .map(([re, im]): Disc => ({ re: BigInt(re), im: BigInt(im), exp: -10, rad: 0, axis: "plane" }));
const realModulus = fc
  .tuple(fc.integer({ min: 1, max: 999 }), fc.integer({ min: 10, max: 150 }), fc.boolean())
  .map(([n, bits, swap]): Modulus => {
    const small: Disc = { re: BigInt(n), im: 0n, exp: -bits, rad: 0, axis: "real" };
    const large = disc.sub(disc.one, small, 400);
    return swap ? { m: small, m1: large } : { m: large, m1: small };
  });
const anyModulus = fc
  .tuple(fc.integer({ min: -5000, max: 5000 }), fc.oneof(fc.constant(0), fc.integer({ min: -4000, max: 4000 })))
  .filter(([re, im]) => im !== 0 || (re !== 0 && re !== 1024))
  .map(([re, im]): Modulus => {
    const m: Disc = {
      re: BigInt(re),
      im: BigInt(im),
      exp: -10,
      rad: 0,
      axis: im === 0 ? "real" : re === 0 ? "imaginary" : "plane",
    };
    return { m, m1: disc.sub(disc.one, m, 400) };
  });
const RUNS = { numRuns: 100, seed: 1_829 };
const mul = (x: Disc, y: Disc) => disc.mul(x, y, PREC);
const add = (x: Disc, y: Disc) => disc.add(x, y, PREC);

describe("Jacobi's functions anywhere", () => {
  it("sn² + cn² = 1, dn² + m sn² = 1 for every m and u — oracle: DLMF 22.6.1", () => {
    fc.assert(
      fc.property(plane, anyModulus, (u, k) => {
        const [s, c, d] = jacobiValues(["sn", "cn", "dn"], u, k, PREC) as [Disc, Disc, Disc];
        expect(disc.overlaps(add(mul(s, s), mul(c, c)), disc.one)).toBe(true);
        expect(disc.overlaps(add(mul(d, d), mul(k.m, mul(s, s))), disc.one)).toBe(true);
        for (const x of [s, c, d]) expect(disc.bits(x)).toBeGreaterThan(PREC - 30);
      }),
      RUNS,
    );
  });

  it("sn(u + w) by the addition theorem — oracle: DLMF 22.8.1, at complex u, w and any m", () => {
    fc.assert(
      fc.property(plane, real, anyModulus, (u, w, k) => {
        const [s1, c1, d1] = jacobiValues(["sn", "cn", "dn"], u, k, 300) as [Disc, Disc, Disc];
        const [s2, c2, d2] = jacobiValues(["sn", "cn", "dn"], w, k, 300) as [Disc, Disc, Disc];
        const m3 = (a: Disc, b: Disc, c: Disc) => disc.mul(disc.mul(a, b, 300), c, 300);
        const top = disc.add(m3(s1, c2, d2), m3(s2, c1, d1), 300);
        const square = disc.sqr(disc.mul(s1, s2, 300), 300);
        const bottom = disc.sub(disc.one, disc.mul(k.m, square, 300), 300);
        const [sum] = jacobiValues(["sn"], disc.add(u, w, 300), k, PREC) as [Disc];
        expect(disc.overlaps(disc.mul(sum, bottom, 300), top)).toBe(true);
      }),
      RUNS,
    );
  });

  it("near m = 0 and m = 1 nothing is lost: dn ≠ 1, cn ≠ dn — oracle: 1 − dn² = m sn², dn² − cn² = m1 sn² at high precision", () => {
    fc.assert(
      fc.property(real, realModulus, (u, k) => {
        fc.pre(!disc.isZero(u));
        const [s, c, d] = jacobiValues(["sn", "cn", "dn"], u, k, 800) as [Disc, Disc, Disc];
        const wide = (x: Disc, y: Disc) => disc.mul(x, y, 800);
        expect(disc.overlaps(disc.sub(wide(d, d), wide(c, c), 800), wide(k.m1, wide(s, s)))).toBe(true);
        for (const x of jacobiValues(["sn", "cn", "dn", "nc", "nd", "cd"], u, k, PREC)) {
          expect(disc.bits(x)).toBeGreaterThan(PREC - 30);
          expect(x.axis).toBe("real");
        }
      }),
      RUNS,
    );
  });

  it("F(am u) = u and E(am u) = ε(u) — oracle: Carlson's integrals against theta functions", () => {
    fc.assert(
      fc.property(real, realModulus, (u, k) => {
        fc.pre(!disc.isZero(u));
        const am = jacobiAmplitude(u, k, PREC);
        expect(disc.overlaps(incompleteF(am, k, PREC), u)).toBe(true);
        expect(disc.overlaps(incompleteE(am, k, PREC), jacobiEpsilon(u, k, PREC))).toBe(true);
      }),
      RUNS,
    );
  });

  it("Z has the period 2K and ε(u + w) its addition theorem — oracle: DLMF 22.16.34, 22.16(ii)", () => {
    fc.assert(
      fc.property(plane, real, anyModulus, (u, w, k) => {
        const sum = disc.add(u, w, PREC);
        const [su] = jacobiValues(["sn"], u, k, PREC) as [Disc];
        const [sw] = jacobiValues(["sn"], w, k, PREC) as [Disc];
        const [ss] = jacobiValues(["sn"], sum, k, PREC) as [Disc];
        const right = disc.sub(
          add(jacobiEpsilon(u, k, PREC), jacobiEpsilon(w, k, PREC)),
          mul(k.m, mul(su, mul(sw, ss))),
          PREC,
        );
        expect(disc.overlaps(jacobiEpsilon(sum, k, PREC), right)).toBe(true);
      }),
      RUNS,
    );
  });

  it("each inverse undoes its function — oracle: theta functions against Carlson's RF", () => {
    const names = ["sn", "ns", "sc", "cs", "sd", "ds", "cn", "nc", "dn", "nd", "cd", "dc"] as const;
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 4095 }), realModulus, fc.constantFrom(...names), (n, k, name) => {
        // u in (0, K), and beyond it for the even pair.
        const K = completeK(k, 400);
        const reach = name === "cn" || name === "nc" || name === "cd" || name === "dc" ? 1 : 0;
        const u = disc.ldexp(disc.mulInt(K, n, 400), reach - 12);
        fc.pre(n % 1024 !== 0);
        const [x] = jacobiValues([name], u, k, 380) as [Disc];
        expect(disc.overlaps(jacobiInverse(name, x, k, PREC), u)).toBe(true);
      }),
      RUNS,
    );
  });

  it("complex inverses: sn(arcsn x) = x — oracle: theta functions against Carlson's RF", () => {
    fc.assert(
      fc.property(plane, fc.constantFrom<JacobiName>("sn", "cn", "sc", "sd", "cd", "ns"), realModulus, (x, name, k) => {
        const u = jacobiInverse(name, x, k, 300);
        const [back] = jacobiValues([name], u, k, PREC) as [Disc];
        expect(disc.overlaps(back, x)).toBe(true);
      }),
      RUNS,
    );
  });

  it.each([
    ["1", "5", "0.5", "0", "1.9399772422407732381", "-0.9860396186525258498"],
    ["12", "5", "0.5", "0", "-1.1243269113955893358", "-1.0547961862995504145"],
    ["20", "0", "0.5", "0.25", undefined, undefined],
    ["3", "2", "3", "0", "3.840916590172852619", "-0.0015935250877608349141"],
    ["3", "2", "-2", "0", "2.3953003812028632983", "0.0029871795517947754335"],
    ["1", "5", "1", "0", "1.3339532491619667833", "-0.72733948313387601327"],
  ])(
    "am(%s + %s i | %s + %s i) — oracle: quadrature of dn along the segment (mpmath 1.2.1, 20 digits); e^(i am) = cn + i sn",
    (x, y, re, im, a, b) => {
      const [u, k] = [read({ re: x, im: y }, 200), modulus(im === "0" ? re : { re, im })];
      const am = jacobiAmplitude(u, k, PREC);
      if (a && b) expectDigits(am, { re: a, im: b }, 19);
      const [sn, cn] = jacobiValues(["sn", "cn"], u, k, PREC) as [Disc, Disc];
      expect(disc.overlaps(disc.exp(disc.mulI(am), PREC), add(cn, disc.mulI(sn)))).toBe(true);
      expect(disc.overlaps(jacobiAmplitude(disc.neg(u), k, PREC), disc.neg(am))).toBe(true);
    },
  );

  it("am steps by little where u does, for any m — oracle: |am(u + h) − am(u) − h dn(u)| is of order h²", () => {
    fc.assert(
      fc.property(plane, anyModulus, (u, k) => {
        fc.pre(!disc.isZero(u));
        const h: Disc = { re: 1n, im: 0n, exp: -40, rad: 0, axis: "real" };
        const [dn] = jacobiValues(["dn"], u, k, PREC) as [Disc];
        const step = disc.sub(jacobiAmplitude(add(u, h), k, PREC), jacobiAmplitude(u, k, PREC), PREC);
        const gap = disc.abs(disc.sub(step, mul(h, dn), PREC), 60);
        // The ray through a pole of dn may pass between u and u + h: then the step is off by 2π, which 40 points did not meet.
        expect(ball.magnitude(gap)).toBeLessThan(-60);
      }),
      { numRuns: 40, seed: 1_829 },
    );
  });

  it("imaginary u gives imaginary sn and real cn, dn", () => {
    const [s, c, d] = jacobiValues(["sn", "cn", "dn"], read({ re: "0", im: "0.4" }, 60), modulus("0.3"), 60) as Disc[];
    expect([s!.axis, c!.axis, d!.axis]).toEqual(["imaginary", "real", "real"]);
  });

  it("a pole is named, also where it lies on the way of am", () => {
    expect(() => jacobiValues(["ns"], disc.zero, modulus("0.3"), 60)).toThrow(PoleError);
    const k = modulus("0.5");
    const iK = disc.mulI(completeK({ m: k.m1, m1: k.m }, 100));
    expect(() => jacobiValues(["sn"], iK, k, 60)).toThrow(PoleError);
    expect(() => jacobiValues(["sn"], iK, k, 60)).toThrow(/the pole iK′; .*zeros of ns/);
    const K = completeK(k, 100);
    const far = disc.add(disc.mulInt(K, -3, 100), disc.mulInt(iK, 5, 100), 100);
    expect(() => jacobiValues(["nd"], far, k, 60)).toThrow(/the pole −3K \+ 5iK′/);
    expect(() => jacobiValues(["sc"], K, k, 60)).toThrow(/the pole K;/);
    const circular = { m: disc.zero, m1: disc.one };
    const half = disc.fromBall(ball.ldexp(ball.pi(100), -1));
    expect(() => jacobiValues(["sc"], half, circular, 60)).toThrow(/the pole K;/);
    expect(() => jacobiValues(["sn"], disc.mulI(half), { m: disc.one, m1: disc.zero }, 60)).toThrow(/the pole iK′;/);
    expect(() => jacobiAmplitude(disc.ldexp(iK, 1), k, 60)).toThrow(DomainError);
    expect(() => jacobiAmplitude(disc.ldexp(iK, 1), k, 60)).toThrow(/the pole iK′ of dn/);
    expect(() => jacobiAmplitude(iK, k, 60)).toThrow(/the pole iK′ of dn/);
    expect(() => jacobiInverse("sn", read("1.5", 60), k, 60)).toThrow(/outside the values/);
  });
});
