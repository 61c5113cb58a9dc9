// Jacobi's functions by theta functions on a reduced basis of the lattice 2K Z + 2iK′ Z.
//
// Let σ_s = σ and σ_c, σ_d, σ_n be the sigma functions of the half periods K, K + iK′, iK′, each divided by the common factor e^(η u²/..).
// Then pq(u) = σ_p(u)/σ_q(u) for p, q among s, c, d, n (DLMF 22.2.4–22.2.9 by 23.6(ii)): with v = u/r1 on any basis r1, r2,
//     σ_s = r1 θ1(v)/θ1′(0),  σ_x = θ_j(v)/θ_j(0),  j = 2, 3, 4 for the half period ≡ r1/2, (r1 + r2)/2, r2/2.
// So no sign and no root has to be chosen, and neither m near 0 nor m near 1 costs digits.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError } from "../proof/errors.ts";
import { ontoImaginary, ontoReal } from "./enclosure.ts";
import type { Modulus } from "./legendre-complete.ts";
import { gram, type Matrix, reduceForm } from "./matrix.ts";
import type { ThetaIndex } from "./theta-multiplier.ts";
import { type ThetaConstants, thetaConstants } from "./theta-sums.ts";
import { type CellPoint, cellPoint, cellSums } from "./theta-values.ts";

export type JacobiLetter = "s" | "c" | "d" | "n";
export type JacobiName = `${JacobiLetter}${JacobiLetter}`;

/** The lattice of a modulus at one precision. */
export interface JacobiContext {
  readonly modulus: Modulus;
  readonly quarter: Disc;
  /** K′, with iK′ the other quarter period. */
  readonly coQuarter: Disc;
  readonly r1: Disc;
  readonly r2: Disc;
  readonly tau: Disc;
  readonly q: Disc;
  readonly sums: ThetaConstants;
  /** Theta index of c, d, n. */
  readonly index: Readonly<Record<JacobiLetter, ThetaIndex>>;
  readonly matrix: Matrix;
  readonly wp: number;
}

/**
 * Periods and theta constants for a modulus other than 0 and 1.
 *
 * Branch   K and K′ are principal values, on a cut those from one side for both; the functions do not depend on it.
 * Cost     two arithmetic-geometric means, one exponential, theta series.
 */
export function jacobiContext(modulus: Modulus, prec: number): JacobiContext {
  const wp = prec + 40;
  const quarter = quarterPeriod(modulus.m1, wp);
  const coQuarter = quarterPeriod(modulus.m, wp);
  const [w1, w2] = [disc.ldexp(quarter, 1), disc.mulI(disc.ldexp(coQuarter, 1))];
  const matrix = reduceForm(gram(...onGrid(w1, w2)));
  const { a, b, c, d } = matrix;
  const combine = (x: bigint, y: bigint) => disc.add(disc.mulInt(w1, x, wp), disc.mulInt(w2, y, wp), wp);
  const [r1, r2] = [combine(d, c), combine(b, a)];
  const tau = disc.div(r2, r1, wp);
  const q = disc.exp(disc.mulI(disc.mulBall(tau, ball.pi(wp + 8), wp + 8)), wp);
  // w1 = a r1 − c r2 and w2 = −b r1 + d r2, modulo 2.
  const index = { s: 1, c: half(a, c), d: half(a + b, c + d), n: half(b, d) } as const;
  return { modulus, quarter, coQuarter, r1, r2, tau, q, sums: thetaConstants(q, wp), index, matrix, wp };
}

/** π/(2 agm(1, √x)). */
function quarterPeriod(x: Disc, wp: number): Disc {
  const mean = disc.agm(disc.one, disc.sqrt(x, wp, { cut: "continuous" }), wp);
  return disc.div(disc.fromBall(ball.ldexp(ball.pi(wp), -1)), mean, wp);
}

/** Both midpoints on one integer grid; the exponents of a modulus within reach are near each other. */
function onGrid(w1: Disc, w2: Disc) {
  const exp = Math.min(w1.exp, w2.exp);
  const scale = (w: Disc) => ({ x: w.re << BigInt(w.exp - exp), y: w.im << BigInt(w.exp - exp) });
  return [scale(w1), scale(w2)] as const;
}

function half(x: bigint, y: bigint): ThetaIndex {
  return x & 1n ? (y & 1n ? 3 : 2) : 4;
}

/** u as a point of the cell, and the sums that its functions share. */
interface JacobiPoint {
  readonly context: JacobiContext;
  readonly at: CellPoint;
  readonly known: Map<JacobiLetter, Disc>;
}

function jacobiPoint(context: JacobiContext, u: Disc): JacobiPoint {
  const at = cellPoint(disc.div(u, context.r1, context.wp), context.tau, context.wp);
  return { context, at, known: new Map() };
}

