// Where a plane cubic is singular: rational singular points by elimination, and whether it holds a line.

import type { Field } from "../../algebra/field.ts";
import { clearingFactor } from "../../algebra/integral.ts";
import { coefficientsIn } from "../../algebra/multigcd.ts";
import {
  add,
  constant,
  degreeIn,
  derivative,
  divideBy,
  evaluate,
  fromTerms,
  isZero,
  multiply,
  type Polynomial,
  substitute,
  subtract,
  variable,
} from "../../algebra/multivariate.ts";
import { rationalRoots } from "../../algebra/rationalroots.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import { trim, type Univariate } from "../../algebra/univariate.ts";
import type { Rational } from "../../number/rational.ts";
import { crossProduct } from "./cubic.ts";
import { hessian } from "./invariants.ts";

type Form = Polynomial<Rational>;
type Triple = readonly Rational[];

export type NodeKind = "split node" | "nonsplit node" | "cusp" | "triple point";

export interface SingularPoint {
  readonly point: Triple;
  readonly kind: NodeKind;
  /** The discriminant of the two tangents, up to squares: zero at a cusp. */
  readonly tangents: Rational;
}

/** True if the Hessian is a multiple of the cubic (or zero): exactly then it is three lines, over some field. */
export function isThreeLines<T>(F: Field<T>, f: Polynomial<T>): boolean {
  const h = hessian(F, f);
  const keys = [...new Set([...f.terms.keys(), ...h.terms.keys()])];
  const at = (p: Polynomial<T>, key: number) => p.terms.get(key) ?? F.zero;
  return keys.every((k) => keys.every((l) => F.isZero(F.sub(F.mul(at(f, k), at(h, l)), F.mul(at(f, l), at(h, k))))));
}

/** The lines over Q that the cubic contains, each once, with coprime whole coefficients. */
export function rationalLines(f: Form): Form[] {
  const letters = f.variables.map((name) => variable(Q, f.variables, name));
  const sides = letters.filter((letter) => isZero(divideBy(Q, f, letter).remainder));
  const rest = letters.reduce(withoutFactor, f);
  // Any other line meets the three sides of the triangle of reference; two of the places differ and span it.
  const places = [0, 1, 2].flatMap((side) => rationalZerosOnSide(rest, side));
  const lines: Form[] = [];
  places.forEach((P, k) => {
    for (const R of places.slice(k + 1)) {
      const form = simplestLine(f.variables, crossProduct(Q, P, R));
      if (!form || lines.some((other) => isZero(subtract(Q, other, form)))) continue;
      if (isZero(divideBy(Q, rest, form).remainder)) lines.push(form);
    }
  });
  return [...sides, ...lines];
}

function withoutFactor(f: Form, g: Form): Form {
  const { quotient, remainder } = divideBy(Q, f, g);
  return isZero(remainder) ? withoutFactor(quotient, g) : f;
}

/** Coprime whole coefficients, the first positive; undefined for the zero form. */
function simplestLine(variables: readonly string[], line: Triple): Form | undefined {
  const first = line.find((c) => c.num !== 0n);
  if (!first) return undefined;
  const factor = clearingFactor(line).times(first.sign());
  const unit = (k: number) => variables.map((_, l) => (k === l ? 1 : 0));
  return fromTerms(
    Q,
    variables,
    line.map((c, k) => [c.times(factor), unit(k)] as const),
  );
}

/** The rational points of the cubic where one letter is 0; none if the whole side belongs to it. */
function rationalZerosOnSide(f: Form, side: number): Triple[] {
  const [p, q] = [0, 1, 2].filter((k) => k !== side) as [number, number];
  const place = (x: Rational, y: Rational): Triple => [0, 1, 2].map((k) => (k === side ? Q.zero : k === p ? x : y));
  const restricted = substitutedAt(f, f.variables[side]!, Q.zero);
  if (isZero(restricted)) return [];
  const at = (x: Rational) => substitutedAt(restricted, f.variables[p]!, x);
  const list = univariateIn(at(Q.one), f.variables[q]!);
  const finite = list.length > 1 ? rationalRoots(list).map((y) => place(Q.one, y)) : [];
  return isZero(divideBy(Q, restricted, variable(Q, f.variables, f.variables[p]!)).remainder)
    ? [...finite, place(Q.zero, Q.one)]
    : finite;
}

/** The rational singular points; complete unless a whole line of the cubic is singular, when some are returned. */
export function rationalSingularPoints(f: Form): SingularPoint[] {
  const found: Triple[] = [];
  for (const chart of [2, 1, 0]) {
    for (const P of singularInChart(f, chart)) {
      if (!found.some((R) => crossProduct(Q, P, R).every((c) => c.num === 0n))) found.push(P);
    }
  }
  return found.map((point) => ({ point, ...kindAt(f, point) }));
}

