// A map of curves as a derivation: Vélu's formulas with the numbers put in for an isogeny, u, r, s, t for a change of model.

import { primesUpTo } from "../../algebra/primes.ts";
import { rationalRoots } from "../../algebra/rationalroots.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import { addUni, deriveUni, divideUni, mulUni, scaleUni, type Univariate } from "../../algebra/univariate.ts";
import { countPlainly } from "../../arithmetic/count.ts";
import { type IntegerModel, toIntegers } from "../../arithmetic/minimal.ts";
import { divisionPolynomials, psiSquared } from "../../curve/division.ts";
import { kernelOf, newtonSums } from "../../curve/isogeny.ts";
import { changeModel } from "../../curve/weierstrass.ts";
import { Rational } from "../../number/rational.ts";
import { Curve } from "../../surface/curve.ts";
import type { Morphism } from "../../surface/morphism.ts";
import type { Point } from "../../surface/point.ts";
import type { AnyVariety } from "../../surface/space.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { curveCheck, exactly, inX, put } from "./parts.ts";

const VELU = "Vélu, Isogénies entre courbes elliptiques, C. R. Acad. Sci. Paris 273 (1971)";

export function morphismWorking(phi: Morphism<AnyVariety, AnyVariety>): Derivation {
  const { kernel } = phi.data;
  const { from, to } = phi;
  if (kernel && from instanceof Curve && to instanceof Curve && from.field.name === "Q") {
    const curves = phi as unknown as Morphism;
    if (ownKernel(curves)) return veluWorking(curves, kernel as Univariate<Rational>);
  }
  return plainWorking(phi);
}

/** The dual ends on a model that Vélu's formulas do not give: they keep a1, a2 and a3, and the differential. */
function ownKernel({ from, to, factor }: Morphism): boolean {
  if (String(factor) !== "1") return false;
  return [0, 1, 2].every((k) => from.a[k]!.equals(to.a[k]!));
}

function veluWorking(phi: Morphism, kernel: Univariate<Rational>): Derivation {
  const { from: E, to: F } = phi;
  const [b2, b4] = E.b;
  const { t, w, terms } = sums(E, kernel);
  const points = pointwise(E, kernel);
  const head = new Derivation(`Isogeny of degree ${phi.degree} by its kernel`, { name: "isogeny" })
    .under("isogeny")
    .step("the curve", { value: E, ...curveCheck(E), label: "curve" })
    .step("the kernel: its abscissas are the roots of", {
      formula: "h(x)",
      value: phi.kernelPolynomial,
      ...kernelCheck(E, kernel, phi.degree),
      label: "kernel",
    })
    .step(
      "the functions $t(x) = 6x^2 + b_2 x + b_4$ and $u(x) = 4x^3 + b_2 x^2 + 2 b_4 x + b_6$ of a kernel abscissa",
      {
        value: {
          "t(x)": inX([b4, b2, Rational.of(6)]),
          "u(x)": inX([E.b[2], b4.times(2), b2, Rational.of(4)]),
        },
        source: VELU,
        check: exactly(
          derivativeFits(E),
          "the derivative of u is 2t, and u is 4 times the right side of the equation plus the square of a1 x + a3",
        ),
        route: "by the derivative, and by completing the square",
        label: "functions",
      },
    );
  const summed = points
    ? head.step("their values; points of order two count half in $t$ and not in $u$", {
        value: points.table,
        check: exactly(points.squares, "u is the square of 2y + a1 x + a3 at the points that are rational"),
        route: "from the ordinates, or from the equation where they are not rational",
        label: "points",
      })
    : head.step("the abscissas are not all rational: sums of their powers by Newton's identities", {
        value: { n: terms[0], "Σ x": terms[1], "Σ x^2": terms[2], "Σ x^3": terms[3] },
        check: exactly(
          traces(kernel).every((trace, k) => trace.equals(terms[k]!)),
          "the traces of the powers of the companion matrix of h",
        ),
        route: "by a matrix with this characteristic polynomial",
        label: "points",
      });
  const agree = points
    ? exactly(points.t.equals(t) && points.w.equals(w), "equal rational numbers")
    : exactly(String([t, w]) === String(byTraces(E, kernel)), "equal rational numbers");
  const a4 = E.a[3].minus(t.times(5));
  const a6 = E.a[4].minus(b2.times(t)).minus(w.times(7));
  return summed
    .step("the sums $t = \\sum t(x_Q)$ and $w = \\sum (u(x_Q) + x_Q\\, t(x_Q))$, a pair $\\pm Q$ once", {
      value: { t, w },
      check: agree,
      route: points
        ? "by Newton's identities from the kernel polynomial, not point by point"
        : "from the traces of the companion matrix, not by Newton's identities",
      label: "sums",
    })
    .step("the target keeps $a_1, a_2, a_3$ and has $(a_4 - 5t,\\; a_6 - b_2 t - 7w)$", {
      formula: `\\left(${put(E.a[3])} - 5 \\cdot ${put(t)},\\; ${put(E.a[4])} - ${put(b2)} \\cdot ${put(t)} - 7 \\cdot ${put(w)}\\right)`,
      value: [a4, a6],
      ...countCheck(E, F),
      label: "coefficients",
    })
    .step("the target", {
      value: F,
      check: exactly(a4.equals(F.a[3]) && a6.equals(F.a[4]), "a4′ and a6′ from t and w are those of the target"),
      route: "the formula evaluated again",
      label: "target",
    })
    .step("the map", {
      value: phi,
      source: VELU,
      check: phi.verify(),
      route: "the formula put into the target's equation",
      label: "map",
    })
    .step("the invariant differential: $\\varphi^*\\omega' = c\\,\\omega$", {
      formula: "c",
      value: phi.factor,
      check: exactly(String(phi.factor) === "1", "the constant is 1, so the isogeny is normalised"),
      route: "read from the leading terms at O",
      label: "differential",
    });
}

