// An elliptic curve in the long Weierstrass form, as a user holds it.

import { complexes, reals } from "../algebra/enclosures.ts";
import type { Field } from "../algebra/field.ts";
import { fromTerms, type Polynomial } from "../algebra/multivariate.ts";
import type { Residue } from "../algebra/primefield.ts";
import { quadraticField } from "../algebra/quadraticfield.ts";
import { rationals } from "../algebra/rationals.ts";
import { mulUni } from "../algebra/univariate.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { groupStructure } from "../arithmetic/structure-fp.ts";
import { divisionPolynomials } from "../curve/division.ts";
import { longEquation } from "../curve/equation/equations.ts";
import { type Equation, plainEquation, plainPolynomial } from "../curve/equation/print.ts";
import { isomorphisms, quadraticTwist } from "../curve/isomorphism.ts";
import { pointsOverX } from "../curve/lift.ts";
import { type Coefficients, type Invariants, invariantsOf, jInvariant, residual } from "../curve/weierstrass.ts";
import { abscissaOfMultiple, abscissasOfSums } from "../curve/xonly.ts";
import type { Quadratic } from "../number/quadratic.ts";
import { primitive, type Rational } from "../number/rational.ts";
import { type Complex, type ComplexNumeric, type Numeric, type Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { remember } from "./behind.ts";
import { type EndomorphismRing, endomorphismRingOf } from "./endomorphisms.ts";
import { type Coordinate, carry } from "./fields.ts";
import { countOf, countOverExtension, modCurve, reductionOf } from "./finite.ts";
import { type ExactInput, elementOf } from "./input.ts";
import {
  type ClassMember,
  isogenyClassOf,
  isogenyWithKernel,
  type KernelInput,
  multiplicationMorphism,
  primeIsogenies,
} from "./isogenies.ts";
import { changeMorphism } from "./joined.ts";
import type { Lattice } from "./lattice.ts";
import type { Morphism } from "./morphism.ts";
import { indexOf, pairingOf } from "./pairing.ts";
import { type AnyPoint, Point } from "./point.ts";
import { type NamedPoints, type PointRelations, relationsOf } from "./relations.ts";
import { rationalPoints, type TorsionSubgroup, torsionOf } from "./torsion.ts";
import { type TorsionPlace, torsionPlaces } from "./torsion-places.ts";
import { fromInclusion } from "./torus-isogeny.ts";
import type { TorusPoint } from "./torus-point.ts";
import { chosenLogarithm, exponentialOf, type LogarithmChoice, latticeOf, logarithmOf, noTorus } from "./uniformise.ts";

/** What a curve was read from, where that is not the long form itself. */
export interface Reading<T> {
  /** The equation as it was given, left side minus right side. */
  readonly polynomial: Polynomial<T>;
  /** Its letters in the roles of x and y. */
  readonly letters: readonly [string, string];
  /** x = scaleX·X, y = scaleY·Y leads from it to the long form in X, Y. */
  readonly scaleX: T;
  readonly scaleY: T;
}

/** A nonsingular curve y² + a1xy + a3y = x³ + a2x² + a4x + a6 over a field. Immutable. Made by `curve`. */
export class Curve<T = Rational> {
  readonly field: Field<T>;
  /** [a1, a2, a3, a4, a6]. */
  readonly a: Coefficients<T>;
  /** The equation the curve was given by, if it had to be rescaled. */
  readonly given: Reading<T> | undefined;
  /** What a reader has to know of how the curve was come by. */
  readonly notice: string | undefined;
  readonly #invariants: Invariants<T>;
  // Made on first use, and only ever set complete.
  #lattice: Lattice | undefined;
  #count: bigint | undefined;

  /** The model must be nonsingular: `curve` checks it and explains a singular one. */
  constructor(field: Field<T>, a: Coefficients<T>, given?: Reading<T>, notice?: string) {
    this.field = field;
    this.a = a;
    this.given = given;
    this.notice = notice;
    this.#invariants = invariantsOf(field, a);
  }

  /** [b2, b4, b6, b8]. */
  get b(): readonly [T, T, T, T] {
    const { b2, b4, b6, b8 } = this.#invariants;
    return [b2, b4, b6, b8];
  }

  get c4(): T {
    return this.#invariants.c4;
  }

  get c6(): T {
    return this.#invariants.c6;
  }

  /** Δ of this model; a change of model with u divides it by u¹². */
  get discriminant(): T {
    return this.#invariants.discriminant;
  }

  /** j = c4³/Δ, 1728 for y² = x³ − x. */
  get j(): T {
    return jInvariant(this.field, this.#invariants);
  }

  /** Both sides of the equation as data, for typesetting. */
  get equation(): Equation<T> {
    return longEquation(this.field, this.a);
  }

  /** The neutral element O, the point at infinity. */
  get origin(): Point<T> {
    return new Point(this, undefined);
  }

  /**
   * The point (x, y), exactly.
   * Throws   DomainError with the residual if it is not on the curve, and the points that have this x.
   */
  point(x: ExactInput | T, y: ExactInput | T): Point<T> {
    const P = [this.#element("x", x), this.#element("y", y)] as const;
    const value = residual(this.field, this.a, ...P);
    if (!this.field.isZero(value)) throw this.#offCurve(P, value);
    return new Point(this, P);
  }

  /** The points with the given x over the field of the curve: none, one of order two, or two, P and −P. */
  pointsWith({ x }: { readonly x: ExactInput | T }): Point<T>[] {
    return pointsOverX(this.field, this.a, this.#element("x", x)).map((P) => new Point(this, P));
  }

  /**
   * The period lattice Λ of dx/(2y + a1x + a3): C/Λ is the curve by x = ℘(z) − b2/12, 2y + a1x + a3 = ℘′(z), with g2 = c4/12 and
   * g3 = c6/216. In the real basis (ω1 > 0 the least real period) for a curve over Q or R.
   *
   * Domain   curves over Q, a quadratic field in its embedding, R or C.
   * Error    each digit shown is proved; more come on request, since the curve is exact.
   */
  lattice(): Lattice {
    this.#lattice ??= remember(latticeOf(this.#analytic("lattice")), { curve: this as unknown as Curve });
    return this.#lattice;
  }

  /** Number of components of the real curve: 2 if Δ > 0, 1 if Δ < 0; undefined for a curve that is not real. */
  get components(): 1 | 2 | undefined {
    return this.lattice().realComponents;
  }

  /**
   * z modulo Λ with exponential(z) = P.
   *
   * Branch   z = r·ω1 + s·ω2 with r and s in (−1/2, 1/2]: a real point has a real z on the component of O and z = ω2/2 + t on the
   *          bounded one; points with 2y + a1x + a3 < 0 near O have small positive z. A torsion point over Q gives an exact point of
   *          the torus, such as 3ω1/7. `near` chooses another representative, the one nearest to a number in the coordinates of the
   *          basis; `component` ("identity", "bounded") says where the point is to lie.
   * Throws   DomainError for a point of another curve or another component, PrecisionError if its coordinates are too coarse.
   */
  logarithm(P: AnyPoint, choice: LogarithmChoice = {}): Real | Complex | TorusPoint {
    this.#analytic("logarithm");
    const Q = P.minus(this.origin) as Point<Coordinate>; // checks that the curve is the same
    const z = remember(logarithmOf(this.lattice(), Q), { curve: this as unknown as Curve, point: P });
    return chosenLogarithm(this.lattice(), z, choice);
  }

  /**
   * The point at z: real coordinates for real z, and for the exact points of the real torus; O for an exact lattice point.
   * Throws   PoleError for a number that cannot be told from a lattice point.
   */
  exponential(z: Numeric): Point<Real>;
  exponential(z: ComplexNumeric): Point<Real> | Point<Complex>;
  exponential(z: ComplexNumeric): Point<Real> | Point<Complex> {
    const P = exponentialOf(this.#analytic("exponential"), this.lattice(), z) as Point<Real>;
    return remember(P, { curve: this as unknown as Curve, argument: scalar(z, "exponential") });
  }

  #analytic(subject: string): Curve<Coordinate> {
    if (this.field.characteristic !== 0n) throw noTorus(subject, this);
    return this as unknown as Curve<Coordinate>;
  }

  /**
   * The reduced global minimal model over Q (a1, a3 in {0, 1}, a2 in {−1, 0, 1}; it is unique) and the change of model to it.
   * Source   Laska, Kraus and Connell.
   */
  minimal(): { readonly curve: Curve; readonly to: Morphism } {
    const E = this.#rational("minimal");
    const { a, change } = globalMinimalModel(E.a);
    const curve = new Curve(rationals, toRationals(a));
    return { curve, to: changeMorphism(E, curve, change) };
  }

  /** The torsion subgroup of E(Q), with generators and its proof. */
  torsion(): TorsionSubgroup {
    const E = this.#rational("torsion");
    return remember(torsionOf(E), { curve: E });
  }

  /**
   * Over Q: all relations between given points modulo torsion, with the torsion point that each gives, and the rank of what they generate: proved,
   * by exact arithmetic and by reduction modulo primes. E.relations({ P, Q }) or a list.
   */
  relations(points: NamedPoints): PointRelations {
    return relationsOf(this.#rational("relations"), points);
  }

  /**
   * Over Q: the n² − 1 points but O that n kills, with their exact places z on C/Λ: values of ℘ and ℘′ at r·ω1 + s·ω2. The rational ones have
   * exact coordinates, found complete by the torsion subgroup; the others are enclosures.
   */
  torsionPoints(n: number): TorsionPlace[] {
    return torsionPlaces(this.#rational("torsionPoints"), n);
  }

  /**
   * The rational points whose x on the minimal model is m/e² with |m| and e² at most `height`, one of ±P each, smallest first: a search,
   * which proves nothing about larger points.
   */
  points({ height }: { readonly height: number }): Point[] {
    const E = this.#rational("points");
    if (!Number.isSafeInteger(height) || height < 1 || height > 20_000) {
      throw new DomainError({
        subject: "points",
        given: `height ${height}`,
        expected: "an integer from 1 to 20000",
        argument: "height",
      });
    }
    return rationalPoints(E, height);
  }

  /**
   * The n-division polynomial in x, n >= 2: ψ_n for odd n; for even n ψ_n·ψ_2, which is a polynomial in x too. Its roots are the
   * abscissas of the points but O that n kills.
   */
  divisionPolynomial(n: number): Polynomial<T> {
    const F = this.field;
    const polynomials = divisionPolynomials(F, this.a);
    const f = polynomials.f(checkedIndex(n));
    const list = n % 2 === 0 ? mulUni(F, f, polynomials.psi2Squared) : f;
    const polynomial = fromTerms(
      F,
      ["x"],
      list.map((c, k) => [c, [k]] as const),
    );
    return remember(polynomial, { curve: this as unknown as Curve, index: n });
  }

  /** The quadratic twist by d; over Q its minimal model. */
  twist(d: ExactInput | T): Curve<T> {
    this.#requireShortForm("twist");
    const F = this.field;
    const factor = this.#element("d", d);
    if (F.isZero(factor)) {
      throw new DomainError({ subject: "twist", given: "d = 0", expected: "a number that is not 0", argument: "d" });
    }
    const curve = new Curve(F, quadraticTwist(F, this.a, factor));
    return F.name === "Q" ? (curve.minimal().curve as unknown as Curve<T>) : curve;
  }

  /** The isomorphism to another curve over the same field, or undefined if there is none (equal j: they may be twists). */
  isomorphism(other: Curve<T>): Morphism<Curve<T>, Curve<T>> | undefined {
    this.#requireShortForm("isomorphism");
    const F = this.field;
    const change = F.name === other.field.name ? isomorphisms(F, this.a, other.a)[0] : undefined;
    return change && changeMorphism(this, other, change);
  }

  /** The curve modulo a prime of good reduction (of the minimal model where this one will not do). */
  mod(p: bigint | number): Curve<Residue> {
    return reductionOf(this.#rational("mod"), BigInt(p));
  }

  /** Over F_p: the number of points, O included, proved. */
  get count(): bigint {
    this.#count ??= countOf(this);
    return this.#count;
  }

  /** Over F_p: the number of points over the field of p^n elements, from the trace. */
  countOver(n: number): bigint {
    return countOverExtension(this.field.characteristic, this.trace, n);
  }

  /** Over F_p: p + 1 − #E(F_p). */
  get trace(): bigint {
    return this.field.characteristic + 1n - this.count;
  }

  /** Over F_p: true if p divides the trace. */
  get isSupersingular(): boolean {
    return this.trace % this.field.characteristic === 0n;
  }

  /**
   * The ring of endomorphisms over the algebraic closure: Z or an imaginary quadratic order with its discriminant, exact for exact j; over
   * F_p ordinary with the discriminant of Z[π], or supersingular.
   */
  endomorphismRing(): EndomorphismRing {
    return endomorphismRingOf(this);
  }

  /** Over F_p: the group as [n] (cyclic) or [n1, n2] with n1 | n2. */
  get structure(): readonly bigint[] {
    const { n1, n2 } = groupStructure(modCurve(this, "structure"), this.count);
    return n1 === 1n ? [n2] : [n1, n2];
  }

  /**
   * The Weil pairing e_n(P, Q) of points that n kills: an n-th root of unity, with e_n(ω1/n, ω2/n) = exp(2πi/n).
   * Throws   DomainError for points that n does not kill.
   */
  weilPairing(n: number, P: Point<T>, Q: Point<T>): T {
    const made = { curve: this as unknown as Curve, point: P, second: Q, index: n };
    return remember(pairingOf(this, n, P, Q), made);
  }

  /** Over F_p: the least n >= 0 with Q = n·P, or undefined. Cost: √l steps for the largest prime l dividing the order of P. */
  index(Q: Point<T>, P: Point<T>): bigint | undefined {
    return indexOf(Q as unknown as Point<Residue>, P as unknown as Point<Residue>, this.count);
  }

  /**
   * The isogeny with the given kernel: a point that generates it, all its points, the polynomial of their abscissas, or over Q an exact
   * point of finite order of C/Λ, such as E.lattice().at(1/3, 0). Or over Q z ↦ z to C/M, for a lattice M that contains Λ: E.isogeny({ lattice: M }).
   * Normalised: it pulls dX/(2Y + a1X + a3) back to dx/(2y + a1x + a3).
   *
   * Throws   DomainError for points that are no subgroup (with a sum that is missing), a subgroup that is not defined over Q, a
   *          number near a torsion point (with its distance from one).
   * Source   Vélu 1971.
   */
  isogeny(by: { readonly kernel: KernelInput<T> } | { readonly lattice: Lattice }): Morphism<Curve<T>, Curve<T>> {
    this.#requireShortForm("isogeny");
    if ("kernel" in by) return isogenyWithKernel(this, by.kernel);
    return fromInclusion(this.#rational("isogeny"), by.lattice) as unknown as Morphism<Curve<T>, Curve<T>>;
  }

  /** Multiplication by n as a map of the curve to itself, of degree n²; its first formula is x(nP) in x alone. |n| <= 20. */
  multiplication(n: number): Morphism<Curve<T>, Curve<T>> {
    this.#requireShortForm("multiplication");
    return multiplicationMorphism(this, n);
  }

  /** x(nP) from x = x(P) alone, for any integer n; undefined if nP = O. The point itself may lie over a larger field. */
  abscissa(n: bigint | number, x: ExactInput | T): T | undefined {
    return abscissaOfMultiple(this.field, this.a, BigInt(n), this.#element("x", x));
  }

  /** x(P + Q) + x(P − Q) and x(P + Q)·x(P − Q), from two different abscissas x(P) and x(Q) alone. */
  abscissasOfSums(x1: ExactInput | T, x2: ExactInput | T): { readonly sum: T; readonly product: T } {
    return abscissasOfSums(this.field, this.a, this.#element("x", x1), this.#element("x", x2));
  }

  /** All isogenies of prime degree from the curve that are defined over Q, by degree: complete by Mazur's theorem. */
  isogenies(): Morphism[] {
    return primeIsogenies(this.#rational("isogenies"));
  }

  /** The minimal models of the curves isogenous over Q, this one's first, with the prime isogenies between them. */
  isogenyClass(): ClassMember[] {
    return isogenyClassOf(this.#rational("isogenyClass"));
  }

  /** The same equation over R, C, or the quadratic field of an exact number: E.over("R"), E.over(quadratic(5)). */
  over(field: "R"): Curve<Real>;
  over(field: "C"): Curve<Complex>;
  over(field: Quadratic): Curve<Quadratic>;
  over(field: "R" | "C" | Quadratic): Curve<Real> | Curve<Complex> | Curve<Quadratic> {
    if (field === "R") return this.carriedTo(reals);
    if (field === "C") return this.carriedTo(complexes);
    return this.carriedTo(quadraticField(field.d));
  }

  /** The formulas of maps divide by 2 and 3. */
  #requireShortForm(subject: string): void {
    const p = this.field.characteristic;
    if (p !== 2n && p !== 3n) return;
    throw new DomainError({
      subject,
      given: `${this}`,
      expected: "a field of characteristic 0 or above 3",
      hint: "Its formulas divide by 2 and 3.",
    });
  }

  #rational(subject: string): Curve {
    if (this.field.name === "Q") return this as unknown as Curve;
    throw new DomainError({ subject, given: `${this}`, expected: "a curve over Q" });
  }

  /** The same equation over a larger field. */
  carriedTo<U>(field: Field<U>): Curve<U> {
    if (field.name === this.field.name) return this as unknown as Curve<U>;
    return new Curve(field, this.a.map((c) => carry(c, field)) as unknown as Coefficients<U>);
  }

  /** True if the two are the same equation over the same field. */
  equals(other: Curve<T>): boolean {
    const F = this.field;
    return F.name === other.field.name && this.a.every((c, k) => F.isZero(F.sub(c, other.a[k]!)));
  }

  /** "y^2 + y = x^3 - x over Q". */
  toString(): string {
    return `${plainEquation(this.field, this.equation)} over ${this.field.name}`;
  }

  toJSON(): { readonly kind: "curve"; readonly field: string; readonly a: readonly string[] } {
    return { kind: "curve", field: this.field.name, a: this.a.map((c) => this.field.format(c)) };
  }

  #element(argument: string, value: ExactInput | T): T {
    return elementOf(this.field, "point", argument, value);
  }

  #offCurve([x, y]: readonly [T, T], value: T): DomainError {
    const F = this.field;
    const { left, right } = this.equation;
    const near = pointsOverX(F, this.a, x).map((P) => `(${P.map((c) => F.format(c)).join(", ")})`);
    const over =
      near.length > 0
        ? `with x = ${F.format(x)} there is ${near.join(" and ")}`
        : `no point over ${F.name} has x = ${F.format(x)}`;
    return new DomainError({
      subject: "point",
      given: `(${F.format(x)}, ${F.format(y)}) is not on ${plainEquation(F, this.equation)}: there ${plainPolynomial(F, left)} − (${plainPolynomial(F, right)}) is ${F.format(value)}`,
      expected: "0",
      hint: `On this curve ${over}.`,
      argument: "y",
    });
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "curve");
  }
}

function checkedIndex(n: number): number {
  if (Number.isSafeInteger(n) && n >= 2 && n <= 100) return n;
  throw new DomainError({
    subject: "divisionPolynomial",
    given: `n = ${n}`,
    expected: "an integer from 2 to 100",
    argument: "n",
  });
}
