// Second routes to RD, RG and RJ: relations with others of their kind, for real arguments or wherever the formulas hold as they stand.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { carlsonRC, carlsonRF } from "./carlson-first.ts";
import { carlsonRD, carlsonRJ } from "./carlson-third.ts";

const THREE = { man: 3n, exp: 0, rad: 0 };

/** Refuses what the formula of a second route does not hold for. */
function positive(route: string, all: readonly Disc[]): void {
  if (all.every((x) => x.axis === "real" && x.re >= 0n)) return;
  throw new DomainError({
    subject: route,
    given: "arguments that are not all real and >= 0",
    expected: "real arguments >= 0 for this route",
  });
}

/** RD(x, y, z) = 3/√(xyz) − RD(y, z, x) − RD(z, x, y), root by root. Source DLMF 19.21.8. */
export function rdBySum(x: Disc, y: Disc, z: Disc, prec: number): Disc {
  const wp = prec + 16;
  const roots = [x, y, z].map((w) => disc.sqrt(w, wp)).reduce((p, q) => disc.mul(p, q, wp));
  const others = disc.add(carlsonRD(y, z, x, wp), carlsonRD(z, x, y, wp), wp);
  return disc.sub(disc.div(disc.fromBall(THREE), roots, wp), others, prec);
}

/** 6 RG = Σ x (y + z) RD(y, z, x). Source DLMF 19.21.11. */
export function rgBySum(x: Disc, y: Disc, z: Disc, prec: number): Disc {
  const wp = prec + 16;
  const part = (p: Disc, q: Disc, r: Disc) =>
    disc.isZero(p) ? disc.zero : disc.mul(disc.mul(p, disc.add(q, r, wp), wp), carlsonRD(q, r, p, wp), wp);
  const sum = disc.add(disc.add(part(x, y, z), part(y, z, x), wp), part(z, x, y), wp);
  return disc.divBall(sum, { man: 6n, exp: 0, rad: 0 }, prec);
}

/** (p − x) RJ(p) = 3 RF − 3 RC(yz/x, pq/x) − (q − x) RJ(q) with (p − x)(q − x) = (y − x)(z − x), x the least. Source DLMF 19.21.12. */
export function rjByPartner(x: Disc, y: Disc, z: Disc, p: Disc, prec: number): Disc {
  positive("RJ by its partner", [x, y, z, p]);
  const wp = prec + 48;
  const mul = (a: Disc, b: Disc) => disc.mul(a, b, wp);
  const [low, mid, top] = [x, y, z].sort((a, b) => (disc.sub(a, b, wp).re < 0n ? -1 : 1)) as [Disc, Disc, Disc];
  // The greatest takes the part of x: it is not 0, and q is positive for p beyond it or between the others.
  const [dp, product] = [disc.sub(p, top, wp), mul(disc.sub(low, top, wp), disc.sub(mid, top, wp))];
  const dq = disc.div(product, dp, wp);
  const q = disc.add(top, dq, wp);
  const rc = carlsonRC(disc.div(mul(low, mid), top, wp), disc.div(mul(p, q), top, wp), wp);
  const right = disc.mulInt(disc.sub(carlsonRF(x, y, z, wp), rc, wp), 3, wp);
  const rest = disc.isZero(dq) ? disc.zero : mul(dq, carlsonRJ(x, y, z, q, wp));
  return disc.div(disc.sub(right, rest, wp), dp, prec);
}
