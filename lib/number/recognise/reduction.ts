import { Rational } from "../rational.ts";

export type Vector = readonly bigint[];

/**
 * An LLL-reduced basis (δ = 3/4) of the lattice that the independent integer vectors span; for a handful of vectors.
 * Source   A. K. Lenstra, H. W. Lenstra, L. Lovász, Factoring polynomials with rational coefficients, Math. Ann. 261 (1982), 515-534, in
 *          integers only: d_i are the Gram determinants and λ_ij = d_j μ_ij (de Weger 1989).
 */
export function reducedBasis(vectors: readonly Vector[]): Vector[] {
  const b = vectors.map((v) => [...v]);
  const n = b.length;
  let { d, lambda } = gram(b);
  let k = 1;
  while (k < n) {
    reduceBy(b, d, lambda, k, k - 1);
    if (lovasz(d, lambda, k)) {
      for (let l = k - 2; l >= 0; l--) reduceBy(b, d, lambda, k, l);
      k++;
    } else {
      [b[k - 1], b[k]] = [b[k]!, b[k - 1]!];
      ({ d, lambda } = gram(b));
      k = Math.max(1, k - 1);
    }
  }
  return b;
}

interface Gram {
  /** d[i + 1] is the Gram determinant of the first i + 1 vectors; d[0] = 1. */
  readonly d: bigint[];
  readonly lambda: bigint[][];
}

function gram(b: readonly bigint[][]): Gram {
  const n = b.length;
  const d = [1n];
  const lambda: bigint[][] = b.map(() => new Array<bigint>(n).fill(0n));
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let u = dot(b[i]!, b[j]!);
      for (let k = 0; k < j; k++) u = (d[k + 1]! * u - lambda[i]![k]! * lambda[j]![k]!) / d[k]!;
      if (j < i) lambda[i]![j] = u;
      else d[i + 1] = u;
    }
  }
  return { d, lambda };
}

function dot(x: Vector, y: Vector): bigint {
  return x.reduce((sum, value, k) => sum + value * y[k]!, 0n);
}

/** Takes the nearest multiple of vector l off vector k. */
function reduceBy(b: bigint[][], d: readonly bigint[], lambda: bigint[][], k: number, l: number): void {
  if (2n * abs(lambda[k]![l]!) <= d[l + 1]!) return;
  const q = Rational.of(lambda[k]![l]!, d[l + 1]!).round();
  b[k] = b[k]!.map((value, c) => value - q * b[l]![c]!);
  lambda[k]![l]! -= q * d[l + 1]!;
  for (let j = 0; j < l; j++) lambda[k]![j]! -= q * lambda[l]![j]!;
}

/** d_{k+1} d_{k−1} >= (3/4) d_k² − λ². */
function lovasz(d: readonly bigint[], lambda: readonly bigint[][], k: number): boolean {
  return 4n * d[k + 1]! * d[k - 1]! >= 3n * d[k]! * d[k]! - 4n * lambda[k]![k - 1]! * lambda[k]![k - 1]!;
}

function abs(n: bigint): bigint {
  return n < 0n ? -n : n;
}
