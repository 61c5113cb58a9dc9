// The torsion subgroup over Q as a derivation: bound by reduction, what division polynomials leave, the points found.

import { factorInteger } from "../../algebra/factor.ts";
import { primesUpTo } from "../../algebra/primes.ts";
import { rationalRoots } from "../../algebra/rationalroots.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import type { Univariate } from "../../algebra/univariate.ts";
import { countPlainly } from "../../arithmetic/count.ts";
import { type IntegerModel, toIntegers } from "../../arithmetic/minimal.ts";
import { divisionPolynomials, primitiveDivisionPolynomial } from "../../curve/division.ts";
import { pointsOverX } from "../../curve/lift.ts";
import { gcd, Rational } from "../../number/rational.ts";
import { Real } from "../../number/values.ts";
import type { Standing } from "../../proof/standing.ts";
import type { Curve } from "../../surface/curve.ts";
import type { TorsionSubgroup } from "../../surface/torsion.ts";
import { Derivation } from "../derivation.ts";
import { rationalTex } from "../exact-kind.ts";
import { table } from "../table.ts";
import { curveCheck, exactly, factorTex, inX } from "./parts.ts";

const INJECTIVE =
  "Silverman AEC, VII.3.1: for an odd prime of good reduction torsion meets the kernel of reduction in O only";

export function torsionWorking(group: TorsionSubgroup, E: Curve): Derivation {
  const { curve: minimal, to } = E.minimal();
  const a = toIntegers(minimal.a)!;
  let working = new Derivation("Torsion subgroup of $E(\\mathbb{Q})$", { name: "torsion" }).step("the curve", {
    value: E,
    ...curveCheck(E),
    label: "curve",
  });
  if (!minimal.equals(E)) {
    working = working.step("the reduced global minimal model, on which the work is done", {
      value: minimal,
      check: to.verify(),
      route: "the change of model put into the equation",
      label: "model",
    });
  }
  working = left(reduction(working, group, minimal, a), group, minimal, a);
  return found(working, group);
}

function reduction(working: Derivation, group: TorsionSubgroup, minimal: Curve, a: IntegerModel): Derivation {
  const { num } = minimal.discriminant;
  const factors = factorInteger(num);
  const product = factors.reduce((n, { prime, exponent }) => n * prime ** BigInt(exponent), 1n);
  const plain = group.counts.every(({ p, count }) => count === pairsOver(a, p));
  const bound = boundOf(group);
  return working
    .step("the discriminant: at primes that do not divide it the reduction is good", {
      formula: `\\Delta = ${factorTex(num, factors)}`,
      value: minimal.discriminant,
      check: exactly(
        product === (num < 0n ? -num : num) && factors.every(({ prime }) => divisorsOf(prime) === 2),
        "the prime powers multiplied, and each prime has no smaller factor up to its root, or up to 10^5",
      ),
      route: "by multiplication and trial division",
      label: "discriminant",
    })
    .step("points over $\\mathbb{F}_p$ for odd primes of good reduction, $O$ among them", {
      value: table(
        group.counts.map(({ p, count }, k) => [p, count, Number(boundOf({ counts: group.counts.slice(0, k + 1) }))]),
        { columns: ["$p$", "$\\#E(\\mathbb{F}_p)$", "gcd so far"] },
      ),
      check: exactly(plain, "all pairs (x, y) tried in the equation modulo p, the point O added"),
      route: "counted by pairs, not by squares",
      label: "counts",
    })
    .step("the order of the torsion subgroup divides each of these", {
      formula: `\\gcd(${group.counts.map(({ count }) => count).join(", ")})`,
      value: Rational.of(bound),
      source: INJECTIVE,
      check: exactly(bound === commonPowers(group), "the prime powers that all counts have in common, multiplied"),
      route: "by factoring the counts, not by Euclid's algorithm",
      label: "bound",
    });
}

