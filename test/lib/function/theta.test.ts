import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { reduction, wordOf } from "../../../lib/function/modular-action.ts";
import { type ThetaIndex, thetaJet } from "../../../lib/function/theta-values.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { entries, expectDigits, read, type Text } from "./reference.ts";

const PREC = 200;
const pi = ball.pi(500);

/** τ with exp(πiτ) = q to 2^−400 by Newton's iteration from doubles, Re τ in (−1, 1]. */
function tauOfNome(text: Text): Disc {
  const q = read(text, 480);
  const [re, im] = disc.toDouble(q);
  const height = ball.fromDouble(-Math.log(Math.hypot(re, im)) / Math.PI);
  let tau = disc.fromBalls(ball.fromDouble(Math.atan2(im, re) / Math.PI), height);
  for (let step = 0; step < 5; step++) {
    const e = disc.exp(disc.mulI(disc.mulBall(tau, pi, 480)), 480);
    const change = disc.div(disc.sub(q, e, 480), disc.mulI(disc.mulBall(e, pi, 480)), 480);
    tau = exact(disc.add(tau, change, 480));
  }
  return tau;
}

function exact(d: Disc): Disc {
  return { ...disc.round({ ...d, rad: 0 }, 450), rad: 0 };
}

describe("theta functions — oracle: DLMF 20.2 summed by an independent program, 45 digits", () => {
  it.each(entries("integrals", "theta_functions"))("$id", ({ input, expected, digits }) => {
    const tau = tauOfNome(input.q);
    const v = disc.divBall(read(input.z, 480), pi, 480);
    for (const j of [1, 2, 3, 4] as const) {
      const [value, slope] = thetaJet(j, v, tau, 1, PREC) as [Disc, Disc];
      expectDigits(value, expected[`theta${j}`], digits);
      // The table's derivative is in z = πv.
      expectDigits(disc.divBall(slope, pi, PREC), expected[`theta${j}_derivative`], digits);
    }
  });
});

const coordinate = fc.integer({ min: -3000, max: 3000 });
const tau = fc
  .tuple(fc.integer({ min: -3000, max: 3000 }), fc.integer({ min: 1, max: 3000 }))
  .map(
    ([re, im]): Disc => ({ re: BigInt(re), im: BigInt(im), exp: -10, rad: 0, axis: re === 0 ? "imaginary" : "plane" }),
  );
const point = fc
  .tuple(coordinate, coordinate)
  .map(
    ([re, im]): Disc => disc.fromBalls({ man: BigInt(re), exp: -10, rad: 0 }, { man: BigInt(im), exp: -11, rad: 0 }),
  );
const RUNS = { numRuns: 100, seed: 1_829 };
const INDEX: readonly ThetaIndex[] = [1, 2, 3, 4];

/** Σ over a window of the bilateral series DLMF 20.2.1–20.2.4, with 2^−80 of slack: the tail outside is far below. */
function plainSum(j: ThetaIndex, v: Disc, t: Disc): Disc {
  const wp = 300;
  const height = disc.toDouble(t)[1];
  const offset = Math.round(-disc.toDouble(v)[1] / height);
  const reach = Math.ceil(Math.sqrt(40 / height)) + 3;
  const half = j <= 2 ? { man: 1n, exp: -1, rad: 0 } : ball.zero;
  let sum: Disc = disc.zero;
  let largest = -Infinity;
  for (let n = offset - reach; n <= offset + reach; n++) {
    const k = ball.add(ball.fromInt(n), half, wp);
    const exponent = disc.add(disc.mulBall(t, ball.mul(k, k, wp), wp), disc.mulBall(disc.ldexp(v, 1), k, wp), wp);
    const term = disc.exp(disc.mulI(disc.mulBall(exponent, pi, wp)), wp);
    largest = Math.max(largest, disc.magnitude(term));
    sum = disc.add(sum, (j === 1 || j === 4) && n & 1 ? disc.neg(term) : term, wp);
  }
  const value = j === 1 ? disc.neg(disc.mulI(sum)) : sum;
  return disc.widenBy(value, { man: 1n, exp: largest - 80, rad: 0 }, wp, false);
}

