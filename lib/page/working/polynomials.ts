// Division polynomials, class polynomials, the Weil pairing and factorisations as derivations.

import { type Polynomial, unpack } from "../../algebra/multivariate.ts";
import { Rational } from "../../number/rational.ts";
import { Complex, type ComplexNumeric, Real } from "../../number/values.ts";
import type { Standing } from "../../proof/standing.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { ClassPolynomial } from "../../surface/class-polynomial.ts";
import type { Curve } from "../../surface/curve.ts";
import { modular } from "../../surface/modular.ts";
import type { AnyPoint } from "../../surface/point.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { curveCheck, exactly, jointly } from "./parts.ts";
import { wpByExpansion } from "./wp-expansion.ts";

/** ψ_n, with the abscissas of some points that n kills put in. */
export function divisionWorking(psi: Polynomial<Rational>, E: Curve, n: number): Derivation {
  const degree = Math.max(...exponents(psi));
  return new Derivation(`Division polynomial $\\psi_{${n}}$`, { name: "division" })
    .step("the curve", { value: E, ...curveCheck(E), label: "curve" })
    .step(
      "$\\psi_1 = 1$, $\\psi_2 = 2y + a_1x + a_3$, $\\psi_3$, $\\psi_4$ and the recursion $\\psi_{2m+1} = \\psi_{m+2}\\psi_m^3 - \\psi_{m-1}\\psi_{m+1}^3$, $\\psi_{2m}\\psi_2 = \\psi_m(\\psi_{m+2}\\psi_{m-1}^2 - \\psi_{m-2}\\psi_{m+1}^2)$",
      {
        source: "Silverman AEC, exercise 3.7",
        formula: `\\deg = ${n % 2 === 0 ? "(n^2 + 2)/2" : "(n^2 - 1)/2"}`,
        value: degree,
        check: exactly(
          degree === (n % 2 === 0 ? (n * n + 2) / 2 : (n * n - 1) / 2),
          "the number of abscissas of points but O that n kills",
        ),
        route: "by counting these points",
        label: "recursion",
      },
    )
    .step(n % 2 === 0 ? `$\\psi_{${n}}\\psi_2$, a polynomial in $x$` : `$\\psi_{${n}}$`, {
      value: psi,
      ...rootsCheck(psi, E, n),
      label: "polynomial",
    });
}

function exponents({ terms }: Polynomial<Rational>): number[] {
  return [...terms.keys()].map((key) => unpack(key, 1)[0]!);
}

/** The polynomial at the abscissa of ω1/n and of ω2/n; where the roots are known there, it is 0. */
function rootsCheck(
  psi: Polynomial<Rational>,
  E: Curve,
  n: number,
): { readonly check: Standing; readonly route: string } {
  const L = E.lattice();
  const shift = E.b[0].div(12);
  const at = [L.at(Rational.of(1, n), 0), L.at(0, Rational.of(1, n))].map((z) => wpByExpansion(L, z).minus(shift));
  const value = (x: Complex) =>
    [...psi.terms].reduce<Complex>((sum, [key, c]) => sum.plus(x.pow(unpack(key, 1)[0]!).times(c)), Complex.from(0));
  return {
    check: jointly(...at.map((x) => standingOf(value(x), "=", 0))),
    route: "its values at the abscissas of $\\omega_1/n$ and $\\omega_2/n$, which the $q$-expansion of $\\wp$ gives",
  };
}

