// A map of curves as a derivation: Vélu's formulas with the numbers put in for an isogeny, u, r, s, t for a change of model.

import { rationalRoots } from "../../algebra/rationalroots.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import type { Univariate } from "../../algebra/univariate.ts";
import { kernelOf, newtonSums } from "../../curve/isogeny.ts";
import { Rational } from "../../number/rational.ts";
import { Curve } from "../../surface/curve.ts";
import type { Morphism } from "../../surface/morphism.ts";
import type { AnyVariety } from "../../surface/space.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { exactly, inX, put } from "./parts.ts";

const VELU = "common practice; Vélu, Isogénies entre courbes elliptiques, C. R. Acad. Sci. Paris 273 (1971)";

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
  const head = new Derivation(`Isogeny of degree ${phi.degree} by its kernel`)
    .under("isogeny")
    .step("the curve", { value: E, label: "curve" })
    .step("the kernel: its abscissas are the roots of", {
      formula: "h(x)",
      value: phi.kernelPolynomial,
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
        label: "functions",
      },
    );
  const summed = points
    ? head.step("their values; points of order two count half in $t$ and not in $u$", {
        value: points.table,
        label: "points",
      })
    : head.step("the abscissas are not all rational: sums of their powers by Newton's identities", {
        value: { n: terms[0], "Σ x": terms[1], "Σ x^2": terms[2], "Σ x^3": terms[3] },
        label: "points",
      });
  const agree = points ? exactly(points.t.equals(t) && points.w.equals(w), "equal rational numbers") : undefined;
  const a4 = E.a[3].minus(t.times(5));
  const a6 = E.a[4].minus(b2.times(t)).minus(w.times(7));
  return summed
    .step("the sums $t = \\sum t(x_Q)$ and $w = \\sum (u(x_Q) + x_Q\\, t(x_Q))$, a pair $\\pm Q$ once", {
      value: { t, w },
      ...(agree
        ? { check: agree, route: "by Newton's identities from the kernel polynomial, not point by point" }
        : {}),
      label: "sums",
    })
    .step("the target keeps $a_1, a_2, a_3$ and has $(a_4 - 5t,\\; a_6 - b_2 t - 7w)$", {
      formula: `\\left(${put(E.a[3])} - 5 \\cdot ${put(t)},\\; ${put(E.a[4])} - ${put(b2)} \\cdot ${put(t)} - 7 \\cdot ${put(w)}\\right)`,
      value: [a4, a6],
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
  const rows = roots.map((x) => {
    const u = x
      .pow(3)
      .times(4)
      .plus(b2.times(x.pow(2)))
      .plus(b4.times(x).times(2))
      .plus(b6);
    const full = x.pow(2).times(6).plus(b2.times(x)).plus(b4);
    const own = u.sign() === 0 ? full.div(2) : full;
    t = t.plus(own);
    w = w.plus(u).plus(x.times(own));
    return [x, own, u];
  });
  return { t, w, table: table(rows, { columns: ["$x_Q$", "$t(x_Q)$", "$u(x_Q)$"] }) };
}

function plainWorking(phi: Morphism<AnyVariety, AnyVariety>): Derivation {
  const { change } = phi;
  const start = new Derivation(`A ${phi.title}`).step("from", { value: phi.from, label: "from" });
  const changed = change
    ? start.step("the change $x = u^2x' + r$, $y = u^3y' + su^2x' + t$", { value: change, label: "change" })
    : start;
  return changed
    .step("to", { value: phi.to, label: "to" })
    .step("the map", {
      value: phi,
      check: phi.verify(),
      route: "the formula put into the target's equation",
      label: "map",
    })
    .step("the pull-back of the invariant differential: $\\varphi^*\\omega' = c\\,\\omega$", {
      formula: "c",
      value: phi.factor,
      label: "differential",
    });
}