/** Common zeros of the derivatives with one letter 1: a resultant in one letter, then the other by common roots. */
function singularInChart(f: Form, chart: number): Triple[] {
  const [p, q] = [0, 1, 2].filter((k) => k !== chart).map((k) => f.variables[k]!) as [string, string];
  const affine = dehomogenised(f, chart, [p, q]);
  const [fp, fq] = [derivative(Q, affine, p), derivative(Q, affine, q)];
  const r = eliminate(fp, fq, q) ?? eliminate(affine, fp, q) ?? eliminate(affine, fq, q);
  const values = r ? rationalRoots(r) : [Q.zero];
  return values.flatMap((x) => {
    const restricted = [affine, fp, fq].map((g) => univariateIn(substitutedAt(g, p, x), q)).filter((u) => u.length > 0);
    const ys = restricted.length === 0 ? [Q.zero] : restricted.map(rationalRoots).reduce(common);
    return ys.map((y) => placed(f.variables, chart, p, x, y));
  });
}

function common(a: Rational[], b: Rational[]): Rational[] {
  return a.filter((x) => b.some((y) => x.equals(y)));
}

function placed(variables: readonly string[], chart: number, p: string, x: Rational, y: Rational): Triple {
  return variables.map((name, k) => (k === chart ? Q.one : name === p ? x : y));
}

function dehomogenised(f: Form, chart: number, letters: readonly string[]): Form {
  const values = f.variables.map((name, k) => (k === chart ? constant(Q, letters, Q.one) : variable(Q, letters, name)));
  return substitute(Q, f, values);
}

function substitutedAt(f: Form, name: string, x: Rational): Form {
  const values = f.variables.map((v) => (v === name ? constant(Q, f.variables, x) : variable(Q, f.variables, v)));
  return substitute(Q, f, values);
}

function univariateIn(f: Form, name: string): Univariate<Rational> {
  return trim(
    Q,
    coefficientsIn(Q, f, name).map((c) => c.terms.get(0) ?? Q.zero),
  );
}

/** The resultant in one letter (Sylvester's determinant) as a polynomial in the other; undefined if it is zero. */
function eliminate(f: Form, g: Form, name: string): Univariate<Rational> | undefined {
  const [m, n] = [degreeIn(f, name), degreeIn(g, name)];
  const other = f.variables.find((v) => v !== name)!;
  if (m < 0 || n < 0) return undefined;
  if (m === 0 || n === 0) return nonzero(univariateIn(m === 0 ? f : g, other));
  const [cf, cg] = [coefficientsIn(Q, f, name), coefficientsIn(Q, g, name)];
  const zero = constant(Q, f.variables, Q.zero);
  const row = (c: Form[], shift: number) =>
    Array.from({ length: m + n }, (_, k) => c[c.length - 1 - (k - shift)] ?? zero);
  const matrix = [
    ...Array.from({ length: n }, (_, k) => row(cf, k)),
    ...Array.from({ length: m }, (_, k) => row(cg, k)),
  ];
  return nonzero(univariateIn(determinantOf(matrix), other));
}

function nonzero(u: Univariate<Rational>): Univariate<Rational> | undefined {
  return u.length > 0 ? u : undefined;
}

/** Laplace expansion; at most five rows. */
function determinantOf(matrix: readonly (readonly Form[])[]): Form {
  const [first, ...rest] = matrix;
  if (rest.length === 0) return first![0]!;
  return first!.reduce<Form | undefined>((total, entry, k) => {
    const minor = isZero(entry) ? undefined : determinantOf(rest.map((row) => row.filter((_, l) => l !== k)));
    const term = minor ? multiply(Q, entry, minor) : constant(Q, entry.variables, Q.zero);
    if (!total) return term;
    return k % 2 === 0 ? add(Q, total, term) : subtract(Q, total, term);
  }, undefined)!;
}

/** The quadratic part at the point: two tangents, one, or none. */
function kindAt(f: Form, P: Triple): { readonly kind: NodeKind; readonly tangents: Rational } {
  const [i, j] = tangentPlane(P);
  const second = (a: Triple, b: Triple) =>
    f.variables.reduce(
      (total, p, k) =>
        f.variables.reduce(
          (sum, q, l) =>
            sum.plus(
              evaluate(Q, derivative(Q, derivative(Q, f, p), q), P)
                .times(a[k]!)
                .times(b[l]!),
            ),
          total,
        ),
      Q.zero,
    );
  const [A, B, C] = [second(i, i), second(i, j), second(j, j)];
  const tangents = B.times(B).minus(A.times(C));
  if ([A, B, C].every((c) => c.num === 0n)) return { kind: "triple point", tangents };
  if (tangents.num === 0n) return { kind: "cusp", tangents };
  return { kind: Q.sqrt(tangents) ? "split node" : "nonsplit node", tangents };
}

/** Two directions that with P span the plane. */
function tangentPlane(P: Triple): [Triple, Triple] {
  const k = P.findIndex((c) => c.num !== 0n);
  const unit = (l: number) => [0, 1, 2].map((m) => (m === l ? Q.one : Q.zero));
  return [unit((k + 1) % 3), unit((k + 2) % 3)];
}
