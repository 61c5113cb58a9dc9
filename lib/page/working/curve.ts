// A curve, a point of it and a point from the torus as derivations.

import { factorInteger } from "../../algebra/factor.ts";
import { primesUpTo } from "../../algebra/primes.ts";
import { countPlainly } from "../../arithmetic/count.ts";
import { toIntegers } from "../../arithmetic/minimal.ts";
import { Rational } from "../../number/rational.ts";
import { Complex, type Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Curve } from "../../surface/curve.ts";
import type { AnyPoint, Point } from "../../surface/point.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { curveCheck, exactly, factorTex, jointly, legendreCheck, plainNumber } from "./parts.ts";
import { wpByExpansion } from "./wp-expansion.ts";

const SILVERMAN = "Silverman AEC, III.1";

/** The usual quantities of a long Weierstrass form over Q. */
export function curveWorking(E: Curve): Derivation {
  const [b2, b4, b6, b8] = E.b;
  const { c4, c6, discriminant } = E;
  const n = discriminant.num * discriminant.den ** 11n;
  return new Derivation("Invariants of a Weierstrass form", { name: "invariants" })
    .under("discriminant", "j")
    .step("the equation", { value: E, ...curveCheck(E), label: "curve" })
    .step(
      "$b_2 = a_1^2 + 4a_2$, $b_4 = a_1a_3 + 2a_4$, $b_6 = a_3^2 + 4a_6$ and $b_8$: completing the square gives $(2y + a_1x + a_3)^2 = 4x^3 + b_2x^2 + 2b_4x + b_6$",
      {
        value: { b2, b4, b6, b8 },
        source: SILVERMAN,
        check: exactly(b8.times(4).equals(b2.times(b6).minus(b4.pow(2))), "4 b8 = b2 b6 - b4^2"),
        route: "the relation among them",
        label: "b",
      },
    )
    .step("$c_4 = b_2^2 - 24b_4$ and $c_6 = -b_2^3 + 36b_2b_4 - 216b_6$", {
      value: { c4, c6 },
      source: SILVERMAN,
      check: exactly(discriminant.times(1728).equals(c4.pow(3).minus(c6.pow(2))), "1728 Δ = c4^3 - c6^2"),
      route: "with Δ from b2, ..., b8",
      label: "c",
    })
    .step("the discriminant $-b_2^2b_8 - 8b_4^3 - 27b_6^2 + 9b_2b_4b_6$", {
      formula: discriminant.den === 1n ? `\\Delta = ${factorTex(n, factorInteger(n))}` : "\\Delta",
      value: discriminant,
      source: SILVERMAN,
      check: exactly(
        discriminant.times(16).equals(cubicDiscriminant(E)),
        "that of 4x^3 + b2 x^2 + 2 b4 x + b6 is 16 Δ",
      ),
      route: "the discriminant of the cubic polynomial",
      label: "discriminant",
    })
    .step("$j = c_4^3/\\Delta$", {
      formula: "j",
      value: E.j,
      check: exactly(E.j.minus(1728).times(discriminant).equals(c6.pow(2)), "(j - 1728) Δ = c6^2"),
      route: "from $c_6$, not from $c_4$",
      label: "j",
    });
}

/** b²c² − 4ac³ − 4b³d − 27a²d² + 18abcd of ax³ + bx² + cx + d. */
function cubicDiscriminant(E: Curve): Rational {
  const [b, b4, d] = E.b;
  const [a, c] = [Rational.of(4), b4.times(2)];
  return b
    .pow(2)
    .times(c.pow(2))
    .minus(a.times(c.pow(3)).times(4))
    .minus(b.pow(3).times(d).times(4))
    .minus(a.pow(2).times(d.pow(2)).times(27))
    .plus(a.times(b).times(c).times(d).times(18));
}

const MOST_MULTIPLES = 12;

/** That a point over Q is on its curve, its multiples, and whether its order is finite. */
export function pointWorking(P: Point): Derivation {
  const E = P.curve;
  const order = P.order();
  const shown = order === Number.POSITIVE_INFINITY ? 4 : Number(order);
  const multiples = Array.from({ length: shown }, (_, k) => P.times(k + 1));
  return new Derivation("Order of a point", { name: "point" })
    .step("the curve and the point", {
      value: { curve: E, P },
      check: standingOf(P, "on", E),
      route: "the coordinates put into the equation",
      label: "point",
    })
    .step("its multiples", {
      value: table(
        multiples.map((R, k) => [k + 1, R]),
        { columns: ["$n$", "$nP$"] },
      ),
      check: exactly(
        multiples.every((R, k) => k === 0 || (multiples[k - 1]!.plus(P) as Point).equals(R)),
        "each is the one before it plus P",
      ),
      route: "by chords and tangents one by one, not by the ladder of doublings",
      label: "multiples",
    })
    .step("its order", { formula: "\\operatorname{ord} P", value: order, ...orderCheck(P, order), label: "order" });
}

