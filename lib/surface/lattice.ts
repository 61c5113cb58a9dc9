import { complexMultiplication, rationalModulus } from "../lattice/complex-multiplication.ts";
import { exactCoordinatesOf } from "../lattice/exact-coordinates.ts";
import { exactInvariant } from "../lattice/exact-invariants.ts";
import { rationalRoot } from "../lattice/exact-roots.ts";
import {
  AREA,
  COORDINATE,
  DISCRIMINANT,
  INVARIANT,
  J,
  QUASI_PERIOD,
  REDUCED_TAU,
  ROOT,
  TAU,
} from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { determinant, generatedRows, latticeInCoordinates, type Rows } from "../lattice/related.ts";
import { type Shape, shapeOf } from "../lattice/shape.ts";
import type { Exact } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, type Numeric, type Real, scalar } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import { remember } from "./behind.ts";
import { ComplexMultiplication } from "./complex-multiplication.ts";
import { type EllipticData, ellipticFunction } from "./elliptic.ts";
import { EllipticFunction, primeRoot } from "./elliptic-function.ts";
import { coordinatesIn, exactCoordinates, indexMatrices, overlapsInteger } from "./lattice-relations.ts";
import { QuasiPeriodicFunction } from "./quasi-periodic-function.ts";
import { TorusPoint } from "./torus-point.ts";
import { inverseOfWp } from "./wp-inverse.ts";

/** The ways to give a lattice; numbers of one pair or triple are given together. */
export type LatticeInput =
  | { readonly periods: readonly [ComplexNumeric, ComplexNumeric] }
  | { readonly halfPeriods: readonly [ComplexNumeric, ComplexNumeric] }
  | { readonly tau: ComplexNumeric }
  | { readonly invariants: readonly [ComplexNumeric, ComplexNumeric] }
  | { readonly roots: readonly [ComplexNumeric, ComplexNumeric, ComplexNumeric] }
  | { readonly j: ComplexNumeric }
  /** j/1728. */
  | { readonly J: ComplexNumeric }
  /** exp(πiτ), exp(2πiτ). */
  | { readonly qTheta: ComplexNumeric }
  | { readonly qMod: ComplexNumeric }
  /** Refused with a word on why: q names two different nomes. */
  | { readonly q: ComplexNumeric }
  /** λ(τ) = m = k² = (e2 − e3)/(e1 − e3). */
  | { readonly lambda: ComplexNumeric }
  | { readonly m: ComplexNumeric }
  | { readonly k: ComplexNumeric };

/** A matrix [[a, b], [c, d]] that acts on τ: new τ = (aτ + b)/(cτ + d), (ω2′, ω1′) = (aω2 + bω1, cω2 + dω1). */
export type IntegerMatrix = readonly [readonly [bigint, bigint], readonly [bigint, bigint]];

/** The reduced basis of a lattice. */
export interface ReducedBasis {
  readonly periods: readonly [TorusPoint, TorusPoint];
  readonly tau: Complex;
  /** From the lattice's own basis. */
  readonly matrix: IntegerMatrix;
  /** Whether τ is inside the fundamental domain, on its boundary by an exact argument, or too near to tell. */
  readonly boundary: "inside" | "on" | "undecided";
}

/** A complex number in the coordinates of a lattice. */
export interface Location {
  /** z = r·ω1 + s·ω2. */
  readonly r: Real;
  readonly s: Real;
  /** A nearest lattice point; of two as near the choice is by midpoints. */
  readonly nearest: TorusPoint;
  /** z minus the nearest lattice point. */
  readonly rest: Complex;
}

/** A lattice Λ = Zω1 + Zω2 of full periods in the complex plane, with its functions. */
export class Lattice {
  readonly data: PeriodLattice;
  /** What was done to the input, where something was: a swap of the periods, a rescaling. */
  readonly notice: string | undefined;
  /** For a sub- or overlattice: the lattice it was made from, its basis in coordinates of that one, and the index of the smaller one. */
  readonly within: { readonly lattice: Lattice; readonly rows: Rows; readonly index: bigint } | undefined;
  /** ℘ as a function: L.wp(z), L.wp.prime(z). */
  readonly wp: EllipticFunction;
  /** Weierstrass ζ, ζ(z + ω_k) = ζ(z) + η_k. */
  readonly zeta: QuasiPeriodicFunction;
  /** Weierstrass σ. */
  readonly sigma: QuasiPeriodicFunction;

