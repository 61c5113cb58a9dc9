import type { Wanted } from "../function/weierstrass.ts";
import { rationalPoint } from "../lattice/exact-torsion.ts";
import { type DivisorPoint, divisorOf } from "../lattice/field/divisor.ts";
import {
  addElements,
  constantElement,
  deriveElement,
  type Element,
  fieldOf,
  invElement,
  isZeroElement,
  mulElements,
  negElement,
  sameElement,
  wpElement,
} from "../lattice/field/element.ts";
import { type Expression, expressionOf, PLACE, VALUE, VALUE_AT_POINT } from "../lattice/field/operations.ts";
import { exactOf } from "../lattice/field/scalar.ts";
import { elementText } from "../lattice/field/text.ts";
import { WEIERSTRASS } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { DomainError, PoleError, UndecidedError } from "../proof/errors.ts";
import { Callable } from "./callable.ts";
import { constantValue, scalarOf } from "./constant.ts";
import { rememberDivisorPoint } from "./divisor-points.ts";
import { type SigmaForm, sigmaForm, type ZetaForm, zetaForm } from "./function-forms.ts";
import { type LaurentExpansion, laurentExpansion, valueAtLatticePoint } from "./laurent-expansion.ts";
import { multipleOf } from "./multiple.ts";
import { type AlgebraicRelation, relationBetween } from "./relation.ts";
import { TorusPoint } from "./torus-point.ts";
import { type InverseChoice, inverseOfWp } from "./wp-inverse.ts";

/** A zero or a pole: a point of the torus, with its multiplicity. */
export interface FunctionPoint {
  readonly point: TorusPoint | Complex;
  readonly multiplicity: number;
}

/**
 * An elliptic function of a lattice: a value that is called as f(z), computed with exactly, and asked for its zeros, poles and series.
 * It is kept as (A(℘) + B(℘)℘′)/D(℘).
 */
export class EllipticFunction extends Callable {
  readonly lattice: PeriodLattice;
  readonly expression: Expression;

  /** @param known an exact value where the caller has one; `value` computes it from the element. */
  constructor(element: Element, known?: (z: ComplexNumeric, value: () => Real | Complex) => Real | Complex) {
    const expression = expressionOf(element);
    super((z) => (known ? known(z, () => evaluate(expression, z)) : evaluate(expression, z)));
    this.lattice = element.field.lattice;
    this.expression = expression;
  }

  /** ℘ of a lattice. */
  static wp(lattice: PeriodLattice): EllipticFunction {
    return new EllipticFunction(wpElement(fieldOf(lattice)));
  }

  plus(other: EllipticFunction | ComplexNumeric): EllipticFunction {
    return new EllipticFunction(addElements(this.element, elementOf(this, other)));
  }

  minus(other: EllipticFunction | ComplexNumeric): EllipticFunction {
    return new EllipticFunction(addElements(this.element, negElement(elementOf(this, other))));
  }

  times(other: EllipticFunction | ComplexNumeric): EllipticFunction {
    return new EllipticFunction(mulElements(this.element, elementOf(this, other)));
  }

  /** Throws DomainError for the zero function. */
  div(other: EllipticFunction | ComplexNumeric): EllipticFunction {
    return new EllipticFunction(mulElements(this.element, inverse(elementOf(this, other))));
  }

  neg(): EllipticFunction {
    return new EllipticFunction(negElement(this.element));
  }

  /** An integer power. */
  pow(n: number): EllipticFunction {
    if (!Number.isSafeInteger(n)) {
      throw new DomainError({ subject: "pow", given: `the exponent ${n}`, expected: "an integer", argument: "n" });
    }
    const base = n < 0 ? inverse(this.element) : this.element;
    let result = constantElement(base.field, base.field.ring.one);
    for (let k = 0; k < Math.abs(n); k++) result = mulElements(result, base);
    return new EllipticFunction(result);
  }

  /** The derivative by z: ℘′ for ℘. */
  get prime(): EllipticFunction {
    return this.derivative(1);
  }

