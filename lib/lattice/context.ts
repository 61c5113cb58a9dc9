// What a lattice knows at a given precision, computed once and kept: periods, the reduced basis with its theta constants, roots, invariants.

import { ontoReal } from "../function/enclosure.ts";
import type { Matrix } from "../function/matrix.ts";
import { type ReducedLattice, reducedInvariants, reducedLattice, reducedRoots } from "../function/reduced.ts";
import { combination } from "../function/weierstrass.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Rational } from "../number/rational.ts";
import { PrecisionError } from "../proof/errors.ts";
import { complexPeriods, type PeriodPair, realPeriods } from "./agm-periods.ts";
import { sharpDiscriminant } from "./build.ts";
import { matrixBits, transformed } from "./canonical.ts";
import { type CubicRoots, cubicRoots } from "./cubic.ts";
import { fixedCubic } from "./fixed-cubic.ts";
import { CHAIN_GUARD, type LogarithmChain, logarithmChain } from "./fixed-logarithm.ts";
import { fixedPeriods } from "./fixed-periods.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { discOf, isRefinable } from "./quantity.ts";

const KEPT = 16;
const caches = new WeakMap<PeriodLattice, Map<string, unknown>>();

/** The value of `compute`, kept for the lattice under the name; the oldest of many kept values goes first. */
function cached<T>(lattice: PeriodLattice, name: string, compute: () => T): T {
  let kept = caches.get(lattice);
  const found = kept?.get(name);
  if (found !== undefined) return found as T;
  const value = compute();
  if (!kept) {
    kept = new Map();
    caches.set(lattice, kept);
  }
  if (kept.size >= KEPT) kept.delete(kept.keys().next().value!);
  kept.set(name, value);
  return value;
}

/** Precisions are rounded up to a multiple of this, so that neighbouring requests share a context. */
const GRAIN = 32;

function rounded(prec: number): number {
  return GRAIN * Math.ceil(prec / GRAIN);
}

/**
 * The own basis of the lattice, about 2^−prec relative where the input has the digits.
 *
 * Error    enclosures of the periods that the lattice's discrete choices name.
 * Cost     see agm-periods.ts; cached.
 */
export function periods(lattice: PeriodLattice, prec: number): PeriodPair {
  const p = rounded(prec);
  return cached(lattice, `periods ${p}`, () => computePeriods(lattice, p));
}

function computePeriods(lattice: PeriodLattice, prec: number): PeriodPair {
  const { given } = lattice;
  if (given.kind === "points") {
    const { w1, w2 } = periods(given.base, prec + 8);
    const point = ([r, s]: readonly [Rational, Rational]) =>
      disc.add(multiple(w1, r, prec + 8), multiple(w2, s, prec + 8), prec);
    return { w1: point(given.rows[0]), w2: point(given.rows[1]) };
  }
  if (given.kind === "periods") return { w1: discOf(given.w1, prec), w2: discOf(given.w2, prec) };
  const refinable = isRefinable(given.g2) && isRefinable(given.g3);
  let pair = meansWith(lattice, prec, refinable);
  // Roots near each other cost bits; exact input has them.
  for (let wp = 2 * prec; refinable && !(pair && accuracy(pair) >= prec) && wp <= 64 * prec + 4096; wp *= 2) {
    pair = meansWith(lattice, wp, true);
  }
  pair ??= meanPeriods(lattice, prec);
  return { w1: disc.round(pair.w1, prec), w2: disc.round(pair.w2, prec) };
}

/** The periods with that many bits; nothing where they do not do and there are more. */
function meansWith(lattice: PeriodLattice, wp: number, more: boolean): PeriodPair | undefined {
  try {
    return meanPeriods(lattice, wp);
  } catch (error) {
    if (more && error instanceof PrecisionError) return undefined;
    throw error;
  }
}

/** q·w for a rational q. */
export function multiple(w: Disc, q: Rational, prec: number): Disc {
  if (q.sign() === 0) return disc.zero;
  return disc.divBall(disc.mulInt(w, q.num, prec), ball.fromInt(q.den), prec);
}

function accuracy({ w1, w2 }: PeriodPair): number {
  return Math.min(disc.bits(w1), disc.bits(w2));
}

function meanPeriods(lattice: PeriodLattice, prec: number): PeriodPair {
  const { given, components } = lattice;
  if (components && given.kind === "invariants") {
    const [g2, g3] = [discOf(given.g2, prec + 40), discOf(given.g3, prec + 40)];
    const fixed = fixedPeriods(disc.real(g2), disc.real(g3), components, prec + 8);
    if (fixed) return fixed;
  }
  const roots = cubic(lattice, prec + 16);
  if (lattice.components) return realPeriods(roots, lattice.components, prec + 8);
  const pair = complexPeriods(roots, prec + 8);
  return transformed(pair, recognised(pair, lattice.anchor!), prec + 8);
}

