// Points r ω1 + s ω2 (+ a remainder) with rational coordinates, and the functions there: exact symmetry before digits.

import { ontoImaginary, ontoReal } from "../function/enclosure.ts";
import { type Wanted, type WeierstrassValues, weierstrass } from "../function/weierstrass.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Rational } from "../number/rational.ts";
import { multiple, periods, reduced } from "./context.ts";
import type { PeriodLattice } from "./period-lattice.ts";

export type Coordinates = readonly [Rational, Rational];

/** r ω1 + s ω2. */
export function pointAt(lattice: PeriodLattice, [r, s]: Coordinates, prec: number): Disc {
  const { w1, w2 } = periods(lattice, prec + 8);
  return disc.add(multiple(w1, r, prec + 8), multiple(w2, s, prec + 8), prec);
}

/** The representative with coordinates in (−1/2, 1/2]. */
export function nearestRepresentative([r, s]: Coordinates): Coordinates {
  const near = (q: Rational) => q.plus(q.neg().round());
  return [near(r), near(s)];
}

/** What the symmetries of a real lattice say about values at a point. */
interface Symmetry {
  /** conj z ≡ z: ℘, ℘′ are real. */
  readonly fixed: boolean;
  /** conj z ≡ −z: ℘ is real, ℘′ imaginary. */
  readonly turned: boolean;
  /** conj z = z or −z itself: ζ and σ are real or imaginary too. */
  readonly exactly: "real" | "imaginary" | undefined;
}

function symmetry(lattice: PeriodLattice, [r, s]: Coordinates, rest: Disc | undefined): Symmetry {
  const k = lattice.conjugation;
  const none = { fixed: false, turned: false, exactly: undefined };
  if (!k || rest?.axis === "plane") return none;
  const conjugate: Coordinates = [r.times(k.a11).plus(s.times(k.a21)), r.times(k.a12).plus(s.times(k.a22))];
  const differences = [conjugate[0].minus(r), conjugate[1].minus(s)];
  const sums = [conjugate[0].plus(r), conjugate[1].plus(s)];
  const whole = (pair: readonly Rational[]) => pair.every((q) => q.isInteger());
  const zero = (pair: readonly Rational[]) => pair.every((q) => q.sign() === 0);
  const fixed = rest?.axis !== "imaginary" && whole(differences);
  const turned = rest?.axis !== "real" && whole(sums);
  // At ω2/2 both congruences hold, and only one of them as an equation.
  const exactly = fixed && zero(differences) ? "real" : turned && zero(sums) ? "imaginary" : undefined;
  return { fixed, turned, exactly };
}

/**
 * The wanted functions at r ω1 + s ω2 + rest.
 *
 * Domain   not a lattice point, for ℘, ℘′, ζ.
 * Error    enclosures; ℘ and ℘′ are taken at the representative with small coordinates, ζ and σ at the point itself. Values that symmetry
 *          makes real or imaginary are given on that axis.
 * Throws   PoleError at a lattice point.
 */
export function valuesAtPoint(
  lattice: PeriodLattice,
  at: Coordinates,
  rest: Disc | undefined,
  prec: number,
  wanted: readonly Wanted[],
): WeierstrassValues {
  const periodic = wanted.every((name) => name === "wp" || name === "prime");
  const where = periodic ? nearestRepresentative(at) : at;
  const wp = prec + farBits(at);
  const point = pointAt(lattice, where, wp);
  const z = rest ? disc.add(point, rest, wp) : point;
  const values = weierstrass(reduced(lattice, wp), z, wp, wanted);
  const { fixed, turned, exactly } = symmetry(lattice, at, rest);
  if (!fixed && !turned) return values;
  const out: { [K in Wanted]?: Disc } = {};
  for (const [name, value] of Object.entries(values) as [Wanted, Disc][]) {
    if (name === "wp") out.wp = ontoReal(value);
    else if (name === "prime") out.prime = fixed ? ontoReal(value) : ontoImaginary(value);
    else if (exactly) out[name] = exactly === "real" ? ontoReal(value) : ontoImaginary(value);
    else out[name] = value;
  }
  return out;
}

function farBits([r, s]: Coordinates): number {
  const bits = (q: Rational) => q.floor().toString(2).length;
  return Math.max(bits(r), bits(s));
}
