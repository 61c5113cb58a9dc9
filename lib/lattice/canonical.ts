// The canonical reduced basis and its ties, decided by exact criteria.
//
// A lattice that is its own conjugate up to homothety has j real, and then τ lies on the boundary of the fundamental domain or on
// Re τ = 0; otherwise a tie cannot occur and enough digits decide. For real g2, g3 the signs of Δ, g2, g3 settle all
// comparisons in the real basis (ω1, ω2), h = Im ω2:
//   Δ > 0 (ω2 = ih):        h >= ω1 iff g3 >= 0
//   Δ < 0 (ω2 = ω1/2 + ih): j <= 0 iff g2 >= 0, then Re τ = −1/2;  g2 < 0 has |τ| = 1;  2h >= ω1 (g2 < 0) and h >= ω1 √3/2 (g2 >= 0) iff g3 >= 0
// since multiplication of Λ by i changes the sign of g3 and exchanges the axes, and ω1 falls as e1 grows with g2 and Δ held.
//
// The sign of the basis: arg r1 in (−π/2, π/2]; in (−π/4, π/4] for a square, (−π/6, π/6] for a hexagonal lattice, whose rotations leave τ.

import { compose, type Gram, IDENTITY, type Matrix, negated, reduceForm } from "../function/matrix.ts";
import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { PeriodPair } from "./agm-periods.ts";
import type { Conjugation, PeriodLattice } from "./period-lattice.ts";

export type Sign = -1 | 0 | 1;

export type Canonical = Pick<PeriodLattice, "toReduced" | "boundary">;

/** Conjugation in the real basis: ω2 ↦ −ω2, or ω1 − ω2. */
export function realConjugation(components: 1 | 2): Conjugation {
  return { a11: 1n, a12: 0n, a21: components === 2 ? 0n : 1n, a22: -1n };
}

const matrix = (a: number, b: number, c: number, d: number): Matrix => ({
  a: BigInt(a),
  b: BigInt(b),
  c: BigInt(c),
  d: BigInt(d),
});

/**
 * From the real basis of a lattice with real invariants to the reduced one, by the signs of the header. (r1, r2) = (dω1 + cω2, bω1 + aω2).
 */
export function canonicalReal(delta: Sign, g2: Sign, g3: Sign): Canonical {
  if (delta > 0) {
    // (ω1, ω2), or (ω2, −ω1) for the flat cell.
    return { toReduced: g3 >= 0 ? IDENTITY : matrix(0, -1, 1, 0), boundary: g3 === 0 ? "on" : "inside" };
  }
  if (g2 > 0) {
    // (ω1, ω2 − ω1), or (2ω2 − ω1, −ω2).
    return { toReduced: g3 > 0 ? matrix(1, -1, 0, 1) : matrix(-1, 0, 2, -1), boundary: "on" };
  }
  if (g2 === 0) {
    // Hexagonal: (ω1, ω2 − ω1), or (ω2, ω2 − ω1) where ω1 is a long diagonal.
    return { toReduced: g3 > 0 ? matrix(1, -1, 0, 1) : matrix(1, -1, 1, 0), boundary: "on" };
  }
  // |τ| = 1: (ω1 − ω2, ω2), or (ω2, ω2 − ω1) for the flat rhombus and the square.
  return { toReduced: g3 > 0 ? matrix(1, 0, -1, 1) : matrix(1, -1, 1, 0), boundary: "on" };
}

/** The reduced basis that a matrix names. */
export function transformed({ w1, w2 }: PeriodPair, m: Matrix, prec: number): PeriodPair {
  const wp = prec + 8;
  const row = (x: bigint, y: bigint) => disc.add(disc.mulInt(w1, x, wp), disc.mulInt(w2, y, wp), prec);
  return { w1: row(m.d, m.c), w2: row(m.b, m.a) };
}

/** A reducing matrix by the midpoints of the enclosures; an identity of bases whatever the accuracy. */
export function midpointReduction({ w1, w2 }: PeriodPair): Matrix {
  const exp = Math.min(w1.exp, w2.exp);
  const grid = (w: Disc) => ({ x: w.re << BigInt(w.exp - exp), y: w.im << BigInt(w.exp - exp) });
  const [v, w] = [grid(w1), grid(w2)];
  return reduceForm({
    A: v.x * v.x + v.y * v.y,
    B: v.x * w.x + v.y * w.y,
    C: w.x * w.x + w.y * w.y,
  });
}

/** Bits that the entries of a matrix can cost. */
export function matrixBits({ a, b, c, d }: Matrix): number {
  return Math.max(...[a, b, c, d].map((n) => n.toString(2).length));
}

/** Length and inclination of an approximately reduced basis, as far as enclosures tell. */
interface Position {
  /** Sign of |τ| − 1, of 1/2 − |Re τ| and of Re τ. */
  readonly arc: Sign | undefined;
  readonly side: Sign | undefined;
  readonly lean: Sign | undefined;
}

function position({ w1, w2 }: PeriodPair, prec: number): Position {
  const A = squareLength(w1, prec);
  const C = squareLength(w2, prec);
  const B = disc.real(disc.mul(w2, disc.conj(w1), prec));
  return {
    arc: ball.compare(C, A),
    side: ball.compare(A, ball.ldexp(ball.abs(B), 1)),
    lean: ball.sign(B),
  };
}