/** For each prime that the counts leave: its division polynomial, and the points that its rational roots give. */
function left(working: Derivation, group: TorsionSubgroup, minimal: Curve, a: IntegerModel): Derivation {
  const bound = boundOf(group);
  const polynomials = divisionPolynomials(Q, minimal.a);
  const primes = [2, 3, 5, 7].filter((l) => bound % BigInt(l) === 0n);
  return primes.reduce((steps, l) => {
    const f = primitiveDivisionPolynomial(Q, polynomials, l);
    const roots = rationalRoots(f);
    const points = roots.flatMap((x) => pointsOverX(Q, minimal.a, x));
    const formula = l === 2 ? "\\psi_2^2 = 4x^3 + b_2 x^2 + 2 b_4 x + b_6" : `\\psi_{${l}}`;
    // ψ5 and ψ7 are longer than a line.
    const shown = f.length <= LONGEST ? { formula, value: inX(f) } : { formula: shortened(l, f) };
    const parts = {
      ...shown,
      source: "Silverman AEC, exercise 3.7",
      ...divisionCheck(minimal, a, group, f, l),
      label: `psi${l}`,
    };
    const words = `points of order ${l}: the abscissas are roots of the division polynomial $\\psi_${l}$, of degree ${f.length - 1}`;
    const listed = roots.length === 0 ? "it has no rational root" : `its rational roots: $x = ${roots.join(",\\ ")}$`;
    if (points.length > 0) {
      return steps.step(words, parts).step(`${listed}; the points over them`, {
        value: points.map(([x, y]) => minimal.point(x, y)),
        check: exactly(
          points.every((P) => minimal.point(...P).times(l).isOrigin),
          `${l}-fold points by the group law`,
        ),
        route: "by chords and tangents, not by the polynomial",
        label: `order${l}`,
      });
    }
    const why = roots.length === 0 ? listed : `${listed}, over which no point is rational`;
    return steps.step(words, parts).step(`${why}; no point has order ${l}`, {
      ...excluded(minimal, a, l),
      label: `order${l}`,
    });
  }, working);
}

const LONGEST = 8;

/** The leading terms and the constant term. */
function shortened(l: number, f: Univariate<Rational>): string {
  const n = f.length - 1;
  const second = f[n - 1]!;
  const sign = (q: Rational) => (q.sign() < 0 ? "-" : "+");
  const size = (q: Rational) => rationalTex(q.abs());
  return `\\psi_{${l}} = ${size(f[n]!)} x^{${n}} ${sign(second)} ${size(second)} x^{${n - 1}} + \\cdots ${sign(f[0]!)} ${size(f[0]!)}`;
}

/** Another reason that no rational point has order l: a prime of good reduction over which there is none, or else the real points. */
function excluded(minimal: Curve, a: IntegerModel, l: number): { check?: Standing; route?: string } {
  const discriminant = minimal.discriminant.num;
  for (const p of primesUpTo(200)) {
    if (p === 2 || discriminant % BigInt(p) === 0n) continue;
    const count = countPlainly(a, p);
    if (count % l !== 0)
      return {
        check: { kind: "proved", argument: `#E(F_${p}) = ${count} is not divisible by ${l}` },
        route: "by one more prime",
      };
    if (!affinePoints(a, p).some((P) => killed(a, p, P, l)))
      return {
        check: { kind: "proved", argument: `E(F_${p}) has no point of order ${l}` },
        route: "by one more prime",
      };
  }
  return notIntegral(minimal, l);
}

/** ψ_l modulo a prime vanishes at the abscissa of a point exactly where its l-fold is O by repeated addition. */
function divisionCheck(minimal: Curve, a: IntegerModel, group: TorsionSubgroup, f: Univariate<Rational>, l: number) {
  const { num } = minimal.discriminant;
  const counted = group.counts.map(({ p }) => p);
  const primes = [...counted, ...primesUpTo(60)].filter(
    (p, k, all) => p > 3 && p !== l && num % BigInt(p) !== 0n && all.indexOf(p) === k && p < 60,
  );
  const fits = primes.every((p) => {
    const residues = f.map((c) => mod(Number(c.num % BigInt(p)), p));
    return affinePoints(a, p).every((P) => {
      const value = residues.reduceRight((sum, c) => mod(sum * P[0] + c, p), 0);
      return (value === 0) === killed(a, p, P, l);
    });
  });
  return {
    check: exactly(
      fits && f.every((c) => c.den === 1n),
      `at all points over F_p, p = ${primes.join(", ")}, it vanishes exactly where the ${l}-fold point is O`,
    ),
    route: "by repeated addition over small fields",
  };
}

/** 2 for a number without a factor from 2 up to its root, or up to 10^5. */
function divisorsOf(n: bigint): number {
  for (let d = 2n; d * d <= n && d < 100_000n; d++) if (n % d === 0n) return 3;
  return 2;
}

/** The product of the least prime powers in all counts. */
function commonPowers({ counts }: TorsionSubgroup): bigint {
  const [first, ...rest] = counts.map(({ count }) => factorInteger(BigInt(count)));
  return (first ?? []).reduce((n, { prime, exponent }) => {
    const least = rest.reduce(
      (e, factors) => Math.min(e, factors.find((other) => other.prime === prime)?.exponent ?? 0),
      exponent,
    );
    return n * prime ** BigInt(least);
  }, 1n);
}

