// Isogenies from the torus: the kernel is given by a point of finite order of C/Λ, or by a lattice that contains Λ.

import { factorInteger } from "../algebra/factor.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import {
  addUni,
  deriveUni,
  divideUni,
  gcdUni,
  mulUni,
  powUni,
  scaleUni,
  type Univariate,
} from "../algebra/univariate.ts";
import { pointsOfOrder } from "../arithmetic/division.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { rationalIsogeny, type TorusCoordinates } from "../arithmetic/rationalkernels.ts";
import { abscissas, denominatorOf, type Isogeny, kernelOf, veluIsogeny } from "../curve/isogeny.ts";
import type { ModelChange } from "../curve/weierstrass.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
import { Complex, type ComplexNumeric, Real } from "../number/values.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import { fromKernel, movedPolynomial, multiplicationMorphism } from "./isogenies.ts";
import { changeMorphism } from "./joined.ts";
import type { Lattice } from "./lattice.ts";
import { coordinatesIn, overlapsInteger } from "./lattice-relations.ts";
import type { Morphism } from "./morphism.ts";
import { Point } from "./point.ts";
import { TorusPoint } from "./torus-point.ts";

/** The isogeny C/Λ → C/(Λ + Zc) over Q, for an exact point c of finite order. */
export function fromTorus(E: Curve, c: ComplexNumeric): Morphism {
  const L = E.lattice();
  if (!(c instanceof TorusPoint) || c.lattice !== L.data || c.order === undefined) throw notExact(E, c);
  return fromCyclic(E, c.reduced);
}

function fromCyclic(E: Curve, c: TorusPoint): Morphism {
  const n = Number(c.order);
  if (n === 1) return multiplicationMorphism(E, 1);
  const { a, change } = globalMinimalModel(E.a);
  // The lattice of the minimal model is uΛ, with the same coordinates in its real basis.
  const h = kernelFrom(new Curve(Q, toRationals(a)), c.coordinates, n);
  if (!h) throw notRational(E, c);
  return fromKernel(E, movedPolynomial(h, change));
}

/**
 * The polynomial of the abscissas of the subgroup that c generates, on a minimal model; undefined if it is not rational, proved.
 * A subgroup of composite order is taken in steps of prime order, each on the quotient by the one before.
 */
function kernelFrom(E: Curve, c: TorusCoordinates, n: number): Univariate<Rational> | undefined {
  const p = Number(factorInteger(BigInt(n)).at(-1)!.prime);
  const first = c.map((q) => q.times(n / p)) as unknown as TorusCoordinates;
  const step = p === 2 ? isogenyByHalf(E, first) : isogenyByPrime(E, first, p);
  if (!step || n === p) return step && abscissas(Q, step.kernel);
  const model = globalMinimalModel(step.target);
  const next = new Curve(Q, toRationals(model.a));
  const rest = kernelFrom(next, carried(E, c, next, model.change, n / p), n / p);
  return rest && pulledBack(step, movedPolynomial(rest, model.change));
}

function isogenyByHalf(E: Curve, c: TorusCoordinates): Isogeny<Rational> | undefined {
  const place = E.lattice().at(...c);
  const P = pointsOfOrder(E.a, 2).find((R) => {
    const z = E.logarithm(new Point(E, R));
    return z instanceof TorusPoint && z.minus(place).isLatticePoint;
  });
  return P && veluIsogeny(Q, E.a, kernelOf(Q, E.a, [P[0].neg(), Q.one]));
}

function isogenyByPrime(E: Curve, c: TorusCoordinates, p: number): Isogeny<Rational> | undefined {
  const { data } = E.lattice();
  return isOnCircle(data, c) ? rationalIsogeny(E.a, data, c, p) : undefined;
}

