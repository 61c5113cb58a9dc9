// Jacobi's functions by theta functions at τ = iK′/K: the second route.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { type JacobiLetter, type JacobiName, jacobiValues, quarterPeriod } from "./jacobi-values.ts";
import type { Modulus } from "./legendre-mean.ts";
import { type ThetaIndex, thetaJet } from "./theta-values.ts";

const INDEX: Readonly<Record<JacobiLetter, ThetaIndex>> = { s: 1, c: 2, d: 3, n: 4 };

/**
 * pq(u | m) as a quotient of σ_s = 2K θ1(v)/θ1′(0) and σ_x = θ_j(v)/θ_j(0), v = u/2K.
 *
 * Domain, Error, Throws   as jacobiValues.
 * Cost     six theta functions.
 * Source   DLMF 22.2.4–22.2.9.
 */
export function jacobiByTheta(name: JacobiName, u: Disc, modulus: Modulus, prec: number): Disc {
  const { m, m1 } = modulus;
  const wp = prec + 32 + 2 * Math.max(0, disc.magnitude(u));
  if (disc.isZero(m) || disc.isZero(m1) || disc.isZero(u)) return jacobiValues([name], u, modulus, prec)[0]!;
  const period = disc.ldexp(quarterPeriod(m1, wp), 1);
  const tau = disc.mulI(disc.div(disc.ldexp(quarterPeriod(m, wp), 1), period, wp));
  const v = disc.div(u, period, wp);
  const sigma = (letter: JacobiLetter): Disc => {
    const j = INDEX[letter];
    const order = j === 1 ? 1 : 0;
    const [value, atZero] = [thetaJet(j, v, tau, 0, wp)[0]!, thetaJet(j, disc.zero, tau, order, wp)[order]!];
    const quotient = disc.div(value, atZero, wp);
    return j === 1 ? disc.mul(quotient, period, wp) : quotient;
  };
  const [p, q] = [...name] as [JacobiLetter, JacobiLetter];
  return disc.div(sigma(p), sigma(q), prec);
}

/** (pq)′ = κ rq tq with r, t the other two letters: κ = 1 for p = s, −1 for q = s, and ±1, ±m, ±m1 else. Source DLMF 22.13.1. */
export function jacobiSlope(name: JacobiName, u: Disc, modulus: Modulus, prec: number): Disc {
  const [p, q] = [...name] as [JacobiLetter, JacobiLetter];
  const others = (["s", "c", "d", "n"] as const).filter((x) => x !== p && x !== q);
  const [x, y] = jacobiValues(
    others.map((r): JacobiName => `${r}${q}`),
    u,
    modulus,
    prec + 4,
  ) as [Disc, Disc];
  return disc.mul(factorOf(name, modulus), disc.mul(x, y, prec + 4), prec);
}

function factorOf(name: JacobiName, { m, m1 }: Modulus): Disc {
  if (name[0] === "s") return disc.one;
  if (name[1] === "s" || name === "cn") return disc.neg(disc.one);
  if (name === "nc") return disc.one;
  if (name === "dn") return disc.neg(m);
  if (name === "nd") return m;
  return name === "dc" ? m1 : disc.neg(m1);
}
