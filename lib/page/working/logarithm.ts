// The elliptic logarithm of a point as a derivation: ℘ and ℘′ there, the component, the integral, the place on the torus.

import { Rational } from "../../number/rational.ts";
import { Complex, Real } from "../../number/values.ts";
import { carlson } from "../../surface/carlson.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Curve } from "../../surface/curve.ts";
import type { Lattice } from "../../surface/lattice.ts";
import type { AnyPoint } from "../../surface/point.ts";
import { TorusPoint } from "../../surface/torus-point.ts";
import { Derivation } from "../derivation.ts";
import { jointly, legendreCheck, plainNumber } from "./parts.ts";
import { wpByExpansion } from "./wp-expansion.ts";

const CARLSON = "DLMF 19.25.35";

type Scalar = Real | Complex;

export function logarithmWorking(z: Scalar, E: Curve, P: AnyPoint): Derivation {
  const L = E.lattice();
  const start = new Derivation("Elliptic logarithm", { name: "logarithm" })
    .under("cubic", "differential", "components")
    .step("the curve and the point", {
      value: { curve: E, P },
      check: standingOf(P, "on", E),
      route: "the coordinates put into the equation",
      label: "point",
    });
  if (!P.coordinates)
    return start.step("the point is $O$, whose logarithm is 0", {
      value: z,
      check: standingOf(z, "in", L),
      route: "0 is a lattice point, a pole of ℘",
      label: "logarithm",
    });
  const [x, y] = P.coordinates as readonly [Rational | Real, Rational | Real];
  const b2 = Complex.from(E.b[0] as never);
  const wp = real(Complex.from(x).plus(b2.div(12)));
  const prime = real(Complex.from(y).times(2).plus(Complex.from(x).times(E.a[0])).plus(E.a[2]));
  const [g2, g3] = L.invariants;
  const left = prime.pow(2).plus(wp.times(g2)).plus(g3);
  const seen = start
    .step("$\\wp(z) = x + b_2/12$ and $\\wp'(z) = 2y + a_1 x + a_3$ at the point", {
      value: { ℘: wp, "℘′": prime },
      check: standingOf(left, "=", wp.pow(3).times(4)),
      route: "$\\wp'^2 + g_2 \\wp + g_3$ against $4\\wp^3$",
      label: "values",
    })
    .step("the period lattice", {
      value: { ω1: plainNumber(L.periods[0]), ω2: plainNumber(L.periods[1]) },
      ...legendreCheck(L),
      label: "lattice",
    });
  const integrated =
    wp instanceof Real && prime instanceof Real && L.realComponents ? onCircle(seen, z, L, wp, prime) : seen;
  return integrated.step(place(z), {
    formula: "z",
    value: z,
    ...valueCheck(z, L, wp, prime),
    label: "logarithm",
  });
}

function place(z: Scalar): string {
  if (!(z instanceof TorusPoint))
    return "the logarithm, $z = r\\omega_1 + s\\omega_2$ with $r, s$ in $(-\\tfrac12, \\tfrac12]$";
  if (!z.remainder) return `the point has finite order ${z.order}: its logarithm is exact`;
  return "the point is on the bounded component: $z = \\omega_2/2 + t$, $t$ real";
}

/** ℘ and ℘′ at the logarithm give the point back; ℘ by its q-expansion, which the logarithm does not use. */
function valueCheck(z: Scalar, L: Lattice, wp: Scalar, prime: Scalar) {
  return {
    check: jointly(standingOf(wpByExpansion(L, Complex.from(z)), "=", wp), standingOf(L.wp.prime(z), "=", prime)),
    route: "$\\wp(z)$ by its $q$-expansion, its tail enclosed, and $\\wp'(z)$ by theta functions",
  };
}

/** Real points: the integral from the abscissa to infinity, for the bounded component after a shift by ω2/2. */
function onCircle(working: Derivation, z: Scalar, L: ReturnType<Curve["lattice"]>, wp: Real, prime: Real): Derivation {
  const [e1, e2, e3] = L.roots;
  const bounded = z instanceof TorusPoint && z.coordinates[1].den === 2n;
  const t = bounded ? (z as TorusPoint).minus(L.at(0, Rational.of(1, 2))) : z;
  // ω2/2 itself is not moved: its logarithm is exact, and nothing is left to integrate.
  if (t instanceof TorusPoint && t.isLatticePoint) return working;
  const gap = real(Complex.from(wp).minus(e3));
  const shifted = bounded ? real(Complex.from(e3).plus(e3.minus(e1).times(e3.minus(e2)).div(gap))) : wp;
  const side = bounded ? -1 : 1;
  const moved = bounded
    ? working.step("the point moved by $\\omega_2/2$ to the component of $O$", {
        formula: "\\wp(z - \\tfrac{\\omega_2}{2}) = e_3 + \\frac{(e_3 - e_1)(e_3 - e_2)}{\\wp(z) - e_3}",
        value: shifted,
        source: "the addition theorem, DLMF 23.10.1, at a half-period",
        check: standingOf(wpByExpansion(L, Complex.from(t)), "=", shifted),
        route: "$\\wp(z - \\omega_2/2)$ by its $q$-expansion",
        label: "shift",
      })
    : working;
  const sign = (prime.sign() ?? 1) * side;
  // Real, since e2 and e3 are real or conjugate.
  const integral = Complex.from(
    carlson.RF(difference(shifted, e1), difference(shifted, e2), difference(shifted, e3)),
  ).re;
  const half = sign === 0 ? "$\\wp' = 0$: half the real period is" : undefined;
  const words =
    half ?? (sign <= 0 ? "$\\wp' < 0$: the real part $t > 0$ is" : "$\\wp' > 0$: the real part $t < 0$ is minus");
  return moved.step(`${words} the integral from $x_0 = \\wp$ to infinity`, {
    formula: `${sign <= 0 ? "" : "-"}\\int_{x_0}^\\infty \\frac{dx}{\\sqrt{4x^3 - g_2 x - g_3}} = ${sign <= 0 ? "" : "-"}R_F(x_0 - e_1, x_0 - e_2, x_0 - e_3)`,
    value: sign <= 0 ? integral : integral.neg(),
    source: CARLSON,
    check: standingOf(sign <= 0 ? integral : integral.neg(), "=", t),
    route: "$R_F$ by duplication against the inverse of ℘",
    label: "integral",
  });
}

function difference(x: Scalar, e: Scalar): Scalar {
  return real(Complex.from(x).minus(e));
}

/** A complex number that is known to be real as a real one. */
function real(z: Scalar): Scalar & Real {
  return (z instanceof Complex && z.isReal ? z.re : z) as Scalar & Real;
}
