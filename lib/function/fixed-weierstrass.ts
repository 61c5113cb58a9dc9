// ℘, ℘′ and ζ at one point in fixed point: the formulas of weierstrass.ts on bare integers, for the arguments that need no more.
//
// With v = z/r1 in the upper half of the cell, a + bi = 2πv and y = 4 sin² πv = 2 − 2 cos 2πv (DLMF 4.21.27, 4.21.28)
//     1/sin² πv = 4/y,   cot πv = 2 sin 2πv / y,   cos(a + bi) = cos a cosh b − i sin a sinh b,   sin(a + bi) = sin a cosh b + i cos a sinh b,
// so one real exponential, one real sine with cosine and two quotients serve all. Lengths are in units of 2^t, near |r1|. Errors are counted as in
// fixed-complex.ts. Near a lattice point and far up in a tall cell, where small numbers count, and for wide arguments the enclosures of
// weierstrass.ts take over.

import * as ball from "../number/ball.ts";
import { finish } from "../number/disc/data.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { pow2, shift } from "../number/fixed/bits.ts";
import { boundedCache } from "../number/fixed/cache.ts";
import { ln2Fixed, piFixed } from "../number/fixed/constants.ts";
import { expFixed } from "../number/fixed/exp.ts";
import { sinCosFixed } from "../number/fixed/trig.ts";
import { type CellSeries, LARGEST, pointSums, withPlaces } from "./cell-series.ts";
import {
  absUpper,
  doubled,
  type Fixed,
  inverse,
  minus,
  plus,
  ROOT2,
  type Sized,
  sized,
  squared,
  times,
  toFixed,
  UP,
} from "./fixed-complex.ts";
import type { ReducedLattice } from "./reduced.ts";

/** What a lattice gives to every point, with W places. */
interface FixedLattice {
  readonly W: number;
  readonly t: number;
  readonly series: CellSeries;
  /** 1/r1, τ, π/r1, (π/r1)², (π/r1)³, η1/r1 and the quasi-periods in units of 2^t. */
  readonly over: Sized;
  readonly tau: Sized;
  readonly slope: readonly [number, number];
  readonly unit: Sized;
  readonly scale: Sized;
  readonly cube: Sized;
  readonly mean: Sized;
  readonly eta1: Sized;
  readonly eta2: Sized;
  readonly pi: bigint;
  readonly ln2: bigint;
  /** Whether all of it but τ is real. */
  readonly real: boolean;
  readonly sharp: boolean;
}

function fixedLattice(l: ReducedLattice, series: CellSeries, W: number): FixedLattice {
  const t = disc.magnitude(l.r1);
  let sharp = true;
  const at = (d: Disc, k: number) => {
    const x = sized(toFixed(disc.ldexp(d, k * t), W), W);
    sharp &&= isSharp(x, W);
    return x;
  };
  const constants = {
    W,
    t,
    series: withPlaces(series, W),
    over: at(l.over, 1),
    tau: at(l.tau, 0),
    slope: disc.toDouble(l.tau) as [number, number],
    unit: at(l.unit, 1),
    scale: at(l.scale, 2),
    cube: at(l.cube, 3),
    mean: at(l.mean, 2),
    eta1: at(l.eta1, 1),
    eta2: at(l.eta2, 1),
    pi: piFixed(W),
    ln2: ln2Fixed(W),
    real: series.real && [l.over, l.unit, l.scale, l.cube, l.mean, l.eta1].every((d) => d.axis === "real"),
  };
  return { ...constants, sharp };
}

const contexts = new WeakMap<ReducedLattice, (W: number) => FixedLattice>();

/** Places beyond the bits that are asked for, where the series has them: the counted errors, and a part that 1/y may lose. */
const GUARD = 44;
const COUNTED = 20;
/** The largest coordinates that are subtracted here, the largest and the least |y|: 1/y has relative errors of some units over |y|. */
const FARTHEST = 2 ** 20;
const HIGHEST = 2 ** 8;
const NEAREST = 2 ** -18;
/** Whether x is off by at most 2^−40, and by units that leave room in the doubles; what is not is left to the enclosures. */
function isSharp(x: Fixed, W: number): boolean {
  return x.err <= 2 ** 300 && x.err * pow2(-W) <= 2 ** -40;
}

/** ℘, ℘′ and ζ, those that are wanted. */
export interface FixedValues {
  wp?: Disc;
  prime?: Disc;
  zeta?: Disc;
}

/**
 * ℘, ℘′ and ζ together, those that are wanted.
 *
 * Domain   every z; see the header for what is left to others.
 * Error    enclosures, about 2^−prec beside the largest term of each formula.
 * Cost     one real exponential, one real sine with cosine, the series, three quotients and about a dozen products.
 * @returns nothing where it does not apply.
 */
