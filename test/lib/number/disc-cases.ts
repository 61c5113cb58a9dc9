// Discs with an exact point of each, and the containment properties of complex operations.
import fc from "fast-check";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { anyExponent, precision } from "./cases.ts";
import { attempt, type Property } from "./containment.ts";

export interface PointedDisc {
  readonly disc: Disc;
  readonly point: Disc;
}

const part = fc.oneof(
  { arbitrary: fc.bigInt(-(2n ** 60n), 2n ** 60n), weight: 3 },
  { arbitrary: fc.bigInt(-(2n ** 500n), 2n ** 500n), weight: 2 },
  { arbitrary: fc.bigInt(-(2n ** 1800n), 2n ** 1800n), weight: 1 },
  { arbitrary: fc.bigInt(-3n, 3n), weight: 1 },
);

const radius = fc.oneof(
  { arbitrary: fc.constant(0), weight: 3 },
  { arbitrary: fc.constantFrom(1, 1.5, 1.9999999999999998, 2 ** 30), weight: 2 },
  { arbitrary: fc.double({ min: 1, max: 2 ** 30, noNaN: true }), weight: 3 },
);

/** Directions of size at most 1 in 1/125ths: axes, Pythagorean points of the circle, the centre. */
const directions: readonly (readonly [number, number])[] = [
  [125, 0],
  [0, -125],
  [75, 100],
  [-100, 75],
  [-35, -120],
  [117, -44],
  [0, 0],
  [60, 60],
];

export function pointedDisc(exponent: fc.Arbitrary<number>): fc.Arbitrary<PointedDisc> {
  const axis = fc.constantFrom("real", "imaginary", "plane", "plane", "plane", "plane");
  return fc
    .tuple(part, part, exponent, radius, axis, fc.constantFrom(...directions))
    .map(([a, b, exp, rad, kind, [u, v]]) => {
      // In units of 2^-60: a little less than rad·(u + iv)/125, since 125 is no power of two.
      const t = (n: number): bigint => (BigInt(rad * 2 ** 52) * BigInt(n) * 255n) / 125n;
      if (kind === "real") {
        const on = { man: (a << 60n) + t(u === 0 ? v : u), exp: exp - 60, rad: 0 };
        return { disc: disc.fromBall({ man: a, exp, rad }), point: disc.fromBall(on) };
      }
      if (kind === "imaginary") {
        const on = { man: (a << 60n) + t(u === 0 ? v : u), exp: exp - 60, rad: 0 };
        return { disc: disc.imaginary({ man: a, exp, rad }), point: disc.imaginary(on) };
      }
      const re = { man: (a << 60n) + t(u), exp: exp - 60, rad: 0 };
      const im = { man: (b << 60n) + t(v), exp: exp - 60, rad: 0 };
      return { disc: { re: a, im: b, exp, rad, axis: "plane" }, point: disc.fromBalls(re, im) };
    });
}

export function resizedDisc(p: PointedDisc, size: number): PointedDisc {
  const now = disc.magnitude(p.disc);
  const k = Number.isFinite(now) ? size - now : 0;
  return { disc: disc.ldexp(p.disc, k), point: disc.ldexp(p.point, k) };
}

function holds(result: Disc, truth: Disc): boolean {
  const fine = result.rad === 0 || (result.rad >= 1 && result.rad <= 2 ** 31);
  const onAxis = (result.axis !== "real" || result.im === 0n) && (result.axis !== "imaginary" || result.re === 0n);
  if (!fine || !onAxis || !Number.isSafeInteger(result.exp)) throw new Error(`ill-formed disc: radius ${result.rad}`);
  return disc.overlaps(result, truth);
}

type Unary = (x: Disc, prec: number) => Disc;
type Binary = (x: Disc, y: Disc, prec: number) => Disc;

function unary(name: string, f: Unary, sizes: fc.Arbitrary<number>): Property {
  const property = fc.property(pointedDisc(anyExponent), sizes, precision, (p, size, prec) => {
    const x = resizedDisc(p, size);
    const result = attempt(() => f(x.disc, prec));
    const truth = attempt(() => f(x.point, 3 * prec + 300));
    return result === undefined || truth === undefined || holds(result, truth);
  });
  return { name: `complex ${name}`, property };
}

function binary(name: string, f: Binary): Property {
  const property = fc.property(pointedDisc(anyExponent), pointedDisc(anyExponent), precision, (x, y, prec) => {
    const result = attempt(() => f(x.disc, y.disc, prec));
    const truth = attempt(() => f(x.point, y.point, 3 * prec + 300));
    return result === undefined || truth === undefined || holds(result, truth);
  });
  return { name: `complex ${name}`, property };
}

interface Gauss {
  readonly re: Rational;
  readonly im: Rational;
}

function gauss(d: Disc): Gauss {
  const unit = d.exp >= 0 ? Rational.of(1n << BigInt(d.exp)) : Rational.of(1n, 1n << BigInt(-d.exp));
  return { re: unit.times(d.re), im: unit.times(d.im) };
}

