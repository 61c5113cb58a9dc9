import { runInThisContext } from "node:vm";
import { describe, expect, it } from "vitest";
import { latticeOfInvariants } from "../../../lib/lattice/build.ts";
import { realLogarithm } from "../../../lib/lattice/real-logarithm.ts";
import { weierstrassValues } from "../../../lib/lattice/values.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

/**
 * Runs f, cut off by the engine after `ms` milliseconds wherever it is, as an interrupt cuts a cell off. Nothing here depends on where that is: whatever
 * was cut off must leave all that is kept complete or absent.
 */
function cutOff(f: () => unknown, ms: number): boolean {
  const holder = globalThis as { evaluateForTest?: () => unknown };
  holder.evaluateForTest = f;
  try {
    runInThisContext("globalThis.evaluateForTest()", { timeout: ms });
    return false;
  } catch (error) {
    expect(error).toMatchObject({ code: "ERR_SCRIPT_EXECUTION_TIMEOUT" });
    return true;
  } finally {
    delete holder.evaluateForTest;
  }
}

describe("a call that is cut off midway leaves what is kept complete or absent", () => {
  it("℘ and ℘′ to 10,000 digits after many cuts — oracle: ℘′² = 4℘³ − g2 ℘ − g3, DLMF 23.3.10", () => {
    const bits = 33_300;
    const [g2, g3] = [Rational.of(7, 3), Rational.of(-5)];
    const L = latticeOfInvariants(g2, g3);
    const z = disc.fromRational(Rational.parse("0.41"), bits + 40, Rational.parse("0.27"));
    const evaluate = () => weierstrassValues(L, z, bits, ["wp", "prime"]);
    let cuts = 0;
    for (let ms = 1; ms < 60_000 && cutOff(evaluate, ms); ms *= 2) cuts++;
    expect(cuts).toBeGreaterThan(0);
    const { wp, prime } = evaluate() as { wp: Disc; prime: Disc };
    const wide = bits + 40;
    const linear = disc.add(disc.mul(disc.fromRational(g2, wide), wp, wide), disc.fromRational(g3, wide), wide);
    const cubic = disc.sub(disc.ldexp(disc.mul(disc.sqr(wp, wide), wp, wide), 2), linear, wide);
    expect(disc.overlaps(disc.sqr(prime, wide), cubic)).toBe(true);
    expect(Math.min(disc.bits(wp), disc.bits(prime))).toBeGreaterThan(bits - 10);
  });

  it("the logarithm to 4,000 digits after many cuts — oracle: ℘ at it is the abscissa", () => {
    const bits = 13_320;
    const L = latticeOfInvariants(Rational.of(4), Rational.of(-1));
    const evaluate = () => realLogarithm(L, ball.fromInt(2), ball.fromInt(5), bits);
    let cuts = 0;
    for (let ms = 1; ms < 60_000 && cutOff(evaluate, ms); ms = Math.ceil(ms * 1.5)) cuts++;
    expect(cuts).toBeGreaterThan(0);
    const { t } = evaluate();
    expect(ball.bits(t)).toBeGreaterThan(bits - 10);
    const { wp } = weierstrassValues(L, disc.fromBall(t), bits, ["wp"]) as { wp: Disc };
    expect(disc.overlaps(wp, disc.fromBall(ball.fromInt(2)))).toBe(true);
  });
});