describe("theta functions anywhere", () => {
  it("reduced route meets the plain series for τ near and far — oracle: definition, DLMF 20.2.1–20.2.4", () => {
    fc.assert(
      fc.property(point, tau, (v, t) => {
        fc.pre(t.im > 20n);
        for (const j of INDEX) {
          const [value] = thetaJet(j, v, t, 0, PREC) as [Disc];
          expect(disc.overlaps(value, plainSum(j, v, t)), `θ${j}`).toBe(true);
        }
      }),
      RUNS,
    );
  });

  it("θ1′(0) = π θ2 θ3 θ4 and θ3⁴ = θ2⁴ + θ4⁴, down to Im τ = 2^−10 — oracle: Jacobi, DLMF 20.4.6, 20.7.5", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const at = (j: ThetaIndex) => thetaJet(j, disc.zero, t, 1, PREC) as [Disc, Disc];
        const [t2, t3, t4] = [at(2)[0], at(3)[0], at(4)[0]];
        const mul = (x: Disc, y: Disc) => disc.mul(x, y, PREC);
        expect(disc.overlaps(at(1)[1], disc.mulBall(mul(mul(t2, t3), t4), pi, PREC))).toBe(true);
        const fourth = (x: Disc) => disc.sqr(disc.sqr(x, PREC), PREC);
        expect(disc.overlaps(fourth(t3), disc.add(fourth(t2), fourth(t4), PREC))).toBe(true);
        for (const x of [t2, t3, t4]) expect(disc.bits(x)).toBeGreaterThan(PREC - 10);
        expect(disc.isZero(at(1)[0])).toBe(true);
      }),
      RUNS,
    );
  });

  it("derivatives meet divided differences — oracle: Taylor's formula with a step of 2^−60", () => {
    fc.assert(
      fc.property(point, tau, fc.constantFrom(...INDEX), (v, t, j) => {
        fc.pre(t.im > 300n);
        const jet = thetaJet(j, v, t, 3, 400);
        const step: Disc = { re: 1n, im: 0n, exp: -60, rad: 0, axis: "real" };
        const ahead = thetaJet(j, disc.add(v, step, 400), t, 3, 400);
        for (const k of [0, 1, 2]) {
          const quotient = disc.ldexp(disc.sub(ahead[k]!, jet[k]!, 400), 60);
          const gap = disc.abs(disc.sub(quotient, jet[k + 1]!, 400), 60);
          const size = Math.max(...jet.map((x) => disc.magnitude(x)));
          expect(ball.magnitude(gap)).toBeLessThan(size - 40);
        }
      }),
      RUNS,
    );
  });

  it("heat equation θ_vv = 4πi θ_τ — oracle: DLMF 20.13.1, a divided difference in τ", () => {
    fc.assert(
      fc.property(point, tau, fc.constantFrom(...INDEX), (v, t, j) => {
        fc.pre(t.im > 300n);
        const step: Disc = { re: 1n, im: 0n, exp: -60, rad: 0, axis: "real" };
        const jet = thetaJet(j, v, t, 2, 400);
        const ahead = thetaJet(j, v, disc.add(t, step, 400), 0, 400);
        const slope = disc.ldexp(disc.sub(ahead[0]!, jet[0]!, 400), 60);
        const right = disc.ldexp(disc.mulI(disc.mulBall(slope, pi, 400)), 2);
        const gap = disc.abs(disc.sub(right, jet[2]!, 400), 60);
        expect(ball.magnitude(gap)).toBeLessThan(Math.max(...jet.map((x) => disc.magnitude(x))) - 35);
      }),
      RUNS,
    );
  });

  it("real v and imaginary τ give real values; θ1(iy) is imaginary — oracle: symmetry of the series", () => {
    const t = read({ re: "0", im: "0.3" }, PREC);
    const v = read("0.2", PREC);
    expect(thetaJet(1, v, t, 1, 60).map((x) => x.axis)).toEqual(["real", "real"]);
    expect(thetaJet(1, disc.mulI(v), t, 1, 60).map((x) => x.axis)).toEqual(["imaginary", "real"]);
  });

  it("Im τ <= 0 is refused with the reason", () => {
    expect(() => thetaJet(3, disc.zero, read({ re: "1", im: "-1" }, 60), 0, 60)).toThrow(DomainError);
    expect(() => thetaJet(3, disc.zero, disc.one, 0, 60)).toThrow(/a real τ/);
  });
});

describe("words of the modular group", () => {
  it("the letters multiply to the matrix or its negative — oracle: exact integers", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const { matrix, word } = reduction(t, 64);
        expect(wordOf(matrix)).toEqual(word);
        expect(matrix.a * matrix.d - matrix.b * matrix.c).toBe(1n);
      }),
      RUNS,
    );
  });
});
