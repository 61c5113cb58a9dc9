import temml from "temml";
import { describe, expect, it } from "vitest";
import { complex, exact, rational, real } from "../../../lib/number/convert.ts";
import { agm, atDigits, cos, exp, gamma, ln, sin, sqrt } from "../../../lib/number/functions.ts";
import { recognise } from "../../../lib/number/recognise.ts";
import { zero } from "../../../lib/number/zero.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import type { Derivation } from "../../../lib/page/derivation.ts";
import { plainFormulas } from "../../../lib/page/plain-formula.ts";
import type { Table } from "../../../lib/page/table.ts";
import { tex } from "../../../lib/page/typeset.ts";
import { working } from "../../../lib/page/working.ts";
import type { Standing } from "../../../lib/proof/standing.ts";
import { carlson } from "../../../lib/surface/carlson.ts";
import { factor } from "../../../lib/surface/factorisation.ts";
import { homothety } from "../../../lib/surface/homothety.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import { quadrics } from "../../../lib/surface/make-quadrics.ts";
import { quartic } from "../../../lib/surface/make-quartic.ts";
import { modular } from "../../../lib/surface/modular.ts";

const text = (value: unknown) => bundle(value)?.["text/plain"] as string;

/** The value of the step with a label. */
function at(steps: Derivation, label: string): unknown {
  return steps.steps.find((step) => step.label === label)?.value;
}

/** Typesets at each level; every check holds. */
function sound(steps: Derivation): void {
  for (const level of ["outline", "steps", "all"] as const)
    expect(() => temml.renderToString(tex(steps.show(level)), { throwOnError: true, maxExpand: 1e5 })).not.toThrow();
  // Every step is checked, and says by which other way.
  for (const step of steps.steps) {
    expect(step.label, step.text).toMatch(/^[\w-]+$/);
    expect(step.route, step.text).toBeTruthy();
    expect(["proved", "certified"], `${step.text}: ${step.route}`).toContain(
      (step.check as Standing | undefined)?.kind,
    );
  }
  expect(new Set(steps.steps.map(({ label }) => label)).size).toBe(steps.steps.length);
  // Every plain line can be read without TeX.
  expect(text(steps.show("all"))).not.toMatch(/\\(?!n)/);
}

describe("working of torsion", () => {
  it("Z/7: counts, bound, multiples — oracle: counts by hand over F_3, and the published group", () => {
    const steps = working(curve`y^2 + x y + y = x^3 - x^2 - 3x + 3`.torsion());
    sound(steps);
    expect((at(steps, "counts") as Table).rows[0]).toEqual([3, 7, 7]);
    expect(String(at(steps, "bound"))).toBe("7");
    expect(String(at(steps, "group"))).toBe("Z/7");
    expect(text(working(curve`y^2 + y = x^3 - x`.lattice()))).toContain("real basis: ω1 > 0 is the least real period");
    expect(steps.cite("bound")).toBe("(4)");
    expect(() => steps.cite("bond")).toThrow(/expected one of curve, discriminant/);
  });

  it("a prime that all counts leave is excluded by the real points — oracle: trivial group of the 5-isogenous curve", () => {
    const steps = working(curve`y^2 + y = x^3 - x^2 - 7820x - 263580`.torsion());
    sound(steps);
    expect(String(at(steps, "bound"))).toBe("5");
    expect(String(at(steps, "group"))).toBe("0");
    expect(text(steps.show("all"))).toContain("none of them an integer");
  });

  it("Z/2 × Z/2, and a model that is not minimal", () => {
    sound(working(curve`y^2 = x^3 - x`.torsion()));
    sound(working(curve`y^2 = x^3 - 432x + 8208`.torsion()));
  });
});

