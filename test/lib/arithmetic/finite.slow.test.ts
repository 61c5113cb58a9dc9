import { describe, expect, it } from "vitest";
import { isPrime } from "../../../lib/algebra/factor.ts";
import type { IntegerModel } from "../../../lib/arithmetic/minimal.ts";
import { countPoints } from "../../../lib/arithmetic/order-fp.ts";

const model = (a: readonly number[]) => a.map(BigInt) as unknown as IntegerModel;

describe("orders over large prime fields", () => {
  it("t = 0 for a supersingular curve of 90 bits, y² = x³ + 1 with p = 2 mod 3 — oracle: theory of complex multiplication", () => {
    const p = 1237940039285380274899124357n; // 2 mod 3
    expect([p % 3n, isPrime(p)]).toEqual([2n, true]);
    expect(countPoints(model([0, 0, 0, 0, 1]), p)).toBe(p + 1n);
  }, 120_000);

  it("the curve 128 bits and its twist have 2p + 2 points together — oracle: theory of twists", () => {
    const p = 340282366920938463463374607431768211297n; // the largest prime below 2^128 − 150 with this last digit
    const count = countPoints(model([0, 0, 0, -7, 6]), p);
    let d = 2n;
    while (power(d, (p - 1n) / 2n, p) === 1n) d++;
    const twist = [0n, 0n, 0n, -7n * d * d, 6n * d ** 3n] as unknown as IntegerModel;
    expect(count + countPoints(twist, p)).toBe(2n * p + 2n);
    expect(count % 4n).toBe(0n); // all points of order two are rational
  }, 600_000);
});

function power(a: bigint, e: bigint, m: bigint): bigint {
  let [result, base] = [1n, a % m];
  for (let rest = e; rest > 0n; rest >>= 1n) {
    if (rest & 1n) result = (result * base) % m;
    base = (base * base) % m;
  }
  return result;
}
