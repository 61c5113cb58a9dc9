// Inverses of the twelve Jacobi functions by Carlson's RF.
//
// u = sn·RF(cn², dn², 1), with x = pq(u) put in and a common factor taken out of the three arguments (DLMF 19.25.30–31, 22.15(ii)).
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { carlsonRF, duplicatedRF } from "./carlson-first.ts";
import type { JacobiName } from "./jacobi-values.ts";
import { completeK, type Modulus } from "./legendre-complete.ts";

/** The functions with a zero at 0 or the value 1 there; the other six are their reciprocals. */
type Principal = "sn" | "sc" | "sd" | "cn" | "dn" | "cd";

const RECIPROCAL: Readonly<Record<string, Principal>> = { ns: "sn", cs: "sc", ds: "sd", nc: "cn", nd: "dn", dc: "cd" };

/**
 * The u with pq(u | m) = x that the principal roots single out: for 0 < m < 1 and real x in the range of pq on the real line, u in [−K, K] for
 * sn, sc, sd and their reciprocals, in [0, 2K] for cn and cd and theirs, in [0, K] for dn and nd.
 *
 * Domain   x and m such that the three arguments of RF stay off the negative real axis.
 * Branch   principal roots; f(−x) = −f(x) for the odd ones, f(−x) = 2K − f(x) for cn, cd and Re x < 0. Cuts where an argument of RF is negative; for cn and cd
 *          the imaginary axis near 0 is none.
 * Error    enclosure, relative where no root is near its zero.
 * Cost     an RF, and K for Re x < 0 in cn and cd.
 * Throws   DomainError where an argument of RF is a negative real number, BranchError for discs that meet the cut.
 * Source   DLMF 22.15(ii), 19.25.30.
 */
export function jacobiInverse(name: JacobiName, x: Disc, k: Modulus, prec: number, by = CARLSON): Disc {
  const base = RECIPROCAL[name];
  if (base) return principalInverse(base, disc.inv(x, prec + 16), k, prec, by);
  return principalInverse(name as Principal, x, k, prec, by);
}

/** The integrals that an inverse is made of. */
export interface Integrals {
  readonly rf: (x: Disc, y: Disc, z: Disc, prec: number) => Disc;
  readonly quarter: (k: Modulus, prec: number) => Disc;
}

const CARLSON: Integrals = { rf: carlsonRF, quarter: completeK };

function principalInverse(name: Principal, x: Disc, k: Modulus, prec: number, by: Integrals): Disc {
  const wp = prec + 16;
  const even = name === "cn" || name === "cd";
  if (even && x.re < 0n) {
    const rest = principalInverse(name, disc.neg(x), k, wp, by);
    return disc.sub(disc.ldexp(by.quarter(k, wp), 1), rest, prec + 2);
  }
  const { front, squares } = parts(name, x, k, wp);
  if (disc.isZero(front)) return disc.zero;
  // cn and cd are analytic across the imaginary axis, where the first argument of RF is negative but its root x (or k′x) lies on the rim that duplications take.
  if (even && x.axis === "imaginary" && !disc.isZero(x)) {
    for (const s of squares.slice(1)) refuse(name, s);
    const [second, third] = squares.slice(1).map((s) => disc.sqrt(s, wp)) as [Disc, Disc];
    const first = name === "cn" ? x : disc.mul(x, disc.sqrt(k.m1, wp), wp);
    return disc.mul(front, duplicatedRF([first, second, third], wp, squares), prec + 2);
  }
  for (const s of squares) refuse(name, s);
  return disc.mul(front, by.rf(...squares, wp), prec + 2);
}

interface Parts {
  readonly front: Disc;
  readonly squares: readonly [Disc, Disc, Disc];
}

function parts(name: Principal, x: Disc, { m, m1 }: Modulus, wp: number): Parts {
  const square = disc.sqr(x, wp);
  const mul = (a: Disc, b: Disc) => disc.mul(a, b, wp);
  const more = (a: Disc) => disc.add(disc.one, a, wp);
  const less = (a: Disc) => disc.sub(disc.one, a, wp);
  const complement = mul(less(x), more(x));
  const root = () => {
    refuse(name, complement);
    return disc.sqrt(complement, wp);
  };
  switch (name) {
    case "sn":
      return { front: x, squares: [complement, less(mul(m, square)), disc.one] };
    case "sc":
      return { front: x, squares: [disc.one, more(mul(m1, square)), more(square)] };
    case "sd":
      return { front: x, squares: [less(mul(m1, square)), disc.one, more(mul(m, square))] };
    case "cn":
      return { front: root(), squares: [square, disc.add(m1, mul(m, square), wp), disc.one] };
    case "dn":
      return { front: root(), squares: [disc.sub(square, m1, wp), mul(m, square), m] };
    case "cd":
      return { front: root(), squares: [mul(m1, square), m1, less(mul(m, square))] };
  }
}

function refuse(name: string, square: Disc): void {
  if (square.axis !== "real" || !(square.re < 0n) || disc.containsZero(square)) return;
  throw new DomainError({
    subject: `inverse ${name}`,
    given: `a real number outside the values of ${name} on the real line`,
    expected: "a value that the function takes there",
    hint: "A complex argument beside it says which side of the branch cut is meant.",
    argument: "x",
  });
}
