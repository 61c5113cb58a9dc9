// Making a lattice: checks of the input and the discrete choices, on a ladder of precisions of their own.

import { type Gram, IDENTITY } from "../function/matrix.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import type { NumberStanding } from "../number/origin.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError, PrecisionError, UndecidedError } from "../proof/errors.ts";
import { complexPeriods, type PeriodPair, realPeriods } from "./agm-periods.ts";
import {
  type Canonical,
  canonicalFrom,
  canonicalReal,
  canonicalUndecided,
  realConjugation,
  type Sign,
  transformed,
} from "./canonical.ts";
import { cubicRoots } from "./cubic.ts";
import type { Conjugation, PeriodLattice } from "./period-lattice.ts";
import {
  discOf,
  type ExactComplex,
  exactComplex,
  exactRational,
  isReal,
  isRefinable,
  type Quantity,
  standingOf,
} from "./quantity.ts";

/** Precisions at which discrete choices are tried, in bits. */
export const LADDER: readonly number[] = [64, 128, 256, 512, 1024, 2048, 4096, 8192, 16384];

/** Where exhausting the ladder costs seconds and an answer without proof is of use, it ends here. */
const BOUNDARY_LADDER = LADDER.slice(0, 6);

/**
 * The lattice Zω1 + Zω2.
 *
 * Domain   ω2/ω1 not real. With Im(ω2/ω1) < 0 the caller swaps first (`orientation` tells).
 * Throws   DomainError for a real ratio, UndecidedError if the enclosures cannot tell.
 */
export function latticeOfPeriods(w1: Quantity, w2: Quantity): PeriodLattice {
  const sign = orientation(w1, w2);
  if (sign < 0) throw realRatio("a period ratio with negative imaginary part", "the periods in the other order");
  const exact = exactPair(w1, w2);
  const conjugation = exact ? exactConjugation(exact) : axisConjugation(w1, w2);
  const given = { kind: "periods", w1, w2 } as const;
  const standing = jointly(w1, w2);
  const rational = exact && exactGram(exact);
  const basis = (prec: number) => ({ w1: discOf(w1, prec), w2: discOf(w2, prec) });
  return real({ given, standing, ...canonicalOnLadder(basis, conjugation !== undefined, rational) }, conjugation);
}

/** The canonical reduction of a basis that can be had at any precision, flagged where the ladder does not decide it. */
export function canonicalOnLadder(basis: (prec: number) => PeriodPair, jReal: boolean, rational?: Gram): Canonical {
  for (const prec of BOUNDARY_LADDER) {
    const canonical = canonicalFrom(basis(prec), prec, jReal, rational);
    if (canonical) return canonical;
  }
  const prec = BOUNDARY_LADDER.at(-1)!;
  return canonicalUndecided(basis(prec), prec);
}

function real(lattice: PeriodLattice, conjugation: Conjugation | undefined): PeriodLattice {
  if (!conjugation) return lattice;
  return { ...lattice, conjugation, components: componentsOf(conjugation) };
}

/** An integral reflection is of the rectangular kind iff it is the identity modulo 2. */
function componentsOf({ a11, a12, a21, a22 }: Conjugation): 1 | 2 {
  return a11 & 1n && a22 & 1n && !(a12 & 1n) && !(a21 & 1n) ? 2 : 1;
}

/**
 * Sign of Im(ω2/ω1).
 * Throws   DomainError if it is 0 (exactly, or both periods on one axis), UndecidedError if the ladder does not tell.
 */
export function orientation(w1: Quantity, w2: Quantity): 1 | -1 {
  const exact = exactPair(w1, w2);
  if (exact) {
    const sign = exactArea(exact).sign();
    if (sign === 0) throw realRatio(exactRatio(exact), "two periods independent over R");
    return sign;
  }
  for (const prec of LADDER) {
    const [x, y] = [discOf(w1, prec), discOf(w2, prec)];
    const area = disc.imag(disc.mul(y, disc.conj(x), prec));
    const sign = ball.sign(area);
    if (sign === 0) throw realRatio("ω2/ω1 is real", "two periods independent over R");
    if (sign !== undefined) return sign;
  }
  throw new UndecidedError({
    subject: "lattice",
    given: "ω2/ω1 cannot be told from a real number",
    expected: "two periods independent over R",
    hint: "Give the periods exactly or with more digits.",
  });
}

function realRatio(given: string, expected: string): DomainError {
  return new DomainError({
    subject: "lattice",
    given,
    expected,
    hint: "Give one of them an imaginary part.",
    argument: "periods",
  });
}

