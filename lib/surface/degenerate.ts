import { degenerateValue } from "../function/degenerate.ts";
import type { Wanted } from "../function/weierstrass.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { asDisc, type Operation } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";

/** [d, z]. */
const VALUES: Readonly<Record<Wanted, Operation>> = {
  wp: valueOperation("wp"),
  prime: valueOperation("prime"),
  zeta: valueOperation("zeta"),
  sigma: valueOperation("sigma"),
};

function valueOperation(name: Wanted): Operation {
  return {
    name: `degenerate ${name}`,
    evaluate: ([d, z], at, prec) => {
      const value = degenerateValue(name, asDisc(at(d)), asDisc(at(z)), prec);
      return value.axis === "real" ? disc.along(value) : value;
    },
  };
}

/** [d]: π/√(−3d). */
const PERIOD: Operation = {
  name: "degenerate period",
  evaluate: ([d], at, prec) => {
    const square = disc.neg(disc.mulInt(asDisc(at(d)), 3n, prec + 8));
    const value = disc.div(disc.fromBall(ball.pi(prec + 8)), disc.sqrt(square, prec + 8), prec);
    return value.axis === "real" ? disc.along(value) : value;
  },
};

/** The functions that ℘, ζ and σ become where two roots meet: with one period, or with none. */
export class DegenerateLattice {
  /** The root d that occurs twice; the third one is −2d. */
  readonly doubleRoot: Real | Complex;
  /** trigonometric: a real period; hyperbolic: an imaginary one; rational: none (a triple root); complex: another one. */
  readonly kind: "trigonometric" | "hyperbolic" | "rational" | "complex";

  constructor(doubleRoot: Real | Complex) {
    this.doubleRoot = doubleRoot;
    const sign = doubleRoot instanceof Real ? doubleRoot.sign() : undefined;
    this.kind = sign === 0 ? "rational" : sign === 1 ? "hyperbolic" : sign === -1 ? "trigonometric" : "complex";
  }

  /** π/√(−3d), the one period; undefined for a triple root. */
  get period(): Real | Complex | undefined {
    return this.kind === "rational" ? undefined : apply(PERIOD, [this.doubleRoot]);
  }

  wp(z: ComplexNumeric): Real | Complex {
    return apply(VALUES.wp, [this.doubleRoot, scalar(z, "wp")]);
  }

  prime(z: ComplexNumeric): Real | Complex {
    return apply(VALUES.prime, [this.doubleRoot, scalar(z, "prime")]);
  }

  zeta(z: ComplexNumeric): Real | Complex {
    return apply(VALUES.zeta, [this.doubleRoot, scalar(z, "zeta")]);
  }

  sigma(z: ComplexNumeric): Real | Complex {
    return apply(VALUES.sigma, [this.doubleRoot, scalar(z, "sigma")]);
  }

  /** What is left of the elliptic functions, in words. */
  toString(): string {
    const d = this.doubleRoot;
    if (this.kind === "rational") return "a triple root 0: ℘(z) = 1/z², no period";
    if (this.kind === "hyperbolic")
      return `a double root d = ${d} > 0: ℘(z) = d + 3d/sinh²(√(3d) z), one imaginary period, the real one is infinite`;
    const words = `a double root d = ${d}: ℘(z) = d + κ²/sin²(κz), κ² = −3d`;
    return this.kind === "trigonometric"
      ? `${words}, one real period π/κ, the imaginary one is infinite`
      : `${words}, one period π/κ`;
  }
}

/**
 * The limit functions for g2³ = 27 g3², where lattice({ invariants }) has no lattice.
 *
 * Domain   exact g2 and g3 with g2³ = 27 g3².
 * Throws   DomainError if the discriminant is not exactly 0.
 */
export function degenerate(input: {
  readonly invariants: readonly [ComplexNumeric, ComplexNumeric];
}): DegenerateLattice {
  const [g2, g3] = input.invariants.map((g) => scalar(g, "degenerate")) as [Complex, Complex];
  const delta = g2.pow(3).minus(g3.pow(2).times(27));
  if (!(delta.exact instanceof Rational && delta.exact.sign() === 0)) {
    throw new DomainError({
      subject: "degenerate",
      given: `g2³ − 27 g3² = ${delta}`,
      expected: "exact invariants with g2³ = 27 g3²",
      hint: "lattice({ invariants }) takes all others.",
      argument: "invariants",
    });
  }
  const zero = g2.exact instanceof Rational && g2.exact.sign() === 0;
  return new DegenerateLattice(zero ? Real.from(0) : g3.div(g2).times(Rational.of(-3, 2)));
}
