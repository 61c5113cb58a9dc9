import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { reduction } from "../../../lib/function/modular-action.ts";
import {
  dedekindEta,
  deltaNormalised,
  eisensteinE,
  eisensteinG,
  eisensteinG2,
  jInvariant,
  jMinus1728,
  latticeDiscriminant,
  modularLambda,
  weber,
} from "../../../lib/function/modular-forms.ts";
import { thetaJet } from "../../../lib/function/theta-values.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { entries, expectDigits, read } from "./reference.ts";

const PREC = 220;

describe("modular functions — oracle: an independent ball arithmetic, 45 digits", () => {
  const routes: Record<string, (tau: Disc, prec: number) => Disc> = {
    ...Object.fromEntries(
      [2, 4, 6, 8, 10, 12, 14].map((k) => [`E${k}`, (tau: Disc, prec: number) => eisensteinE(k, tau, prec)]),
    ),
    G2: (tau, prec) => eisensteinG2("rows", tau, prec),
    G4: (tau, prec) => eisensteinG(4, tau, prec),
    G6: (tau, prec) => eisensteinG(6, tau, prec),
    eta: dedekindEta,
    delta_normalised: deltaNormalised,
    discriminant: latticeDiscriminant,
    j: jInvariant,
    klein_invariant: (tau, prec) => disc.divBall(jInvariant(tau, prec), ball.fromInt(1728), prec),
    lambda: (tau, prec) => modularLambda(tau, prec).lambda,
    theta2: (tau, prec) => thetaJet(2, disc.zero, tau, 0, prec)[0]!,
    theta3: (tau, prec) => thetaJet(3, disc.zero, tau, 0, prec)[0]!,
    theta4: (tau, prec) => thetaJet(4, disc.zero, tau, 0, prec)[0]!,
  };
  for (const { id, input, expected, digits } of entries("modular", "modular_values")) {
    it.each(Object.keys(routes))(`${id} ${input.name}: %s`, (name) => {
      // Beside a zero the table still counts 45 digits of the value.
      const prec = [PREC, 4 * PREC].find((p) => disc.bits(routes[name]!(read(input.tau, 2 * p), p)) > 3.33 * digits);
      const value = routes[name]!(read(input.tau, 8 * PREC), prec ?? PREC);
      expectDigits(value, expected[name], digits);
    });
  }

  it.each(entries("modular", "modular_values"))("$id reduction, up to sign and the boundary", ({ input, expected }) => {
    const { matrix, tau } = reduction(read(input.tau, 2 * PREC), PREC);
    const reduced = read(expected.reduction.reduced, PREC);
    const gap = disc.abs(disc.sub(tau, reduced, PREC), 60);
    if (ball.magnitude(gap) > -140) {
      // Only a tie may be broken otherwise: the mirror image on the boundary.
      expect(ball.magnitude(disc.abs(disc.add(tau, disc.conj(reduced), PREC), 60))).toBeLessThan(-140);
    } else {
      const printed = expected.reduction.matrix.map(BigInt);
      const ours = [matrix.a, matrix.b, matrix.c, matrix.d];
      expect([ours, ours.map((x) => -x)]).toContainEqual(printed);
    }
  });

  it.each(entries("modular", "special_constant").filter((e) => e.input.function))("$input.name, 60 digits", (entry) => {
    const { input, expected, digits } = entry;
    const tau =
      typeof input.tau === "string"
        ? disc.fromBalls({ man: 1n, exp: -1, rad: 0 }, ball.ldexp(ball.sqrt(ball.fromInt(3), 300), -1))
        : read(input.tau, 300);
    const name = input.function as string;
    expectDigits(routes[name]!(tau, 230), expected, Math.min(digits, 59));
  });
});

describe("j at quadratic points — oracle: the thirteen integers, and Hermite's near-integer", () => {
  it.each(entries("modular", "cm_j_invariant"))("D = $input.discriminant", ({ input, expected }) => {
    const value = jInvariant(read(input.tau_decimal, 400), 320);
    const gap = disc.abs(disc.sub(value, read(expected, 400), 400), 60);
    // The 79 decimals of τ leave 10^−60 of the largest value.
    expect(ball.magnitude(gap)).toBeLessThan(-190);
  });

  it.each(entries("modular", "special_constant").filter((e) => !e.input.function))("$input.name", (entry) => {
    const root = ball.sqrt(ball.fromInt(163), 300);
    const value = disc.fromBall(ball.exp(ball.mul(ball.pi(300), root, 300), 300));
    expectDigits(value, entry.expected, entry.digits);
  });
});

const tau = fc
  .tuple(fc.integer({ min: -3000, max: 3000 }), fc.integer({ min: 1, max: 3000 }))
  .map(
    ([re, im]): Disc => ({ re: BigInt(re), im: BigInt(im), exp: -10, rad: 0, axis: re === 0 ? "imaginary" : "plane" }),
  );
const tall = fc
  .tuple(fc.integer({ min: -3000, max: 3000 }), fc.integer({ min: 600, max: 50_000 }))
  .map(
    ([re, im]): Disc => ({ re: BigInt(re), im: BigInt(im), exp: -10, rad: 0, axis: re === 0 ? "imaginary" : "plane" }),
  );
const RUNS = { numRuns: 100, seed: 1_877 };
const mul = (x: Disc, y: Disc) => disc.mul(x, y, PREC);