/** The real points of odd prime order l are at kω1/l; a rational one would have an integral abscissa. */
function notIntegral(minimal: Curve, l: number): { check?: Standing; route?: string } {
  if (l === 2) return noRationalRoot(minimal);
  const L = minimal.lattice();
  const shift = minimal.b[0].div(12);
  const abscissas = Array.from({ length: (l - 1) / 2 }, (_, k) => L.wp(L.at(Rational.of(k + 1, l), 0)).minus(shift));
  const apart = abscissas.every((x) => {
    const below = x instanceof Real ? x.floor() : undefined;
    return below !== undefined && !x.overlaps(below);
  });
  if (!apart) return {};
  const list = abscissas.map((x) => x.digits(8)).join(", ");
  return {
    check: { kind: "proved", argument: `the real points of order ${l} have x = ${list}, none of them an integer` },
    route: "by the real points k·ω1/ℓ, since torsion of odd order has integral coordinates (Silverman AEC, VII.3.4)",
  };
}

/** Roots of 4x³ + b2x² + 2b4x + b6 are quarters of integers, if rational: the real ones are not. */
function noRationalRoot(minimal: Curve): { check?: Standing; route?: string } {
  const shift = minimal.b[0].div(12);
  const roots = minimal.lattice().roots.flatMap((e) => (e instanceof Real ? [e.minus(shift).times(4)] : []));
  const apart = roots.every((x) => {
    const below = x.floor();
    return below !== undefined && !x.overlaps(below);
  });
  if (!apart) return {};
  return {
    check: {
      kind: "proved",
      argument: `4x = ${roots.map((x) => x.digits(8)).join(", ")} at the real roots, no integers`,
    },
    route: "by the real roots, since 4x would be an integer",
  };
}

function found(working: Derivation, group: TorsionSubgroup): Derivation {
  const steps = group.generators.reduce((steps, P, k) => {
    const n = group.structure[k]!;
    const multiples = Array.from({ length: n }, (_, m) => P.times(m + 1));
    const chain = multiples.slice(1).reduce((sum) => sum.plus(P), multiples[0]!);
    const proper = factorInteger(BigInt(n)).every(({ prime }) => !P.times(BigInt(n) / prime).isOrigin);
    return steps.step(`a point of order ${n} and its multiples`, {
      value: table(
        multiples.map((R, m) => [m + 1, R]),
        { columns: ["$n$", "$nP$"] },
      ),
      check: exactly(chain.isOrigin && proper, `P added ${n} times gives O, and nP is not O for ${n}/ℓ, ℓ prime`),
      route: "by repeated addition, not by the ladder of doublings",
      label: `generator${k + 1}`,
    });
  }, working);
  const bound = boundOf(group);
  const argument = `the subgroup has ${group.order} of at most ${bound} elements${
    BigInt(group.order) === bound ? "" : ", and the steps above exclude the rest"
  }`;
  const pairwise = new Set(group.points.map(String)).size === group.order - 1;
  return steps.step("the torsion subgroup", {
    value: group,
    check: exactly(pairwise && bound % BigInt(group.order) === 0n, argument),
    route: "the points listed and counted",
    label: "group",
  });
}

function boundOf({ counts }: Pick<TorsionSubgroup, "counts">): bigint {
  return counts.reduce((g, { count }) => gcd(g, BigInt(count)), 0n);
}

// Plain arithmetic modulo a small prime, on purpose not that of the library's curves.

type Pair = readonly [number, number];

function affinePoints(a: IntegerModel, p: number): Pair[] {
  const [a1, a2, a3, a4, a6] = a.map((c) => mod(Number(c % BigInt(p)), p)) as [number, number, number, number, number];
  const list: Pair[] = [];
  for (let x = 0; x < p; x++) {
    const right = mod((((x + a2) * x + a4) % p) * x + a6, p);
    for (let y = 0; y < p; y++) if (mod(y * (y + a1 * x + a3), p) === right) list.push([x, y]);
  }
  return list;
}

function pairsOver(a: IntegerModel, p: number): number {
  return affinePoints(a, p).length + 1;
}

function killed(a: IntegerModel, p: number, P: Pair, l: number): boolean {
  let sum: Pair | undefined = P;
  for (let k = 1; k < l; k++) sum = sum ? added(a, p, sum, P) : P;
  return sum === undefined;
}

function added(a: IntegerModel, p: number, [x, y]: Pair, [u, v]: Pair): Pair | undefined {
  const [a1, a2, a3, a4] = a.map((c) => mod(Number(c % BigInt(p)), p)) as [number, number, number, number];
  if (x === u && mod(y + v + a1 * x + a3, p) === 0) return undefined;
  const [rise, run] =
    x === u
      ? [mod(3 * x * x + 2 * a2 * x + a4 - a1 * y, p), mod(2 * y + a1 * x + a3, p)]
      : [mod(v - y, p), mod(u - x, p)];
  const slope = mod(rise * inverse(run, p), p);
  const third = mod(slope * slope + a1 * slope - a2 - x - u, p);
  return [third, mod(-(slope * (third - x) + y) - a1 * third - a3, p)];
}

function inverse(n: number, p: number): number {
  for (let k = 1; k < p; k++) if (mod(k * n, p) === 1) return k;
  return 0;
}

function mod(n: number, p: number): number {
  return ((n % p) + p) % p;
}
