import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

describe("quotients and roots keep their accuracy at every length — oracle: the bits asked for", () => {
  // A root lost all bits beyond a thousand, and a divisor of 450 to 490 bits its quotient: the error's unit was taken for its size.
  for (const prec of [64, 200, 440, 456, 480, 500, 900, 1000, 1100, 2100, 5000]) {
    it(`${prec} bits`, () => {
      const y = ball.fromRational(Rational.parse("0.00001"), prec);
      expect(ball.bits(ball.inv(y, prec))).toBeGreaterThan(prec - 6);
      const x = disc.fromRational(Rational.parse("0.000003"), prec, Rational.parse("0.000012"));
      expect(disc.bits(disc.divBall(x, y, prec))).toBeGreaterThan(prec - 6);
      const short = ball.fromRational(Rational.parse("0.3"), 50);
      expect(ball.bits(ball.div(short, y, prec))).toBeGreaterThan(45);
      expect(ball.bits(ball.sqrt(y, prec))).toBeGreaterThan(prec - 6);
      expect(disc.bits(disc.sqrt(x, prec))).toBeGreaterThan(prec - 6);
      expect(ball.bits(ball.agm(y, ball.one, prec))).toBeGreaterThan(prec - 20);
      expect(disc.bits(disc.inv(x, prec))).toBeGreaterThan(prec - 6);
    });
  }
});
