// Division polynomials and the n-fold formulas as exact rational functions.
//
// With y = ℘′, y² = C = 4x³ − g2 x − g3, ψ_n = f_n(x) for odd n and y f_n(x) for even n (Silverman AEC, exercise 3.7, for Y = y/2, a = −g2/4,
// b = −g3/4):
//     ℘(nz) = x − ψ_(n−1) ψ_(n+1)/ψ_n²,     ℘′(nz) = ψ_2n/ψ_n⁴,     ψ_2n = ψ_n (ψ_(n+2) ψ_(n−1)² − ψ_(n−2) ψ_(n+1)²)/y
// The quotients are in lowest terms, so nothing is divided out; g2 and g3 may be exact or names.

import { mulUni, powUni, scaleUni, subUni } from "../../algebra/univariate.ts";
import { Rational } from "../../number/rational.ts";
import type { Element, FunctionField, ScalarPolynomial } from "./element.ts";
import { exactOf, exactScalar, type Scalar } from "./scalar.ts";

const tables = new WeakMap<FunctionField, ScalarPolynomial[]>();

/**
 * f_n, for n >= 0.
 * Cost     products of polynomials of degree about n²/2, for all n asked for so far kept.
 */
export function divisionPolynomial(field: FunctionField, n: number): ScalarPolynomial {
  let table = tables.get(field);
  if (!table) {
    table = first(field);
    tables.set(field, table);
  }
  for (let k = table.length; k <= n; k++) table.push(next(field, table, k));
  return table[n]!;
}

/** f_0 .. f_4. */
function first({ ring, cubic }: FunctionField): ScalarPolynomial[] {
  const quarter = exactScalar(Rational.of(1, 4));
  const [b, a] = [0, 1].map((k) => ring.mul(quarter, cubic[k] ?? ring.zero)) as [Scalar, Scalar];
  const int = (n: number) => ring.fromInt(BigInt(n));
  const times = (n: number, ...factors: Scalar[]) => factors.reduce(ring.mul, int(n));
  const third = [ring.neg(ring.mul(a, a)), times(12, b), times(6, a), ring.zero, int(3)];
  const fourth = [
    ring.add(times(-16, b, b), times(-2, a, a, a)),
    times(-8, a, b),
    times(-10, a, a),
    times(40, b),
    times(10, a),
    ring.zero,
    int(2),
  ];
  return [[], [ring.one], [ring.one], third, fourth];
}

function next({ ring, cubic }: FunctionField, f: readonly ScalarPolynomial[], n: number): ScalarPolynomial {
  const mul = (...factors: ScalarPolynomial[]) => factors.reduce((p, q) => mulUni(ring, p, q));
  const m = Math.floor(n / 2);
  if (n % 2 === 0) return mul(f[m]!, doubled(ring, f, m));
  const [up, down] = [mul(f[m + 2]!, powUni(ring, f[m]!, 3)), mul(f[m - 1]!, powUni(ring, f[m + 1]!, 3))];
  const square = mul(cubic, cubic);
  return m % 2 === 0 ? subUni(ring, mul(square, up), down) : subUni(ring, up, mul(square, down));
}

/** f_2m/f_m. */
function doubled(ring: FunctionField["ring"], f: readonly ScalarPolynomial[], m: number): ScalarPolynomial {
  const square = (p: ScalarPolynomial) => mulUni(ring, p, p);
  // f_(−1) = −f_1.
  const below = m >= 2 ? f[m - 2]! : scaleUni(ring, ring.fromInt(-1n), f[1]!);
  return subUni(ring, mulUni(ring, f[m + 2]!, square(f[m - 1]!)), mulUni(ring, below, square(f[m + 1]!)));
}

/** (℘(nz), ℘′(nz)) for n >= 1 as functions of z. */
export function multipleAsElements(field: FunctionField, n: number): { readonly x: Element; readonly y: Element } {
  const { ring, cubic } = field;
  const mul = (...factors: ScalarPolynomial[]) => factors.reduce((p, q) => mulUni(ring, p, q));
  divisionPolynomial(field, n + 2);
  const f = tables.get(field)!;
  const own = f[n]!;
  const square = mul(own, own);
  const pair = mul(f[n - 1]!, f[n + 1]!);
  const letter: ScalarPolynomial = [ring.zero, ring.one];
  const even = n % 2 === 0;
  const bottom = even ? mul(cubic, square) : square;
  const top = subUni(ring, mul(letter, bottom), even ? pair : mul(cubic, pair));
  const cube = mul(square, own);
  const x = monic(field, top, [], bottom);
  const y = monic(field, [], doubled(ring, f, n), even ? mul(cubic, cubic, cube) : cube);
  return { x, y };
}

/** (A + By)/D with D made monic. */
function monic(field: FunctionField, A: ScalarPolynomial, B: ScalarPolynomial, D: ScalarPolynomial): Element {
  const { ring } = field;
  const lead = D.at(-1)!;
  if (exactOf(lead) === undefined) throw new TypeError("a division polynomial has a number as its leading coefficient");
  const by = ring.inv(lead);
  return {
    field,
    A: scaleUni(ring, by, A),
    B: scaleUni(ring, by, B),
    D: scaleUni(ring, by, D),
    constants: new Map(),
  };
}