describe("working of minimal models", () => {
  it("u = 6 from the orders at 2 and 3 — oracle: Δ = −11·6^12 by hand", () => {
    const steps = working(curve`y^2 = x^3 - 432x + 8208`.minimal());
    sound(steps);
    expect(String(at(steps, "scale"))).toBe("6");
    expect((at(steps, "primes") as Table).rows.map(String)).toEqual(["2,8,9,12,1", "3,4,6,12,1", "11,0,0,1,0"]);
  });

  it("denominators, and Kraus's condition at 2", () => {
    sound(working(curve({ a: [0, "1/2", 0, "-81/16", 3] }).minimal()));
    sound(working(curve`y^2 = x^3 + 16`.minimal()));
    sound(working(curve`y^2 = x^3 - x`.minimal()));
    sound(working(curve`y^2 = x^3 + 4x`.minimal()));
  });
});

describe("working of isogenies", () => {
  it("5-isogeny: t = 1562, w = 38544 — oracle: Vélu's sums over the points by hand", () => {
    const E = curve`y^2 + y = x^3 - x^2 - 10x - 20`;
    const steps = working(E.isogeny({ kernel: E.point(5, 5) }));
    sound(steps);
    expect(text(steps)).toContain("{ t: 1562, w: 38544 }");
    expect((at(steps, "points") as Table).rows.map(String)).toEqual(["5,110,121", "16,1452,14641"]);
    expect(String(at(steps, "target"))).toContain("x^3 - x^2 - 7820*x - 263580");
  });

  it("degree 2, a dual, a kernel without rational points, a change of model", () => {
    const E = curve`y^2 = x^3 - x`;
    const phi = E.isogeny({ kernel: E.point(0, 0) });
    sound(working(phi));
    sound(working(phi.dual()));
    sound(working(curve`y^2 + y = x^3 - x^2 - 7820x - 263580`.isogenies()[0]));
    sound(working(curve`y^2 = x^3 - 432x + 8208`.minimal().to));
  });
});

describe("working of lattices and of what is computed on them", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const F = curve`y^2 + y = x^3 - x^2`;

  it("two means for a real cubic, at 20 and 60 digits — oracle: published real periods 2.99345864 and 6.34604652", () => {
    for (const [C, period] of [
      [E, "2.99345864"],
      [F, "6.34604652"],
    ] as const) {
      const steps = working(C.lattice());
      sound(steps);
      expect(String(at(steps, "omega1"))).toContain(period);
      expect((at(steps, "agm1") as Table).rows.length).toBeLessThan(8);
      atDigits(60, () => sound(working(C.lattice())));
    }
  });

  it("lattices that are not real, or given by periods", () => {
    sound(working(lattice({ invariants: [complex(1, 2), complex(0, 1)] })));
    sound(working(lattice({ tau: complex("3/10", "1/50") })));
  });

  it("a cubic and a quartic through a point, a flex too", () => {
    const steps = working(cubic`u^3 + 2v^3 + 3w^3 = 6u v w`.through({ u: 1, v: 1, w: 1 }));
    sound(steps);
    expect(text(steps)).toContain("(3) the tangent meets the curve again in\n    (1 : -2 : 1)");
    sound(working(cubic`x^3 + y^3 + z^3 = 0`.through({ x: 1, y: -1, z: 0 })));
    sound(working(quartic`y^2 = x^4 + 1`.through({ x: 0, y: 1 })));
    sound(working(quadrics`a^2 + 5b^2 = c^2, a^2 - 5b^2 = d^2`.through({ a: 1, b: 0, c: 1, d: 1 })));
  });

  it("numbers: each operation by its inverse or an identity", () => {
    const L = lattice({ invariants: [4, -1] });
    const z = complex("0.41", "0.27");
    for (const x of [L.wp(z).pow(2).minus(real(2).sqrt()), L.wp.prime(z), L.zeta(z), L.sigma(z)]) sound(working(x));
    for (const x of [...L.quasiPeriods, L.roots[0].times(L.tau), L.area, lattice({ tau: z }).j]) sound(working(x));
    sound(
      working(
        exp(real("1/3"))
          .plus(ln(real(3)))
          .times(sin(1))
          .div(cos(2)),
      ),
    );
  });

  it("a logarithm on each component, for finite order too — oracle: Carlson's integral, in the checks", () => {
    sound(working(E.logarithm(E.point(2, -3))));
    sound(working(E.logarithm(E.point(2, 2))));
    const steps = working(E.logarithm(E.point(0, 0)));
    sound(steps);
    expect(String(at(steps, "integral"))).toContain("0.929592715285395");
    sound(working(F.logarithm(F.point(0, 0))));
    sound(working(curve`y^2 = x^3 - x`.logarithm(curve`y^2 = x^3 - x`.point(0, 0))));
    expect(at(working(E.logarithm(E.origin)), "logarithm")).toBeDefined();
  });

  it("℘ by the q-expansion — oracle: the theta functions, in the checks", () => {
    const L = lattice({ invariants: [4, -1] });
    sound(working(L.wp(complex("0.41", "0.27"))));
    sound(working(L.wp(complex("7.41", "-12.27"))));
    sound(working(L.wp(L.at("1/3", 0))));
    atDigits(60, () => sound(working(L.wp(L.at("1/3", "1/2").plus(complex("1/7", 0))))));
  });

  it("moves of τ, one by one — oracle: the last τ of the table is the reduced one, 2/17 + 25i/17 by hand", () => {
    const steps = working(lattice({ tau: complex("3/10", "1/50") }).reduced);
    sound(steps);
    expect((at(steps, "moves") as Table).rows.at(-1)!.map(String)).toEqual(["$T^{-2}$", "2/17 + 25/17 i"]);
  });

  it("complex multiplication: forms and class number — oracle: h(−23) = 3; none for j = 110592/37", () => {
    const steps = working(lattice({ tau: exact`(1+√(-23))/2` }).complexMultiplication());
    sound(steps);
    expect((at(steps, "forms") as Table).rows.map(String)).toEqual(["1,1,6", "2,1,3", "2,-1,3"]);
    sound(working(curve`y^2 = x^3 - x`.lattice().complexMultiplication()));
    sound(working(E.lattice().complexMultiplication()));
  });
});