export function fixedWeierstrass(
  l: ReducedLattice,
  series: CellSeries,
  z: Disc,
  prec: number,
  wanted: readonly (keyof FixedValues)[],
): FixedValues | undefined {
  const W = Math.min(series.places, 32 * Math.ceil((prec + GUARD) / 32));
  if (W < 96 || W < prec + COUNTED) return undefined;
  let at = contexts.get(l);
  if (!at) {
    at = boundedCache(6, (places) => fixedLattice(l, series, places));
    contexts.set(l, at);
  }
  const c = at(W);
  const real = z.axis === "real" && c.real;
  const cell = c.sharp && (real || z.axis === "plane") ? toUpperCell(c, z) : undefined;
  if (!cell) return undefined;
  const order = wanted.includes("prime") ? 3 : wanted.includes("wp") ? 2 : 1;
  const found = derivatives(c, cell.v, order, real, pow2(prec + COUNTED - W));
  if (!found) return undefined;
  const out: FixedValues = {};
  const value = (x: Sized, power: number, odd: boolean) => finished(x, c, power, odd && cell.down, prec, real);
  if (found.second && wanted.includes("wp")) out.wp = value(minus(times(c.scale, found.second, W), c.mean), 2, false);
  if (found.third) out.prime = value(times(c.cube, found.third, W), 3, true);
  if (wanted.includes("zeta")) out.zeta = value(shiftedZeta(c, cell, found.first), 1, true);
  return out;
}

/** ±ζ(z): ζ is odd, so the shift is turned with the argument. */
function shiftedZeta(c: FixedLattice, { v, m1, m2, down }: Cell, first: Sized): Sized {
  let sum = plus(times(c.eta1, v, c.W), times(c.unit, first, c.W));
  const sign = down ? -1 : 1;
  if (m1 !== 0) sum = plus(sum, multiple(c.eta1, sign * m1));
  if (m2 !== 0) sum = plus(sum, multiple(c.eta2, sign * m2));
  return sum;
}

function finished(x: Sized, { W, t }: FixedLattice, power: number, turned: boolean, prec: number, real: boolean): Disc {
  const [re, im] = turned ? [-x.re, -x.im] : [x.re, x.im];
  const exp = -W - power * t;
  const err = Math.max(1, x.err);
  return real ? disc.fromBall(ball.finish(re, exp, err, prec, W)) : finish(re, im, exp, err, prec);
}

function multiple(x: Sized, m: number): Sized {
  const n = BigInt(m);
  const size = Math.abs(m);
  return { re: x.re * n, im: x.im * n, err: x.err * size * UP, size: x.size * size * UP };
}

interface Cell {
  /** ±(z/r1 − m1 − m2 τ), Im v >= 0. */
  readonly v: Sized;
  readonly m1: number;
  readonly m2: number;
  /** Whether the sign is −. */
  readonly down: boolean;
}

/** z in or beside the cell; any integers near are right, so doubles choose them. */
function toUpperCell(c: FixedLattice, z: Disc): Cell | undefined {
  const { W, tau } = c;
  if (!(disc.magnitude(z) - c.t < 20)) return undefined;
  const point = toFixed(disc.ldexp(z, -c.t), W);
  if (!isSharp(point, W)) return undefined;
  const v = times(sized(point, W), c.over, W);
  const [x, height] = c.slope;
  const m2 = Math.round(toDouble(v.im, W) / height);
  const m1 = Math.round(toDouble(v.re, W) - m2 * x);
  if (!(Math.abs(m1) + Math.abs(m2) < FARTHEST)) return undefined;
  let { re, im, err } = v;
  if (m2 !== 0) {
    const n = BigInt(m2);
    re -= n * tau.re;
    im -= n * tau.im;
    err = (err + Math.abs(m2) * tau.err) * UP;
  }
  if (m1 !== 0) re -= BigInt(m1) << shift(W);
  const down = im < 0n;
  const cell = down ? { re: -re, im: -im, err } : { re, im, err };
  return { v: sized(cell, W), m1, m2, down };
}

/** man·2^−places for places >= 60. */
function toDouble(man: bigint, places: number): number {
  return Number(man >> shift(places - 60)) * 2 ** -60;
}

/** f1, −f2 and −f3 of weierstrass.ts. */
interface Derivatives {
  readonly first: Sized;
  readonly second?: Sized;
  readonly third?: Sized;
}