/** The form |Xω1 + Yω2|² up to a factor, with integers, where the periods are exact. */
export function exactForm(w1: Quantity, w2: Quantity): Gram | undefined {
  const exact = exactPair(w1, w2);
  return exact && exactGram(exact);
}

type ExactPair = readonly [ExactComplex, ExactComplex];

function exactPair(w1: Quantity, w2: Quantity): ExactPair | undefined {
  const [x, y] = [exactComplex(w1), exactComplex(w2)];
  if (!x || !y) return undefined;
  if (x.root === y.root || x.imag.sign() === 0) return [{ ...x, root: y.root }, y];
  return y.imag.sign() === 0 ? [x, { ...y, root: x.root }] : undefined;
}

/** Im(ω2 conj ω1)/√D. */
function exactArea([x, y]: ExactPair): Rational {
  return y.imag.times(x.real).minus(y.real.times(x.imag));
}

function exactRatio([x, y]: ExactPair): string {
  const ratio = x.real.sign() !== 0 ? y.real.div(x.real) : x.imag.sign() !== 0 ? y.imag.div(x.imag) : undefined;
  return ratio ? `ω2/ω1 is real (${ratio})` : "ω1 is 0";
}

function exactGram([x, y]: ExactPair): Gram {
  const D = x.root;
  const A = x.real.times(x.real).plus(x.imag.times(x.imag).times(D));
  const B = x.real.times(y.real).plus(x.imag.times(y.imag).times(D));
  const C = y.real.times(y.real).plus(y.imag.times(y.imag).times(D));
  const den = A.den * B.den * C.den;
  const whole = (q: Rational) => (q.num * den) / q.den;
  return { A: whole(A), B: whole(B), C: whole(C) };
}

/** The action of conjugation, if it maps the lattice to itself. */
function exactConjugation(pair: ExactPair): Conjugation | undefined {
  const [x, y] = pair;
  const area = exactArea(pair);
  const coordinates = (z: ExactComplex): [Rational, Rational] => [
    y.imag.times(z.real).minus(y.real.times(z.imag)).div(area),
    z.imag.times(x.real).minus(z.real.times(x.imag)).div(area),
  ];
  const conjugate = (z: ExactComplex): ExactComplex => ({ ...z, imag: z.imag.neg() });
  const [a11, a12] = coordinates(conjugate(x));
  const [a21, a22] = coordinates(conjugate(y));
  if (![a11, a12, a21, a22].every((q) => q.isInteger())) return undefined;
  return { a11: a11.num, a12: a12.num, a21: a21.num, a22: a22.num };
}

/** A rectangular basis on the axes. */
function axisConjugation(w1: Quantity, w2: Quantity): Conjugation | undefined {
  const [x, y] = [discOf(w1, 64), discOf(w2, 64)];
  if (x.axis === "real" && y.axis === "imaginary") return { a11: 1n, a12: 0n, a21: 0n, a22: -1n };
  if (x.axis === "imaginary" && y.axis === "real") return { a11: -1n, a12: 0n, a21: 0n, a22: 1n };
  return undefined;
}

/**
 * The lattice with the invariants g2, g3; in its real basis if they are real, else in its reduced basis.
 *
 * Domain   g2³ ≠ 27 g3².
 * Throws   DomainError where g2³ = 27 g3² exactly, UndecidedError if the enclosures cannot tell.
 */
export function latticeOfInvariants(g2: Quantity, g3: Quantity): PeriodLattice {
  const given = { kind: "invariants", g2, g3 } as const;
  if (isReal(g2) && isReal(g3)) return realInvariants(g2, g3);
  let basis: PeriodPair | undefined;
  let reached = 64;
  for (const prec of BOUNDARY_LADDER) {
    const delta = discriminant(g2, g3, prec);
    if (disc.isZero(delta)) throw degenerate();
    if (disc.containsZero(delta)) continue;
    const found = basisAt(g2, g3, delta, prec);
    if (!found) continue;
    basis = found;
    reached = prec;
    const canonical = canonicalFrom(basis, prec, false);
    if (canonical) return anchored(given, basis, canonical, prec);
  }
  if (!basis) throw singularOrNot();
  return anchored(given, basis, canonicalUndecided(basis, reached), reached);
}

