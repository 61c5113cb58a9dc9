import { describe, expect, it } from "vitest";
import type { Ball } from "../../../lib/number/ball.ts";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

const PRECISIONS = [20, 53, 176, 500, 1000, 1100, 3332, 5000, 20_000];

// Long inexact arguments, and the same with a radius of a few units.
function arguments_(prec: number): Ball[] {
  const third = ball.fromRational(Rational.of(22n, 27n), prec);
  return [third, ball.fromRational(Rational.of(7n, 9n), prec), { ...third, rad: 5 }];
}

// A result of relative condition about 1 keeps all but a few bits of the precision: what "few" is, is the claim.
const REAL: Readonly<Record<string, readonly [number, (x: Ball, y: Ball, prec: number) => Ball]>> = {
  add: [6, ball.add],
  mul: [6, ball.mul],
  "mul by a short exact number": [6, (x, _y, prec) => ball.mulInt(x, 3, prec)],
  div: [6, ball.div],
  "div of a short exact number": [6, (x, _y, prec) => ball.div(ball.fromInt(3), x, prec)],
  "div by a short exact number": [6, (x, _y, prec) => ball.div(x, ball.fromInt(3), prec)],
  sqrt: [6, (x, _y, prec) => ball.sqrt(x, prec)],
  "sqrt of a short exact number": [4, (_x, _y, prec) => ball.sqrt(ball.fromInt(3), prec)],
  exp: [6, (x, _y, prec) => ball.exp(x, prec)],
  ln: [8, (x, _y, prec) => ball.ln(x, prec)],
  sin: [6, (x, _y, prec) => ball.sin(x, prec)],
  cos: [6, (x, _y, prec) => ball.cos(x, prec)],
  agm: [6, ball.agm],
  pi: [3, (_x, _y, prec) => ball.pi(prec)],
};

const COMPLEX: Readonly<Record<string, readonly [number, (x: disc.Disc, y: disc.Disc, prec: number) => disc.Disc]>> = {
  add: [7, disc.add],
  mul: [7, disc.mul],
  sqr: [7, (x, _y, prec) => disc.sqr(x, prec)],
  div: [7, disc.div],
  sqrt: [7, (x, _y, prec) => disc.sqrt(x, prec)],
  exp: [7, (x, _y, prec) => disc.exp(x, prec)],
  sin: [7, (x, _y, prec) => disc.sinCos(x, prec).sin],
  agm: [8, disc.agm],
};

describe("results stay narrow — oracle: radius against the precision asked", () => {
  for (const [name, [lost, f]] of Object.entries(REAL)) {
    it(`${name} loses at most ${lost} bits at 20 to 20,000 bits`, () => {
      for (const prec of PRECISIONS) {
        const [x, y, z] = arguments_(prec) as [Ball, Ball, Ball];
        expect(ball.bits(f(x, y, prec))).toBeGreaterThanOrEqual(prec - lost);
        expect(ball.bits(f(z, y, prec))).toBeGreaterThanOrEqual(prec - lost - 2);
      }
    });
  }
  for (const [name, [lost, f]] of Object.entries(COMPLEX)) {
    it(`complex ${name} loses at most ${lost} bits at 20 to 20,000 bits`, () => {
      for (const prec of PRECISIONS) {
        const [x, y, z] = arguments_(prec) as [Ball, Ball, Ball];
        expect(disc.bits(f(disc.fromBalls(x, y), disc.fromBalls(y, x), prec))).toBeGreaterThanOrEqual(prec - lost);
        expect(disc.bits(f(disc.fromBalls(z, y), disc.fromBalls(y, z), prec))).toBeGreaterThanOrEqual(prec - lost - 2);
      }
    });
  }
});
