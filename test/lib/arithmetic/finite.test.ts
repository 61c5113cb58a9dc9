import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { modularSqrt, type Residue } from "../../../lib/algebra/primefield.ts";
import { primesUpTo } from "../../../lib/algebra/primes.ts";
import { countPlainly } from "../../../lib/arithmetic/count.ts";
import { multiplyMod, pointFrom, reduceModel } from "../../../lib/arithmetic/group-fp.ts";
import type { IntegerModel } from "../../../lib/arithmetic/minimal.ts";
import { countBySteps, countByTraces, countPoints, orderDividing } from "../../../lib/arithmetic/order-fp.ts";
import { discreteLogarithm, groupStructure } from "../../../lib/arithmetic/structure-fp.ts";
import type { Curve } from "../../../lib/surface/curve.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import table from "./curves.json" with { type: "json" };

const model = (a: readonly number[]) => a.map(BigInt) as unknown as IntegerModel;

describe("points over F_p", () => {
  it("traces a_p for p < 100 of the tabulated curves — oracle: Cremona, Table 3", () => {
    for (const entry of table.entries) {
      const bad = entry.bad_primes.map(({ p }) => p);
      for (const [p, trace] of Object.entries<number>(entry.frobenius_traces ?? {})) {
        if (bad.includes(Number(p))) continue;
        expect(Number(p) + 1 - countPlainly(model(entry.a), Number(p))).toBe(trace);
      }
    }
  });

  it("baby and giant steps agree with plain counting — oracle: second algorithm", () => {
    const primes = [200_003, 200_009, 300_007, 400_009];
    const coefficient = fc.integer({ min: -50, max: 50 });
    fc.assert(
      fc.property(fc.constantFrom(...primes), fc.array(coefficient, { minLength: 5, maxLength: 5 }), (p, a) => {
        const E = model(a);
        const F = reduceModel(E, BigInt(p));
        try {
          curve({ a }).mod(p);
        } catch {
          return; // singular over Q or modulo p
        }
        expect(countPoints(F.a, F.p)).toBe(BigInt(countPlainly(E, p)));
      }),
      { seed: 5, numRuns: 12 }, // plain counting takes milliseconds each
    );
  });

  it("plain counting itself, p < 60 — oracle: every pair (x, y) tried", () => {
    for (const a of [
      [0, 0, 1, -1, 0],
      [1, 0, 1, -19, 26],
      [1, 1, 1, -10, -10],
    ]) {
      for (const p of primesUpTo(60)) {
        let points = 1;
        for (let x = 0; x < p; x++) {
          for (let y = 0; y < p; y++) {
            const value = y * y + a[0]! * x * y + a[2]! * y - x ** 3 - a[1]! * x * x - a[3]! * x - a[4]!;
            if (value % p === 0) points++;
          }
        }
        expect(countPlainly(model(a), p)).toBe(points);
      }
    }
  });

  it("by steps, and by traces modulo small primes, for all good p < 2000 — oracle: plain counting", () => {
    for (const [a, bad] of [
      [[0, 0, 1, -1, 0], [37]],
      [
        [0, 0, 0, -7, 6],
        [2, 5],
      ], // all points of order two are rational
      [
        [0, 0, 0, 0, 1],
        [2, 3],
      ], // supersingular at p = 2 mod 3
    ] as const) {
      for (const p of primesUpTo(2000)) {
        if (p < 5 || (bad as readonly number[]).includes(p)) continue;
        const plain = BigInt(countPlainly(model(a), p));
        if (p > 500) expect(countBySteps(model(a), BigInt(p))).toBe(plain);
        if (p % 19 === 3 || p < 60) expect(countByTraces(model(a), BigInt(p), 1n)).toBe(plain);
      }
    }
  }, 120_000);

  it("a prime of 80 bits — oracle: the order kills points of E, that of the twist points of the twist, one multiple in Hasse's interval", () => {
    const p = 1208925819614629174706111n;
    const E = reduceModel(model([0, 0, 1, -1, 0]), p);
    const count = countPoints(E.a, p);
    expect(count).toBe(1208925819613430426310836n);
    for (const x of [1n, 10n]) expect(multiplyMod(E, count, pointFrom(E, x))).toBe(undefined);
    const order = orderDividing(E, pointFrom(E, 1n), count);
    expect(order * order > 16n * p).toBe(true); // so no other number in the interval kills it
  }, 120_000);

  it("over extensions — oracle: the recurrence by hand for n = 2, 3, and the count over F_5 as F_(5^1)", () => {
    const E = curve`y^2 + y = x^3 - x`.mod(5);
    const t = E.trace;
    expect(E.countOver(1)).toBe(E.count);
    expect(E.countOver(2)).toBe(26n - (t * t - 10n));
    expect(E.countOver(3)).toBe(126n - (t ** 3n - 15n * t));
    expect(E.countOver(6) % E.countOver(2)).toBe(0n);
    expect(() => E.countOver(0)).toThrow(/expected an integer from 1 to 1000/);
  });

  it("a curve of 60 bits: the order kills points of E, and lies in Hasse's interval — oracle: definition", () => {
    const p = 1152921504606846883n;
    const E = reduceModel(model([0, 0, 1, -1, 0]), p);
    const count = countPoints(E.a, p);
    for (const x of [1n, 10n, 100n]) expect(multiplyMod(E, count, pointFrom(E, x))).toBe(undefined);
    const trace = p + 1n - count;
    expect(trace * trace <= 4n * p).toBe(true);
  });

  it("structure: the exponent is n2 and n1·n2 points exist — oracle: counting orders one by one for p < 60", () => {
    for (const a of [
      [0, 0, 0, -1, 0],
      [0, 0, 0, 0, 1],
      [1, 0, 1, -19, 26],
    ]) {
      for (const p of primesUpTo(60)) {
        if (p < 5) continue;
        let E: Curve<Residue>;
        try {
          E = curve({ a }).mod(p);
        } catch {
          continue;
        }
        const points = Array.from({ length: p }, (_, x) => E.pointsWith({ x })).flat();
        expect(BigInt(points.length + 1)).toBe(E.count);
        const exponent = points.reduce((n, P) => (n < (P.order() as bigint) ? (P.order() as bigint) : n), 1n);
        expect(E.structure.at(-1)).toBe(exponent);
        expect(E.structure.reduce((x, y) => x * y)).toBe(E.count);
      }
    }
  });

  it("discrete logarithms — oracle: multiplication", () => {
    const p = 1_000_003n;
    const E = reduceModel(model([0, 0, 1, -1, 0]), p);
    const count = countPoints(E.a, p);
    const P = pointFrom(E, 5n);
    const order = orderDividing(E, P, count);
    for (const m of [0n, 1n, 12345n, 900_000n]) {
      expect(discreteLogarithm(E, multiplyMod(E, m, P), P, order)).toBe(m % order);
    }
    expect(groupStructure(E, count).n2 % order).toBe(0n);
  });

  it("square roots modulo primes — oracle: squaring", () => {
    for (const p of [3n, 7n, 13n, 17n, 97n, 193n, 65537n, 1000003n]) {
      for (let a = 0n; a < 20n; a++) {
        const r = modularSqrt(a * a, p);
        expect(r !== undefined && (r * r - a * a) % p === 0n && 2n * r <= p).toBe(true);
      }
    }
  });

  it("over F_2 and F_3 points are found, and maps refused in words — oracle: plain counting", () => {
    const E = curve`y^2 + y = x^3 - x`;
    for (const p of [2, 3]) {
      const F = E.mod(p);
      const found = Array.from({ length: p }, (_, x) => F.pointsWith({ x })).flat();
      expect(BigInt(found.length + 1)).toBe(F.count);
      expect(() => F.isogeny({ kernel: found[0]! })).toThrow(/characteristic 0 or above 3/);
    }
  });

  it("a bad prime is refused with the kind of reduction", () => {
    expect(() => curve`y^2 + y = x^3 - x`.mod(37)).toThrow(/bad reduction at 37.* a nonsplit node at \(5, 18\)/);
    expect(() => curve`y^2 + y = x^3 - x`.mod(6)).toThrow(/expected a prime/);
  });
});
