// Jacobi's functions on a reduced basis of the lattice 2K Z + 2iK′ Z, by Landen's transformations.
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
import { nearestZero } from "./jacobi-poles.ts";
import type { Modulus } from "./legendre-complete.ts";
import { gram, type Matrix, reduceForm } from "./matrix.ts";
import type { ThetaIndex } from "./theta-multiplier.ts";
import { thetaConstants } from "./theta-sums.ts";
import { type CellPlace, cellPlace, negative } from "./theta-values.ts";

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
  /** κ_N, ..., κ_1 and a_N of the means that begin at θ3², θ4². */
  readonly kappas: readonly Disc[];
  readonly last: Disc;
  /** The start of the chain is right to 2^rest. */
  readonly rest: number;
  /** Theta index of c, d, n. */
  readonly index: Readonly<Record<JacobiLetter, ThetaIndex>>;
  readonly matrix: Matrix;
  readonly wp: number;
}

/**
 * Periods and theta constants for a modulus other than 0 and 1.
 *
 * Branch   K and K′ are principal values, on a cut those from one side for both; the functions do not depend on it.
 * Cost     three arithmetic-geometric means, one exponential, theta series.
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
  return { modulus, quarter, coQuarter, r1, r2, tau, q, ...landenChain(q, wp), index, matrix, wp };
}

/** The means a_n = θ3²(q^(2^n)), b_n = θ4²(q^(2^n)), c_(n+1) = c_n²/(4 a_(n+1)), and κ_n = c_n a_n/a_N², until the nome is negligible. */
function landenChain(q: Disc, wp: number): Pick<JacobiContext, "kappas" | "last" | "rest"> {
  const sums = thetaConstants(q, wp);
  const fall = -disc.magnitude(q);
  let [a, b] = [disc.sqr(sums.theta3, wp), disc.sqr(sums.theta4, wp)];
  // c_0 = θ2² = 4 q^(1/2) half2²
  let square = disc.ldexp(disc.mul(q, disc.sqr(disc.sqr(sums.half2, wp), wp), wp), 4);
  const products: Disc[] = [];
  let power = 1;
  // 6 < 2^3 and a unit for the magnitude of what is widened.
  for (; (power - 1) * fall < wp + 4; power *= 2) {
    const mean = disc.ldexp(disc.add(a, b, wp), -1);
    b = disc.sqrt(disc.mul(a, b, wp), wp);
    a = mean;
    const c = disc.ldexp(disc.div(square, a, wp), -2);
    square = disc.sqr(c, wp);
    products.unshift(disc.mul(c, a, wp));
  }
  const over = disc.inv(disc.sqr(a, wp), wp);
  return { kappas: products.map((x) => disc.mul(x, over, wp)), last: a, rest: 3 - (power - 1) * fall };
}

/** π/(2 agm(1, √x)). */
export function quarterPeriod(x: Disc, wp: number): Disc {
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

/**
 * θ1(v)/θ1′(0), θ2(v)/θ2(0), θ3(v)/θ3(0), θ4(v)/θ4(0) at v = u/r1, up to one common factor.
 *
 * In the means that begin at θ3², θ4² the nome of step n is q^(2^n) and its modulus c_n/a_n. From sin πv, cos πv, 1, 1 at a step N where the nome is
 * negligible the chain of Landen's transformations leads back, with s/n = sn·a_N/a_n at step n and κ_n = c_n a_n/a_N²:
 *     s, c, d, n  →  s n,  c d,  n² − κ s²,  n² + κ s²,          θ1(v)/θ1′(0) : θ4(v)/θ4(0) = s/(π a_N) : n
 * Error    the start is right to 6 |q^(2^N)/q| relatively: |cos 2πkv| <= |q|^−k in the cell, and sin (2k+1)x/sin x is as small.
 * Source   DLMF 22.7.2–22.7.4 with 22.2.
 */
function thetaQuotients(context: JacobiContext, place: CellPlace): readonly Disc[] {
  const { wp, kappas, last, r1, rest } = context;
  const pi = ball.pi(wp + 8);
  const { sin, cos } = disc.sinCos(disc.mulBall(place.point, pi, wp + 8), wp);
  const near = (x: Disc) =>
    disc.isZero(x) ? x : disc.widenBy(x, { man: 1n, exp: disc.magnitude(x) + rest, rad: 0 }, wp, true);
  let [s, c, d, n] = [near(sin), near(cos), near(disc.one), near(disc.one)];
  for (const kappa of kappas) {
    const [product, small] = [disc.mul(c, d, wp), disc.mul(kappa, disc.sqr(s, wp), wp)];
    s = disc.mul(s, n, wp);
    const square = disc.sqr(n, wp);
    [c, d, n] = [product, disc.sub(square, small, wp), disc.add(square, small, wp)];
  }
  const first = disc.div(disc.mul(s, r1, wp), disc.mulBall(last, pi, wp), wp);
  return [first, c, d, n].map((x, k) => (negative((k + 1) as ThetaIndex, place) ? disc.neg(x) : x));
}

/**
 * pq(u | m) for each of the names asked for, p and q among s, c, d, n.
 *
 * Domain   any u off the poles (zeros of qn(u), all of them simple), any m.
 * Branch   none: meromorphic in u, and single-valued in m.
 * Error    enclosures; relative away from zeros and poles.
 * Cost     two means, a sine, log2(prec) steps of five products; the means and moduli only once if `contextOf` keeps them.
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
  const place = cellPlace(disc.div(u, context.r1, context.wp), context.tau, context.wp);
  const quotients = thetaQuotients(context, place);
  const sigma = (letter: JacobiLetter) => quotients[context.index[letter] - 1]!;
  return names.map((name) => {
    const [p, q] = [...name] as [JacobiLetter, JacobiLetter];
    if (p === q) return disc.one;
    if (disc.isZero(u) && (p === "s" || q !== "s")) return p === "s" ? disc.zero : disc.one;
    const bottom = disc.isZero(u) ? disc.zero : sigma(q);
    if (disc.containsZero(bottom)) throw pole(name, nearestZero(q, u, context.quarter, context.coQuarter));
    return axisOf(p, q, u, modulus, disc.div(sigma(p), bottom, prec + 2));
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

function pole(name: string, where: string): PoleError {
  return new PoleError({
    subject: name,
    given: `an argument that is, or cannot be told from, the pole ${where}`,
    expected: "an argument away from the poles",
    hint: `The poles of ${name} are the zeros of ${[...name].reverse().join("")}, a double lattice of them with the periods 2K and 2iK′.`,
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
  if (disc.containsZero(values[q])) {
    const half = disc.fromBall(ball.ldexp(ball.pi(53), -1));
    throw pole(name, circular ? nearestZero(q, u, half, undefined) : nearestZero(q, u, undefined, half));
  }
  return disc.div(values[p], values[q], prec + 2);
}