  /** The n-th derivative by z, n >= 0. */
  derivative(n = 1): EllipticFunction {
    if (!(Number.isSafeInteger(n) && n >= 0)) {
      throw new DomainError({ subject: "derivative", given: `n = ${n}`, expected: "an integer n >= 0", argument: "n" });
    }
    let element = this.element;
    for (let k = 0; k < n; k++) element = deriveElement(element);
    return new EllipticFunction(element);
  }

  /**
   * f(nz) as an exact rational function of ℘ and ℘′.
   *
   * Domain   an integer n other than 0, or a complex multiplication α of the lattice (exact`1 + i` on the square lattice): an exact algebraic
   *          integer with αΛ ⊂ Λ, for exact invariants.
   * Error    none: by division polynomials, or a quotient of degree |α|² that is proved by its differential equation.
   * Throws   DomainError for other numbers.
   */
  multiple(n: ComplexNumeric): EllipticFunction {
    return new EllipticFunction(multipleOf(this.element, n));
  }

  /**
   * The irreducible polynomial relation F(f, g) = 0 with another function of the lattice, proved.
   *
   * Domain   exact coefficients and invariants.
   * @example L.wp.relation(L.wp.prime)   // Y² − 4X³ + 4X − 1 = 0
   */
  relation(g: EllipticFunction): AlgebraicRelation {
    return relationBetween(this, g);
  }

  /**
   * Whether both are the same function: yes by equal normal forms, no by different ones over exact numbers or by disjoint values.
   * Throws UndecidedError if neither can be shown, TypeError for functions of different lattices.
   */
  equals(other: EllipticFunction | ComplexNumeric): boolean {
    const difference = addElements(this.element, negElement(elementOf(this, other)));
    if (isZeroElement(difference)) return true;
    return !differs(new EllipticFunction(difference));
  }

  /** Number of poles in a cell with multiplicity, which is that of the zeros; 0 for a constant. */
  get order(): number {
    return this.poles.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  }

  /** The zeros of a cell; none for a constant. Exact half-periods and lattice points come as exact points. */
  get zeros(): readonly FunctionPoint[] {
    return this.divisor(1);
  }

  get poles(): readonly FunctionPoint[] {
    return this.divisor(-1);
  }

  private divisor(sign: 1 | -1): FunctionPoint[] {
    if (isZeroElement(this.element)) {
      throw new DomainError({ subject: "zeros", given: "the function 0", expected: "a function that is not 0" });
    }
    const { atOrigin, points } = divisorOf(this.element);
    const list = points
      .filter(({ order }) => order * sign > 0)
      .map((at) => ({ point: pointOf(this, at), multiplicity: Math.abs(at.order) }));
    const origin = {
      point: new TorusPoint(this.lattice, [Rational.zero, Rational.zero]),
      multiplicity: atOrigin * sign,
    };
    return origin.multiplicity > 0 ? [origin, ...list] : list;
  }

  /**
   * The Laurent series at p with n coefficients from the leading one, exact where the function and the point are.
   * Throws PoleError where a pole cannot be told from p: take p from `poles`.
   */
  laurent(p: ComplexNumeric, n = 8): LaurentExpansion {
    return laurentExpansion(this.expression, p, n);
  }

  /** The coefficient of 1/(z − p). */
  residue(p: ComplexNumeric): Real | Complex {
    return this.laurent(p, 1).residue;
  }

  /**
   * z with ℘(z) = w; for ℘ only.
   *
   * Branch   z modulo the lattice is fixed up to sign by w. `prime`, the value of ℘′ there, settles it; for real w on a real lattice `sign` does,
   *          the sign of ℘′ (of Im ℘′ where it is imaginary). Without both ℘′ = −√(4w³ − g2 w − g3) by the principal root, so that a large
   *          w > 0 has a small z > 0. `component` ("identity", "bounded") and `line` ("real", "imaginary") say where z is to lie.
   * Throws   DomainError where w has no solution on the component or line, or `prime` is no value of ℘′ over w.
   */
  inverse(w: ComplexNumeric, choice: InverseChoice = {}): Complex {
    if (!sameElement(this.element, wpElement(this.element.field))) {
      throw new DomainError({
        subject: "inverse",
        given: `${this}`,
        expected: "the function ℘",
        hint: "Solve for ℘ first.",
      });
    }
    return inverseOfWp(this.lattice, w, (x) => primeRoot(this, x), choice);
  }

