// A point of the upper half plane brought into the fundamental domain, with the word in τ + n and −1/τ that does it. The multipliers
// of theta functions and of η are read off the word, letter by letter, so that no formula with a choice of root is needed.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { shift } from "../number/fixed/bits.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import { compose, gram, IDENTITY, type Matrix, reduceForm, roundedQuotient } from "./matrix.ts";

/** One letter of a word: τ ↦ τ + n, or τ ↦ −1/τ. */
export type Letter = { readonly kind: "shift"; readonly by: bigint } | { readonly kind: "turn" };

/** τ′ = Mτ in (or, for a wide disc, beside) the fundamental domain. */
export interface Reduction {
  readonly matrix: Matrix;
  /** Mτ. */
  readonly tau: Disc;
  /** cτ + d. */
  readonly factor: Disc;
  /** Product of √(−iτ_k) over the turns of the word, each with positive real part; a square root of cτ + d up to an eighth root of unity. */
  readonly root: Disc;
  /** The letters in the order in which they are applied. */
  readonly word: readonly Letter[];
}

const TURN: Matrix = { a: 0n, b: -1n, c: 1n, d: 0n };

/**
 * The letters, first applied first, whose product is the matrix of determinant 1 or its negative.
 * Cost     Euclid's algorithm on the first column: M = T^n S M′ with n the integer nearest to a/c, until c = 0.
 */
export function wordOf(matrix: Matrix): Letter[] {
  const leftToRight: Letter[] = [];
  let { a, b, c, d } = matrix;
  while (c !== 0n) {
    const n = c > 0n ? roundedQuotient(a, c) : roundedQuotient(-a, -c);
    if (n !== 0n) leftToRight.push({ kind: "shift", by: n });
    leftToRight.push({ kind: "turn" });
    [a, b, c, d] = [c, d, n * c - a, n * d - b];
  }
  if (b !== 0n) leftToRight.push({ kind: "shift", by: b * d });
  return leftToRight.reverse();
}

/**
 * τ brought into the fundamental domain by the matrix that its midpoint asks for; an identity for every τ of the disc.
 *
 * Domain   Im τ > 0.
 * Error    enclosures. τ beside the real axis costs twice as many bits as cτ + d is small, which an exact τ can give.
 * Throws   DomainError for Im τ <= 0, UndecidedError for a disc that meets the real axis.
 */
export function reduction(tau: Disc, prec: number): Reduction {
  refuseLowerHalf(tau);
  return along(wordOf(reduceForm(gridGram(tau))), tau, prec);
}

/** The lattice Z + Zτ of the midpoint, on an integer grid. */
function gridGram(tau: Disc) {
  const unit = 1n << shift(Math.max(0, -tau.exp));
  const up = shift(Math.max(0, tau.exp));
  return gram({ x: unit, y: 0n }, { x: tau.re << up, y: tau.im << up });
}

/** The reduction that a given word does. */
export function along(word: readonly Letter[], tau: Disc, prec: number): Reduction {
  const size = word.reduce((bits, letter) => bits + (letter.kind === "shift" ? letter.by.toString(2).length : 1), 0);
  const wp = prec + 2 * size + 8;
  let matrix = IDENTITY;
  let root: Disc = disc.one;
  for (const letter of word) {
    if (letter.kind === "turn") {
      root = disc.mul(root, disc.sqrt(disc.neg(disc.mulI(moved(matrix, tau, wp))), wp), wp);
      matrix = compose(TURN, matrix);
    } else {
      matrix = compose({ a: 1n, b: letter.by, c: 0n, d: 1n }, matrix);
    }
  }
  return { matrix, tau: moved(matrix, tau, wp), factor: linear(matrix.c, matrix.d, tau, wp), root, word };
}

/** Exponents of numbers end at 2^45. */
export const LARGEST_LOGARITHM = 44;

/** exp(πiτ) for a reduced τ. Throws DomainError where no number has that exponent. */
export function nomeOf(tau: Disc, wp: number): Disc {
  const height = disc.magnitude(tau);
  if (height > LARGEST_LOGARITHM - 4) {
    throw new DomainError({
      subject: "modular",
      given: `a τ whose image in the fundamental domain has Im τ of about 10^${Math.round(height * Math.log10(2))}`,
      expected: `Im τ under 10^${Math.floor((LARGEST_LOGARITHM - 4) * Math.log10(2))} there, so that exp(πiτ) has an exponent`,
      hint: "So near a cusp the first term of the q-expansion is the value; take its logarithm, πiτ times a rational number.",
      argument: "tau",
    });
  }
  return disc.exp(disc.mulI(disc.mulBall(tau, ball.pi(wp + 8), wp + 8)), wp);
}

/** (aτ + b)/(cτ + d). */
export function moved({ a, b, c, d }: Matrix, tau: Disc, wp: number): Disc {
  if (c === 0n) return d > 0n ? linear(a, b, tau, wp) : linear(-a, -b, tau, wp);
  return disc.div(linear(a, b, tau, wp), linear(c, d, tau, wp), wp);
}

function linear(c: bigint, d: bigint, tau: Disc, wp: number): Disc {
  const constant = disc.fromBall(ball.fromInt(d));
  return c === 0n ? constant : disc.add(disc.mulInt(tau, c, wp), constant, wp);
}

function refuseLowerHalf(tau: Disc): void {
  const height = disc.imag(tau);
  if (height.man > 0n && height.man > BigInt(Math.ceil(height.rad))) return;
  if (height.rad === 0 || height.man < -BigInt(Math.ceil(height.rad))) {
    throw new DomainError({
      subject: "modular",
      given: height.man === 0n ? "a real τ" : "τ with a negative imaginary part",
      expected: "Im τ > 0",
      hint: height.man === 0n ? "" : "The conjugate of τ is in the upper half plane.",
      argument: "tau",
    });
  }
  throw new UndecidedError({
    subject: "modular",
    given: "an enclosure of τ that meets the real axis",
    expected: "Im τ > 0",
    hint: "Give τ with more digits.",
    argument: "tau",
  });
}