/** t and w from the power sums of the roots of the kernel polynomial. */
function sums(E: Curve, kernel: Univariate<Rational>) {
  const [b2, b4, b6] = E.b;
  const { two, rest } = kernelOf(Q, E.a, kernel);
  const half = Rational.of(1, 2);
  let [t, w] = [Rational.zero, Rational.zero];
  for (const [h, weight] of [
    [two, half],
    [rest, Rational.of(1)],
  ] as const) {
    const [n, p1, p2, p3] = newtonSums(Q, h, 3) as [Rational, Rational, Rational, Rational];
    const sumT = p2.times(6).plus(b2.times(p1)).plus(b4.times(n));
    const sumXT = p3.times(6).plus(b2.times(p2)).plus(b4.times(p1));
    const sumU = p3.times(4).plus(b2.times(p2)).plus(b4.times(p1).times(2)).plus(b6.times(n));
    t = t.plus(weight.times(sumT));
    w = w.plus(weight.times(sumXT));
    if (h === rest) w = w.plus(sumU);
  }
  return { t, w, terms: newtonSums(Q, kernel, 3) };
}

/** The same point by point, if all abscissas are rational. */
function pointwise(E: Curve, kernel: Univariate<Rational>) {
  const roots = rationalRoots(kernel);
  if (roots.length !== kernel.length - 1) return undefined;
  const [b2, b4, b6] = E.b;
  let [t, w] = [Rational.zero, Rational.zero];
  let squares = true;
  const rows = roots.map((x) => {
    const u = x
      .pow(3)
      .times(4)
      .plus(b2.times(x.pow(2)))
      .plus(b4.times(x).times(2))
      .plus(b6);
    const full = x.pow(2).times(6).plus(b2.times(x)).plus(b4);
    const own = u.sign() === 0 ? full.div(2) : full;
    for (const P of E.pointsWith({ x })) {
      const root = P.y.times(2).plus(E.a[0].times(x)).plus(E.a[2]);
      squares &&= root.pow(2).equals(u);
    }
    t = t.plus(own);
    w = w.plus(u).plus(x.times(own));
    return [x, own, u];
  });
  return { t, w, squares, table: table(rows, { columns: ["$x_Q$", "$t(x_Q)$", "$u(x_Q)$"] }) };
}

/** The points of the kernel have an order that divides its degree: by the group law, or by the division polynomial. */
function kernelCheck(E: Curve, kernel: Univariate<Rational>, degree: number) {
  const points = rationalRoots(kernel).flatMap((x) => E.pointsWith({ x }));
  if (points.length === degree - 1)
    return {
      check: exactly(
        points.every((P) => repeated(P, degree).isOrigin),
        `each of the ${points.length} points added ${degree} times gives O`,
      ),
      route: "by the group law",
    };
  const psi = psiSquared(Q, divisionPolynomials(Q, E.a), degree);
  return {
    check: exactly(divideUni(Q, psi, kernel).remainder.length === 0, `h divides the square of ψ_${degree}`),
    route: "by the division polynomial",
  };
}

function repeated(P: Point, n: number): Point {
  let sum = P;
  for (let k = 1; k < n; k++) sum = sum.plus(P) as Point;
  return sum;
}

function derivativeFits(E: Curve): boolean {
  const [a1, a2, a3, a4, a6] = E.a;
  const [b2, b4, b6] = E.b;
  const u = [b6, b4.times(2), b2, Rational.of(4)];
  const slope = deriveUni(Q, u).map((c) => c.div(2));
  const line = [a3, a1];
  const square = addUni(Q, scaleUni(Q, Rational.of(4), [a6, a4, a2, Rational.of(1)]), mulUni(Q, line, line));
  return String(slope) === String([b4, b2, Rational.of(6)]) && String(square) === String(u);
}

/** Isogenous curves have as many points over F_p, which nothing in Vélu's formulas knows. */
function countCheck(E: Curve, F: Curve) {
  const models = [E, F].map((C) => toIntegers(C.minimal().curve.a)!) as [IntegerModel, IntegerModel];
  const bad = E.minimal().curve.discriminant.num * F.minimal().curve.discriminant.num;
  const primes = primesUpTo(60).filter((p) => p > 2 && bad % BigInt(p) !== 0n);
  return {
    check: exactly(
      primes.every((p) => countPlainly(models[0], p) === countPlainly(models[1], p)),
      `both curves have the same number of points over F_p for p = ${primes.join(", ")}`,
    ),
    route: "points counted over small fields",
  };
}