export function classPolynomialWorking(H: ClassPolynomial): Derivation {
  const { discriminant: D, forms, coefficients } = H;
  const values = forms.map(([a, b, c]) => ({ a, b, c, j: modular.j(rootOf(a, b, D)) }));
  return new Derivation(`Class polynomial of discriminant ${D}`, { name: "class-polynomial" })
    .under("j")
    .step("the primitive reduced forms $ax^2 + bxy + cy^2$ of this discriminant", {
      value: table(
        forms.map((form) => [...form]),
        { columns: ["$a$", "$b$", "$c$"] },
      ),
      source: "Cox, Primes of the Form x² + ny², §2.A",
      check: exactly(
        forms.every(([a, b, c]) => b * b - 4n * a * c === D && (b < 0n ? -b : b) <= a && a <= c),
        "b^2 - 4ac = D and |b| ≤ a ≤ c for each",
      ),
      route: "each form by itself",
      label: "forms",
    })
    .step("$j$ at the root $(-b + \\sqrt{D})/2a$ of each", {
      value: table(
        values.map(({ a, b, c, j }) => [a, b, c, j]),
        { columns: ["$a$", "$b$", "$c$", "$j$"] },
      ),
      check: jointly(...values.map(({ a, b, j }) => standingOf(byEisenstein(rootOf(a, b, D)), "=", j))),
      route: "$1728 E_4^3/(E_4^3 - E_6^2)$",
      label: "values",
    })
    .step("their elementary symmetric functions are integers", {
      value: H,
      check: jointly(
        standingOf(
          values.reduce((sum, { j }) => sum.plus(j), Complex.from(0)),
          "=",
          Rational.of(-(coefficients[1] ?? 0n)),
        ),
        standingOf(
          values.reduce((product, { j }) => product.times(j), Complex.from(1)),
          "=",
          Rational.of((coefficients.at(-1) ?? 0n) * (forms.length % 2 === 0 ? 1n : -1n)),
        ),
      ),
      route: "the sum and the product of the values against two of the coefficients",
      label: "polynomial",
    });
}

function rootOf(a: bigint, b: bigint, D: bigint): Complex {
  return Complex.of(0, Real.from(-D).sqrt())
    .minus(b)
    .div(2n * a);
}

function byEisenstein(tau: ComplexNumeric): Complex {
  const four = Complex.from(modular.E(4, tau)).pow(3);
  return four.times(1728).div(four.minus(Complex.from(modular.E(6, tau)).pow(2)));
}

/** e_n(P, Q) and the properties that determine it up to the choice of the root of unity. */
export function pairingWorking(value: object, E: Curve, n: number, P: AnyPoint, Q: AnyPoint): Derivation {
  const F = E.field;
  const [e, doubled, turned] = [value, E.weilPairing(n, P.times(2), Q), E.weilPairing(n, Q, P)] as Rational[];
  return new Derivation(`Weil pairing $e_{${n}}(P, Q)$`, { name: "pairing" })
    .under("weilPairing")
    .step("the curve and the points", {
      value: { curve: E, P, Q },
      check: exactly(P.times(n).isOrigin && Q.times(n).isOrigin, `${n}P = ${n}Q = O`),
      route: "by the group law",
      label: "points",
    })
    .step("by Miller's functions with divisors $n(P) - n(O)$ and $n(Q) - n(O)$", {
      formula: `e_{${n}}(P, Q)`,
      value: e,
      source: "Miller, The Weil pairing, and its efficient calculation, J. Cryptology 17 (2004)",
      check: exactly(F.format(power(F, e!, n)) === F.format(F.one), `its ${n}-th power is 1`),
      route: "as a root of unity",
      label: "pairing",
    })
    .step("it is bilinear and alternating: $e(2P, Q)$ and $e(Q, P)$", {
      value: { "e(2P, Q)": doubled, "e(Q, P)": turned },
      check: exactly(
        F.format(F.mul(e!, e!)) === F.format(doubled!) && F.format(F.mul(e!, turned!)) === F.format(F.one),
        "e(2P, Q) = e(P, Q)^2 and e(P, Q) e(Q, P) = 1",
      ),
      route: "computed again with other points",
      label: "bilinear",
    });
}

function power<T>(F: { mul(x: T, y: T): T; readonly one: T }, x: T, n: number): T {
  let product = F.one;
  for (let k = 0; k < n; k++) product = F.mul(product, x);
  return product;
}
