import { CARLSON } from "../function/operations.ts";
import { sameExact } from "../number/exactness.ts";
import type { Operation } from "../number/origin.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, type Real, scalar } from "../number/values.ts";

/**
 * Carlson's symmetric elliptic integrals (DLMF 19.16). All roots have a positive real part along the path of integration; the
 * functions are analytic in their arguments cut along the negative real axis, and the value is a Real where the arguments show that it is.
 */
export const carlson = {
  /**
   * RF(x, y, z) = ½ ∫_0^∞ dt / √((t+x)(t+y)(t+z)).
   * Domain   off the cut, at most one argument 0. Error proved. Throws DomainError on the cut, PoleError for two zeros. Source DLMF 19.16.1.
   * @example carlson.RF(1, 2, 0)   // 1.3110287771460599052...
   */
  RF: (x: ComplexNumeric, y: ComplexNumeric, z: ComplexNumeric): Real | Complex => symmetric(CARLSON.RF, [x, y, z]),

  /**
   * RC(x, y) = ½ ∫_0^∞ dt / (√(t+x) (t+y)); for y < 0 Cauchy's principal value.
   * Domain   x off the cut, y ≠ 0. Error proved. Throws DomainError, PoleError. Source DLMF 19.16.6, 19.2.20.
   * @example carlson.RC(0, "1/4")   // 3.1415926535897932384...
   */
  RC: (x: ComplexNumeric, y: ComplexNumeric): Real | Complex => {
    const [a, b] = [scalar(x, "RC"), scalar(y, "RC")];
    const vanishes = isZero(a) && b.exact instanceof Rational && b.exact.sign() < 0;
    return apply(CARLSON.RC, [a, b], vanishes ? Rational.zero : undefined);
  },

  /**
   * RJ(x, y, z, p) = (3/2) ∫_0^∞ dt / (√((t+x)(t+y)(t+z)) (t+p)); for p < 0 and x, y, z >= 0 Cauchy's principal value.
   * Domain   off the cut, at most one of x, y, z is 0, p ≠ 0. Error proved. Throws DomainError on the cut, PoleError, PrecisionError where arguments
   *          all round the origin leave the branch open. Source DLMF 19.16.2, 19.20.14.
   * @example carlson.RJ(2, 3, 4, 5)   // 0.14297579667156753833...
   */
  RJ: (x: ComplexNumeric, y: ComplexNumeric, z: ComplexNumeric, p: ComplexNumeric): Real | Complex => {
    const [values, last] = [[x, y, z].map((w) => scalar(w, "RJ")), scalar(p, "RJ")];
    const twin = values.findIndex((w) => w.exact && last.exact && sameExact(w.exact, last.exact));
    if (twin < 0) return symmetric(CARLSON.RJ, values, last);
    return symmetric(CARLSON.RD, values.toSpliced(twin, 1), last);
  },

  /**
   * RD(x, y, z) = RJ(x, y, z, z).
   * Domain   off the cut, z ≠ 0, at most one of x and y 0. Error proved. Throws DomainError, PoleError. Source DLMF 19.16.5.
   * @example carlson.RD(0, 2, 1)   // 1.7972103521033883111...
   */
  RD: (x: ComplexNumeric, y: ComplexNumeric, z: ComplexNumeric): Real | Complex => symmetric(CARLSON.RD, [x, y], z),

  /**
   * RG(x, y, z) = ¼ ∫_0^∞ (x/(t+x) + y/(t+y) + z/(t+z)) t dt / √((t+x)(t+y)(t+z)); the ellipse with half axes a and b has the perimeter 8 RG(0, a², b²).
   * Domain   off the cut; zeros allowed. Error proved. Throws DomainError. Source DLMF 19.16.3.
   * @example carlson.RG(2, 3, 4)   // 1.7255030280692277601...
   */
  RG: (x: ComplexNumeric, y: ComplexNumeric, z: ComplexNumeric): Real | Complex => symmetric(CARLSON.RG, [x, y, z]),
} as const;

function symmetric(
  operation: Operation,
  alike: readonly ComplexNumeric[],
  last: ComplexNumeric | undefined = undefined,
): Real | Complex {
  const values = alike.map((x) => scalar(x, operation.name));
  const rest = last === undefined ? [] : [scalar(last, operation.name)];
  return apply(operation, [...values, ...rest, closed(values)]);
}

/** Whether two of the numbers are exactly conjugate and the others real. */
function closed(values: readonly (Real | Complex)[]): boolean {
  const off = values.map((x) => x.exact).filter((x) => x instanceof Quadratic && x.d < 0n && !x.isRational());
  const real = values.filter((x) => x.exact instanceof Rational || !("disc" in x)).length;
  if (off.length !== 2 || off.length + real !== values.length) return false;
  return (off[0] as Quadratic).equals((off[1] as Quadratic).conjugate());
}

function isZero(x: Real | Complex): boolean {
  return x.exact instanceof Rational && x.exact.sign() === 0;
}
