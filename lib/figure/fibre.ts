import { evaluate } from "./polynomial.ts";

/** F(x, y) = Σ rows[k](x) y^k with rows of degree at most 3 - k: a plane cubic in an affine chart, in double precision. */
export interface PlaneEquation {
  readonly rows: readonly (readonly number[])[];
}

/** The polynomial F(x, ·), constant term first, without its leading zeros. */
function fibrePolynomial(equation: PlaneEquation, x: number): number[] {
  return equation.rows.map((row) => evaluate(row, x));
}

/**
 * The real y over x in rising order, `count` of them. Close to a vertical tangent rounding may lose or add a pair of
 * roots that nearly coincide; the count is known from the middle of the interval, so the pair is put back or dropped.
 */
export function fibre(equation: PlaneEquation, degree: number, x: number, count: number): number[] {
  const p = fibrePolynomial(equation, x);
  const [d = 0, c = 0, b = 0, a = 0] = p;
  if (degree === 1) return count === 1 && c !== 0 ? [-d / c] : [];
  const { real, pair } = degree === 2 ? quadratic(b, c, d) : cubic(a, b, c, d);
  if (real.length === count) return real;
  if (real.length < count) return [...real, pair, pair].slice(0, count).sort((s, t) => s - t);
  return withoutClosestPair(real).slice(0, count);
}

/** How many real y lie over x, away from the critical x. */
export function fibreCount(equation: PlaneEquation, degree: number, x: number): number {
  const [d = 0, c = 0, b = 0, a = 0] = fibrePolynomial(equation, x);
  if (degree === 1) return c === 0 ? 0 : 1;
  return (degree === 2 ? quadratic(b, c, d) : cubic(a, b, c, d)).real.length;
}

interface Roots {
  readonly real: number[];
  /** Real part of the two roots that are not real, if there are any. */
  readonly pair: number;
}

function quadratic(a: number, b: number, c: number): Roots {
  const square = b * b - 4 * a * c;
  const pair = -b / (2 * a);
  if (!(square > 0)) return { real: [], pair };
  // The root without cancellation first, the other from the product of the roots.
  const q = -(b + (b < 0 ? -1 : 1) * Math.sqrt(square)) / 2;
  return { real: [q / a, c / q].sort((s, t) => s - t), pair };
}

function cubic(a: number, b: number, c: number, d: number): Roots {
  const shift = -b / (3 * a);
  const p = c / a - (b * b) / (3 * a * a);
  const q = (2 * b ** 3) / (27 * a ** 3) - (b * c) / (3 * a * a) + d / a;
  const square = (q * q) / 4 + (p * p * p) / 27;
  const polish = (y: number): number => newton(a, b, c, d, y);
  if (square < 0) {
    const size = 2 * Math.sqrt(-p / 3);
    const angle = Math.acos(Math.max(-1, Math.min(1, (3 * q) / (p * size)))) / 3;
    const real = [0, 1, 2].map((k) => polish(shift + size * Math.cos(angle - (2 * Math.PI * k) / 3)));
    return { real: real.sort((s, t) => s - t), pair: Number.NaN };
  }
  const u = Math.cbrt(-q / 2 - (q < 0 ? -1 : 1) * Math.sqrt(square));
  const root = polish(shift + u - (u === 0 ? 0 : p / (3 * u)));
  // The three roots add up to 3 · shift.
  return { real: [root], pair: (3 * shift - root) / 2 };
}

function newton(a: number, b: number, c: number, d: number, start: number): number {
  let y = start;
  for (let step = 0; step < 3; step++) {
    const value = ((a * y + b) * y + c) * y + d;
    const slope = (3 * a * y + 2 * b) * y + c;
    const next = y - value / slope;
    // At a multiple root the slope vanishes and Newton would leave; the closed form is good enough there.
    if (!Number.isFinite(next) || Math.abs(next - y) > 1e-3 * (1 + Math.abs(y))) return y;
    y = next;
  }
  return y;
}

function withoutClosestPair(real: readonly number[]): number[] {
  if (real.length < 2) return [...real];
  let at = 0;
  for (let k = 1; k + 1 < real.length; k++) {
    if (real[k + 1]! - real[k]! < real[at + 1]! - real[at]!) at = k;
  }
  return real.filter((_, k) => k !== at && k !== at + 1);
}
