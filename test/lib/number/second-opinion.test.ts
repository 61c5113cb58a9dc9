import { readFileSync } from "node:fs";
import { Decimal } from "decimal.js";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Ball } from "../../../lib/number/ball.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { significant } from "../../../lib/number/print.ts";
import { Rational } from "../../../lib/number/rational.ts";

const at = (text: string, prec: number): Ball => ball.fromRational(Rational.parse(text), prec);
const z = (re: string, im: string, prec: number): Disc => disc.fromBalls(at(re, prec), at(im, prec));

const REAL: Readonly<Record<string, (prec: number) => Ball>> = {
  pi: ball.pi,
  euler: ball.eulerGamma,
  ln2: ball.ln2,
  "sqrt 2": (p) => ball.sqrt(at("2", p), p),
  "cbrt 5": (p) => ball.nthRoot(at("5", p), 3, p),
  "exp 1/3": (p) => ball.exp(at("1/3", p), p),
  "exp -29": (p) => ball.exp(at("-29", p), p),
  "ln 3": (p) => ball.ln(at("3", p), p),
  "ln 1000001/1000000": (p) => ball.ln(at("1000001/1000000", p + 20), p),
  "sin 1": (p) => ball.sin(at("1", p), p),
  "cos 1": (p) => ball.cos(at("1", p), p),
  "sin 1000000": (p) => ball.sin(at("1000000", p), p),
  "tan 7/5": (p) => ball.tan(at("7/5", p), p),
  "atan 2/3": (p) => ball.atan(at("2/3", p), p),
  "asin 3/4": (p) => ball.asin(at("3/4", p), p),
  "acos 3/4": (p) => ball.acos(at("3/4", p), p),
  "sinh 1/7": (p) => ball.sinh(at("1/7", p), p),
  "agm 1 2": (p) => ball.agm(at("1", p), at("2", p), p),
  "agm 1 1/1000000": (p) => ball.agm(at("1", p), at("1/1000000", p), p),
  "gamma 1/3": (p) => ball.gammaRational(Rational.of(1n, 3n), p),
  "gamma -7/4": (p) => ball.gammaRational(Rational.of(-7n, 4n), p),
  "gamma 100001/3": (p) => ball.gammaRational(Rational.of(100001n, 3n), p),
  "gamma -3001/2": (p) => ball.gammaRational(Rational.of(-3001n, 2n), p),
  "asinh 2/3": (p) => ball.asinh(at("2/3", p), p),
  "acosh 4/3": (p) => ball.acosh(at("4/3", p), p),
  "atanh 2/3": (p) => ball.atanh(at("2/3", p), p),
};

const COMPLEX: Readonly<Record<string, (prec: number) => Disc>> = {
  "exp 1/2+3i": (p) => disc.exp(z("1/2", "3", p), p),
  "ln -2+i": (p) => disc.ln(z("-2", "1", p), p),
  "sqrt -3+4/5i": (p) => disc.sqrt(z("-3", "4/5", p), p),
  "sin 1+2i": (p) => disc.sinCos(z("1", "2", p), p).sin,
  "atan 1+i": (p) => disc.atan(z("1", "1", p), p),
  "agm 1 2i": (p) => disc.agm(disc.one, z("0", "2", p), p),
  "asinh 1+2i": (p) => disc.asinh(z("1", "2", p), p),
  "acosh 1/2+i": (p) => disc.acosh(z("1/2", "1", p), p),
  "atanh 2-i": (p) => disc.atanh(z("2", "-1", p), p),
  "fifth root of -3+i": (p) => disc.nthRoot(z("-3", "1", p), 5, p),
  mul: (p) => disc.mul(z("1/3", "2/7", p), z("5/11", "-3/13", p), p),
};

interface Entry {
  readonly name: string;
  readonly part?: "re" | "im";
  readonly digits: number;
  readonly last: string;
}

const fixture = JSON.parse(readFileSync(new URL("./second-opinion.json", import.meta.url), "utf8")) as {
  entries: Entry[];
};

describe("decimals at 50, 1000 and 10,000 digits — oracle: mpmath (second-opinion.json)", () => {
  for (const { name, part, digits, last } of fixture.entries) {
    it(`${name}${part ? `, ${part}` : ""}, ${digits} digits`, () => {
      const prec = Math.ceil(digits * 3.33) + 40;
      const d = part ? COMPLEX[name]!(prec) : undefined;
      const x = d ? (part === "re" ? disc.real(d) : disc.imag(d)) : REAL[name]!(prec);
      expect(significant(x, digits)?.digits.slice(-100)).toBe(last);
    });
  }
});

/** decimal.js rounds its elementary functions to the last digit, right up to a unit of it as far as it promises. */
function agrees(x: Ball, second: Decimal): boolean {
  const unit = Rational.parse(`1e${second.e - Decimal.precision + 1}`);
  return ball.contains(ball.widen(x, ball.fromRational(unit, 30)), Rational.parse(second.toString()));
}

type Opinion = readonly [string, (x: Decimal) => Decimal, (x: Ball, prec: number) => Ball, min: number, max: number];

const OPINIONS: readonly Opinion[] = [
  ["sqrt", (x) => x.sqrt(), ball.sqrt, 0.001, 1000],
  ["cbrt", (x) => x.cbrt(), (x, p) => ball.nthRoot(x, 3, p), -1000, 1000],
  ["exp", (x) => x.exp(), ball.exp, -50, 50],
  ["ln", (x) => x.ln(), ball.ln, 0.001, 1000],
  ["sin", (x) => x.sin(), ball.sin, -20, 20],
  ["cos", (x) => x.cos(), ball.cos, -20, 20],
  ["tan", (x) => x.tan(), ball.tan, -20, 20],
  ["asin", (x) => x.asin(), ball.asin, -0.99, 0.99],
  ["acos", (x) => x.acos(), ball.acos, -0.99, 0.99],
  ["atan", (x) => x.atan(), ball.atan, -100, 100],
  ["sinh", (x) => x.sinh(), ball.sinh, -20, 20],
  ["cosh", (x) => x.cosh(), ball.cosh, -20, 20],
  ["tanh", (x) => x.tanh(), ball.tanh, -20, 20],
  ["asinh", (x) => x.asinh(), ball.asinh, -100, 100],
  ["acosh", (x) => x.acosh(), ball.acosh, 1.001, 100],
  ["atanh", (x) => x.atanh(), ball.atanh, -0.99, 0.99],
];

describe("elementary functions up to 300 digits — oracle: decimal.js", () => {
  for (const [name, theirs, mine, min, max] of OPINIONS) {
    it(name, () => {
      const argument = fc.integer({ min: Math.ceil(min * 1000), max: Math.floor(max * 1000) });
      for (const digits of [15, 50, 300]) {
        Decimal.set({ precision: digits });
        const prec = Math.ceil(digits * 3.33) + 20;
        // 300 digits of decimal.js cost milliseconds each, so 5 arguments are enough there and 30 below.
        const property = fc.property(argument, (n) =>
          agrees(mine(at(`${n}/1000`, prec + 20), prec), theirs(new Decimal(n).div(1000))),
        );
        fc.assert(property, { numRuns: digits === 300 ? 5 : 30, seed: 5 });
      }
    });
  }
});