function orderCheck(P: Point, order: number | bigint) {
  if (order !== Number.POSITIVE_INFINITY) {
    const proper = factorInteger(BigInt(order)).every(({ prime }) => !P.times(BigInt(order) / prime).isOrigin);
    return {
      check: exactly(
        proper && P.times(Number(order)).isOrigin,
        `${order}P = O, and nP is not O for ${order}/ℓ, ℓ prime`,
      ),
      route: "by the divisors of the order",
      source: "Silverman AEC, III.2.3 (group law algorithm)",
    };
  }
  const first = Array.from({ length: MOST_MULTIPLES }, (_, k) => P.times(k + 1));
  return {
    check: jointly(
      exactly(
        first.every((R) => !R.isOrigin),
        `nP is not O for n up to ${MOST_MULTIPLES}, and by Mazur's theorem no torsion point over Q has a larger order`,
      ),
      ...byReduction(P),
    ),
    route: "the multiples, and the orders of the reductions modulo small primes",
    source: "Mazur's theorem, Silverman AEC, VIII.7.5",
  };
}

/** The order of a torsion point is that of its reduction at every odd prime of good reduction; two different ones exclude it. */
function byReduction(P: Point) {
  const { curve: minimal, to } = P.curve.minimal();
  const image = to(P) as Point;
  const a = toIntegers(minimal.a)!;
  const primes = primesUpTo(200).filter((p) => p > 2 && minimal.discriminant.num % BigInt(p) !== 0n);
  const orders = primes.flatMap((p) => {
    if (!image.coordinates || image.coordinates.some((c) => c.den % BigInt(p) === 0n)) return [];
    const residues = minimal.mod(p);
    const [x, y] = image.coordinates;
    return countPlainly(a, p) > 0 ? [{ p, n: residues.point(x, y).order() }] : [];
  });
  const [first] = orders;
  const other = orders.find(({ n }) => first && n !== first.n);
  if (!first || !other) return [];
  return [
    exactly(true, `modulo ${first.p} its order is ${first.n}, modulo ${other.p} it is ${other.n}, so it is not finite`),
  ];
}

/** The point of a number on the torus. */
export function exponentialWorking(P: AnyPoint, E: Curve, z: Real | Complex): Derivation {
  const L = E.lattice();
  const start = new Derivation("Point from the torus", { name: "exponential" })
    .under("cubic", "differential")
    .step("the curve", { value: E, ...curveCheck(E), label: "curve" })
    .step("its period lattice", {
      value: { ω1: plainNumber(L.periods[0]), ω2: plainNumber(L.periods[1]) },
      ...legendreCheck(L),
      label: "lattice",
    });
  if (!P.coordinates) {
    return start.step("the argument is a lattice point, so the point is $O$", {
      formula: "z",
      value: z,
      check: standingOf(z, "in", L),
      route: "its coordinates",
      label: "point",
    });
  }
  const [x, y] = P.coordinates as readonly [Real, Real];
  const [wp, prime] = [L.wp(z), L.wp.prime(z)];
  const byExpansion = wpByExpansion(L, Complex.from(z));
  const [g2, g3] = L.invariants;
  return start
    .step("$\\wp$ and $\\wp'$ at the argument", {
      formula: "z",
      value: { z, "℘(z)": wp, "℘′(z)": prime },
      check: jointly(
        standingOf(byExpansion, "=", wp),
        standingOf(Complex.from(prime).pow(2), "=", byExpansion.pow(3).times(4).minus(byExpansion.times(g2)).minus(g3)),
      ),
      route: "$\\wp$ by its $q$-expansion, its tail enclosed; $\\wp'^2$ by the differential equation",
      label: "values",
    })
    .step("$x = \\wp(z) - b_2/12$ and $2y + a_1x + a_3 = \\wp'(z)$", {
      value: { x, y },
      check: jointly(standingOf([x, y], "on", E), standingOf(byExpansion.minus(E.b[0].div(12)), "=", x)),
      route: "put into the equation of the curve",
      label: "point",
    });
}
