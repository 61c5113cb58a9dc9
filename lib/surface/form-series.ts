// Laurent series of σ-quotients and ζ-sums at points whose part in the function is known: no multiplicity has to be found again.

import { Rational } from "../number/rational.ts";
import { type Complex, type ComplexNumeric, Real } from "../number/values.ts";
import type { EllipticFunction, FunctionPoint } from "./elliptic-function.ts";
import { onTorus, type SigmaForm, weightOf, type ZetaForm } from "./function-forms.ts";
import { checkCount, LaurentExpansion } from "./laurent-expansion.ts";
import { quasiExpansion } from "./quasi-expansion.ts";
import { TorusPoint } from "./torus-point.ts";

type Value = Real | Complex;

interface Series {
  readonly order: number;
  readonly coefficients: readonly Value[];
}

/** Whether z is one of the points, by exact coordinates. */
export function isAmong(list: readonly FunctionPoint[], z: ComplexNumeric): boolean {
  return list.some(({ point }) => samePlace(point, z));
}

function samePlace(p: TorusPoint | Complex, z: ComplexNumeric): boolean {
  if (!(p instanceof TorusPoint)) return p === z;
  const gap = onTorus(p.lattice, z).minus(p);
  const rest = gap.remainder;
  return gap.coordinates.every((q) => q.isInteger()) && (!rest || `${rest.exact ?? "?"}` === "0");
}

/** The series of C Π σ(z − a)/Π σ(z − b) at p. */
export function sigmaSeries(form: SigmaForm, p: TorusPoint, n: number): LaurentExpansion {
  checkCount(n);
  const all = (count: number): Series => {
    const product = (list: readonly FunctionPoint[]) =>
      list.reduce<Series>(
        (s, { point, multiplicity }) => {
          const { order, coefficients } = quasiExpansion(form.function.lattice, "sigma", p.minus(point), count);
          let power = s;
          for (let k = 0; k < multiplicity; k++) power = times(power, { order, coefficients }, count);
          return power;
        },
        unit(form.constant, count),
      );
    const [top, bottom] = [product(form.zeros), product(form.poles)];
    return over(top, { ...bottom, coefficients: bottom.coefficients.map((c) => c.div(form.constant)) }, count);
  };
  return expansion(p, all, n);
}

function unit(value: Value, count: number): Series {
  return { order: 0, coefficients: [value, ...new Array<Value>(count - 1).fill(Real.from(0))] };
}

function times(a: Series, b: Series, count: number): Series {
  const coefficients = Array.from({ length: count }, (_, k) => {
    let sum: Value = Real.from(0);
    for (let j = 0; j <= k; j++) sum = sum.plus(a.coefficients[j]!.times(b.coefficients[k - j]!));
    return sum;
  });
  return { order: a.order + b.order, coefficients };
}

function over(a: Series, b: Series, count: number): Series {
  const out: Value[] = [];
  for (let k = 0; k < count; k++) {
    let value = a.coefficients[k]!;
    for (let j = 1; j <= k; j++) value = value.minus(b.coefficients[j]!.times(out[k - j]!));
    out.push(value.div(b.coefficients[0]!));
  }
  return { order: a.order - b.order, coefficients: out };
}

/** The series of C + Σ c_1 ζ(z − p) + ... at one of its poles, whose principal part is given exactly as it was typed. */
export function zetaSeries(form: ZetaForm, wp: EllipticFunction, p: TorusPoint, n: number): LaurentExpansion {
  checkCount(n);
  const own = form.parts.find(({ at }) => samePlace(at, p));
  const order = -(own?.coefficients.length ?? 0);
  const at = (exponent: number): Value => {
    if (exponent < 0) return own!.coefficients[-1 - exponent]!;
    let sum: Value = exponent === 0 ? form.constant : Real.from(0);
    for (const part of form.parts) {
      const here = p.minus(part.at);
      part.coefficients.forEach((c, k) => {
        if (`${c.exact ?? "?"}` === "0") return;
        const series =
          k === 0
            ? quasiExpansion(form.function.lattice, "zeta", here, exponent + 2)
            : wp.derivative(k - 1).laurent(here, exponent + k + 2);
        const weight = k === 0 ? Rational.one : weightOf(k + 1);
        sum = sum.plus(c.times(series.coefficient(exponent)).times(weight));
      });
    }
    return sum;
  };
  const coefficients = Array.from({ length: n }, (_, k) => at(order + k));
  return new LaurentExpansion(p, order, coefficients, (k) => at(order + k));
}

function expansion(p: TorusPoint, series: (count: number) => Series, n: number): LaurentExpansion {
  const { order, coefficients } = series(n);
  return new LaurentExpansion(p, order, coefficients, (k) => series(k + 1).coefficients[k]!);
}