  /**
   * The function in another of its three forms:
   *     "rational"   (A(℘) + B(℘)℘′)/D(℘), which is this value itself
   *     "sigma"      C Π σ(z − a)/Π σ(z − b) over zeros a and poles b with Σ a = Σ b
   *     "zeta"       C + Σ c_1 ζ(z − p) + Σ c_k (−1)^k/(k−1)! ℘^(k−2)(z − p) over the principal parts
   * Each form is a function again, gives its parts, and has `as` itself.
   *
   * Throws   DomainError for "sigma" of the function 0.
   * Source   DLMF 23.2(iii); Whittaker and Watson 20.53 (σ), 20.52 (ζ).
   */
  as(form: "rational"): EllipticFunction;
  as(form: "sigma"): SigmaForm;
  as(form: "zeta"): ZetaForm;
  as(form: "rational" | "sigma" | "zeta"): EllipticFunction | SigmaForm | ZetaForm;
  as(form: "rational" | "sigma" | "zeta"): EllipticFunction | SigmaForm | ZetaForm {
    if (form === "rational") return this;
    if (form === "sigma") return sigmaForm(this);
    if (form === "zeta") return this.zeta;
    throw new DomainError({
      subject: "as",
      given: `"${form}"`,
      expected: '"rational", "sigma" or "zeta"',
      argument: "form",
    });
  }

  /** See `as("zeta")`. */
  protected get zeta(): ZetaForm {
    return zetaForm(this, EllipticFunction.wp(this.lattice));
  }

  /** The first coefficient of the series at 0, by the degrees of the rational form. */
  get leadingAtZero(): Real | Complex {
    return laurentExpansion(this.expression, 0, 1).coefficients[0]!;
  }

  get element(): Element {
    return this.expression.element;
  }

  get conventions(): readonly ConventionKey[] {
    return ["cubic"];
  }

  /** The function as a formula in ℘ and ℘′. */
  override toString(): string {
    return elementText(this.element);
  }
}

function inverse(element: Element): Element {
  if (!isZeroElement(element)) return invElement(element);
  throw new DomainError({ subject: "div", given: "the function 0 as divisor", expected: "a function that is not 0" });
}

function elementOf(f: EllipticFunction, other: EllipticFunction | ComplexNumeric): Element {
  if (other instanceof EllipticFunction) {
    if (other.lattice === f.lattice) return other.element;
    throw new TypeError("elliptic function: got functions of two lattices; expected functions of one lattice");
  }
  const { field } = f.element;
  const { scalar: value, constants } = scalarOf(field, scalar(other, "elliptic function"));
  return constantElement(field, value, constants);
}

/** Whether a function whose normal form is not 0 is not the function 0: no by a nonzero value, for named constants may be related. */
function differs(f: EllipticFunction): true {
  const { A, B } = f.element;
  if ([...A, ...B].every((c) => [...c.values()].every(({ powers }) => powers.length === 0))) return true;
  for (const [r, s] of [
    [1n, 3n],
    [2n, 7n],
    [3n, 11n],
  ] as const) {
    const value = f(new TorusPoint(f.lattice, [Rational.of(r, 5n), Rational.of(s, 13n)]));
    if (!value.overlaps(0)) return true;
  }
  throw new UndecidedError({
    subject: "elliptic function",
    given: `two functions whose difference ${f} cannot be told from 0`,
    expected: "functions that an exact argument or their values tell apart",
  });
}

