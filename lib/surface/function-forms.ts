// Elliptic functions as quotients of σ and as sums of ζ, made from their zeros, poles and principal parts.

import { COORDINATE } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { UndecidedError } from "../proof/errors.ts";
import { Callable } from "./callable.ts";
import type { EllipticFunction, FunctionPoint } from "./elliptic-function.ts";
import { quasiExpansion } from "./quasi-expansion.ts";
import { quasiValue } from "./quasi-value.ts";
import { TorusPoint } from "./torus-point.ts";

type FormName = "rational" | "sigma" | "zeta";

/** C Π σ(z − a)/Π σ(z − b). */
export class SigmaForm extends Callable {
  readonly function: EllipticFunction;
  readonly constant: Real | Complex;
  /** Representatives with multiplicities; their sums are equal as numbers, not only modulo the lattice. */
  readonly zeros: readonly FunctionPoint[];
  readonly poles: readonly FunctionPoint[];

  constructor(
    f: EllipticFunction,
    constant: Real | Complex,
    zeros: readonly FunctionPoint[],
    poles: readonly FunctionPoint[],
  ) {
    super((z) =>
      sigmaProduct(f.lattice, z, zeros)
        .times(constant)
        .div(sigmaProduct(f.lattice, z, poles)),
    );
    this.function = f;
    this.constant = constant;
    this.zeros = zeros;
    this.poles = poles;
  }

  as(form: FormName): EllipticFunction | SigmaForm | ZetaForm {
    return form === "sigma" ? this : this.function.as(form);
  }

  get conventions(): readonly ConventionKey[] {
    return ["cubic"];
  }

  /** "2·σ(z − ω1/3)²/(σ(z)σ(z − ω2/2))", with the numbers behind longer names left to `zeros` and `poles`. */
  override toString(): string {
    const product = (list: readonly FunctionPoint[]) =>
      list.map(({ point, multiplicity }) => `σ(${shifted(point)})${raised(multiplicity)}`).join("·");
    const front = `${this.constant}` === "1" ? "" : `${bracketed(`${this.constant}`)}·`;
    if (this.zeros.length === 0) return `${this.constant}`;
    return `${front}${product(this.zeros)}/${this.poles.length > 1 ? `(${product(this.poles)})` : product(this.poles)}`;
  }
}

/** The principal part at a point: Σ coefficients[k − 1] (z − at)^−k. */
export interface ZetaPart {
  readonly at: TorusPoint | Complex;
  readonly coefficients: readonly (Real | Complex)[];
}

/** C + Σ c_1 ζ(z − p) + Σ_{k>=2} c_k (−1)^k/(k−1)! ℘^(k−2)(z − p). */
export class ZetaForm extends Callable {
  readonly function: EllipticFunction;
  readonly constant: Real | Complex;
  readonly parts: readonly ZetaPart[];

  constructor(f: EllipticFunction, constant: Real | Complex, parts: readonly ZetaPart[], wp: EllipticFunction) {
    super((z) => parts.reduce<Real | Complex>((sum, part) => sum.plus(partValue(f.lattice, wp, part, z)), constant));
    this.function = f;
    this.constant = constant;
    this.parts = parts;
  }

  as(form: FormName): EllipticFunction | SigmaForm | ZetaForm {
    return form === "zeta" ? this : this.function.as(form);
  }

  get conventions(): readonly ConventionKey[] {
    return ["cubic", "quasiPeriods"];
  }

  /** "1/2 + ζ(z) − ζ(z − ω1/3) + 3 ℘(z)". */
  override toString(): string {
    const terms = this.parts.flatMap(({ at, coefficients }) =>
      coefficients.map((c, k) => {
        const weight = k === 0 ? c : c.times(weightOf(k + 1));
        return vanishes(weight) ? "" : termText(weight, `${k === 0 ? "ζ" : derivativeName(k - 1)}(${shifted(at)})`);
      }),
    );
    const all = [vanishes(this.constant) ? "" : `${this.constant}`, ...terms].filter((text) => text !== "");
    return all.length === 0 ? "0" : all.join(" + ").replaceAll("+ −", "− ");
  }
}

/** A point of the torus of this lattice: itself, or 0 with the number as remainder. */
export function onTorus(lattice: PeriodLattice, z: ComplexNumeric): TorusPoint {
  if (z instanceof TorusPoint && z.lattice === lattice) return z;
  const number = scalar(z, "elliptic function");
  const zero = number.exact instanceof Rational && number.exact.sign() === 0;
  return new TorusPoint(lattice, [Rational.zero, Rational.zero], zero ? undefined : number);
}

function sigmaProduct(lattice: PeriodLattice, z: ComplexNumeric, list: readonly FunctionPoint[]): Real | Complex {
  const here = onTorus(lattice, z);
  return list.reduce<Real | Complex>(
    (p, { point, multiplicity }) => p.times(quasiValue(lattice, "sigma", here.minus(point)).pow(multiplicity)),
    Real.from(1),
  );
}

/** (−1)^k/(k−1)!. */
export function weightOf(k: number): Rational {
  let factorial = 1n;
  for (let n = 2; n < k; n++) factorial *= BigInt(n);
  return Rational.of(k % 2 === 0 ? 1 : -1, factorial);
}