/** A basis by means of enclosures with so many bits, or nothing where the roots are too near each other for these. */
function basisAt(g2: Quantity, g3: Quantity, delta: disc.Disc, prec: number): PeriodPair | undefined {
  try {
    return complexPeriods(cubicRoots(discOf(g2, prec + 32), discOf(g3, prec + 32), delta, prec), prec);
  } catch (error) {
    if (error instanceof PrecisionError && prec < BOUNDARY_LADDER.at(-1)!) return undefined;
    throw error;
  }
}

function anchored(
  given: Extract<PeriodLattice["given"], { kind: "invariants" }>,
  basis: PeriodPair,
  { toReduced, boundary }: Pick<PeriodLattice, "toReduced" | "boundary">,
  prec: number,
): PeriodLattice {
  const standing = jointly(given.g2, given.g3);
  return { given, standing, toReduced: IDENTITY, boundary, anchor: transformed(basis, toReduced, prec) };
}

/** The standing of what is built on two numbers; "exact" counts as input of the defined kind. */
function jointly(x: Quantity, y: Quantity): NumberStanding {
  const both = [standingOf(x), standingOf(y)];
  return both.includes("double") ? "double" : both.includes("measured") ? "measured" : "defined";
}

function realInvariants(g2: Quantity, g3: Quantity): PeriodLattice {
  const given = { kind: "invariants", g2, g3 } as const;
  const standing = jointly(g2, g3);
  const delta = signOnLadder((prec) => disc.real(discriminant(g2, g3, prec)));
  if (delta === 0) throw degenerate();
  if (delta === undefined) throw singularOrNot();
  const components = delta > 0 ? 2 : 1;
  const conjugation = realConjugation(components);
  const s2 = signOnLadder((prec) => disc.real(discOf(g2, prec)));
  const s3 = signOnLadder((prec) => disc.real(discOf(g3, prec)));
  // For Δ > 0 the sign of g2 is not asked.
  if (s3 !== undefined && (s2 !== undefined || delta > 0)) {
    return { given, standing, ...canonicalReal(delta, s2 ?? 1, s3), conjugation, components };
  }
  const prec = 256;
  const enclosed = sharpDiscriminant(g2, g3, prec);
  const basis = realPeriods(cubicRoots(discOf(g2, prec), discOf(g3, prec), enclosed, prec), components, prec);
  const canonical = canonicalFrom(basis, prec, false) ?? canonicalUndecided(basis, prec);
  return { given, standing, ...canonical, conjugation, components };
}

function signOnLadder(value: (prec: number) => ball.Ball): Sign | undefined {
  for (const prec of LADDER) {
    const sign = ball.sign(value(prec));
    if (sign !== undefined) return sign;
  }
  return undefined;
}

/** Δ = g2³ − 27 g3², subtracted exactly where the invariants are rational. */
export function discriminant(g2: Quantity, g3: Quantity, prec: number): disc.Disc {
  const [a, b] = [exactRational(g2), exactRational(g3)];
  if (a && b) return discOf(a.pow(3).minus(b.pow(2).times(27)), prec);
  const [x, y] = [discOf(g2, prec + 8), discOf(g3, prec + 8)];
  const cube = disc.mul(disc.sqr(x, prec + 8), x, prec + 8);
  return disc.sub(cube, disc.mulInt(disc.sqr(y, prec + 8), 27n, prec + 8), prec);
}

/** Δ with about prec bits of its own where the invariants have them: near a double root most bits of g2³ and 27 g3² cancel. */
export function sharpDiscriminant(g2: Quantity, g3: Quantity, prec: number): disc.Disc {
  let delta = discriminant(g2, g3, prec);
  if (!isRefinable(g2) || !isRefinable(g3)) return delta;
  for (let wp = 2 * prec; disc.bits(delta) < prec - 8 && wp <= prec + 32_768; wp *= 2) delta = discriminant(g2, g3, wp);
  return delta;
}

function degenerate(): DomainError {
  return new DomainError({
    subject: "lattice",
    given: "g2³ = 27 g3², a cubic with a multiple root",
    expected: "invariants with g2³ ≠ 27 g3²",
    hint: "A double root leaves trigonometric or hyperbolic functions and one period only, a triple root rational functions: see degenerate({ invariants }).",
    argument: "invariants",
  });
}

function singularOrNot(): UndecidedError {
  return new UndecidedError({
    subject: "lattice",
    given: "g2³ − 27 g3² cannot be told from 0",
    expected: "invariants with g2³ ≠ 27 g3²",
    hint: "Give g2 and g3 exactly or with more digits.",
  });
}