  constructor(data: PeriodLattice, notice?: string, within?: Lattice["within"]) {
    this.data = data;
    this.notice = notice;
    this.within = within;
    this.wp = EllipticFunction.wp(data);
    this.zeta = new QuasiPeriodicFunction(data, "zeta");
    this.sigma = new QuasiPeriodicFunction(data, "sigma");
  }

  /** The same as wp. */
  get ℘(): EllipticFunction {
    return this.wp;
  }

  /** The full periods ω1, ω2, Im(ω2/ω1) > 0, as exact points: ω1/3 stays one. */
  get periods(): readonly [TorusPoint, TorusPoint] {
    return [this.at(1, 0), this.at(0, 1)];
  }

  /** ω1/2, (ω1+ω2)/2, ω2/2: the points where ℘ is e1, e2, e3. */
  get halfPeriods(): readonly [TorusPoint, TorusPoint, TorusPoint] {
    const half = Rational.of(1, 2);
    return [this.at(half, 0), this.at(half, half), this.at(0, half)];
  }

  /** The point r·ω1 + s·ω2 with exact rational coordinates. Throws TypeError for others: add a number to a point instead. */
  at(r: Numeric, s: Numeric): TorusPoint {
    return new TorusPoint(this.data, [coordinate(r), coordinate(s)]);
  }

  /** ω2/ω1. */
  get tau(): Complex {
    return Complex.from(apply(TAU, [this.data], exactTau(this.data)));
  }

  /** g2, g3 of ℘′² = 4℘³ − g2 ℘ − g3: as given, or computed. */
  get invariants(): readonly [Real | Complex, Real | Complex] {
    const { given } = this.data;
    if (given.kind === "invariants") return [given.g2 as Real | Complex, given.g3 as Real | Complex];
    const known = (index: 2 | 3) => exactInvariant(this.data, index === 2 ? "g2" : "g3");
    return [apply(INVARIANT, [this.data, 2], known(2)), apply(INVARIANT, [this.data, 3], known(3))];
  }

  /** e1 = ℘(ω1/2), e2 = ℘((ω1+ω2)/2), e3 = ℘(ω2/2); rational ones exactly. */
  get roots(): readonly [Real | Complex, Real | Complex, Real | Complex] {
    const root = (index: 1 | 2 | 3) => apply(ROOT, [this.data, index], rationalRoot(this.data, index));
    return [root(1), root(2), root(3)];
  }

  /** Δ = g2³ − 27 g3². */
  get discriminant(): Real | Complex {
    return apply(DISCRIMINANT, [this.data], exactDiscriminant(this)?.exact);
  }

  /** j = 1728 g2³/Δ. */
  get j(): Real | Complex {
    const exact = exactDiscriminant(this);
    const known = exact ? this.invariants[0].pow(3).times(1728).div(exact).exact : rationalModulus(this.data);
    return apply(J, [this.data], known);
  }

  /** η1, η2 of the full periods: η1 ω2 − η2 ω1 = 2πi. */
  get quasiPeriods(): readonly [Real | Complex, Real | Complex] {
    return [apply(QUASI_PERIOD, [this.data, 1]), apply(QUASI_PERIOD, [this.data, 2])];
  }

  /** The area of a period cell. */
  get area(): Real {
    return apply(AREA, [this.data]) as Real;
  }

  /**
   * "square", "hexagonal", "rectangular", "rhombic" or "general", decided exactly.
   * Throws UndecidedError where the enclosures allow more than one.
   */
  get shape(): Shape {
    const shape = shapeOf(this.data);
    if (shape) return shape;
    throw new UndecidedError({
      subject: "shape",
      given: "periods that cannot be told from those of a more symmetric lattice",
      expected: "a lattice given exactly",
      hint: "Give the lattice by exact periods, τ, invariants or j.",
    });
  }

  /** Number of components of the real curve: 1 or 2; undefined for a lattice that is not known to be its own conjugate. */
  get realComponents(): 1 | 2 | undefined {
    return this.data.components;
  }

  /** The basis with τ in the fundamental domain, and the matrix that leads to it. */
  get reduced(): ReducedBasis {
    this.#reduced ??= remember(this.#reduction(), { lattice: this });
    return this.#reduced;
  }

  #reduced: ReducedBasis | undefined;

