// What a pair of operands gives, as types. Unions are taken apart; any stays any; an impossible pair gives NoOp.
//
// Numbers are told by one field each: comparing whole classes costs the checker a hundred times as much.
import type { Quadratic } from "../number/quadratic.ts";
import type { Rational } from "../number/rational.ts";
import type { Complex, Real } from "../number/values.ts";
import type { Join } from "./fields.ts";
import type { Point } from "./point.ts";
import type { TorusPoint } from "./torus-point.ts";

/** No value: the operands have no such sum, product, ... */
export interface NoOp<Operator extends string, A, B> {
  readonly noSuchOperation: readonly [Operator, A, B];
}

type IsAny<T> = 0 extends 1 & T ? true : false;
// biome-ignore lint/suspicious/noExplicitAny: a value of any type may be a library value, so the result may be too
type Any = any;

interface IsComplex {
  readonly disc: unknown;
}
/** A point of a torus: complex, with exact coordinates that sums and rational factors keep. */
interface IsTorusPoint extends IsComplex {
  readonly coordinates: unknown;
}
interface IsReal {
  readonly ball: unknown;
}
interface IsRational {
  readonly num: bigint;
  readonly den: bigint;
}
interface IsQuadratic {
  readonly d: bigint;
}
type Scalar = IsComplex | IsReal | IsRational | IsQuadratic;
type Plain = number | bigint;
/** A value that answers operators by methods. */
type Operand = { plus(other: never): unknown } | { times(other: never): unknown };

/** `a + b` */
export type Sum<A, B> =
  IsAny<A> extends true
    ? AnySum<B>
    : IsAny<B> extends true
      ? AnySum<A>
      : A extends unknown
        ? B extends unknown
          ? A extends string
            ? string
            : B extends string
              ? string
              : Arithmetic<"+", A, B>
          : never
        : never;
type AnySum<B> = [B] extends [string] ? string : Any;

/** `a - b` */
export type Difference<A, B> = Guarded<"-", A, B>;
/** `a * b` */
export type Product<A, B> = Guarded<"*", A, B>;
/** `a / b` */
export type Quotient<A, B> = Guarded<"/", A, B>;

type Guarded<O extends "-" | "*" | "/", A, B> =
  IsAny<A> extends true
    ? Any
    : IsAny<B> extends true
      ? Any
      : A extends unknown
        ? B extends unknown
          ? Arithmetic<O, A, B>
          : never
        : never;

/** One operand of each; neither a union nor any. */
type Arithmetic<O extends "+" | "-" | "*" | "/", A, B> = A extends number
  ? B extends number
    ? number
    : B extends Scalar
      ? Meeting<O, A, B>
      : Reflected<O, A, B>
  : A extends bigint
    ? B extends bigint
      ? bigint
      : B extends Scalar
        ? Meeting<O, A, B>
        : Reflected<O, A, B>
    : A extends Scalar
      ? B extends Scalar | Plain
        ? Meeting<O, A, B>
        : Reflected<O, A, B>
      : Own<O, A, B>;

/** The kind in which two numbers meet. */
type Meeting<O extends "+" | "-" | "*" | "/", A, B> = A extends IsTorusPoint
  ? O extends "+" | "-"
    ? TorusPoint
    : B extends IsRational | Plain
      ? TorusPoint
      : Complex
  : B extends IsTorusPoint
    ? O extends "+" | "-"
      ? TorusPoint
      : O extends "*"
        ? A extends IsRational | Plain
          ? TorusPoint
          : Complex
        : Complex
    : Numbers<A, B>;
type Numbers<A, B> = A extends IsComplex
  ? Complex
  : B extends IsComplex
    ? Complex
    : A extends IsReal
      ? B extends IsQuadratic
        ? Real | Complex
        : Real
      : B extends IsReal
        ? A extends IsQuadratic
          ? Real | Complex
          : Real
        : A extends IsQuadratic
          ? Quadratic
          : B extends IsQuadratic
            ? Quadratic
            : Rational;

/** Points of elliptic curves add over the larger of their fields. */
interface IsPoint {
  readonly isOrigin: boolean;
  readonly coordinates: unknown;
}
type FieldOf<P extends IsPoint> = Exclude<P["coordinates"], undefined> extends readonly [infer T, unknown] ? T : never;
type PointSum<O extends string, A extends IsPoint, B extends IsPoint> = [Join<FieldOf<A>, FieldOf<B>>] extends [never]
  ? NoOp<O, A, B>
  : Point<Join<FieldOf<A>, FieldOf<B>>>;