/** Traces of the powers 0, 1, 2, 3 of the companion matrix of a monic polynomial. */
function traces(h: Univariate<Rational>): Rational[] {
  const n = h.length - 1;
  const columns = (k: number) => Array.from({ length: n }, (_, row) => (row === k ? Rational.one : Rational.zero));
  // Multiplication by x on the residues modulo h.
  const times = (v: readonly Rational[]): Rational[] => {
    const top = v[n - 1]!;
    return v.map((_, row) => (row === 0 ? Rational.zero : v[row - 1]!).minus(top.times(h[row]!)));
  };
  const sums = [Rational.zero, Rational.zero, Rational.zero, Rational.zero];
  for (let k = 0; k < n; k++) {
    let v: readonly Rational[] = columns(k);
    for (let m = 0; m <= 3; m++) {
      sums[m] = sums[m]!.plus(v[k]!);
      v = times(v);
    }
  }
  return sums;
}

/** t and w from these traces, for a kernel without points of order two. */
function byTraces(E: Curve, kernel: Univariate<Rational>): [Rational, Rational] {
  const [b2, b4, b6] = E.b;
  const { two, rest } = kernelOf(Q, E.a, kernel);
  const parts = [two, rest].map(traces) as [Rational[], Rational[]];
  const tOf = ([n, p1, p2]: Rational[]) => p2!.times(6).plus(b2.times(p1!)).plus(b4.times(n!));
  const xtOf = ([, p1, p2, p3]: Rational[]) => p3!.times(6).plus(b2.times(p2!)).plus(b4.times(p1!));
  const uOf = ([n, p1, p2, p3]: Rational[]) =>
    p3!.times(4).plus(b2.times(p2!)).plus(b4.times(2).times(p1!)).plus(b6.times(n!));
  const t = tOf(parts[0]).div(2).plus(tOf(parts[1]));
  const w = xtOf(parts[0]).div(2).plus(xtOf(parts[1])).plus(uOf(parts[1]));
  return [t, w];
}

function plainWorking(phi: Morphism<AnyVariety, AnyVariety>): Derivation {
  const { change, from, to } = phi;
  const start = new Derivation(`${/^[aeiou]/.test(phi.title) ? "An" : "A"} ${phi.title}`, { name: "map" }).step(
    "from",
    {
      value: from,
      ...smooth(from),
      label: "from",
    },
  );
  const changed = change
    ? start.step("the change $x = u^2x' + r$, $y = u^3y' + su^2x' + t$", {
        value: change,
        ...changeCheck(phi),
        label: "change",
      })
    : start;
  const inverse = phi.data.inverse ? phi.inverse : undefined;
  return changed
    .step("to", { value: to, ...smooth(to), label: "to" })
    .step("the map", {
      value: phi,
      check: phi.verify(),
      route: inverse
        ? "the formula put into the target's equation, and composed with its inverse both ways"
        : "the formula put into the target's equation",
      label: "map",
    })
    .step("the pull-back of the invariant differential: $\\varphi^*\\omega' = c\\,\\omega$", {
      formula: "c",
      value: phi.factor,
      ...factorCheck(phi, inverse),
      label: "differential",
    });
}

function smooth(C: AnyVariety) {
  if (C instanceof Curve && C.field.name === "Q") return curveCheck(C as Curve);
  return {
    check: exactly(true, "given as a nonsingular curve, which was tested when it was made"),
    route: "by its partial derivatives",
  };
}

/** The change put into the coefficients of the source, by the formulas for new coefficients. */
function changeCheck(phi: Morphism<AnyVariety, AnyVariety>) {
  const { from, to, change } = phi;
  if (!(from instanceof Curve && to instanceof Curve)) return {};
  const F = from.field;
  const moved = changeModel(F, from.a, change as never);
  return {
    check: exactly(
      moved.every((c, k) => F.format(c) === F.format(to.a[k])),
      "the new coefficients are those of the target",
    ),
    route: "the formulas for the coefficients of the new model",
  };
}

/** The constants of a map and its inverse multiply to 1; those of an isogeny and its dual to the degree. */
function factorCheck(phi: Morphism<AnyVariety, AnyVariety>, inverse: Morphism<AnyVariety, AnyVariety> | undefined) {
  const { factor } = phi;
  if (!(factor instanceof Rational)) return {};
  const other = inverse ?? (phi.data.dual ? phi.dual() : undefined);
  if (!other || !(other.factor instanceof Rational)) return {};
  const n = inverse ? 1 : phi.degree;
  return {
    check: exactly(
      factor.times(other.factor).equals(n),
      `the constant of the ${inverse ? "inverse" : "dual"} is ${other.factor}, and both multiply to ${n}`,
    ),
    route: `from the formula of the ${inverse ? "inverse" : "dual"}`,
  };
}