function cubic(lattice: PeriodLattice, prec: number): CubicRoots {
  const { given } = lattice;
  if (given.kind !== "invariants") throw new TypeError("the cubic of a lattice that was given by periods");
  const [g2, g3] = [discOf(given.g2, prec + 24), discOf(given.g3, prec + 24)];
  return cubicRoots(g2, g3, sharpDiscriminant(given.g2, given.g3, prec + 24), prec);
}

/** The chain for logarithms of real points with so many bits, if there is one in fixed point. */
export function chainOf(lattice: PeriodLattice, prec: number): LogarithmChain | undefined {
  const { given, components } = lattice;
  if (given.kind !== "invariants" || !components) return undefined;
  const W = rounded(prec + CHAIN_GUARD);
  return cached(lattice, `chain ${W}`, () => {
    const [g2, g3] = [discOf(given.g2, W + 24), discOf(given.g3, W + 24)];
    const fixed = fixedCubic(disc.real(g2), disc.real(g3), components, W);
    return { chain: fixed && logarithmChain(fixed) };
  }).chain;
}

/** The matrix from `basis` to the basis that the anchor shows, of the same lattice. */
function recognised(basis: PeriodPair, anchor: PeriodPair): Matrix {
  const [w1, w2] = [disc.toDouble(basis.w1), disc.toDouble(basis.w2)];
  const area = w1[0] * w2[1] - w1[1] * w2[0];
  const row = (w: Disc) => {
    const [x, y] = disc.toDouble(w);
    const [p, q] = [(x * w2[1] - y * w2[0]) / area, (w1[0] * y - w1[1] * x) / area];
    const [m, n] = [Math.round(p), Math.round(q)];
    if (!(Math.abs(p - m) < 0.1 && Math.abs(q - n) < 0.1)) {
      throw new PrecisionError({
        subject: "periods",
        given: "invariants too coarse to recognise the chosen basis",
        expected: "invariants with more digits",
      });
    }
    return [BigInt(m), BigInt(n)] as const;
  };
  const [d, c] = row(anchor.w1);
  const [b, a] = row(anchor.w2);
  return { a, b, c, d };
}

/** The reduced basis with its theta constants. */
export function reduced(lattice: PeriodLattice, prec: number): ReducedLattice {
  const p = rounded(prec);
  return cached(lattice, `reduced ${p}`, () => {
    // A far τ costs bits twice: in the combination and in the ratio.
    const wp = p + 2 * matrixBits(lattice.toReduced) + 8;
    const { w1, w2 } = transformed(periods(lattice, wp), lattice.toReduced, wp);
    return reducedLattice(w1, w2, p);
  });
}

/** η1 and η2 of the own basis. */
export function quasiPeriods(lattice: PeriodLattice, prec: number): readonly [Disc, Disc] {
  const { a, b, c, d } = lattice.toReduced;
  const wp = prec + matrixBits(lattice.toReduced) + 8;
  const { eta1, eta2 } = reduced(lattice, wp);
  const own = [combination(eta1, eta2, a, -c, wp), combination(eta1, eta2, -b, d, wp)] as const;
  return [disc.round(own[0], prec), disc.round(own[1], prec)];
}

/** e1, e2, e3 at ω1/2, (ω1+ω2)/2 and ω2/2 of the own basis. */
export function roots(lattice: PeriodLattice, prec: number): readonly [Disc, Disc, Disc] {
  const p = rounded(prec);
  return cached(lattice, `roots ${p}`, () => {
    if (lattice.given.kind === "invariants" && lattice.components) return realBasisRoots(lattice, p);
    const at = reducedRoots(reduced(lattice, p));
    const { a, b, c, d } = lattice.toReduced;
    const root = (x: bigint, y: bigint) => (x & 1n ? (y & 1n ? at[1] : at[0]) : at[2]);
    return [root(a, c), root(a + b, c + d), root(b, d)] as const;
  });
}

/** Labels in the real basis: e1 > e2 > e3, or e1 real and Im e2 > 0. */
function realBasisRoots(lattice: PeriodLattice, prec: number): readonly [Disc, Disc, Disc] {
  const { root, gap } = cubic(lattice, prec + 8);
  const half = disc.ldexp(disc.neg(root), -1);
  const offset = disc.ldexp(gap, -1);
  const [above, under] = [disc.add(half, offset, prec + 8), disc.sub(half, offset, prec + 8)];
  return lattice.components === 2 && root.re < 0n ? [above, under, root] : [root, above, under];
}

/** g2 and g3: as given, or by theta constants. */
export function invariants(lattice: PeriodLattice, prec: number): { readonly g2: Disc; readonly g3: Disc } {
  const { given } = lattice;
  if (given.kind === "invariants") return { g2: discOf(given.g2, prec), g3: discOf(given.g3, prec) };
  const p = rounded(prec);
  return cached(lattice, `invariants ${p}`, () => {
    const { g2, g3 } = reducedInvariants(reduced(lattice, p));
    return lattice.conjugation ? { g2: ontoReal(g2), g3: ontoReal(g3) } : { g2, g3 };
  });
}