describe("working of other values", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const X = curve`y^2 = x^3 - x`;

  it("curves and points: invariants, multiples, finite and infinite order — oracle: Δ = 37, order 7", () => {
    sound(working(E));
    sound(working(curve({ a: [0, "1/2", 0, "-81/16", 3] })));
    const steps = working(E.point(0, 0));
    sound(steps);
    expect(at(steps, "order")).toBe(Number.POSITIVE_INFINITY);
    const T = curve`y^2 + x y + y = x^3 - x^2 - 3x + 3`;
    expect(at(working(T.point(1, 0)), "order")).toBe(7);
    sound(working(T.point(1, 0)));
    sound(working(E.origin));
  });

  it("points from the torus, division polynomials, the Weil pairing — oracle: ψ3 by hand, e2 = −1", () => {
    sound(working(E.exponential(real("1/3"))));
    sound(working(E.exponential(complex("1/3", "1/5"))));
    sound(working(E.exponential(E.lattice().at("1/3", 0))));
    const psi = working(E.divisionPolynomial(3));
    sound(psi);
    expect(text(psi)).toContain("3*x^4 - 6*x^2 + 3*x - 1");
    sound(working(E.divisionPolynomial(4)));
    const pairing = working(X.weilPairing(2, X.point(0, 0), X.point(1, 0)));
    sound(pairing);
    expect(String(at(pairing, "pairing"))).toBe("-1");
  });

  it("class polynomials, homotheties, sub- and overlattices, moduli, moved points, factors", () => {
    const L = lattice({ invariants: [4, -1] });
    sound(working(modular.classPolynomial(-23)));
    sound(working(homothety(X.lattice(), curve`y^2 = x^3 - 5x`.lattice())));
    const over = working(L.overlattice(L.at("1/3", 0)));
    sound(over);
    expect(at(over, "index")).toBe(3n);
    sound(
      working(
        L.sublattice([
          [1, 0],
          [1, 2],
        ]),
      ),
    );
    sound(working(jacobi({ m: "1/3" })));
    sound(working(modular.reduce(complex("1/3", "1/50"))));
    sound(working(factor(-944784)));
    for (const x of [modular.j(complex("1/3", 2)), modular.eta(complex("1/3", 2)), modular.lambda(complex("1/3", 2))])
      sound(working(x));
    for (const x of [
      jacobi({ m: "1/3" }).sn("1/2"),
      legendre.K({ m: "1/3" }),
      agm(1, real(2).sqrt()),
      gamma(rational("1/3")),
    ])
      sound(working(x));
  });

  it("a recognised number is a conjecture in its derivation too", () => {
    const found = recognise(exp(ln(real(3)).neg()))!;
    expect(working(found).checks.map(({ kind }) => kind)).toEqual(["certified", "certified", "conjectured"]);
  });

  it("a value without a derivation says so, by what it is", () => {
    expect(() => working([1, 2])).toThrow("working: a list has no derivation: no record is kept of how it was made.");
    expect(() => working("abc")).toThrow("the plain string abc has no derivation");
    expect(() => working({})).toThrow("this record has no derivation");
    expect(() => working(L2.wp)).toThrow("a function has no derivation");
  });
  const L2 = lattice({ tau: complex(0, 1) });

  it("links are named on request, where a notebook holds two of a kind", () => {
    expect(working(X.torsion(), { name: "X" }).anchor("bound")).toBe("step-x-bound");
    expect(working(X.torsion()).anchor("bound")).toBe("step-torsion-bound");
  });
});