function partValue(lattice: PeriodLattice, wp: EllipticFunction, part: ZetaPart, z: ComplexNumeric): Real | Complex {
  const here = onTorus(lattice, z).minus(part.at);
  return part.coefficients.reduce<Real | Complex>((sum, c, k) => {
    if (vanishes(c)) return sum;
    const value =
      k === 0
        ? quasiValue(lattice, "zeta", here)
        : wp
            .derivative(k - 1)(here)
            .times(weightOf(k + 1));
    return sum.plus(c.times(value));
  }, Real.from(0));
}

function vanishes(x: Real | Complex): boolean {
  return x.exact !== undefined && `${x.exact}` === "0";
}

/** See `EllipticFunction.as`. */
export function sigmaForm(f: EllipticFunction): SigmaForm {
  const [zeros, poles] = equalSums(f.lattice, f.zeros, f.poles);
  // Leading coefficients at 0, where σ(z − p) starts with σ(−p), or z, or at another lattice point with a factor times z.
  const leading = (list: readonly FunctionPoint[]) =>
    list.reduce<Real | Complex>((p, { point, multiplicity }) => {
      const at = onTorus(f.lattice, point).neg();
      return p.times(quasiExpansion(f.lattice, "sigma", at, 1).coefficients[0]!.pow(multiplicity));
    }, Real.from(1));
  const constant = f.leadingAtZero.times(leading(poles)).div(leading(zeros));
  return new SigmaForm(f, constant, zeros, poles);
}

/** The last zero moved by the lattice vector between the sums, which Abel's theorem says is there. */
function equalSums(
  lattice: PeriodLattice,
  zeros: readonly FunctionPoint[],
  poles: readonly FunctionPoint[],
): [FunctionPoint[], FunctionPoint[]] {
  const total = (list: readonly FunctionPoint[]) =>
    list.reduce((sum, { point, multiplicity }) => sum.plus(onTorus(lattice, point).times(multiplicity)), zero(lattice));
  const gap = latticeVector(lattice, total(poles).minus(total(zeros)));
  const last = zeros.at(-1);
  if (!last || gap.coordinates.every((q) => q.sign() === 0)) return [[...zeros], [...poles]];
  const moved: FunctionPoint = { point: onTorus(lattice, last.point).plus(gap), multiplicity: 1 };
  const rest = last.multiplicity > 1 ? [{ point: last.point, multiplicity: last.multiplicity - 1 }] : [];
  return [[...zeros.slice(0, -1), ...rest, moved], [...poles]];
}

function zero(lattice: PeriodLattice): TorusPoint {
  return new TorusPoint(lattice, [Rational.zero, Rational.zero]);
}

/** A lattice vector known by enclosure: its coordinates are the integers that they hold. */
function latticeVector(lattice: PeriodLattice, gap: TorusPoint): TorusPoint {
  const [r, s] = gap.coordinates;
  if (!gap.remainder) return gap;
  const [x, y] = [1, 2].map((index) => apply(COORDINATE, [lattice, gap.remainder, index]) as Real) as [Real, Real];
  const whole = [x.plus(r), y.plus(s)].map((c) => c.plus(Rational.of(1, 2)).floor());
  if (whole.every((n) => n !== undefined)) {
    return new TorusPoint(lattice, [Rational.of(whole[0]!), Rational.of(whole[1]!)]);
  }
  throw new UndecidedError({
    subject: "as",
    given: "zeros and poles too coarse to tell the lattice vector between their sums",
    expected: "zeros and poles with more digits",
  });
}

/** See `EllipticFunction.as`. */
export function zetaForm(f: EllipticFunction, wp: EllipticFunction): ZetaForm {
  const parts = f.poles.map(({ point, multiplicity }): ZetaPart => {
    const series = f.laurent(point, multiplicity);
    return { at: point, coefficients: Array.from({ length: multiplicity }, (_, k) => series.coefficient(-1 - k)) };
  });
  // The constant is what the parts leave of the term t^0 at 0.
  let constant = f.laurent(0, 1).coefficient(0);
  for (const { at, coefficients } of parts) {
    const here = onTorus(f.lattice, at).neg();
    coefficients.forEach((c, k) => {
      if (vanishes(c)) return;
      const series = k === 0 ? quasiExpansion(f.lattice, "zeta", here, 2) : wp.derivative(k - 1).laurent(here, 1);
      const term = series.coefficient(0);
      if (!vanishes(term)) constant = constant.minus(c.times(k === 0 ? term : term.times(weightOf(k + 1))));
    });
  }
  return new ZetaForm(f, constant, parts, wp);
}

function shifted(point: TorusPoint | Complex): string {
  const name = point instanceof TorusPoint ? point.name.replaceAll("-", "−") : `${point}`.replaceAll("-", "−");
  if (name === "0") return "z";
  if (/ [+−] /.test(name.replace(/^\(.*\)/, ""))) return `z − (${name})`;
  return name.startsWith("−") ? `z + ${name.slice(1)}` : `z − ${name}`;
}

function raised(n: number): string {
  const digits = [..."⁰¹²³⁴⁵⁶⁷⁸⁹"];
  return n === 1 ? "" : [...`${n}`].map((d) => digits[Number(d)]).join("");
}

function derivativeName(n: number): string {
  return n < 4 ? `℘${"′".repeat(n)}` : `℘^(${n})`;
}

function bracketed(text: string): string {
  return / /.test(text) ? `(${text})` : text;
}

function termText(weight: Real | Complex, name: string): string {
  const text = `${weight}`;
  if (text === "1") return name;
  if (text === "-1") return `−${name}`;
  const negative = text.startsWith("-") && !/ /.test(text);
  return `${negative ? "−" : ""}${bracketed(negative ? text.slice(1) : text)} ${name}`;
}
