// #E(F_p): plain counting for small p, baby and giant steps on E and its twist beyond, with traces modulo small primes for large p.

import { factorInteger, type PrimePower } from "../algebra/factor.ts";
import { integerSqrt, lcm, modulo } from "../algebra/integer.ts";
import { quadraticCharacter } from "../algebra/primefield.ts";
import { primesUpTo } from "../algebra/primes.ts";
import { countPlainly } from "./count.ts";
import { addMod, addToAll, type ModCurve, type ModPoint, multiplyMod, negateMod, pointFrom } from "./group-fp.ts";
import type { IntegerModel } from "./minimal.ts";
import { traceModulo } from "./schoof.ts";

/** Below this plain counting takes a few milliseconds, about as long as the steps. */
const PLAIN = 200_000n;

/** Above this the trace modulo small primes comes first: the steps alone would be 3·2^17 additions and as many stored points. */
const STEPS_ALONE = 1n << 66n;

/**
 * The number of points of a nonsingular reduction, proved.
 *
 * Method   p < 200,000: plain counting. Below 2^66, by Mestre's theorem, E or its quadratic twist has a point whose order leaves one
 *          candidate in Hasse's interval; points of both are tried by baby and giant steps until one candidate is left. Above, the trace
 *          modulo small primes by Schoof's algorithm leaves 2^36 candidates or fewer to the steps.
 * Cost     about 3 p^(1/4) additions: some 100,000 for p near 2^60. Seconds at 100 bits, a minute or so at 160; minutes beyond.
 * Source   Schoof, Counting points on elliptic curves over finite fields (1995), sections 3 and 5; Cohen 7.4.3.
 */
export function countPoints(a: IntegerModel, p: bigint): bigint {
  if (p < PLAIN) return BigInt(countPlainly(a, Number(p)));
  return p < STEPS_ALONE ? countBySteps(a, p) : countByTraces(a, p);
}

/** Candidates that are left to the steps after Schoof's algorithm. */
const LEFT_TO_STEPS = 1n << 36n;

/** #E(F_p) from t modulo small primes, and steps for the rest; for p above some hundred. */
export function countByTraces(a: IntegerModel, p: bigint, left = LEFT_TO_STEPS): bigint {
  const E = shortModel(a, p);
  const short = { A: E.a[3], B: E.a[4], p };
  const bound = integerSqrt(4n * p) + 1n; // |t| <= 2√p
  let [t, modulus] = [0n, 1n];
  for (const l of primesUpTo(1000)) {
    if (2n * bound < modulus * left) break;
    const L = BigInt(l);
    if (L === p) continue;
    const residue = traceModulo(short, l);
    while (modulo(t, L) !== residue) t += modulus;
    modulus *= L;
  }
  // t = t0 + k·modulus with |t| <= bound.
  const lowest = t - modulus * ((t + bound) / modulus);
  const count = (2n * bound) / modulus + 1n;
  if (count === 1n) return p + 1n - lowest;
  for (let x = 1n; ; x += 7919n) {
    const found = residualTraces(E, pointFrom(E, x), lowest, modulus, count);
    if (found.length === 1) return p + 1n - found[0]!;
  }
}

/** All t = t0 + k·m, 0 <= k <= count, with (p + 1 − t)P = O, at most two of them: baby and giant steps over the whole range. */
function residualTraces(curve: ModCurve, P: ModPoint, t0: bigint, m: bigint, count: bigint): bigint[] {
  const s = integerSqrt(count) / 2n + 1n;
  const step = multiplyMod(curve, m, P);
  const table = babySteps(curve, step, s);
  if (table.killed !== undefined) return []; // a point of small order tells too little
  const stride = 2n * s + 1n;
  const giant = multiplyMod(curve, stride, step);
  const start = multiplyMod(curve, curve.p + 1n - t0, P);
  const rounds = count / stride + 2n;
  let points = chain(curve, start, negateMod(curve, giant), BLOCK);
  const jump = multiplyMod(curve, -BigInt(BLOCK), giant);
  const found = new Set<bigint>();
  for (let k = 0n; k <= rounds && found.size < 2; k += BigInt(BLOCK)) {
    points.forEach((Q, l) => {
      const j = Q ? table.index.get(Q[0]) : 0;
      if (j === undefined) return;
      const centre = (k + BigInt(l)) * stride;
      for (const n of new Set([centre + BigInt(j), centre - BigInt(j)])) {
        const t = t0 + n * m;
        if (n >= 0n && n <= count && multiplyMod(curve, curve.p + 1n - t, P) === undefined) found.add(t);
      }
    });
    points = addToAll(curve, points, jump);
  }
  return [...found];
}

/** #E(F_p) by steps on points of E and its twist; for p above some hundred. */
export function countBySteps(a: IntegerModel, p: bigint): bigint {
  const E = shortModel(a, p);
  const twist = twistOf(E);
  const width = 2n * integerSqrt(p) + 2n;
  const [low, high] = [p + 1n - width, p + 1n + width];
  let [orders, twistOrders] = [1n, 1n];
  for (let k = 0n; ; k++) {
    const onTwist = k % 2n === 1n;
    const curve = onTwist ? twist : E;
    const P = pointFrom(curve, 1n + k * k * 7919n);
    const multiple = annihilator(curve, P, width);
    const order = orderDividing(curve, P, multiple);
    if (onTwist) twistOrders = lcm(twistOrders, order);
    else orders = lcm(orders, order);
    const candidates = matching(low, high, p, orders, twistOrders);
    if (candidates.length === 1) return candidates[0]!;
  }
}