it("formulas in sentences are readable as plain text", () => {
  expect(plainFormulas("points over $\\mathbb{F}_p$, $T^n: \\tau + n$, $\\operatorname{Re} \\omega_2 = 0$")).toBe(
    "points over F_p, T^n: τ + n, Re ω2 = 0",
  );
});

describe("workings of single function values: their formula with the numbers put in, its source, a second route", () => {
  it.each([
    [
      "K",
      () => legendre.K({ m: "1/3" }),
      "K(1/3) = π/(2 M(1, √(2/3))) = 1.7339168852579350250...",
      /R_F\(0, m1, 1\) by duplication/,
    ],
    ["F", () => legendre.F({ phi: 1, m: "1/2" }), "1.0832167728451687504...", /sn F\(φ \| m\) = sin φ/],
    ["RF", () => carlson.RF(1, 2, 3), "R_F(1, 2, 3) = ", /homogeneity/],
    ["agm", () => agm(1, sqrt(2)), "M(1, √2) = 1.1981402347355922074...", /R_F\(0, a², b²\)/],
    [
      "inverse of ℘",
      () => curve`y^2 + y = x^3 - x`.lattice().wp.inverse(2),
      "℘^-1(2) = R_F(2 - e1, 2 - e2, 2 - e3) = 0.7249122149096230677",
      /Carlson RF/,
    ],
    ["zero", () => zero((x) => cos(x).minus(x), { between: [0, 1] }), "0.73908513321516064165...", /twice the bits/],
  ])("%s — oracle: values of a general-purpose library", (_, value, line, route) => {
    const text = String(bundle(working(value()).show("all"))?.["text/plain"]);
    expect(text).toContain(line);
    expect(text).toMatch(route);
    expect(text).not.toMatch(/refuted|undecided/);
  });

  it("a mean shows its rows, which meet its value — oracle: the value itself", () => {
    const [mean, value] = working(agm(1, sqrt(2))).steps;
    const rows = (mean!.value as Table).rows;
    expect(String(rows.at(-1)![1]).slice(0, 20)).toBe(String(value!.value).slice(0, 20));
  });

  it.each([undefined, null, 5, "word"])("%s has none, and says so", (value) => {
    expect(() => working(value)).toThrow(/^working: .*has no derivation/);
  });
});