function squareLength(w: Disc, prec: number): Ball {
  return disc.real(disc.mul(w, disc.conj(w), prec));
}

/**
 * The canonical matrix from enclosures of a basis, if they decide it; undefined asks for more digits.
 *
 * Domain   `jReal` says that j is known to be real, as for a lattice that is its own conjugate: then τ is on the part of the boundary that
 *          its enclosure meets, if that is one part only. `rational` is the exact form |Xω1 + Yω2|² up to a factor, where there is
 *          one: it settles every tie.
 */
export function canonicalFrom(basis: PeriodPair, prec: number, jReal: boolean, rational?: Gram): Canonical | undefined {
  if (rational) {
    const m = reduceForm(rational);
    const sign = signed(transformed(basis, m, prec), m, isSquare(rational, m), isHexagonal(rational, m));
    return sign && { toReduced: sign, boundary: onBoundary(rational, m) ? "on" : "inside" };
  }
  const m = midpointReduction(basis);
  const reduced = transformed(basis, m, prec);
  const at = position(reduced, prec);
  if (at.arc === 1 && at.side === 1) {
    const sign = signed(reduced, m, false, false);
    return sign && { toReduced: sign, boundary: "inside" };
  }
  const tied = jReal ? tieMatrix(at) : undefined;
  if (!tied) return undefined;
  const sign = signed(transformed(reduced, tied, prec), compose(tied, m), false, false);
  return sign && { toReduced: sign, boundary: "on" };
}

/** For real j: onto Re τ = −1/2, or onto the left half of the arc. */
function tieMatrix({ arc, side, lean }: Position): Matrix | undefined {
  if (lean === undefined || lean === 0) return undefined;
  if (arc === 1 && side === undefined) return lean < 0 ? IDENTITY : matrix(1, -1, 0, 1);
  if (side === 1 && arc === undefined) return lean < 0 ? IDENTITY : matrix(0, -1, 1, 0);
  return undefined;
}

/** What is left when the digits run out: the matrix of the midpoints, said to be undecided. */
export function canonicalUndecided(basis: PeriodPair, prec: number): Canonical {
  const m = midpointReduction(basis);
  const negative = transformed(basis, m, prec).w1.re < 0n;
  return { toReduced: negative ? negated(m) : m, boundary: "undecided" };
}

function reducedGram({ A, B, C }: Gram, m: Matrix): Gram {
  const form = (x: bigint, y: bigint, u: bigint, v: bigint) => A * x * u + B * (x * v + y * u) + C * y * v;
  return { A: form(m.d, m.c, m.d, m.c), B: form(m.d, m.c, m.b, m.a), C: form(m.b, m.a, m.b, m.a) };
}

function onBoundary(g: Gram, m: Matrix): boolean {
  const { A, B, C } = reducedGram(g, m);
  return A === C || -2n * B === A;
}

function isSquare(g: Gram, m: Matrix): boolean {
  const { A, B, C } = reducedGram(g, m);
  return A === C && B === 0n;
}

function isHexagonal(g: Gram, m: Matrix): boolean {
  const { A, B, C } = reducedGram(g, m);
  return A === C && -2n * B === A;
}

/** m times the rotation that puts r1 into the sector of the header, if the enclosures tell. */
function signed(reduced: PeriodPair, m: Matrix, square: boolean, hexagonal: boolean): Matrix | undefined {
  if (square || hexagonal) return rotated(reduced, m, hexagonal);
  const right = ball.sign(disc.real(reduced.w1));
  if (right === undefined) return undefined;
  if (right !== 0) return right > 0 ? m : negated(m);
  const up = ball.sign(disc.imag(reduced.w1));
  return up === undefined ? undefined : up > 0 ? m : negated(m);
}

/** Among the rotations of r1 by the units of the lattice the one in the half-open sector around the positive axis. */
function rotated(reduced: PeriodPair, m: Matrix, hexagonal: boolean): Matrix | undefined {
  // Multiplication by the unit i takes (r1, r2) to (r2, −r1); by −ρ² it takes them to (r1 + r2, −r1).
  const unit = hexagonal ? matrix(0, -1, 1, 1) : matrix(0, -1, 1, 0);
  let turn = IDENTITY;
  for (let n = 0; n < 6; n++) {
    const r1 = transformed(reduced, turn, 120).w1;
    const inside = inSector(disc.real(r1), disc.imag(r1), hexagonal);
    if (inside === undefined) return undefined;
    if (inside) return compose(turn, m);
    turn = compose(unit, turn);
  }
  return undefined;
}

/** −x/s < y <= x/s for s = √3 or 1, x > 0; the upper edge is accepted on overlap of exactly symmetric enclosures only. */
function inSector(x: Ball, y: Ball, hexagonal: boolean): boolean | undefined {
  const right = ball.sign(x);
  if (right === undefined) return undefined;
  if (right <= 0) return false;
  const scaled = hexagonal ? ball.mul(y, ball.sqrt(ball.fromInt(3), 120), 120) : y;
  const below = ball.compare(scaled, x);
  const above = ball.compare(ball.neg(x), scaled);
  if (below === undefined || above === undefined) return undefined;
  return below <= 0 && above < 0;
}
