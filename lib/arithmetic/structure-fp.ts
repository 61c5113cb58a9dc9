// The group E(F_p) as Z/n1 × Z/n2 with generators, and discrete logarithms in it.

import { factorInteger } from "../algebra/factor.ts";
import { integerSqrt, modulo } from "../algebra/integer.ts";
import { addMod, type ModCurve, type ModPoint, multiplyMod, pointFrom } from "./group-fp.ts";

/** E(F_p) = Z/n1 × Z/n2 with n1 | n2; n1 = 1 for a cyclic group. */
export interface FiniteGroup {
  readonly n1: bigint;
  readonly n2: bigint;
}

/**
 * The structure of a group of known order, proved: for each prime l with l² | N and l | p − 1 points are gathered until they
 * generate the l-part.
 * Cost     √l steps for each such l; in all other cases the l-part is cyclic.
 * Source   the l-part is not cyclic only if l | p − 1, by the Weil pairing (Silverman AEC III.8.1.1).
 */
export function groupStructure(curve: ModCurve, count: bigint): FiniteGroup {
  let n1 = 1n;
  for (const { prime, exponent } of factorInteger(count)) {
    if (exponent < 2 || (curve.p - 1n) % prime !== 0n) continue;
    n1 *= prime ** BigInt(smallerExponent(curve, count, prime, exponent));
  }
  return { n1, n2: count / n1 };
}

/** b with l-part Z/l^b × Z/l^(e−b), b <= e − b. */
function smallerExponent(curve: ModCurve, count: bigint, l: bigint, e: number): number {
  const cofactor = count / l ** BigInt(e);
  let best: ModPoint;
  let a = 0;
  let b = 0;
  for (let k = 0n; a + b < e; k++) {
    const R = multiplyMod(curve, cofactor, pointFrom(curve, 1n + k * 104729n));
    const order = exponentOf(curve, R, l);
    if (order > a) {
      // A longer generator: what the other part was is found anew.
      [best, a, b] = [R, order, 0];
      continue;
    }
    b = Math.max(b, exponentModulo(curve, R, best, l, a));
  }
  return Math.min(a, b);
}

/** k with order l^k. */
function exponentOf(curve: ModCurve, R: ModPoint, l: bigint): number {
  let k = 0;
  for (let Q = R; Q; Q = multiplyMod(curve, l, Q)) k++;
  return k;
}

/** The least k with l^k R a multiple of G, which has order l^a. */
function exponentModulo(curve: ModCurve, R: ModPoint, G: ModPoint, l: bigint, a: number): number {
  let k = 0;
  for (let Q = R; logarithmInPrimePower(curve, Q, G, l, a) === undefined; Q = multiplyMod(curve, l, Q)) k++;
  return k;
}

/** m with Q = mG for G of order l^a, or undefined; digit by digit in base l. Source: Pohlig and Hellman. */
function logarithmInPrimePower(curve: ModCurve, Q: ModPoint, G: ModPoint, l: bigint, a: number): bigint | undefined {
  const top = multiplyMod(curve, l ** BigInt(a - 1), G);
  let m = 0n;
  for (let k = 0; k < a; k++) {
    const rest = addMod(curve, Q, multiplyMod(curve, -m, G));
    const digit = logarithmBySteps(curve, multiplyMod(curve, l ** BigInt(a - 1 - k), rest), top, l);
    if (digit === undefined) return undefined;
    m += digit * l ** BigInt(k);
  }
  return multiplyMod(curve, m, G)?.join() === Q?.join() ? m : undefined;
}

/** m in [0, order) with Q = mG, by baby and giant steps, or undefined. */
function logarithmBySteps(curve: ModCurve, Q: ModPoint, G: ModPoint, order: bigint): bigint | undefined {
  const s = integerSqrt(order) + 1n;
  const table = new Map<string, bigint>();
  let R: ModPoint;
  for (let j = 0n; j < s; j++) {
    table.set(R ? `${R[0]},${R[1]}` : "O", j);
    R = addMod(curve, R, G);
  }
  const step = multiplyMod(curve, -s, G);
  let P = Q;
  for (let k = 0n; k <= s; k++) {
    const j = table.get(P ? `${P[0]},${P[1]}` : "O");
    if (j !== undefined) return modulo(k * s + j, order);
    P = addMod(curve, P, step);
  }
  return undefined;
}

/**
 * m with Q = mP, the least not negative, or undefined if Q is no multiple of P.
 * Cost     √l steps for the largest prime l that divides the order of P.
 * Source   Pohlig and Hellman 1978, Shanks 1971.
 */
export function discreteLogarithm(curve: ModCurve, Q: ModPoint, P: ModPoint, order: bigint): bigint | undefined {
  let [m, modulus] = [0n, 1n];
  for (const { prime, exponent } of factorInteger(order)) {
    const part = prime ** BigInt(exponent);
    const cofactor = order / part;
    const digit = logarithmInPrimePower(
      curve,
      multiplyMod(curve, cofactor, Q),
      multiplyMod(curve, cofactor, P),
      prime,
      exponent,
    );
    if (digit === undefined) return undefined;
    // Chinese remainders, one at a time.
    while (m % part !== digit) m += modulus;
    modulus *= part;
  }
  return multiplyMod(curve, m, P)?.join() === Q?.join() ? m : undefined;
}