/** |result − truth| <= radius, squared, in exact rational arithmetic. */
function holdsExactly(result: Disc, truth: Gauss): boolean {
  const centre = gauss(result);
  const re = centre.re.minus(truth.re);
  const im = centre.im.minus(truth.im);
  if (result.axis === "real" && !truth.im.equals(0)) return false;
  if (result.axis === "imaginary" && !truth.re.equals(0)) return false;
  const r = gauss({ re: BigInt(result.rad * 2 ** 52), im: 0n, exp: result.exp - 52, rad: 0, axis: "real" }).re;
  return re.times(re).plus(im.times(im)).compare(r.times(r)) <= 0;
}

function field(name: string, f: Binary, g: (x: Gauss, y: Gauss) => Gauss): Property {
  const near = fc.integer({ min: -500, max: 500 });
  const property = fc.property(pointedDisc(near), pointedDisc(near), precision, (x, y, prec) => {
    const result = attempt(() => f(x.disc, y.disc, prec));
    return result === undefined || holdsExactly(result, g(gauss(x.point), gauss(y.point)));
  });
  return { name: `complex ${name}, exactly`, property };
}

const times = (x: Gauss, y: Gauss): Gauss => ({
  re: x.re.times(y.re).minus(x.im.times(y.im)),
  im: x.re.times(y.im).plus(x.im.times(y.re)),
});

function quotient(x: Gauss, y: Gauss): Gauss {
  const norm = y.re.times(y.re).plus(y.im.times(y.im));
  const top = times(x, { re: y.re, im: y.im.neg() });
  return { re: top.re.div(norm), im: top.im.div(norm) };
}

const moderate = fc.integer({ min: -60, max: 8 });

export const discProperties: readonly Property[] = [
  field("add", disc.add, (x, y) => ({ re: x.re.plus(y.re), im: x.im.plus(y.im) })),
  field("sub", disc.sub, (x, y) => ({ re: x.re.minus(y.re), im: x.im.minus(y.im) })),
  field("mul", disc.mul, times),
  field("div", disc.div, quotient),
  field(
    "sqr",
    (x, _y, prec) => disc.sqr(x, prec),
    (x) => times(x, x),
  ),
  field(
    "conj, mulI",
    (x) => disc.mulI(disc.conj(x)),
    (x) => ({ re: x.im, im: x.re }),
  ),
  binary("add", disc.add),
  binary("mul", disc.mul),
  binary("div", disc.div),
  binary("agm", disc.agm),
  unary("sqrt", disc.sqrt, fc.integer({ min: -33000, max: 33000 })),
  unary("exp", disc.exp, moderate),
  unary("exp of tiny", disc.exp, fc.integer({ min: -3000, max: 0 })),
  unary("sin", (x, prec) => disc.sinCos(x, prec).sin, moderate),
  unary("cos", (x, prec) => disc.sinCos(x, prec).cos, moderate),
  unary("sin of tiny", (x, prec) => disc.sinCos(x, prec).sin, fc.integer({ min: -3000, max: 0 })),
  unary("ln", disc.ln, moderate),
  unary("ln of tiny and huge", disc.ln, fc.integer({ min: -33000, max: 33000 })),
  unary("arg", (x, prec) => disc.fromBall(disc.arg(x, prec)), moderate),
  unary("tan", disc.tan, fc.integer({ min: -60, max: 4 })),
  unary("atan", disc.atan, moderate),
  unary("asin", disc.asin, moderate),
  unary("acos", disc.acos, moderate),
  unary("asinh", disc.asinh, moderate),
  unary("acosh", disc.acosh, moderate),
  unary("acosh near 1", (x, prec) => disc.acosh(disc.add(disc.one, x, 3000), prec), fc.integer({ min: -300, max: -1 })),
  unary("atanh", disc.atanh, moderate),
  unary("cube root", (x, prec) => disc.nthRoot(x, 3, prec), moderate),
  unary("sixth root", (x, prec) => disc.nthRoot(x, 6, prec), fc.integer({ min: -3000, max: 3000 })),
  unary("sinh", (x, prec) => disc.sinhCosh(x, prec).sinh, moderate),
  unary("power", (x, prec) => disc.power(x, disc.add(disc.one, disc.i, 8), prec), moderate),
  unary("pow 5", (x, prec) => disc.pow(x, 5, prec), moderate),
  unary("pow -2", (x, prec) => disc.pow(x, -2, prec), moderate),
  unary("abs", (x, prec) => disc.fromBall(disc.abs(x, prec)), moderate),
  unary("real part", (x) => disc.fromBall(disc.real(x)), moderate),
  unary("imaginary part", (x) => disc.fromBall(disc.imag(x)), moderate),
  unary("round trip of parts", (x) => disc.fromBalls(disc.real(x), disc.imag(x)), moderate),
];