function pointOf(f: EllipticFunction, at: DivisorPoint): TorusPoint | Complex {
  const half = Rational.of(1, 2);
  const zero = Rational.zero;
  if (at.halfPeriod)
    return new TorusPoint(f.lattice, [at.halfPeriod === 3 ? zero : half, at.halfPeriod === 1 ? zero : half]);
  const point = Complex.from(apply(PLACE, [f.expression, at]));
  rememberDivisorPoint(point, at);
  return point;
}

/** √(4x³ − g2 x − g3), principal. */
export function primeRoot(wp: EllipticFunction, x: Real | Complex): Real | Complex {
  const value = squareAt(wp.prime.pow(2).element, x);
  return value instanceof Real && value.sign() !== -1 ? value.sqrt() : Complex.from(value).sqrt();
}

/** 4x³ − g2 x − g3 at a number. */
function squareAt({ field, A }: Element, x: Real | Complex): Real | Complex {
  const expression = expressionOf(constantElement(field, field.ring.zero));
  return A.reduceRight<Real | Complex>((sum, c) => sum.times(x).plus(constantValue(expression, c)), Real.from(0));
}

function evaluate(expression: Expression, z: ComplexNumeric): Real | Complex {
  const { element } = expression;
  const { lattice } = element.field;
  const kind = weierstrassKind(element);
  if (!(z instanceof TorusPoint && z.lattice === lattice)) {
    const number = scalar(z, "elliptic function");
    if (number.exact instanceof Rational && number.exact.sign() === 0) {
      const origin = new TorusPoint(lattice, [Rational.zero, Rational.zero]);
      return valueAtLatticePoint(expression, origin, kind ?? "elliptic function");
    }
    return kind
      ? apply(WEIERSTRASS[kind].number, [lattice, number])
      : away(z, () => apply(VALUE, [expression, number]));
  }
  if (z.isLatticePoint) return valueAtLatticePoint(expression, z, kind ?? "elliptic function");
  const at = [...z.coordinates, ...(z.remainder ? [z.remainder] : [])];
  if (kind) return apply(WEIERSTRASS[kind].point, [lattice, ...at], exactValue(z, kind));
  return away(z, () => apply(VALUE_AT_POINT, [expression, ...at]));
}

/** Names the argument where a value has met a pole. */
function away(z: ComplexNumeric, value: () => Real | Complex): Real | Complex {
  try {
    return value();
  } catch (error) {
    if (!(error instanceof PoleError)) throw error;
    const place = z instanceof TorusPoint ? `${z.name}, with coordinates (${z.coordinates.join(", ")})` : `${z}`;
    throw new PoleError({
      subject: "elliptic function",
      given: `the argument ${place}${z instanceof TorusPoint && z.remainder ? " and a remainder" : ""}, which is, or cannot be told from, a pole`,
      expected: "an argument away from the poles",
      hint: "f.poles lists them, f.laurent(p, n) describes the function there.",
      argument: "z",
    });
  }
}

/** ℘ and ℘′ themselves have operations of their own. */
function weierstrassKind({ A, B, D }: Element): "wp" | "prime" | undefined {
  if (D.length !== 1) return undefined;
  const isOne = (c: Element["A"][number] | undefined) => c !== undefined && exactOf(c)?.toString() === "1";
  if (B.length === 0 && A.length === 2 && A[0]!.size === 0 && isOne(A[1])) return "wp";
  return A.length === 0 && B.length === 1 && isOne(B[0]) ? "prime" : undefined;
}

/** Values that are known exactly: ℘′ is 0 at the half-periods, and ℘ and ℘′ may be rational at points of small order. */
function exactValue(z: TorusPoint, kind: Wanted): Rational | undefined {
  if (z.remainder || kind === "zeta" || kind === "sigma") return undefined;
  if (kind === "prime" && z.order === 2n) return Rational.zero;
  const point = rationalPoint(z.lattice, z.coordinates);
  return kind === "prime" ? point?.y : point?.x;
}
