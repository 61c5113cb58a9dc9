// The rules for what bounds are made of: doubles, shifts, quotients and lower bounds. Each test fails when its rule is broken.
import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { ends, sizeBelow } from "../../../lib/number/ball/data.ts";
import * as ball from "../../../lib/number/ball.ts";
import { below, hypotSize } from "../../../lib/number/disc/data.ts";
import * as disc from "../../../lib/number/disc.ts";
import { pow2, scaledRadius, sizePower } from "../../../lib/number/fixed/bits.ts";
import { Rational } from "../../../lib/number/rational.ts";

const ROOT = new URL("../../../lib/number/", import.meta.url);

/** The lines of code of the kernels and enclosures, without comments. */
function codeLines(): string[] {
  return ["ball", "disc", "fixed"].flatMap((folder) =>
    readdirSync(new URL(`${folder}/`, ROOT)).flatMap((file) =>
      readFileSync(new URL(`${folder}/${file}`, ROOT), "utf8")
        .replace(/\/\*[\s\S]*?\*\//g, "")
        .replace(/\/\/.*/g, "")
        .split("\n")
        .map((line) => `${folder}/${file}: ${line.trim()}`),
    ),
  );
}

/** A double as a rational number, exactly. */
function exactly(x: number): Rational {
  const { man, exp } = ball.fromDouble(x);
  return exp >= 0 ? Rational.of(man << BigInt(exp)) : Rational.of(man, 1n << BigInt(-exp));
}

const power = (k: number): Rational => (k >= 0 ? Rational.of(1n << BigInt(k)) : Rational.of(1n, 1n << BigInt(-k)));

describe("doubles inside bounds", () => {
  it("only + − * / and √ of them, since pow, exp and log differ between engines — oracle: the source text", () => {
    // Starts of an iteration whose result is looked at, and a constant.
    const starts = /fixed\/(log|atan)\.ts: const guess = |Math\.LOG2E/;
    const calls = codeLines().filter((line) =>
      /Math\.(?!max|min|abs|sqrt|floor|ceil|round|trunc|clz32|cbrt)/.test(line),
    );
    expect(calls.filter((line) => !starts.test(line))).toEqual([]);
    // Of powers only those of two with a written exponent, which every engine has exactly; and conversions for pictures.
    const powers = codeLines().filter((line) => /[^*]\*\*[^*]/.test(line.replace(/\b2n? \*\* -?\d+n?/g, "")));
    const harmless = /toDouble|top \* 2 \*\* half|2 \*\* LEAST_POWER|2 \*\* -SEARCH|BigInt\(PRIMES/;
    expect(powers.filter((line) => !harmless.test(line))).toEqual([]);
    // Cube roots choose how many terms or halvings, never how large an error is.
    for (const line of codeLines().filter((text) => text.includes("Math.cbrt"))) expect(line).toMatch(/Math\.round\(/);
  });

  it("a power of two is exact, and below the range of doubles an upper bound — oracle: exact powers", () => {
    for (const k of [-1000, -999, -53, 0, 1, 62, 511, 1023]) expect(exactly(pow2(k)).equals(power(k))).toBe(true);
    for (const k of [-1001, -5000]) expect(exactly(pow2(k)).compare(power(k))).toBe(1);
    expect(pow2(1024)).toBe(Infinity);
    expect(scaledRadius(0, 5000)).toBe(0);
    expect(scaledRadius(1.5, -5000)).toBeGreaterThan(0);
  });
});

// Number() rounds the first up and the second down.
const AWKWARD = [
  2n ** 54n - 1n,
  2n ** 54n + 1n,
  2n ** 100n - 1n,
  2n ** 100n + 1n,
  2n ** 1500n - 1n,
  2n ** 1500n + 1n,
  3n,
];

describe("lower bounds round down", () => {
  it("of a mantissa — oracle: exact comparison", () => {
    for (const n of AWKWARD) {
      for (const m of [n, -n]) {
        const d = sizeBelow(m, 1500);
        expect(exactly(d).times(power(sizePower())).compare(n)).toBe(-1);
      }
    }
  });

  it("of the size of a complex midpoint — oracle: squares of integers", () => {
    for (const a of AWKWARD) {
      for (const b of [0n, 1n, a - 1n]) {
        const { d, e } = hypotSize(a, b, 1500);
        const square = (x: number): Rational =>
          exactly(x)
            .times(exactly(x))
            .times(power(2 * e));
        expect(square(below(d)).compare(a * a + b * b)).toBe(-1);
        expect(square(d).compare(a * a + b * b)).toBe(1);
      }
    }
  });

  it("the ends of a ball with a broken radius go outward to integers", () => {
    expect(ends({ man: 10n, exp: 0, rad: 1.25 })).toEqual({ low: 8n, high: 12n });
    expect(ball.lower({ man: 10n, exp: 0, rad: 1.25 }).man).toBe(8n);
    expect(ball.lowMagnitude({ man: 9n, exp: 0, rad: 1.5 })).toBe(2);
  });

  it("a divisor counts with its least size: 1/(m ± r) holds both ends — oracle: exact quotients", () => {
    for (const n of AWKWARD.slice(0, 4)) {
      const divisor = { man: n, exp: 0, rad: 2 ** 29 + 0.5 };
      const inverse = ball.inv(divisor, 200);
      for (const s of [1, -1]) {
        const end = Rational.of(n).plus(exactly(s * divisor.rad));
        expect(ball.contains(inverse, end.inv())).toBe(true);
      }
    }
  });
});

describe("one-sided errors are counted", () => {
  const SIGNS = [
    [1n, 3n],
    [-1n, 3n],
    [2n, -3n],
    [-22n, -7n],
    [-(2n ** 300n) - 1n, 2n ** 150n + 1n],
  ] as const;

  it.each(SIGNS)("%i/%i: the quotient is cut towards 0, within its radius — oracle: the exact quotient", (a, b) => {
    const q = ball.div(ball.fromInt(a), ball.fromInt(b), 64);
    const exact = Rational.of(a, b);
    expect(q.rad).toBeGreaterThanOrEqual(1);
    expect(ball.contains(q, exact)).toBe(true);
    // Towards 0: the midpoint of a short quotient is never the larger one.
    if (a < -100n) return;
    expect(Rational.of(q.man).times(power(q.exp)).abs().compare(exact.abs())).toBe(-1);
    expect(ball.contains(ball.fromRational(exact, 64), exact)).toBe(true);
  });

  it.each(SIGNS)("a shift goes down: (%i)·(%i) cut to 20 bits — oracle: the exact product", (a, b) => {
    const wide = { man: a * 2n ** 40n + 1n, exp: 0, rad: 0 };
    const product = ball.mul(wide, ball.fromInt(b), 20);
    const exact = Rational.of(wide.man * b);
    expect(product.rad).toBeGreaterThanOrEqual(1);
    expect(ball.contains(product, exact)).toBe(true);
    expect(Rational.of(product.man).times(power(product.exp)).compare(exact)).toBe(-1);
  });

  it("complex quotients cut both parts towards 0, products and sums go down in both — oracle: exact arithmetic", () => {
    const z = { re: -5n, im: 7n, exp: 0, rad: 0, axis: "plane" } as const;
    const w = { re: 3n, im: -11n, exp: 0, rad: 0, axis: "plane" } as const;
    const q = disc.div(z, w, 64);
    // z/w = (-92 - 34 i)/130
    const off = (part: bigint, top: bigint): Rational =>
      Rational.of(part).times(power(q.exp)).minus(Rational.of(top, 130n));
    const distance = off(q.re, -92n).pow(2).plus(off(q.im, -34n).pow(2));
    expect(distance.compare(exactly(q.rad).times(power(q.exp)).pow(2))).toBeLessThanOrEqual(0);
    expect(q.rad).toBeGreaterThanOrEqual(Math.SQRT2);
    const long = { re: -(2n ** 90n) - 1n, im: -(2n ** 89n) - 1n, exp: 0, rad: 0, axis: "plane" } as const;
    const cut = disc.round(long, 40);
    expect(cut.rad).toBeGreaterThanOrEqual(Math.SQRT2);
    expect(disc.contains(cut, long)).toBe(true);
  });
});

describe("complex radii", () => {
  it("above 2^30 ulps they drop mantissa bits; NaN and infinity are refused; small ones become 1", () => {
    const long = { re: 2n ** 200n + 12345n, im: -(2n ** 190n), exp: 0, rad: 2 ** 100, axis: "plane" } as const;
    const x = disc.round(long, 300);
    expect(x.rad).toBeLessThanOrEqual(2 ** 30 + 2);
    expect(disc.contains(x, { ...long, rad: 2 ** 99.9 })).toBe(true);
    for (const rad of [Number.NaN, Infinity]) expect(() => disc.round({ ...long, rad }, 300)).toThrow();
    expect(disc.round({ ...long, rad: 0.25 }, 300).rad).toBe(1);
  });

  it("an exponent gap beyond the precision goes into the radius", () => {
    const tiny = { re: 1n, im: 1n, exp: -1_000_000_000, rad: 0, axis: "plane" } as const;
    const x = disc.add(disc.fromBalls(ball.pi(64), ball.pi(64)), tiny, 64);
    expect(x.re.toString(2).length).toBeLessThan(140);
    expect(x.rad).toBeGreaterThanOrEqual(1);
  });

  it("accuracy is relative to |z|: a small part does not lower it", () => {
    const z = disc.fromBalls(ball.pi(100), ball.ldexp(ball.pi(100), -80));
    expect(disc.bits(z)).toBeGreaterThanOrEqual(97);
    expect(ball.bits(disc.imag(z))).toBeLessThan(30);
  });
});
