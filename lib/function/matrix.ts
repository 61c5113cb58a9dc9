// Integer 2 x 2 matrices as changes of basis and as Möbius maps, and Lagrange–Gauss reduction on exact data.

/**
 * Rows act on a basis: (ω1′, ω2′) = (d ω1 + c ω2, b ω1 + a ω2), so that τ′ = ω2′/ω1′ = (aτ + b)/(cτ + d).
 * Written [[a, b], [c, d]] as it acts on τ.
 */
export interface Matrix {
  readonly a: bigint;
  readonly b: bigint;
  readonly c: bigint;
  readonly d: bigint;
}

export const IDENTITY: Matrix = { a: 1n, b: 0n, c: 0n, d: 1n };

/** The map x ↦ M(N(x)). */
export function compose(m: Matrix, n: Matrix): Matrix {
  return {
    a: m.a * n.a + m.b * n.c,
    b: m.a * n.b + m.b * n.d,
    c: m.c * n.a + m.d * n.c,
    d: m.c * n.b + m.d * n.d,
  };
}

export function determinant(m: Matrix): bigint {
  return m.a * m.d - m.b * m.c;
}

/** Inverse of a matrix of determinant ±1. */
export function inverse(m: Matrix): Matrix {
  const s = determinant(m);
  return { a: s * m.d, b: -s * m.b, c: -s * m.c, d: s * m.a };
}

export function sameMatrix(m: Matrix, n: Matrix): boolean {
  return m.a === n.a && m.b === n.b && m.c === n.c && m.d === n.d;
}

export function negated(m: Matrix): Matrix {
  return { a: -m.a, b: -m.b, c: -m.c, d: -m.d };
}

/** A vector of the plane on an integer grid: (x + i y) times a common unit. */
export interface GridVector {
  readonly x: bigint;
  readonly y: bigint;
}

/** Nearest integer to n/d, d > 0; ties go up. */
export function roundedQuotient(n: bigint, d: bigint): bigint {
  const twice = 2n * n + d;
  const q = twice / (2n * d);
  return twice < 0n && q * 2n * d !== twice ? q - 1n : q;
}

/** Positive definite form A X² + 2B XY + C Y² = |X ω1 + Y ω2|² up to a common factor; signs and sizes are exact. */
export interface Gram {
  readonly A: bigint;
  readonly B: bigint;
  readonly C: bigint;
}

export function gram(v: GridVector, w: GridVector): Gram {
  return { A: v.x * v.x + v.y * v.y, B: v.x * w.x + v.y * w.y, C: w.x * w.x + w.y * w.y };
}

/**
 * The matrix that brings τ of a positively oriented basis into the fundamental domain Re τ in [−1/2, 1/2), |τ| >= 1 and
 * Re τ <= 0 on the arc, decided exactly on the given form.
 *
 * Cost     one integer division a step; the number of steps is logarithmic in the size of the form.
 * Source   Lagrange–Gauss reduction; the steps are τ ↦ τ − n and τ ↦ −1/τ of determinant 1.
 */
export function reduceForm({ A, B, C }: Gram): Matrix {
  let m = IDENTITY;
  for (;;) {
    // Re τ = B/A; ties go up so that the result is in [−1/2, 1/2).
    const n = roundedQuotient(B, A);
    if (n !== 0n) {
      C += n * (n * A - 2n * B);
      B -= n * A;
      m = { a: m.a - n * m.c, b: m.b - n * m.d, c: m.c, d: m.d };
    }
    if (C > A || (C === A && B <= 0n)) return m;
    [A, B, C] = [C, -B, A];
    m = { a: -m.c, b: -m.d, c: m.a, d: m.b };
  }
}