/** Whether conjugation takes the point to itself or its opposite, as it must for a rational subgroup of odd prime order. */
function isOnCircle({ conjugation: k }: PeriodLattice, [r, s]: TorusCoordinates): boolean {
  if (!k) return false;
  const [x, y] = [r.times(k.a11).plus(s.times(k.a21)), r.times(k.a12).plus(s.times(k.a22))];
  const whole = (...list: Rational[]) => list.every((q) => q.isInteger());
  return whole(x.minus(r), y.minus(s)) || whole(x.plus(r), y.plus(s));
}

/** The point c of the torus of E on the torus of the minimal model of its quotient, where it has the order m. */
function carried(
  E: Curve,
  c: TorusCoordinates,
  target: Curve,
  { u }: ModelChange<Rational>,
  m: number,
): TorusCoordinates {
  const z = Complex.from(E.lattice().at(...c)).times(u);
  const { r, s } = target.lattice().locate(z);
  const exact = (x: Real) => {
    const whole = x.times(m).plus(Rational.of(1, 2)).midpoint.floor();
    if (whole === undefined || !overlapsInteger(x.times(m)))
      throw new Error("a point of order m has coordinates in Z/m");
    return Rational.of(whole, m);
  };
  return [exact(r), exact(s)];
}

/** The abscissas over those of h under the isogeny, and those of its kernel. */
function pulledBack(step: Isogeny<Rational>, h: Univariate<Rational>): Univariate<Rational> {
  const D = denominatorOf(Q, step);
  const d = h.length - 1;
  const over = h.reduce<Univariate<Rational>>(
    (total, c, k) => addUni(Q, total, scaleUni(Q, c, mulUni(Q, powUni(Q, step.numerator, k), powUni(Q, D, d - k)))),
    [],
  );
  const all = mulUni(Q, abscissas(Q, step.kernel), over);
  return divideUni(Q, all, gcdUni(Q, all, deriveUni(Q, all))).quotient;
}

/**
 * The isogeny z ↦ z from C/Λ to C/M for a lattice M that contains Λ: by its cyclic part and a multiplication.
 *
 * M is a lattice made from Λ by `overlattice`, or one of another curve with rational invariants: then the matrix is read from
 * enclosures, and equal invariants of the target prove the inclusion.
 */
export function fromInclusion(E: Curve, M: Lattice): Morphism {
  const L = E.lattice();
  const exact = exactRows(L, M);
  const rows = exact ?? invertedRows(L, M);
  const index = indexOf(rows);
  const k = commonMultiple(rows, index);
  const generator = generatorOf(L, rows.map((row) => row.map((q) => q.times(k))) as unknown as Rows);
  const cyclic = fromCyclic(E, generator);
  const whole = k === 1 ? cyclic : scaledBack(cyclic.compose(multiplicationMorphism(E, k)), k);
  if (!exact && !sameInvariants(whole.to, M)) throw notContained(L, M);
  return whole;
}

type Rows = readonly [TorusCoordinates, TorusCoordinates];

/** The basis of M in coordinates of Λ, where both come from one lattice. Throws DomainError if M does not contain Λ. */
function exactRows(L: Lattice, M: Lattice): Rows | undefined {
  const rows = coordinatesIn(M, L).map((row) => row.map((x) => x.exact));
  if (!rows.flat().every((q) => q instanceof Rational)) return undefined;
  L.indexIn(M); // refuses, with the coordinates that are no integers
  return rows as unknown as Rows;
}

/** The same from the integers that the coordinates of Λ in M are near to. */
function invertedRows(L: Lattice, M: Lattice): Rows {
  const coordinates = coordinatesIn(L, M);
  if (!coordinates.flat().every(overlapsInteger)) throw notContained(L, M);
  const [[a, b], [c, d]] = coordinates.map((row) =>
    row.map((x) => Rational.of(x.plus(Rational.of(1, 2)).midpoint.floor()!)),
  ) as unknown as Rows;
  const det = a.times(d).minus(b.times(c));
  if (det.sign() === 0) throw notContained(L, M);
  return [
    [d.div(det), b.neg().div(det)],
    [c.neg().div(det), a.div(det)],
  ];
}

