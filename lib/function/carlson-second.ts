// Carlson's integral of the second kind: RG.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { closedUnderConjugation, refuseCut } from "./carlson-duplication.ts";
import { carlsonRF } from "./carlson-first.ts";
import { carlsonRD } from "./carlson-third.ts";
import { ontoReal } from "./enclosure.ts";

/**
 * RG(x, y, z) = ¼ ∫_0^∞ (x/(t+x) + y/(t+y) + z/(t+z)) t dt / √((t+x)(t+y)(t+z)).
 *
 * Domain   x, y, z off the negative real axis; any of them may be 0.
 * Branch   as RF.
 * Error    enclosure. For real arguments nothing cancels, since z is taken between x and y; for complex ones the radius shows what does.
 * Cost     an RF and an RD.
 * Throws   as RF.
 * Source   DLMF 19.16.3, 19.21.10: 2 RG = z RF − (x − z)(y − z) RD/3 + √x√y/√z.
 */
export function carlsonRG(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  for (const w of [x, y, z]) refuseCut("RG", w);
  const wp = prec + 16;
  const some = [x, y, z].filter((w) => !disc.isZero(w));
  if (some.length === 0) return disc.zero;
  if (some.length === 1) return disc.ldexp(disc.sqrt(some[0]!, prec + 2), -1);
  const [a, b, c] = middleLast([x, y, z]);
  const value = rgWithLast(a, b, c, wp);
  return closedUnderConjugation([x, y, z], real) ? ontoReal(value) : value;
}

function rgWithLast(x: Disc, y: Disc, z: Disc, wp: number): Disc {
  const product = disc.mul(disc.sub(x, z, wp), disc.sub(z, y, wp), wp);
  const first = disc.mul(z, carlsonRF(x, y, z, wp), wp);
  const second = disc.isZero(product)
    ? disc.zero
    : disc.divBall(disc.mul(product, carlsonRD(x, y, z, wp), wp), { man: 3n, exp: 0, rad: 0 }, wp);
  const roots = disc.mul(disc.sqrt(x, wp), disc.sqrt(y, wp), wp);
  const third = disc.isZero(roots) ? disc.zero : disc.div(roots, disc.sqrt(z, wp), wp);
  return disc.ldexp(disc.add(disc.add(first, second, wp), third, wp), -1);
}

/** The three with the one last that lies between the others (for complex numbers: is nearest to them), and is not 0. */
function middleLast(all: readonly [Disc, Disc, Disc]): readonly [Disc, Disc, Disc] {
  const orders = [0, 1, 2].map((k) => [all[(k + 1) % 3]!, all[(k + 2) % 3]!, all[k]!] as const);
  const size = ([x, y, z]: readonly [Disc, Disc, Disc]) => {
    if (disc.isZero(z)) return Infinity;
    const product = disc.mul(disc.sub(x, z, 53), disc.sub(z, y, 53), 53);
    if (product.axis === "real" && product.re >= 0n) return -Infinity;
    return disc.magnitude(product);
  };
  return orders.reduce((best, next) => (size(next) < size(best) ? next : best));
}