  #reduction(): ReducedBasis {
    const { toReduced, boundary } = this.data;
    const { a, b, c, d } = toReduced;
    const matrix: IntegerMatrix = [
      [a, b],
      [c, d],
    ];
    const tau = Complex.from(apply(REDUCED_TAU, [this.data], exactReducedTau(this.data)));
    return { periods: [this.at(d, c), this.at(b, a)], tau, matrix, boundary };
  }

  /** z in the coordinates of the basis, with a nearest lattice point. */
  locate(z: ComplexNumeric): Location {
    const number = scalar(z, "locate");
    const exact = exactCoordinatesOf(this.data.given, number);
    const r = apply(COORDINATE, [this.data, number, 1], exact?.[0]) as Real;
    const s = apply(COORDINATE, [this.data, number, 2], exact?.[1]) as Real;
    const { a, b, c, d } = this.data.toReduced;
    const [m, n] = nearestByMidpoint(this, r, s);
    const nearest = this.at(d * m + b * n, c * m + a * n);
    return { r, s, nearest, rest: Complex.from(number.minus(Complex.from(nearest))) };
  }

  /**
   * z modulo the lattice with ℘(z) = x and ℘′(z) = y.
   *
   * Domain   y² = 4x³ − g2 x − g3; enclosures have to allow it.
   * Branch   a representative near the cell around 0 of the reduced basis; the sign of y settles that of z.
   * Throws   DomainError if x and y fit no point.
   */
  logarithm(x: ComplexNumeric, y: ComplexNumeric): Complex {
    return inverseOfWp(this.data, x, (w) => primeRoot(this.wp, w), { prime: y }, "logarithm");
  }

  /**
   * Whether z is a lattice point: yes by exact arithmetic, no also by enclosures.
   * Throws UndecidedError for a number that cannot be told from one and has no exact coordinates.
   */
  contains(z: ComplexNumeric): boolean {
    if (z instanceof TorusPoint && z.lattice === this.data && !z.remainder) return z.isLatticePoint;
    const { r, s, rest, nearest } = this.locate(z);
    if (r.exact instanceof Rational && s.exact instanceof Rational) return r.exact.isInteger() && s.exact.isInteger();
    if (!rest.overlaps(0)) return false;
    throw new UndecidedError({
      subject: "contains",
      given: `${z}, which cannot be told from ${nearest.name}`,
      expected: "a point with exact coordinates, as L.at(1/2, 0)",
    });
  }

  /**
   * The lattice Λ + Zp + ...: this one with further points of finite order.
   *
   * Domain   points of this lattice with exact coordinates. Index, and matrix of the new basis in the old one, are in `within`.
   * Throws   TypeError for a number: near a torsion point is not at one.
   */
  overlattice(...points: readonly TorusPoint[]): Lattice {
    const rows = generatedRows(points.map((p) => exactCoordinates(this, p)));
    return this.inCoordinates(rows);
  }

  /**
   * The lattice with the basis (M11 ω1 + M12 ω2, M21 ω1 + M22 ω2).
   * Domain   an integer matrix of determinant not 0; for a negative one the new periods are exchanged.
   */
  sublattice(matrix: readonly [readonly [Numeric, Numeric], readonly [Numeric, Numeric]]): Lattice {
    const rows = matrix.map((row) => row.map(coordinate)) as unknown as Rows;
    if (!rows.flat().every((q) => q.isInteger())) {
      throw new DomainError({
        subject: "sublattice",
        given: `the matrix ${rows.map((row) => `[${row}]`)}`,
        expected: "integers",
        hint: "overlattice takes points with fractions.",
        argument: "matrix",
      });
    }
    return this.inCoordinates(rows);
  }

  /** All overlattices of index n, in a fixed order: the subgroups of order n of the n-division points. */
  overlattices(n: number): readonly Lattice[] {
    return indexMatrices(n, "overlattices").map(([[a, b], [c, d]]) => {
      const part = (k: bigint) => Rational.of(k, n);
      return this.inCoordinates(
        generatedRows([
          [part(a), part(b)],
          [part(c), part(d)],
        ]),
      );
    });
  }

  /** All sublattices of index n, in a fixed order. */
  sublattices(n: number): readonly Lattice[] {
    return indexMatrices(n, "sublattices").map((matrix) => this.sublattice(matrix));
  }

  /**
   * The index of this lattice in M, which has to contain it.
   * Throws   DomainError with the coordinates in M that are no integers; UndecidedError where numbers are only near integers: exact for
   *          lattices made from one another.
   */
  indexIn(M: Lattice): bigint {
    const rows = coordinatesIn(this, M);
    const failing = rows.flat().filter((x) => !overlapsInteger(x));
    if (failing.length > 0) {
      throw new DomainError({
        subject: "indexIn",
        given: `periods with the coordinates ${rows.map(([r, s]) => `(${r}, ${s})`).join(" and ")} in the other lattice`,
        expected: "integers, as a sublattice has",
        argument: "M",
      });
    }
    const exact = rows.map((row) => row.map((x) => x.exact));
    if (!exact.flat().every((q) => q instanceof Rational)) {
      throw new UndecidedError({
        subject: "indexIn",
        given: `coordinates that agree with integers: ${rows.map(([r, s]) => `(${r}, ${s})`).join(" and ")}`,
        expected: "lattices made from one another by overlattice or sublattice",
      });
    }
    return determinant(exact as unknown as Rows).abs().num;
  }

  private inCoordinates(rows: Rows): Lattice {
    const data = latticeInCoordinates(this.data, rows);
    const given = data.given as Extract<PeriodLattice["given"], { kind: "points" }>;
    const ratio = determinant(given.rows);
    const index = ratio.isInteger() ? ratio.num : ratio.den;
    return new Lattice(data, undefined, { lattice: this, rows: given.rows, index });
  }

  /**
   * The elliptic function with given zeros and poles, z^k + ... at 0, or with given principal parts and constant.
   *
   * Domain   as many zeros as poles, of the same sum modulo the lattice (Abel); residues with the sum 0. Points with exact coordinates are checked
   *          exactly, numbers within their enclosures.
   * @example L.elliptic({ zeros: [L.at(1/3, 0), L.at(-1/3, 0)], poles: [0, 0] })   // ℘(z) − ℘(ω1/3)
   */
  elliptic(data: EllipticData): EllipticFunction {
    return ellipticFunction(this.data, data);
  }

  /**
   * Complex multiplication, by exact τ or j where there is one: the discriminant of the order, or why there is none. Enclosures alone
   * give "consistent with" and "excluded".
   */
  complexMultiplication(): ComplexMultiplication {
    this.#multiplication ??= remember(new ComplexMultiplication(complexMultiplication(this.data, this.j.exact)), {
      lattice: this,
    });
    return this.#multiplication;
  }

  #multiplication: ComplexMultiplication | undefined;

  /** The conventions that the numbers of this lattice rest on. */
  get conventions(): readonly ConventionKey[] {
    const { given, components } = this.data;
    if (given.kind !== "invariants") return ["cubic", "periods"];
    return ["cubic", "periods", components ? "realBasis" : "signOfPeriods"];
  }

  toString(): string {
    const [w1, w2] = this.periods;
    return `lattice with ${w1}, ${w2}`;
  }
}

