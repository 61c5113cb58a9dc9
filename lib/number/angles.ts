// Rational multiples of π, and what the circular functions are there: exact numbers at the twelfths that a quadratic field holds, and
// half sums of roots of unity elsewhere.
import { PoleError } from "../proof/errors.ts";
import { DIV, JOIN, MINUS, NEG, PI, PLUS, TIMES } from "./operations.ts";
import { type Exact, isNode } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import type { GrowthRule } from "./separation.ts";

/** (re + im·i)·π. */
interface Multiple {
  readonly re: Rational;
  readonly im: Rational;
}

/** Sums of more terms are not followed. */
const DEEPEST = 16;

/** x as an exact Gaussian multiple of π, if it was built as one. */
function multipleOfPi(x: unknown, depth = 0): Multiple | undefined {
  if (!isNode(x) || depth > DEEPEST) return undefined;
  if (x.exact) return x.exact.sign() === 0 ? { re: Rational.zero, im: Rational.zero } : undefined;
  if (!x.origin) return undefined;
  const { operation, operands } = x.origin;
  const [a, b] = operands;
  const part = (operand: unknown) => multipleOfPi(operand, depth + 1);
  switch (operation) {
    case PI:
      return { re: Rational.one, im: Rational.zero };
    case NEG:
      return times(part(a), { re: Rational.of(-1), im: Rational.zero });
    case TIMES:
      return times(part(a), gaussian(b)) ?? times(part(b), gaussian(a));
    case DIV:
      return times(part(a), inverse(gaussian(b)));
    case PLUS:
      return sum(part(a), () => part(b));
    case MINUS:
      return sum(part(a), () => times(part(b), { re: Rational.of(-1), im: Rational.zero }));
    case JOIN:
      return sum(part(a), () => times(part(b), { re: Rational.zero, im: Rational.one }));
    default:
      return undefined;
  }
}

/** An exact Gaussian number. */
function gaussian(x: unknown): Multiple | undefined {
  const exact = isNode(x) ? x.exact : x;
  if (exact instanceof Rational) return { re: exact, im: Rational.zero };
  return exact instanceof Quadratic && exact.d === -1n ? { re: exact.a, im: exact.b } : undefined;
}

function times(x: Multiple | undefined, y: Multiple | undefined): Multiple | undefined {
  if (!x || !y) return undefined;
  return {
    re: x.re.times(y.re).minus(x.im.times(y.im)),
    im: x.re.times(y.im).plus(x.im.times(y.re)),
  };
}

function inverse(x: Multiple | undefined): Multiple | undefined {
  const norm = x?.re.pow(2).plus(x.im.pow(2));
  return x && norm && norm.sign() !== 0 ? { re: x.re.div(norm), im: x.im.div(norm).neg() } : undefined;
}

function sum(x: Multiple | undefined, y: () => Multiple | undefined): Multiple | undefined {
  const other = x && y();
  return x && other && { re: x.re.plus(other.re), im: x.im.plus(other.im) };
}

/** q with x = qπ. */
function halfTurns(x: unknown): Rational | undefined {
  const multiple = multipleOfPi(x);
  return multiple?.im.sign() === 0 ? multiple.re : undefined;
}

const HALF = Rational.of(1n, 2n);
/** sin(nπ/12) for n = 0 ... 6, where it is a quadratic number. */
const SINES: readonly (Exact | undefined)[] = [
  Rational.zero,
  undefined,
  HALF,
  Quadratic.of(Rational.zero, HALF, 2),
  Quadratic.of(Rational.zero, HALF, 3),
  undefined,
  Rational.one,
];

function sine(q: Rational): Exact | undefined {
  const twelfths = q.times(12);
  if (!twelfths.isInteger()) return undefined;
  const n = Number(((twelfths.num % 24n) + 24n) % 24n);
  if (n >= 12) return sine(q.minus(1))?.neg();
  return SINES[n <= 6 ? n : 12 - n];
}

/** The exact value of a circular function at a number, if it is one that a quadratic field holds. */
export type ExactOn = (x: unknown) => Exact | undefined;

export const exactSine: ExactOn = (x) => {
  const q = halfTurns(x);
  return q && sine(q);
};

export const exactCosine: ExactOn = (x) => {
  const q = halfTurns(x);
  return q && sine(q.plus(HALF));
};

export const exactTangent: ExactOn = (x) => {
  const q = halfTurns(x);
  const [s, c] = q ? [sine(q.times(2)), sine(q.times(2).plus(HALF))] : [];
  if (!s || !c) return undefined;
  // sin 2x/(1 + cos 2x) = (1 − cos 2x)/sin 2x; where one is irrational the other is rational.
  if (c instanceof Rational) {
    const below = c.plus(1);
    if (below.sign() === 0) throw tangentPole(q!);
    return s instanceof Rational ? s.div(below) : s.div(s.withRational(below));
  }
  return s instanceof Rational ? c.withRational(Rational.one).minus(c).div(c.withRational(s)) : undefined;
};

function tangentPole(q: Rational): PoleError {
  return new PoleError({
    subject: "tan",
    given: `${q}·π, where the cosine is 0`,
    expected: "a number away from π/2 + kπ",
    hint: "1/tan x is cos x/sin x, which is 0 there.",
    argument: "x",
  });
}

/** e^x at imaginary x: 1, −1, ±i and the primitive third and sixth roots of unity. */
export const exactExponential: ExactOn = (x) => {
  const multiple = multipleOfPi(x);
  if (multiple?.re.sign() !== 0) return undefined;
  const [c, s] = [sine(multiple.im.plus(HALF)), sine(multiple.im)];
  if (!(c instanceof Rational) || !s) return undefined;
  if (s instanceof Rational) return s.sign() === 0 ? c : Quadratic.of(c, s, -1);
  // s = b√3, i·b√3 = b√−3.
  return Quadratic.of(c, s.b, -3);
};

/** ζ + ζ^−1 over 2, or ζ − ζ^−1 over 2i, for ζ = e^(iπp/q), a 2q-th root of unity. */
function circular(more: number): GrowthRule {
  return ([x], _of, field) => {
    const q = halfTurns(x);
    if (!q) return undefined;
    field.unity(2 * Number(q.den));
    field.unity(more);
    return { u: 1, l: 1 };
  };
}

export const growthOfSine = circular(4);
export const growthOfCosine = circular(1);

/** e^(iπp/q), a 2q-th root of unity. */
export const growthOfUnit: GrowthRule = ([x], _of, field) => {
  const multiple = multipleOfPi(x);
  if (multiple?.re.sign() !== 0) return undefined;
  field.unity(2 * Number(multiple.im.den));
  return { u: 0, l: 0 };
};
