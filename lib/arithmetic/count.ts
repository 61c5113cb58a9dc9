// Points of a curve over F_p by plain counting, for small p: the arithmetic is in doubles below 2^53.

import type { IntegerModel } from "./minimal.ts";

/** Residues of integers modulo a small prime. */
export function residues(a: IntegerModel, p: number): number[] {
  const P = BigInt(p);
  return a.map((c) => Number(((c % P) + P) % P));
}

/**
 * The number of projective points of y² + a1xy + a3y = x³ + a2x² + a4x + a6 over F_p, the singular one counted once if
 * the reduction is singular, by the quadratic character of 4x³ + b2x² + 2b4x + b6.
 * Cost     O(p) steps.
 */
export function countPlainly(a: IntegerModel, p: number): number {
  const [a1, a2, a3, a4, a6] = residues(a, p) as [number, number, number, number, number];
  if (p === 2) return countOverTwo(a1, a2, a3, a4, a6);
  const b2 = (a1 * a1 + 4 * a2) % p;
  const b4 = (a1 * a3 + 2 * a4) % p;
  const b6 = (a3 * a3 + 4 * a6) % p;
  const roots = squareCounts(p);
  let count = 1;
  for (let x = 0; x < p; x++) {
    const value = ((((4 * x + b2) % p) * x + 2 * b4) % p) * x + b6;
    count += roots[value % p]!;
  }
  return count;
}

/** How many square roots each residue has. */
function squareCounts(p: number): Uint8Array {
  const counts = new Uint8Array(p);
  counts[0] = 1;
  for (let y = 1; y <= p >> 1; y++) counts[(y * y) % p] = 2;
  return counts;
}

function countOverTwo(a1: number, a2: number, a3: number, a4: number, a6: number): number {
  let count = 1;
  for (let x = 0; x < 2; x++) {
    for (let y = 0; y < 2; y++) {
      if ((y * y + a1 * x * y + a3 * y + x * x * x + a2 * x * x + a4 * x + a6) % 2 === 0) count++;
    }
  }
  return count;
}
