import { describe, expect, it } from "vitest";
import { real } from "../../../lib/number/convert.ts";
import { Quadratic, quadratic } from "../../../lib/number/quadratic.ts";
import { squarefree } from "../../../lib/number/squarefree.ts";

const [P, Q, R] = [1_000_003n, 1_000_033n, 1_000_000_007n];
const HUGE = 2n ** 89n - 1n;

describe("quadratic numbers", () => {
  it("square factors leave the root, also those of primes above a million — oracle: the product by hand", () => {
    expect(squarefree(72n)).toEqual({ root: 6n, free: 2n });
    expect(squarefree(-7n * P * P)).toEqual({ root: P, free: -7n });
    expect(squarefree(P * P * Q)).toEqual({ root: P, free: Q });
    expect(squarefree(P * P * Q * Q * 11n)).toEqual({ root: P * Q, free: 11n });
    expect(squarefree(P ** 3n)).toEqual({ root: P, free: P });
    expect(squarefree(P ** 4n)).toEqual({ root: P ** 2n, free: 1n });
    expect(squarefree(P ** 5n * Q)).toEqual({ root: P ** 2n, free: P * Q });
    expect(squarefree(R * R * Q * 4n)).toEqual({ root: 2n * R, free: Q });
    expect(squarefree(HUGE * HUGE)).toEqual({ root: HUGE, free: 1n });
  });

  it("a field whose d keeps a square that no factoring finds is still the same field — oracle: √(p³) = p√p", () => {
    const long = quadratic(HUGE ** 3n);
    const short = quadratic(HUGE).times(HUGE);
    expect(long.equals(short)).toBe(true);
    expect(long.minus(short).isRational()).toBe(true);
    expect(real("0").equals(real(0))).toBe(true);
    expect(long.equals(short.plus(1))).toBe(false);
  });

  it("a rational number of one field meets those of another — oracle: by hand", () => {
    const three = Quadratic.of(3, 0, 5);
    expect(three.plus(quadratic(7)).toString()).toBe("3 + √7");
    expect(three.minus(quadratic(7)).toString()).toBe("3 - √7");
    expect(quadratic(7).times(three).toString()).toBe("3 √7");
    expect(three.div(quadratic(7)).toString()).toBe("3/7 √7");
    expect(() => quadratic(5).plus(quadratic(7))).toThrow(/numbers of one field/);
  });

  it("has two embeddings, of which it names the first", () => {
    const [x, y] = quadratic(5).plus(1).div(2).embeddings;
    expect(x.toString()).toBe("1/2 + 1/2 √5");
    expect(x.sign()).toBe(1);
    expect(y.sign()).toBe(-1);
    expect(x.times(y).equals(-1)).toBe(true);
  });
});