function derivatives(
  c: FixedLattice,
  v: Sized,
  order: 1 | 2 | 3,
  real: boolean,
  nearest: number,
): Derivatives | undefined {
  const { W, series } = c;
  const circle = sineCosine(c, v, real);
  if (!circle || !(circle.y.size >= nearest)) return undefined;
  const { sin, y } = circle;
  const Y = lowered(y, series.k);
  const size = absUpper(Y, W);
  if (!(size <= LARGEST)) return undefined;
  const sums = pointSums(series, Y, size, order, real);
  const over = inverse(y, W);
  const base = inverse(sized(sums[0]!, W), W);
  if (!over || !base) return undefined;
  const one: Sized = { re: 1n << shift(W), im: 0n, err: 0, size: 1 };
  const ratio = (j: number) => times(sized(sums[j]!, W), base, W);
  const e1 = ratio(1);
  const linear = plus(one, doubled(e1, 1));
  const cot = doubled(times(sin, over, W), 1);
  const first = times(cot, linear, W);
  if (order < 2) return { first };
  const e2 = ratio(2);
  const square = doubled(over, 2);
  const e1Square = squared(e1, W);
  const kappa = doubled(minus(e2, e1Square), 2);
  const reduced = minus(linear, kappa);
  const second = plus(times(square, reduced, W), kappa);
  if (order < 3) return { first, second };
  // κ3 = ε3 − ε1 (3ε2 − 2ε1²)
  const inner = minus(multiple(e2, 3), doubled(e1Square, 1));
  const kappa3 = doubled(minus(ratio(3), times(e1, inner, W)), 2);
  const factor = plus(minus(reduced, half(kappa)), kappa3);
  const third = multiple(times(cot, minus(times(square, factor, W), kappa3), W), -2);
  return { first, second, third };
}

/** κ is a multiple of 4, so that this is exact. */
function half({ re, im, err, size }: Sized): Sized {
  return { re: re >> 1n, im: im >> 1n, err: err / 2, size: size / 2 };
}

function lowered(x: Fixed, k: number): Fixed {
  if (k <= 0) {
    const by = shift(-k);
    return { re: x.re << by, im: x.im << by, err: x.err * pow2(-k) };
  }
  const by = shift(k);
  return { re: x.re >> by, im: x.im >> by, err: (x.err * pow2(-k) + ROOT2) * UP };
}

/**
 * sin 2πv and y = 2 − 2 cos 2πv.
 *
 * Error    Re v − n/4 is at most 1/8 and a little, so the angle is below 1 and off by 2 units (π by 2, times 1/4, and a cut), sine and cosine, whose own error is under 2, by 4.
 *          b = 2π Im v = m ln 2 + r is off by 2(2·Im v + m) + 2 units at most, m <= 9, e^r by twice that and 2, e^b by 2^m times that. e^−b is below 1 and
 *          off by no more. So cosh b and sinh b are off by E = 2^m (4(2 Im v + m) + 7), and each part of the products by 4 cosh b + E + 1 (and the
 *          product of the errors, which is nothing). An error of v moves sine and cosine by at most 2π (1 + 2^−20) cosh(b) times it.
 */
function sineCosine(c: FixedLattice, v: Sized, real: boolean): { readonly sin: Sized; readonly y: Sized } | undefined {
  const { W, pi } = c;
  const w = shift(W);
  const n = Math.round(4 * toDouble(v.re, W));
  const rest = v.re - (BigInt(n) << shift(W - 2));
  const angle = (pi * (rest < 0n ? -rest : rest)) >> shift(W - 1);
  const { sin: s, cos } = sinCosFixed(angle, W);
  const [sine, cosine] = turned(rest < 0n ? -s : s, cos, n);
  if (real) {
    const err = (4 + 6.3 * v.err) * UP;
    const y = sizedY({ re: (1n << shift(W + 1)) - 2n * cosine, im: 0n, err: 2 * err }, W);
    return y && { sin: { re: sine, im: 0n, err, size: 1 + 2 ** -20 }, y };
  }
  const b = (pi * v.im) >> shift(W - 1);
  const m = Math.floor(toDouble(b, W) / Math.LN2);
  if (!(m <= 9)) return undefined;
  const r = b - BigInt(m) * c.ln2;
  if (r < 0n || r >> w !== 0n) return undefined;
  const up = expFixed(r, W) << shift(m);
  const low = (1n << shift(2 * W)) / up;
  const [cosh, sinh] = [(up + low) >> 1n, (up - low) >> 1n];
  const height = (toDouble(cosh, W) + 2 ** -30) * UP;
  const each = 4 * height + 2 ** m * (4 * (2 * v.size + m) + 7) + 2;
  const err = (ROOT2 * each + 6.3 * height * v.err) * UP;
  const sin: Sized = { re: (sine * cosh) >> w, im: (cosine * sinh) >> w, err, size: (height + 1) * UP };
  const re = (1n << shift(W + 1)) - ((cosine * cosh) >> shift(W - 1));
  const y = sizedY({ re, im: (sine * sinh) >> shift(W - 1), err: 2 * err }, W);
  return y && { sin, y };
}

/** Sine and cosine of an angle with n quarter turns more. */
function turned(sin: bigint, cos: bigint, n: number): readonly [bigint, bigint] {
  const quarter = ((n % 4) + 4) % 4;
  if (quarter === 0) return [sin, cos];
  if (quarter === 1) return [cos, -sin];
  return quarter === 2 ? [-sin, -cos] : [-cos, sin];
}

function sizedY(y: Fixed, W: number): Sized | undefined {
  const found = sized(y, W);
  return found.size <= HIGHEST && found.size >= NEAREST ? found : undefined;
}