/** By a method of the left operand. */
type Own<O extends "+" | "-" | "*" | "/", A, B> = O extends "+" | "-"
  ? A extends IsPoint
    ? B extends IsPoint
      ? PointSum<O, A, B>
      : Method<O, A, B>
    : Method<O, A, B>
  : Method<O, A, B>;

type Method<O extends "+" | "-" | "*" | "/", A, B> = O extends "+"
  ? A extends { plus(other: infer P): infer R }
    ? Fitting<B, P, R, Reflected<O, A, B>>
    : Reflected<O, A, B>
  : O extends "-"
    ? A extends { minus(other: infer P): infer R }
      ? Fitting<B, P, R, Reflected<O, A, B>>
      : Reflected<O, A, B>
    : O extends "*"
      ? A extends { times(other: infer P): infer R }
        ? Fitting<B, P, R, Reflected<O, A, B>>
        : Reflected<O, A, B>
      : A extends { div(other: infer P): infer R }
        ? Fitting<B, P, R, Reflected<O, A, B>>
        : Reflected<O, A, B>;

type Fitting<B, P, R, Otherwise> = B extends P ? R : Otherwise;

/** By a method of the right operand. */
type Reflected<O extends "+" | "-" | "*" | "/", A, B> = O extends "+"
  ? B extends { plus(other: infer P): infer R }
    ? Fitting<A, P, R, NoOp<O, A, B>>
    : NoOp<O, A, B>
  : O extends "*"
    ? B extends { times(other: infer P): infer R }
      ? Fitting<A, P, R, NoOp<O, A, B>>
      : NoOp<O, A, B>
    : O extends "-"
      ? B extends { neg(): { plus(other: infer P): infer R } }
        ? Fitting<A, P, R, NoOp<O, A, B>>
        : NoOp<O, A, B>
      : B extends { inv(): { times(other: infer P): infer R } }
        ? Fitting<A, P, R, NoOp<O, A, B>>
        : NoOp<O, A, B>;

/** `a ** b` */
export type Power<A, B> =
  IsAny<A> extends true
    ? Any
    : IsAny<B> extends true
      ? Any
      : A extends unknown
        ? B extends unknown
          ? PowerOf<A, B>
          : never
        : never;
type PowerOf<A, B> = A extends Scalar | Plain
  ? B extends Plain
    ? WholePower<A, B>
    : B extends IsRational | IsReal
      ? A extends IsComplex | IsQuadratic
        ? Complex
        : Real
      : B extends IsComplex
        ? Complex
        : NoOp<"**", A, B>
  : A extends { pow(exponent: infer P): infer R }
    ? Fitting<B, P, R, NoOp<"**", A, B>>
    : NoOp<"**", A, B>;
type WholePower<A, B> = A extends number
  ? B extends number
    ? number
    : NoOp<"**", A, B>
  : A extends bigint
    ? B extends bigint
      ? bigint
      : NoOp<"**", A, B>
    : A extends IsComplex
      ? Complex
      : A extends IsReal
        ? Real
        : A extends IsQuadratic
          ? Quadratic
          : Rational;

/** `-a` */
export type Negative<A> = IsAny<A> extends true ? Any : A extends unknown ? NegativeOf<A> : never;
type NegativeOf<A> = A extends bigint
  ? bigint
  : A extends { neg(): infer R }
    ? R
    : A extends Operand
      ? NoOp<"-", A, A>
      : number;

/** `a < b`, `a <= b`, `a > b`, `a >= b` */
export type Order<A, B> =
  IsAny<A> extends true
    ? boolean
    : IsAny<B> extends true
      ? boolean
      : A extends unknown
        ? B extends unknown
          ? OrderOf<A, B>
          : never
        : never;
type OrderOf<A, B> = A extends IsComplex | null | undefined
  ? NoOp<"<", A, B>
  : B extends IsComplex | null | undefined
    ? NoOp<"<", A, B>
    : A extends Scalar | Plain
      ? B extends Scalar | Plain
        ? boolean
        : NoOp<"<", A, B>
      : A extends { compare(other: infer P): unknown }
        ? Fitting<B, P, boolean, NoOp<"<", A, B>>
        : A extends Operand
          ? NoOp<"<", A, B>
          : B extends Operand | Scalar | Plain
            ? NoOp<"<", A, B>
            : boolean;
