// The trace of Frobenius modulo small primes, for fields too large for steps alone.

import { modulo } from "../algebra/integer.ts";
import { type ModPolynomial, modPolynomials, type QuotientRing, quotientRing } from "../algebra/modpoly.ts";

/** y² = x³ + Ax + B over F_p, p > 3. */
export interface ShortCurve {
  readonly A: bigint;
  readonly B: bigint;
  readonly p: bigint;
}

/**
 * t modulo a prime l ≠ p, where p + 1 − t is the number of points.
 *
 * Method   on the l-torsion φ² − tφ + p = 0 for the Frobenius map φ: (x, y) ↦ (x^p, y^p), taken on the general point modulo the l-division
 *          polynomial. Where a denominator has a common factor with it, the work goes on modulo that factor: t is the same for every
 *          point of order l.
 * Cost     four powers with exponent about p of polynomials of degree (l² − 1)/2, and l additions there.
 * Source   Schoof, Elliptic curves over finite fields and the computation of square roots mod p (1985).
 */
export function traceModulo(curve: ShortCurve, l: number): bigint {
  const ring = modPolynomials(curve.p);
  const f: ModPolynomial = [curve.B, curve.A, 0n, 1n];
  if (l === 2) {
    const R = quotientRing(ring, f);
    const root = ring.gcd(ring.sub(R.power([0n, 1n], curve.p), [0n, 1n]), f);
    return root.length > 1 ? 0n : 1n;
  }
  let modulus = ring.monic(divisionPolynomial(curve, l));
  for (;;) {
    try {
      return traceOnTorsion(curve, quotientRing(ring, modulus), f, l);
    } catch (error) {
      if (!(error instanceof Split)) throw error;
      modulus = error.factor;
    }
  }
}

/** A proper factor of the modulus was met. */
class Split extends Error {
  readonly factor: ModPolynomial;
  constructor(factor: ModPolynomial) {
    super("the division polynomial splits");
    this.factor = factor;
  }
}

/** (a(x), b(x)·y) on the general point, or undefined for O. */
type General = { readonly a: ModPolynomial; readonly b: ModPolynomial } | undefined;

interface Torsion {
  readonly R: QuotientRing;
  readonly f: ModPolynomial;
  readonly A: bigint;
}

function traceOnTorsion(curve: ShortCurve, R: QuotientRing, cubic: ModPolynomial, l: number): bigint {
  const { p } = curve;
  const f = R.reduce(cubic);
  const torsion = { R, f, A: curve.A };
  const x = R.reduce([0n, 1n]);
  const P: General = { a: x, b: [1n] };
  // y^p = y·f^((p−1)/2), and φ once more: y^(p²) = y·(f^((p−1)/2))^(p+1).
  const a = R.power(x, p);
  const b = R.power(f, (p - 1n) / 2n);
  const once: General = { a, b };
  const twice: General = { a: R.power(a, p), b: R.mul(R.power(b, p), b) };
  const q = modulo(p, BigInt(l));
  const sum = add(torsion, twice, multiple(torsion, q, P));
  if (!sum) return 0n;
  let Q: General = once;
  for (let t = 1n; 2n * t < BigInt(l); t++) {
    if (!Q) throw new Error("a point of order l is not killed by a smaller number");
    if (same(torsion, sum.a, Q.a)) return same(torsion, sum.b, Q.b) ? t : BigInt(l) - t;
    Q = add(torsion, Q, once);
  }
  throw new Error("Frobenius satisfies its equation on the torsion");
}

/** Whether two elements agree; where they do on some points of the torsion only, the work is restricted to those. */
function same({ R }: Torsion, u: ModPolynomial, v: ModPolynomial): boolean {
  const difference = R.ring.sub(u, v);
  if (difference.length === 0) return true;
  const common = R.ring.gcd(difference, R.modulus);
  if (common.length === 1) return false;
  throw new Split(common);
}

function inverse({ R }: Torsion, u: ModPolynomial): ModPolynomial {
  const found = R.inverse(u);
  if ("inverse" in found) return found.inverse;
  throw new Split(found.factor);
}

function add(torsion: Torsion, P: General, Q: General): General {
  if (!P) return Q;
  if (!Q) return P;
  const { R, f, A } = torsion;
  const { ring } = R;
  let slope: ModPolynomial; // over y
  if (same(torsion, P.a, Q.a)) {
    if (!same(torsion, P.b, Q.b)) return undefined;
    // (3a² + A)/(2by) = y (3a² + A)/(2bf)
    const above = ring.add(
      ring.scale(3n, R.mul(P.a, P.a)),
      [A].filter((c) => c !== 0n),
    );
    slope = R.mul(above, inverse(torsion, ring.scale(2n, R.mul(P.b, f))));
  } else {
    slope = R.mul(ring.sub(Q.b, P.b), inverse(torsion, ring.sub(Q.a, P.a)));
  }
  const a = ring.sub(ring.sub(R.mul(R.mul(slope, slope), f), P.a), Q.a);
  return { a, b: ring.sub(R.mul(slope, ring.sub(P.a, a)), P.b) };
}

function multiple(torsion: Torsion, n: bigint, P: General): General {
  let result: General;
  for (const digit of n.toString(2)) {
    result = add(torsion, result, result);
    if (digit === "1") result = add(torsion, result, P);
  }
  return result;
}

/** ψ_l of y² = x³ + Ax + B for odd l, by the recursion with ψ_2 = 2y. Source: Silverman AEC, exercise 3.7. */
function divisionPolynomial({ A, B, p }: ShortCurve, l: number): ModPolynomial {
  const ring = modPolynomials(p);
  const poly = (...c: bigint[]) => ring.add(c, []);
  const mul = (...factors: ModPolynomial[]) => factors.reduce((g, h) => ring.mul(g, h));
  const sixteen = ring.scale(16n, mul(poly(B, A, 0n, 1n), poly(B, A, 0n, 1n)));
  // g_n = ψ_n for odd n and ψ_n/(2y) for even n.
  const known: ModPolynomial[] = [
    [],
    [1n],
    [1n],
    poly(-A * A, 12n * B, 6n * A, 0n, 3n),
    poly(-2n * (8n * B * B + A ** 3n), -8n * A * B, -10n * A * A, 40n * B, 10n * A, 0n, 2n),
  ];
  const g = (n: number): ModPolynomial => {
    const found = known[n];
    if (found) return found;
    const m = n >> 1;
    const value = n % 2 === 1 ? odd(m) : even(m);
    known[n] = value;
    return value;
  };
  const odd = (m: number) => {
    const left = mul(g(m + 2), g(m), g(m), g(m));
    const right = mul(g(m - 1), g(m + 1), g(m + 1), g(m + 1));
    return m % 2 === 0 ? ring.sub(mul(sixteen, left), right) : ring.sub(left, mul(sixteen, right));
  };
  const even = (m: number) => mul(g(m), ring.sub(mul(g(m + 2), g(m - 1), g(m - 1)), mul(g(m - 2), g(m + 1), g(m + 1))));
  return g(l);
}
