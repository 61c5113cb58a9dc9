import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Ball } from "../../../lib/number/ball.ts";
import * as ball from "../../../lib/number/ball.ts";
import { exact, type Pointed, pointed, precision } from "./cases.ts";

type Binary = (x: Ball, y: Ball, prec: number) => Ball;

/** The containment property for sums of balls with one exponent and for products, as a check that can fail. */
function failed(f: Binary, method: "plus" | "times", runs: number): boolean {
  const near = fc.constant(0);
  const property = fc.property(pointed(near), pointed(near), precision, (x: Pointed, y: Pointed, prec) =>
    ball.contains(f(x.ball, y.ball, prec), exact(x.point)[method](exact(y.point))),
  );
  return fc.check(property, { numRuns: runs, seed: 11 }).failed;
}

describe("the containment test catches deliberate faults — oracle: the fault itself", () => {
  it("a sum whose radius lacks the last outward factor", () => {
    const broken: Binary = (x, y) => ({ man: x.man + y.man, exp: x.exp, rad: x.rad + y.rad });
    expect(failed(broken, "plus", 3000)).toBe(true);
  });

  it("a product that does not count the bits it cuts", () => {
    const broken: Binary = (x, y, prec) => {
      const z = ball.mul(x, y, prec);
      return z.rad >= 2 ? { man: z.man, exp: z.exp, rad: z.rad - 1 } : z;
    };
    expect(failed(broken, "times", 3000)).toBe(true);
  });

  it("a product without the term of both radii", () => {
    const broken: Binary = (x, y) => {
      const size = (n: bigint): number => Math.abs(Number(n)) * (1 + 2 ** -50);
      const rad = (size(x.man) * y.rad + size(y.man) * x.rad) * (1 + 2 ** -48);
      return rad < 2 ** 900
        ? { man: x.man * y.man, exp: 0, rad: rad === 0 ? 0 : Math.max(rad, 1) }
        : ball.mul(x, y, 53);
    };
    expect(failed(broken, "times", 3000)).toBe(true);
  });

  it("and passes for the real ones", () => {
    expect(failed(ball.add, "plus", 500)).toBe(false);
    expect(failed(ball.mul, "times", 500)).toBe(false);
  });
});
