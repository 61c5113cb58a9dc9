// Class polynomials, q-expansions and points moved by the modular group.

import { Rational } from "../number/rational.ts";
import type { ClassPolynomial } from "../surface/class-polynomial.ts";
import type { Jacobi } from "../surface/jacobi.ts";
import type { Moved } from "../surface/moved.ts";
import type { QSeries } from "../surface/q-series.ts";
import { texInteger } from "./digits.ts";
import { rationalTex } from "./exact-kind.ts";
import type { Kind } from "./kind.ts";
import { array } from "./tex.ts";

/** A sum longer than this (in signs of TeX) goes on in the next line. */
const LINE = 160;

interface Term {
  readonly minus: boolean;
  readonly tex: string;
}

export const classPolynomialKind: Kind<ClassPolynomial> = {
  text: (H) => String(H),
  tex: (H) => {
    const top = H.classNumber;
    const terms = H.coefficients.flatMap((c, k) =>
      c === 0n ? [] : [integerTerm(c, powerTex("X", Rational.of(top - k)))],
    );
    return brokenSum(`H_{${H.discriminant}}(X)`, terms);
  },
  data: (H) => ({ ...H.toJSON() }),
};

export const qSeriesKind: Kind<QSeries> = {
  text: (s) => String(s),
  tex: (s) => {
    const nome = s.nome === "q_mod" ? "q_{\\mathrm{mod}}" : "q_\\theta";
    const terms = s.coefficients.flatMap((c, k) =>
      c.sign() === 0 ? [] : [rationalTerm(c, powerTex(nome, s.first.plus(k)))],
    );
    const end = powerTex(nome, s.first.plus(s.coefficients.length));
    return brokenSum("", [...terms, { minus: false, tex: `O\\left(${end}\\right)` }]);
  },
  conventions: () => ["nome"],
  data: (s) => ({ ...s.toJSON() }),
};

export const movedKind: Kind<Moved> = {
  text: (m) => String(m),
  tex: (m, show) => {
    const [[a, b], [c, d]] = m.matrix;
    return array("rcl", [
      ["M", "=", `\\begin{pmatrix} ${a} & ${b} \\\\ ${c} & ${d} \\end{pmatrix}`],
      ["M\\tau", "=", show.tex(m.tau)],
      ["c\\tau + d", "=", show.tex(m.factor)],
      ["\\eta(M\\tau)", "=", `${turnTex(m.etaTwentyFourths, 24)}(c\\tau + d)^{1/2}\\, \\eta(\\tau)`],
      ...m.theta.map(({ index, of, eighths }) => [
        `\\theta_${index}\\left(\\tfrac{v}{c\\tau+d} \\middle| M\\tau\\right)`,
        "=",
        `${turnTex(eighths, 8)}(c\\tau + d)^{1/2}\\, e^{\\pi i c v^2/(c\\tau+d)}\\, \\theta_${of}(v | \\tau)`,
      ]),
    ]);
  },
  data: (m, show) => ({
    kind: "moved point",
    matrix: m.matrix.map((row) => row.map(String)),
    tau: show.data(m.tau),
    etaTwentyFourths: String(m.etaTwentyFourths),
  }),
};

function turnTex(part: number, whole: number): string {
  return part === 0 ? "" : `e^{2\\pi i \\cdot ${part}/${whole}}\\, `;
}

export const jacobiKind: Kind<Jacobi> = {
  text: (J, show) => `Jacobi functions with m = ${show.text(J.m)}, m1 = ${show.text(J.m1)}`,
  prose: (J, show) => `Jacobi functions with $m = ${show.tex(J.m)}$, $m_1 = ${show.tex(J.m1)}$`,
  conventions: (J) => J.conventions,
  data: (J, show) => ({ kind: "Jacobi functions", m: show.data(J.m), m1: show.data(J.m1) }),
};

function powerTex(base: string, exponent: Rational): string {
  if (exponent.sign() === 0) return "";
  return exponent.equals(1) ? base : `${base}^{${exponent}}`;
}

function integerTerm(c: bigint, monomial: string): Term {
  return rationalTerm(Rational.of(c), monomial);
}

function rationalTerm(c: Rational, monomial: string): Term {
  const size = c.abs();
  const number = size.isInteger() ? texInteger(String(size)) : rationalTex(size);
  const tex = monomial === "" ? number : size.equals(1) ? monomial : `${number}\\, ${monomial}`;
  return { minus: c.sign() < 0, tex };
}

function brokenSum(left: string, terms: readonly Term[]): string {
  const lines: string[] = [""];
  terms.forEach(({ minus, tex }, k) => {
    const signed = k === 0 ? `${minus ? "-" : ""}${tex}` : ` ${minus ? "-" : "+"} ${tex}`;
    const last = lines.length - 1;
    if (lines[last] !== "" && (lines[last]! + signed).length > LINE) lines.push(signed.trim());
    else lines[last] += signed;
  });
  const head = left === "" ? "" : `${left} = `;
  if (lines.length === 1) return head + lines[0]!;
  return array("l", [[head + lines[0]!], ...lines.slice(1).map((line) => [`\\quad ${line}`])]);
}
