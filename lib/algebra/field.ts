// A field as a record of pure functions, so that polynomials, points and maps are written once for all of them.

/**
 * Exact arithmetic in one field. Elements are immutable and carry no reference to the field.
 *
 * `isZero` must decide: a field of enclosures throws UndecidedError where it cannot.
 */
export interface Field<T> {
  /** As it is printed after "over": "Q", "Q(√5)", "F_7". */
  readonly name: string;
  /** 0n, or the prime. */
  readonly characteristic: bigint;
  readonly zero: T;
  readonly one: T;
  fromInt(n: bigint): T;
  add(a: T, b: T): T;
  sub(a: T, b: T): T;
  mul(a: T, b: T): T;
  neg(a: T): T;
  /** Throws DomainError on zero. */
  inv(a: T): T;
  isZero(a: T): boolean;
  /** A square root in the field, if there is one; the choice of the two is fixed by the field. */
  sqrt(a: T): T | undefined;
  /** A cube root in the field, where the field offers it. */
  cbrt?(a: T): T | undefined;
  format(a: T): string;
}

export function equal<T>(F: Field<T>, a: T, b: T): boolean {
  return F.isZero(F.sub(a, b));
}

export function divide<T>(F: Field<T>, a: T, b: T): T {
  return F.mul(a, F.inv(b));
}

export function square<T>(F: Field<T>, a: T): T {
  return F.mul(a, a);
}

export function cube<T>(F: Field<T>, a: T): T {
  return F.mul(a, F.mul(a, a));
}

/** n·a for a small integer n. */
export function scale<T>(F: Field<T>, n: number | bigint, a: T): T {
  return F.mul(F.fromInt(BigInt(n)), a);
}

/** a^n for n >= 0. */
export function power<T>(F: Field<T>, a: T, n: number): T {
  let result = F.one;
  for (let k = 0; k < n; k++) result = F.mul(result, a);
  return result;
}

export function sum<T>(F: Field<T>, ...terms: readonly T[]): T {
  return terms.reduce((total, term) => F.add(total, term), F.zero);
}

/** p/q as an element. */
export function fraction<T>(F: Field<T>, numerator: bigint, denominator: bigint): T {
  return divide(F, F.fromInt(numerator), F.fromInt(denominator));
}