function indexOf([[a, b], [c, d]]: Rows): number {
  return Number(a.times(d).minus(b.times(c)).abs().inv().num);
}

/** The largest k with (1/k)Λ inside M. */
function commonMultiple(rows: Rows, index: number): number {
  let k = 1;
  for (let m = 2; m * m <= index; m++) if (index % (m * m) === 0 && containsPart(rows, m)) k = m;
  return k;
}

/** Whether (1/m)Λ lies in the lattice of the rows: their inverse has entries divisible by m. */
function containsPart([[a, b], [c, d]]: Rows, m: number): boolean {
  const det = a.times(d).minus(b.times(c));
  return [d, b, c, a].every((q) => q.div(det).div(m).isInteger());
}

/** A point that generates the lattice of the rows over Λ; the quotient is cyclic. */
function generatorOf(L: Lattice, [p, q]: Rows): TorusPoint {
  const [P, R] = [L.at(...p), L.at(...q)];
  const index = indexOf([p, q]);
  for (let i = 0; i <= index; i++) {
    for (let j = 0; j <= index; j++) {
      const c = P.times(i).plus(R.times(j)) as TorusPoint;
      if (Number(c.order) === index) return c.reduced;
    }
  }
  throw new Error("a cyclic quotient has a generator");
}

/** C/kM → C/M is w ↦ w/k: the model with x multiplied by k². */
function scaledBack(phi: Morphism, k: number): Morphism {
  const u = Rational.of(1, k);
  const a = phi.to.a.map((c, i) => c.times(Rational.of(k).pow([1, 2, 3, 4, 6][i]!)));
  const target = new Curve(Q, a as unknown as Curve["a"]);
  return changeMorphism(phi.to, target, { u, r: Q.zero, s: Q.zero, t: Q.zero }).compose(phi);
}

function sameInvariants(E: Curve, M: Lattice): boolean {
  const [g2, g3] = M.invariants.map((x) => x.exact);
  if (!(g2 instanceof Rational && g3 instanceof Rational)) {
    throw new UndecidedError({
      subject: "isogeny",
      given: "a lattice whose coordinates are only near integers",
      expected: "a lattice made by L.overlattice, or one with rational invariants",
    });
  }
  return E.c4.div(12).equals(g2) && E.c6.div(216).equals(g3);
}

function notContained(L: Lattice, M: Lattice): DomainError {
  const rows = coordinatesIn(L, M).map(([r, s]) => `(${r}, ${s})`);
  return new DomainError({
    subject: "isogeny",
    given: `a lattice in which the periods of the curve have the coordinates ${rows.join(" and ")}`,
    expected: "integers, as in a lattice that contains that of the curve",
    argument: "lattice",
  });
}

function notRational(E: Curve, c: TorusPoint): DomainError {
  return new DomainError({
    subject: "isogeny",
    given: `the subgroup of ${c.name}, of order ${c.order}, on ${E}`,
    expected: "a subgroup that is defined over Q",
    hint: "Its kernel polynomial has no rational coefficients: enclosures exclude every candidate.",
    argument: "kernel",
  });
}

/** A number is not snapped to a torsion point: the message says how far the nearest small multiple is from a period. */
function notExact(E: Curve, c: ComplexNumeric): DomainError {
  const L = E.lattice();
  const z = Complex.from(c);
  const distances = Array.from({ length: 12 }, (_, k) => {
    const n = k + 1;
    return { n, gap: L.locate(z.times(n)).rest.abs() };
  });
  const near = distances.reduce((a, b) => (b.gap.toDouble() < a.gap.toDouble() ? b : a));
  return new DomainError({
    subject: "isogeny",
    given: `the number ${c instanceof Real || c instanceof Complex ? c : String(c)}, whose ${near.n}-fold differs from a period by ${near.gap.digits(5)}`,
    expected: "an exact point of finite order, such as L.at(1/3, 0)",
    hint: "A number is not moved to a torsion point near it.",
    argument: "kernel",
  });
}
