// What the duplications of Carlson's integrals share: roots in the right half plane, the mean, and when to stop.
//
// With λ = √x√y + √y√z + √z√x we have x + λ = (√x + √y)(√x + √z), so all is done on the roots a = √x, b = √y, c = √z: they and their
// sums lie in the right half plane, far from the cut of the root, and √((x + λ)/4) = √(a + b) √(a + c)/2 needs no choice.

import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError, PoleError, PrecisionError } from "../proof/errors.ts";
import { carlsonSeries, farEnough, type Kind, termCount } from "./carlson-series.ts";
import { lowMagnitude } from "./enclosure.ts";

export type Triple = readonly [Disc, Disc, Disc];

/** The roots of (x + λ)/4, (y + λ)/4 and (z + λ)/4 from those of x, y and z. */
export function halved([a, b, c]: Triple, wp: number): Triple {
  const ab = disc.sqrt(disc.add(a, b, wp), wp);
  const bc = disc.sqrt(disc.add(b, c, wp), wp);
  const ca = disc.sqrt(disc.add(c, a, wp), wp);
  const half = (x: Disc, y: Disc) => disc.ldexp(disc.mul(x, y, wp), -1);
  return [half(ab, ca), half(ab, bc), half(ca, bc)];
}

/** Principal roots of x, y and z. */
export function rootsOf(name: string, arguments_: readonly Disc[], wp: number): Disc[] {
  return arguments_.map((x) => {
    refuseCut(name, x);
    return disc.sqrt(x, wp);
  });
}

/** Refuses a negative number, which lies on the cut of the integral. */
export function refuseCut(name: string, x: Disc): void {
  if (x.axis !== "real" || !(x.re < 0n)) return;
  throw new DomainError({
    subject: name,
    given: "a negative argument, which lies on the cut (−∞, 0)",
    expected: "arguments off the negative real axis",
    hint: "Only the last argument of RC and RJ may be negative; the value is then Cauchy's principal value.",
  });
}

/** Refuses more zeros than the integral converges for. */
export function refuseZeros(name: string, arguments_: readonly Disc[], allowed: number): void {
  if (arguments_.filter((x) => disc.isZero(x)).length <= allowed) return;
  throw new PoleError({
    subject: name,
    given:
      allowed === 0
        ? "an argument 0 where the integral diverges"
        : "two arguments that are 0, where the integral diverges",
    expected: allowed === 0 ? "an argument that is not 0" : "at most one argument that is 0",
  });
}

/** A duplication: the roots, how they go on, and the weighted sum of their squares, which is the mean times the sum of the weights. */
export interface Duplication<R> {
  readonly name: string;
  readonly start: R;
  /** The differences of the mean and the arguments, times the sum of the weights; each step divides them by 4. */
  readonly gaps: readonly Disc[];
  total(roots: R, bits: number): Disc;
  next(roots: R, step: number): R;
}

/** Where a duplication ended. */
export interface Ended<R> {
  readonly roots: R;
  readonly steps: number;
  readonly total: Disc;
  readonly series: Disc;
}

/** Duplications until the series is short, and the series. */
export function duplicated<R>(kind: Kind, { name, start, gaps, total, next }: Duplication<R>, wp: number): Ended<R> {
  const terms = termCount(wp);
  let roots = start;
  let steps = 0;
  while (!farEnough(fallOf(gaps, total(roots, 32), steps), terms, wp)) {
    roots = next(roots, steps);
    steps = nextStep(name, steps);
  }
  const sum = total(roots, wp);
  const fall = Math.min(fallOf(gaps, sum, steps), 2 * wp);
  const scaled = gaps.map((g) => disc.ldexp(disc.div(g, sum, wp), -2 * steps));
  return { roots, steps, total: sum, series: carlsonSeries(kind, scaled, fall, terms, wp) };
}

/** The largest e such that every |difference|·4^−step < 2^−e·|mean|; −Infinity as long as the mean is not known to be off 0. */
function fallOf(differences: readonly Disc[], mean: Disc, step: number): number {
  const top = Math.max(...differences.map((d) => disc.magnitude(d)));
  if (top === -Infinity) return Infinity;
  return lowMagnitude(mean) + 2 * step - top;
}

/**
 * Whether the arguments of a symmetric function are provably closed under conjugation, so that the value is real: all
 * real, or exactly one pair of conjugates and a real number. `known` is for callers who know it of inexact ones.
 */
export function closedUnderConjugation(arguments_: readonly Disc[], known = false): boolean {
  const off = arguments_.filter((x) => x.axis !== "real");
  if (off.length === 0 || known) return true;
  return off.length === 2 && isConjugate(off[0]!, off[1]!);
}

function isConjugate(x: Disc, y: Disc): boolean {
  return x.rad === 0 && y.rad === 0 && disc.isZero(disc.sub(x, disc.conj(y), 1 << 30));
}

/** More duplications than any exponent within reach needs: each gains two bits of the ratio of the arguments. */
const MAX_STEPS = 200_000;

/** The number of the next duplication. Throws PrecisionError where enclosures are too wide for the arguments ever to come together. */
function nextStep(name: string, step: number): number {
  if (step < MAX_STEPS) return step + 1;
  throw new PrecisionError({
    subject: name,
    given: "arguments too coarse, or too far apart, for the duplication to end",
    expected: "enclosures that are small beside the arguments",
  });
}
