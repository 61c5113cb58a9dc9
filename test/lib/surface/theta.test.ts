import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { exact } from "../../../lib/number/convert.ts";
import { exp } from "../../../lib/number/functions.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError } from "../../../lib/proof/errors.ts";
import { type ThetaInput, theta, thetaLogarithmic } from "../../../lib/surface/theta.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(20);
});
afterEach(() => {
  provedDigits(before);
});

const at = { v: "1/5", tau: exact`1/7 + 3/4 i` };

/** Σ (2πi(n+a))^k exp(πi(n+a)²τ + 2πi(n+a)(v+b)) for |n| <= 12: beyond, terms are under 10^-150. */
function series([a, b]: readonly [string, string], v: string, tau: Complex, k: number): Complex {
  let sum = Complex.from(0);
  for (let n = -12; n <= 12; n++) {
    const m = Real.from(a).plus(n);
    const inner = tau.times(m).plus(Real.from(v).plus(b).times(2));
    const term = exp(inner.times(m).times(i.times(π))) as Complex;
    sum = sum.plus(term.times(Complex.from(i.times(π).times(2).times(m)).pow(k)));
  }
  return sum;
}

function expectNear(x: Complex | Real, y: Complex | Real, digits: number): void {
  const gap = Complex.from(x).minus(y).abs().div(Complex.from(y).abs()).toDouble();
  expect(gap).toBeLessThan(10 ** -digits);
}

describe("theta functions with characteristics and their derivatives", () => {
  it("θ[a, b] and its derivatives to the ninth — oracle: the bilateral series differentiated term by term, DLMF 21.2.5", () => {
    for (const [a, b] of [
      ["1/3", "1/4"],
      ["-2/5", "7/3"],
      ["1/2", "1/2"],
      ["17/4", "0"],
    ] as const) {
      for (const derivative of [0, 1, 4, 9]) {
        const value = theta([a, b], at, { derivative });
        expectNear(value, series([a, b], "1/5", Complex.from(at.tau), derivative), 19);
      }
    }
  });

  it("θ1 .. θ4 in the tenth derivative — oracle: the series of their characteristics", () => {
    const labels = { 2: ["1/2", "0"], 3: ["0", "0"], 4: ["0", "1/2"] } as const;
    for (const j of [2, 3, 4] as const) {
      expectNear(theta(j, at, { derivative: 10 }), series(labels[j], "1/5", Complex.from(at.tau), 10), 19);
    }
    const first = series(["1/2", "1/2"], "1/5", Complex.from(at.tau), 10).neg();
    expectNear(theta(1, at, { derivative: 10 }), first, 19);
  });

  it("θ[a + 1, b] = θ[a, b], θ[a, b + 1] = exp(2πia) θ[a, b] — oracle: shift of the sum", () => {
    const value = theta(["1/3", "1/4"], at);
    expect(theta(["4/3", "1/4"], at).overlaps(value)).toBe(true);
    const turn = exp(i.times(π).times("2/3")) as Complex;
    expect(theta(["1/3", "5/4"], at).overlaps(turn.times(value))).toBe(true);
  });

  it("derivatives in z are those in v over powers of π — oracle: chain rule", () => {
    const inV = theta(2, { v: "1/5", tau: i }, { derivative: 5 });
    const inZ = theta(2, { z: π.div(5), tau: i }, { derivative: 5 });
    expect(inZ.times(π.pow(5)).overlaps(inV)).toBe(true);
  });

  it("θ1^(5)(0) at τ = 50 i keeps its digits — oracle: 2 π^5 q^(1/4) (1 − 3^5 q² + ...)", () => {
    const value = theta(1, { v: 0, tau: exact`50 i` }, { derivative: 5 });
    const leading = (exp(π.times("-25/2")) as Real).times(π.pow(5)).times(2);
    expectNear(value, leading, 19);
    expect(value).toBeInstanceOf(Real);
  });

  it("(ln θ)″ and (ln θ)‴ — oracle: quotient rule on the derivatives", () => {
    const [f, f1, f2, f3] = [0, 1, 2, 3].map((derivative) => Complex.from(theta(["1/3", 0], at, { derivative }))) as [
      Complex,
      Complex,
      Complex,
      Complex,
    ];
    const slope = f1.div(f);
    const second = f2.div(f).minus(slope.pow(2));
    const third = f3.div(f).minus(slope.times(second).times(3)).minus(slope.pow(3));
    expect(thetaLogarithmic(["1/3", 0], at).overlaps(slope)).toBe(true);
    expect(thetaLogarithmic(["1/3", 0], at, { derivative: 2 }).overlaps(second)).toBe(true);
    expect(thetaLogarithmic(["1/3", 0], at, { derivative: 3 }).overlaps(third)).toBe(true);
  });

  it("zeros at exact points are exactly 0 — oracle: DLMF 20.2(iv)", () => {
    const tau = exact`1/3 + √(-7)/2`;
    const zero = (value: Real | Complex) => expect(value.exact?.toString()).toBe("0");
    zero(theta(1, { v: -3, tau: i }));
    zero(theta(1, { v: Complex.from(tau).times(2).plus(5), tau }));
    zero(theta(2, { v: "7/2", tau }));
    zero(theta(3, { v: Complex.from(tau).plus(1).div(2), tau }));
    zero(theta(4, { v: Complex.from(tau).times("3/2"), tau }));
    zero(theta(["1/3", "1/4"], { v: Complex.from(tau).div(6).plus("1/4"), tau }));
    expect(theta(1, { v: "1/2", tau }).exact).toBeUndefined();
    expect(() => thetaLogarithmic(3, { v: Complex.from(tau).plus(1).div(2), tau })).toThrow(PoleError);
  });
});

describe("theta refuses, and says why", () => {
  it("an argument far off the axis, a τ beside the axis", () => {
    const far = () => theta(1, { v: exact`1/3 + 100000000000 i`, tau: i });
    expect(far).toThrow(DomainError);
    expect(far).toThrow(/off the axis by about 10\^11, where \|ln θ\| is about 10\^23.*keep that factor apart/);
    const low = () => theta(3, { v: 0, tau: exact`i/1000000000000000000` });
    expect(low).toThrow(/image in the fundamental domain has Im τ of about 10\^18/);
  });

  it("no nome: q_θ = 3/2, 0; order 3/2; an unknown function", () => {
    expect(() => theta(3, { v: 0, qTheta: "3/2" })).toThrow(/q_θ = 3\/2; expected 0 < \|q_θ\| < 1/);
    expect(() => theta(3, { v: 0, qMod: 0 })).toThrow(/q_mod = 0.*trigonometric: m = 0/);
    expect(() => theta(3, { v: 0, tau: i }, { derivative: 1.5 })).toThrow(/an integer from 0/);
    expect(() => theta(5 as 1, { v: 0, tau: i })).toThrow(/θ5; expected 1, 2, 3, 4 or characteristics/);
    expect(() => theta([π, 0], { v: 0, tau: i })).toThrow(/an exact rational number/);
    expect(() => thetaLogarithmic(3, { v: 0, tau: i }, { derivative: 0 })).toThrow(/an order from 1 on/);
    expect(() => theta(3, { v: 0 } as unknown as ThetaInput)).toThrow(/\{ tau \}, \{ qTheta \}/);
  });
});