/** σ_x(u) up to the factor that is common to the four. */
function sigma({ context, at, known }: JacobiPoint, letter: JacobiLetter): Disc {
  const old = known.get(letter);
  if (old) return old;
  const { q, wp, sums, index, r1 } = context;
  const j = index[letter];
  const [sum] = cellSums(j, at, q, disc.sqr(q, wp), 0, wp) as [Disc];
  let value: Disc;
  if (j === 1) {
    // θ1′(0) = 2π q^(1/4) first, and q^(1/4) cancels; i e^(−πiv) S_0 stands for θ1.
    const scale = disc.div(r1, disc.mulBall(sums.first, ball.ldexp(ball.pi(wp), 1), wp), wp);
    value = disc.mul(disc.mul(sum, scale, wp), lowering(at, wp), wp);
  } else if (j === 2) {
    value = disc.mul(disc.div(sum, disc.ldexp(sums.half2, 1), wp), lowering(at, wp), wp);
  } else {
    value = disc.div(sum, j === 3 ? sums.theta3 : sums.theta4, wp);
  }
  const { m, n, flipped } = at;
  const parity = j === 1 ? m + n + (flipped ? 1n : 0n) : j === 2 ? m : j === 4 ? n : 0n;
  if (parity & 1n) value = disc.neg(value);
  known.set(letter, value);
  return value;
}

/** e^(−πiv). */
function lowering(at: CellPoint, wp: number): Disc {
  return disc.exp(disc.neg(disc.mulI(disc.mulBall(at.point, ball.pi(wp + 8), wp + 8))), wp);
}

/**
 * pq(u | m) for each of the names asked for, p and q among s, c, d, n.
 *
 * Domain   any u off the poles (zeros of qn(u), all of them simple), any m.
 * Branch   none: meromorphic in u, and single-valued in m.
 * Error    enclosures; relative away from zeros and poles.
 * Cost     two means, two exponentials, one theta series of √prec terms a letter; the means only once if `contextOf` keeps them.
 * Throws   PoleError at a pole, or if the disc of u holds one.
 * Source   DLMF 22.2.4–22.2.9; for m = 0 and 1 DLMF 22.5(ii).
 */
export function jacobiValues(
  names: readonly JacobiName[],
  u: Disc,
  modulus: Modulus,
  prec: number,
  contextOf: (modulus: Modulus, prec: number) => JacobiContext = jacobiContext,
): Disc[] {
  if (disc.isZero(modulus.m) || disc.isZero(modulus.m1)) return names.map((name) => degenerate(name, u, modulus, prec));
  const context = contextOf(modulus, prec + guard(u, prec));
  const point = jacobiPoint(context, u);
  return names.map((name) => {
    const [p, q] = [...name] as [JacobiLetter, JacobiLetter];
    if (p === q) return disc.one;
    if (disc.isZero(u) && (p === "s" || q !== "s")) return p === "s" ? disc.zero : disc.one;
    const bottom = disc.isZero(u) ? disc.zero : sigma(point, q);
    if (disc.containsZero(bottom)) throw pole(name, u);
    return axisOf(p, q, u, modulus, disc.div(sigma(point, p), bottom, prec + 2));
  });
}

/** A far u costs the bits of its whole periods, a small one those of its sine. */
function guard(u: Disc, prec: number): number {
  if (disc.isZero(u)) return 0;
  const size = disc.magnitude(u);
  return size > 0 ? 2 * size : Math.min(-size, 64 * prec);
}

/** For real m: real u gives real values; imaginary u imaginary ones where exactly one letter is s. */
function axisOf(p: JacobiLetter, q: JacobiLetter, u: Disc, { m }: Modulus, value: Disc): Disc {
  if (m.axis !== "real" || u.axis === "plane") return value;
  if (u.axis === "real") return ontoReal(value);
  return (p === "s") !== (q === "s") ? ontoImaginary(value) : ontoReal(value);
}

function pole(name: string, u: Disc): PoleError {
  return new PoleError({
    subject: name,
    given: disc.isZero(u) ? "u = 0, a pole" : "an argument that is a pole, or cannot be told from one",
    expected: "an argument away from the poles",
    hint: "The poles are the zeros of the function with the letters exchanged.",
    argument: "u",
  });
}

/** m = 0: sn, cn, dn are sin, cos, 1. m = 1: tanh, sech, sech. */
function degenerate(name: JacobiName, u: Disc, { m }: Modulus, prec: number): Disc {
  const [p, q] = [...name] as [JacobiLetter, JacobiLetter];
  if (p === q) return disc.one;
  const circular = disc.isZero(m);
  const wp = prec + 8;
  const { sin, cos } = disc.sinCos(circular ? u : disc.mulI(u), wp);
  // sinh u = −i sin iu; over the common factor n: tanh, sech, sech, 1 or s = sinh, c = d = 1, n = cosh.
  const values: Record<JacobiLetter, Disc> = circular
    ? { s: sin, c: cos, d: disc.one, n: disc.one }
    : { s: disc.neg(disc.mulI(sin)), c: disc.one, d: disc.one, n: cos };
  if (disc.containsZero(values[q])) throw pole(name, u);
  return disc.div(values[p], values[q], prec + 2);
}