/** Σ σ_{k−1}(n) q^n for |q| < 1/2, with the tail after 400 terms covered by 2^−150. */
function plainE(k: number, factor: bigint, t: Disc): Disc {
  const q = disc.exp(disc.mulI(disc.mulBall(t, ball.ldexp(ball.pi(300), 1), 300)), 300);
  let power: Disc = disc.one;
  let sum: Disc = disc.zero;
  for (let n = 1; n <= 120; n++) {
    power = disc.mul(power, q, 300);
    let divisors = 0n;
    for (let d = 1; d <= n; d++) if (n % d === 0) divisors += BigInt(d) ** BigInt(k - 1);
    sum = disc.add(sum, disc.mulInt(power, divisors, 300), 300);
  }
  return disc.widenBy(
    disc.add(disc.one, disc.mulInt(sum, factor, 300), 300),
    { man: 1n, exp: -100, rad: 0 },
    300,
    false,
  );
}

describe("modular functions anywhere", () => {
  it("E2, E4, E6, E12 meet their q-series — oracle: definition by divisor sums", () => {
    fc.assert(
      fc.property(tall, (t) => {
        for (const [k, factor] of [
          [2, -24n],
          [4, 240n],
          [6, -504n],
        ] as const) {
          expect(disc.overlaps(eisensteinE(k, t, PREC), plainE(k, factor, t)), `E${k}`).toBe(true);
        }
      }),
      RUNS,
    );
  });

  it("1728 Δ = E4³ − E6², j Δ = E4³, j − 1728 = E6²/Δ down to Im τ = 2^−10 — oracle: identities, DLMF 23.15.7", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const [e4, e6, delta] = [eisensteinE(4, t, PREC), eisensteinE(6, t, PREC), deltaNormalised(t, PREC)];
        const cube = mul(mul(e4, e4), e4);
        expect(disc.overlaps(disc.mulInt(delta, 1728, PREC), disc.sub(cube, mul(e6, e6), PREC))).toBe(true);
        expect(disc.overlaps(mul(jInvariant(t, PREC), delta), cube)).toBe(true);
        expect(disc.overlaps(mul(jMinus1728(t, PREC), delta), mul(e6, e6))).toBe(true);
        expect(disc.bits(delta)).toBeGreaterThan(PREC - 10);
      }),
      RUNS,
    );
  });

  it("E8 = E4², E10 = E4 E6, 691 E12 = 441 E4³ + 250 E6² — oracle: dimension of the space of forms", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const [e4, e6] = [eisensteinE(4, t, PREC), eisensteinE(6, t, PREC)];
        expect(disc.overlaps(eisensteinE(8, t, PREC), mul(e4, e4))).toBe(true);
        expect(disc.overlaps(eisensteinE(10, t, PREC), mul(e4, e6))).toBe(true);
        const right = disc.add(disc.mulInt(mul(mul(e4, e4), e4), 441, PREC), disc.mulInt(mul(e6, e6), 250, PREC), PREC);
        expect(disc.overlaps(disc.mulInt(eisensteinE(12, t, PREC), 691, PREC), right)).toBe(true);
      }),
      RUNS,
    );
  });

  it("λ + (1−λ) = 1, j = 256 (1 − λ(1−λ))³/(λ(1−λ))² — oracle: DLMF 23.15.7 by the other route", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const { lambda, complement } = modularLambda(t, PREC);
        expect(disc.overlaps(disc.add(lambda, complement, PREC), disc.one)).toBe(true);
        const x = mul(lambda, complement);
        const top = disc.pow(disc.sub(disc.one, x, PREC), 3, PREC);
        expect(disc.overlaps(mul(jInvariant(t, PREC), mul(x, x)), disc.ldexp(top, 8))).toBe(true);
        expect(Math.min(disc.bits(lambda), disc.bits(complement))).toBeGreaterThan(PREC - 20);
      }),
      RUNS,
    );
  });

  it("f f1 f2 = √2, f⁸ = f1⁸ + f2⁸, and f1 = θ4/η-quotients — oracle: Weber's identities", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const [f, f1, f2] = (["f", "f1", "f2"] as const).map((name) => weber(name, t, PREC)) as [Disc, Disc, Disc];
        expect(disc.overlaps(mul(mul(f, f1), f2), disc.fromBall(ball.sqrt(ball.fromInt(2), PREC)))).toBe(true);
        const eighth = (x: Disc) => disc.pow(x, 8, PREC);
        expect(disc.overlaps(eighth(f), disc.add(eighth(f1), eighth(f2), PREC))).toBe(true);
        // θ3 = η f², θ4 = η f1²
        const theta = mul(dedekindEta(t, PREC), mul(f, f));
        expect(disc.overlaps(theta, thetaJet(3, disc.zero, t, 0, PREC)[0]!)).toBe(true);
      }),
      RUNS,
    );
  });

  it("G2 by columns is τ^−2 G2 by rows at −1/τ, and the symmetric sum has weight 2 — oracle: exchange of m and n", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const turned = disc.neg(disc.inv(t, 400));
        const over = disc.inv(disc.sqr(t, 400), 400);
        const right = disc.mul(over, eisensteinG2("rows", turned, PREC), 300);
        expect(disc.overlaps(eisensteinG2("columns", t, PREC), right)).toBe(true);
        const symmetric = disc.mul(over, eisensteinG2("symmetric", turned, PREC), 300);
        expect(disc.overlaps(eisensteinG2("symmetric", t, PREC), symmetric)).toBe(true);
      }),
      RUNS,
    );
  });

  it("values on the imaginary axis are real; odd weights and the lower half plane are refused", () => {
    const t = read({ re: "0", im: "0.3" }, PREC);
    for (const x of [
      eisensteinE(2, t, 60),
      eisensteinE(6, t, 60),
      dedekindEta(t, 60),
      jInvariant(t, 60),
      weber("f", t, 60),
    ]) {
      expect(x.axis).toBe("real");
    }
    expect(() => eisensteinE(3, t, 60)).toThrow(DomainError);
    expect(() => jInvariant(disc.conj(t), 60)).toThrow(/upper half plane/);
  });
});
