// Random and edge enclosures with a point of each, and the exact arithmetic that the containment tests compare with.
import fc from "fast-check";
import type { Ball } from "../../../lib/number/ball.ts";
import * as ball from "../../../lib/number/ball.ts";
import { Rational } from "../../../lib/number/rational.ts";

/** An enclosure and an exact point of it. */
export interface Pointed {
  readonly ball: Ball;
  readonly point: Ball;
}

const mantissa = fc.oneof(
  { arbitrary: fc.bigInt(-(2n ** 60n), 2n ** 60n), weight: 3 },
  { arbitrary: fc.bigInt(-(2n ** 700n), 2n ** 700n), weight: 2 },
  { arbitrary: fc.bigInt(-(2n ** 2400n), 2n ** 2400n), weight: 1 },
  { arbitrary: fc.bigInt(-3n, 3n), weight: 1 },
  // Neighbours of powers of two: where lengths are easily miscounted.
  {
    arbitrary: fc.tuple(fc.integer({ min: 1, max: 1200 }), fc.bigInt(-2n, 2n)).map(([k, d]) => (1n << BigInt(k)) + d),
    weight: 1,
  },
);

const radius = fc.oneof(
  { arbitrary: fc.constant(0), weight: 3 },
  { arbitrary: fc.constantFrom(1, 1.5, 1.9999999999999998, 2 ** 30), weight: 2 },
  { arbitrary: fc.double({ min: 1, max: 2 ** 30, noNaN: true }), weight: 3 },
  { arbitrary: fc.double({ min: 1, max: 10, noNaN: true }), weight: 3 },
);

/** Where in [-1, 1] the point lies, in units of the radius; the edges often. */
const place = fc.constantFrom(-1, 1, -1, 1, 0, 0.5, -0.75, 0.984375);

export function pointed(exponent: fc.Arbitrary<number>): fc.Arbitrary<Pointed> {
  return fc.tuple(mantissa, exponent, radius, place).map(([man, exp, rad, f]) => {
    // man + f·rad over 2^58: the radius has 52 fraction bits, f has 6.
    const t = BigInt(rad * 2 ** 52) * BigInt(f * 64);
    return { ball: { man, exp, rad }, point: { man: (man << 58n) + t, exp: exp - 58, rad: 0 } };
  });
}

export const anyExponent = fc.oneof(
  { arbitrary: fc.integer({ min: -400, max: 400 }), weight: 4 },
  { arbitrary: fc.integer({ min: -33300, max: 33300 }), weight: 1 },
);

/** Moves the ball by a power of two so that |x| is about 2^size. */
export function resized(p: Pointed, size: number): Pointed {
  const now = ball.magnitude(p.ball);
  const shift = Number.isFinite(now) ? size - now : 0;
  return { ball: ball.ldexp(p.ball, shift), point: ball.ldexp(p.point, shift) };
}

export const precision = fc.oneof(
  fc.integer({ min: 10, max: 200 }),
  fc.constantFrom(53, 64, 176, 700, 1000, 1100, 2600),
  fc.integer({ min: 200, max: 1500 }),
);

/** The exact value of a point. */
export function exact(x: Ball): Rational {
  return x.exp >= 0 ? Rational.of(x.man << BigInt(x.exp)) : Rational.of(x.man, 1n << BigInt(-x.exp));
}
