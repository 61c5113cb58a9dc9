import { BranchError } from "../../proof/errors.ts";
import { agm as ballAgm } from "../ball/agm.ts";
import { fromInt, sign } from "../ball/data.ts";
import { add, conj, div, ldexp, mul, neg, round, sqr, sub, widenBy } from "./arithmetic.ts";
import { along, bits, type Disc, fromBall, isZero, magnitude, one, real, zero } from "./data.ts";
import { sqrt } from "./elementary.ts";

/** b_1 .. b_4 of the real routine, times 2^14. */
const TAIL: readonly number[] = [4096, 1280, 704, 469];

/**
 * Arithmetic-geometric mean of two complex numbers with the right choice of every root: |a' − b'| <= |a' + b'|, and
 * Im(b'/a') > 0 in the tie, which occurs only for b/a < 0.
 *
 * Domain   any; 0 if a, b or a + b is exactly 0.
 * Branch   in b/a, along the negative real axis; a tie that both enclosures leave open throws BranchError.
 * Error    discs throughout; the tail as for real numbers, since it is bounded by the absolute values of its terms.
 * Source   D. A. Cox, The arithmetic-geometric mean of Gauss, L'Enseignement Math. 30 (1984), section 2.
 */
export function agm(a: Disc, b: Disc, prec: number): Disc {
  if (isZero(a) || isZero(b)) return zero;
  if (a.axis === "real" && b.axis === "real" && sign(along(a)) === 1 && sign(along(b)) === 1) {
    return fromBall(ballAgm(along(a), along(b), prec));
  }
  const work = prec + 20;
  let x = round(a, work);
  let y = round(b, work);
  for (;;) {
    const sum = add(x, y, work);
    const difference = sub(x, y, work);
    if (isZero(sum)) return zero;
    if (isZero(difference)) return round(x, prec);
    const near = magnitude(sum) - 1 - magnitude(difference);
    if (near >= 2 && (10 * near > work || near > Math.min(bits(x), bits(y)) - 6))
      return closed(sum, difference, work, prec);
    const mean = ldexp(sum, -1);
    y = rightRoot(x, y, mean, work);
    x = mean;
  }
}

function rightRoot(x: Disc, y: Disc, mean: Disc, work: number): Disc {
  const root = sqrt(mul(x, y, work), work, { cut: "continuous" });
  // A few bits decide, as a rule.
  const rough = sign(real(mul(round(root, 40), conj(round(mean, 40)), 40)));
  if (rough !== undefined && rough !== 0) return rough === 1 ? root : neg(root);
  const product = mul(root, conj(mean), work);
  const choice = sign(real(product));
  if (choice === 1) return root;
  if (choice === -1) return neg(root);
  // The ratio b'/a' is exactly imaginary: take the upper half plane.
  if (product.axis === "imaginary" && sign(along(product)) !== undefined)
    return sign(along(product)) === 1 ? root : neg(root);
  throw new BranchError({
    subject: "agm",
    given: "enclosures that leave open which root is the right one",
    expected: "b/a away from the negative real axis",
    hint: "Sharper arguments may do.",
  });
}

/** (a + b)/2 · agm(1 + z, 1 − z) with z = (a − b)/(a + b). */
function closed(sum: Disc, difference: Disc, work: number, prec: number): Disc {
  const z = div(difference, sum, work);
  const u = sqr(z, work);
  let series: Disc = zero;
  for (let n = TAIL.length - 1; n >= 0; n--) {
    series = mul(u, add(ldexp(fromBall(fromInt(TAIL[n]!)), -14), series, work), work);
  }
  const rest = { man: 1n, exp: 10 * magnitude(z), rad: 0 };
  const axial = z.axis !== "plane";
  return round(mul(ldexp(sum, -1), widenBy(sub(one, series, work), rest, work, axial), work), prec);
}