/** y² = x³ − 27c4 x − 54c6 modulo p > 3. */
function shortModel([a1, a2, a3, a4, a6]: IntegerModel, p: bigint): ModCurve {
  const b2 = a1 * a1 + 4n * a2;
  const b4 = a1 * a3 + 2n * a4;
  const b6 = a3 * a3 + 4n * a6;
  const c4 = b2 * b2 - 24n * b4;
  const c6 = -(b2 ** 3n) + 36n * b2 * b4 - 216n * b6;
  return { a: [0n, 0n, 0n, modulo(-27n * c4, p), modulo(-54n * c6, p)], p };
}

function twistOf({ a: [, , , A, B], p }: ModCurve): ModCurve {
  let d = 2n;
  while (quadraticCharacter(d, p) !== -1) d++;
  return { a: [0n, 0n, 0n, (A * d * d) % p, (((B * d * d) % p) * d) % p], p };
}

/** A positive n within `width` of p + 1 with nP = O: (p + 1)P = tP, t = k(2s + 1) ± j by a table of jP. */
function annihilator(curve: ModCurve, P: ModPoint, width: bigint): bigint {
  const { p } = curve;
  const s = integerSqrt(width) + 1n;
  const table = babySteps(curve, P, s);
  if (table.killed !== undefined) return BigInt(table.killed);
  const stride = 2n * s + 1n;
  const step = multiplyMod(curve, stride, P);
  const blocks = (width / stride + 2n) * 2n;
  const start = -(blocks / 2n);
  // (p + 1)P − k·stride·P for k = start, start + 1, ... compared with ±jP.
  const first = addMod(curve, multiplyMod(curve, p + 1n, P), multiplyMod(curve, -start * stride, P));
  let points = chain(curve, first, multiplyMod(curve, -1n, step), BLOCK);
  const jump = multiplyMod(curve, -BigInt(BLOCK), step);
  for (let k = start; ; k += BigInt(BLOCK)) {
    for (let l = 0; l < BLOCK; l++) {
      const Q = points[l];
      const j = Q ? table.index.get(Q[0]) : 0;
      if (j === undefined) continue;
      const base = p + 1n - (k + BigInt(l)) * stride;
      const n = j === 0 ? base : matchSign(curve, P, base, BigInt(j));
      if (n !== undefined && n > 0n) return n;
    }
    points = addToAll(curve, points, jump);
  }
}

function matchSign(curve: ModCurve, P: ModPoint, base: bigint, j: bigint): bigint | undefined {
  return [base - j, base + j].find((n) => multiplyMod(curve, n, P) === undefined);
}

const BLOCK = 256;

/** Q, Q + D, ..., one by one. */
function chain(curve: ModCurve, Q: ModPoint, D: ModPoint, length: number): ModPoint[] {
  const list: ModPoint[] = [Q];
  while (list.length < length) list.push(addMod(curve, list.at(-1), D));
  return list;
}

interface StepTable {
  /** j by the abscissa of jP. */
  readonly index: ReadonlyMap<bigint, number>;
  /** The least j > 0 met with jP = O. */
  readonly killed: number | undefined;
}

/** Abscissas of jP for 0 < j <= s. */
function babySteps(curve: ModCurve, P: ModPoint, s: bigint): StepTable {
  const index = new Map<bigint, number>();
  let killed: number | undefined;
  let points = chain(curve, P, P, BLOCK);
  const jump = multiplyMod(curve, BigInt(BLOCK), P);
  for (let start = 1; start <= s && killed === undefined; start += BLOCK) {
    points.forEach((Q, k) => {
      if (!Q) killed ??= start + k;
      else if (!index.has(Q[0])) index.set(Q[0], start + k);
    });
    points = addToAll(curve, points, jump);
  }
  return { index, killed };
}

/** The order of P, given a multiple of it. */
export function orderDividing(
  curve: ModCurve,
  P: ModPoint,
  multiple: bigint,
  factors = factorInteger(multiple),
): bigint {
  let order = multiple;
  for (const { prime, exponent } of factors as PrimePower[]) {
    for (let k = 0; k < exponent && multiplyMod(curve, order / prime, P) === undefined; k++) order /= prime;
  }
  return order;
}

/** The N in the interval that both group exponents allow; stops after two. */
function matching(low: bigint, high: bigint, p: bigint, orders: bigint, twistOrders: bigint): bigint[] {
  const found: bigint[] = [];
  for (let n = low + modulo(-low, orders); n <= high && found.length < 2; n += orders) {
    if ((2n * p + 2n - n) % twistOrders === 0n) found.push(n);
    if (orders < 1000n && (high - low) / orders > 100_000n) return [low, high]; // hopeless: more points are needed
  }
  return found;
}
