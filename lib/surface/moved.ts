import type { Matrix } from "../function/matrix.ts";
import type { Multipliers, ThetaAction } from "../function/multipliers.ts";
import type { Complex, Real } from "../number/values.ts";

/** A point of the upper half plane moved by a matrix of determinant 1, with what modular forms take up on the way. */
export class Moved {
  /** Rows [a, b], [c, d]. */
  readonly matrix: readonly [readonly [bigint, bigint], readonly [bigint, bigint]];
  /** Mτ = (aτ + b)/(cτ + d). */
  readonly tau: Complex;
  /** cτ + d: a form of weight k has f(Mτ) = (cτ + d)^k f(τ). */
  readonly factor: Real | Complex;
  /** e in 0 .. 23 with η(Mτ) = exp(2πi e/24) (cτ + d)^(1/2) η(τ), principal root. */
  readonly etaTwentyFourths: number;
  /** θ_index(v/(cτ+d) | Mτ) = exp(2πi eighths/8) (cτ + d)^(1/2) exp(πi c v²/(cτ+d)) θ_of(v | τ), for index 1 to 4. */
  readonly theta: readonly ThetaAction[];

  constructor({ a, b, c, d }: Matrix, tau: Complex, factor: Real | Complex, { eta, theta }: Multipliers) {
    this.matrix = [
      [a, b],
      [c, d],
    ];
    this.tau = tau;
    this.factor = factor;
    this.etaTwentyFourths = eta;
    this.theta = theta;
  }

  toString(): string {
    const [[a, b], [c, d]] = this.matrix;
    return [
      `M = [[${a}, ${b}], [${c}, ${d}]]`,
      `Mτ = ${this.tau}`,
      `cτ + d = ${this.factor}`,
      `η(Mτ) = ${turn(this.etaTwentyFourths, 24)}(cτ + d)^(1/2) η(τ)`,
      ...this.theta.map(
        ({ index, of, eighths }) =>
          `θ${index}(v/(cτ+d) | Mτ) = ${turn(eighths, 8)}(cτ + d)^(1/2) exp(πi c v²/(cτ+d)) θ${of}(v | τ)`,
      ),
    ].join("\n");
  }
}

function turn(part: number, whole: number): string {
  return part === 0 ? "" : `exp(2πi·${part}/${whole}) `;
}