function coordinate(x: Numeric): Rational {
  const { exact } = scalar(x, "at");
  if (exact instanceof Rational) return exact;
  throw new TypeError(
    `at: the coordinate ${x} is not an exact rational number; add a number to a point instead, as in L.at(1/3, 0).plus(x)`,
  );
}

/** Coordinates in the reduced basis of a nearest lattice point, from doubles: exact for all that doubles tell apart. */
function nearestByMidpoint(lattice: Lattice, r: Real, s: Real): [bigint, bigint] {
  const { a, b, c, d } = lattice.data.toReduced;
  const inReduced = (x: Real, p: bigint, y: Real, q: bigint) => x.times(p).plus(y.times(q));
  const x = inReduced(r, a, s, -b);
  const y = inReduced(r, -c, s, d);
  const [u, v] = [x.plus(Rational.of(1, 2)).midpoint.floor()!, y.plus(Rational.of(1, 2)).midpoint.floor()!];
  const [fx, fy] = [x.minus(u).toDouble(), y.minus(v).toDouble()];
  const [tr, ti] = lattice.reduced.tau.toDouble();
  let best: [bigint, bigint] = [u, v];
  let least = Number.POSITIVE_INFINITY;
  for (const k of [0, -1, 1]) {
    for (const l of [0, -1, 1]) {
      const [p, q] = [fx - k + (fy - l) * tr, (fy - l) * ti];
      if (p * p + q * q < least) {
        least = p * p + q * q;
        best = [u + BigInt(k), v + BigInt(l)];
      }
    }
  }
  return best;
}

/** Δ, where g2 and g3 are exact. */
function exactDiscriminant({ invariants: [g2, g3] }: Lattice): Real | Complex | undefined {
  if (!g2.exact || !g3.exact) return undefined;
  const value = g2.pow(3).minus(g3.pow(2).times(27));
  return value.exact ? value : undefined;
}

function exactTau({ given }: PeriodLattice): Exact | undefined {
  if (given.kind !== "periods") return undefined;
  return (given.w2 as Complex).div(given.w1 as Complex).exact;
}

function exactReducedTau(data: PeriodLattice): Exact | undefined {
  const tau = exactTau(data);
  if (!tau || tau instanceof Rational) return undefined;
  const { a, b, c, d } = data.toReduced;
  return tau.times(a).plus(b).div(tau.times(c).plus(d));
}
