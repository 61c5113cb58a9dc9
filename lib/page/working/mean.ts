// The table of an arithmetic-geometric mean of two positive numbers, for a step of a derivation.

import { provedDigits } from "../../number/context.ts";
import type { Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import { table } from "../table.ts";
import { jointly } from "./parts.ts";

/** a and b of each step of the mean until they agree to the digits asked for. */
function steps(a: Real, b: Real): (readonly [number, Real, Real])[] {
  const rows: (readonly [number, Real, Real])[] = [[0, a, b]];
  const least = -(provedDigits() * Math.log2(10)) - 4;
  for (let n = 1; n < 60; n++) {
    const [, x, y] = rows.at(-1)!;
    const [p, q] = [x.plus(y).div(2), x.times(y).sqrt()];
    rows.push([n, p, q]);
    // The next pair differs by about (p − q)²/8p.
    const gap = Math.abs(p.minus(q).toDouble() / p.toDouble());
    if (gap === 0 || Math.log2(gap) < least / 2) {
      rows.push([n + 1, p.plus(q).div(2), p.times(q).sqrt()]);
      break;
    }
  }
  return rows;
}

/**
 * The table of a mean with c_n, c_n² = a_n² − b_n², by its own recursion c_(n+1) = c_n²/4a_(n+1): the rows are checked by the
 * identity, which no step of the mean uses.
 */
export function mean({ a, b }: { readonly a: Real; readonly b: Real }) {
  const rows = steps(a, b);
  const c = [a.pow(2).minus(b.pow(2)).sqrt()];
  for (const [, next] of rows.slice(1)) c.push(c.at(-1)!.pow(2).div(next.times(4)));
  const checks = rows.map(([, p, q], n) => standingOf(q.pow(2).plus(c[n]!.pow(2)), "=", p.pow(2)));
  return {
    value: table(
      // The differences need few digits.
      rows.map(([n, p, q], k) => [n, p, q, c[k]!.exact ? c[k] : c[k]!.digits(8)]),
      { columns: ["$n$", "$a_n$", "$b_n$", "$c_n$"] },
    ),
    trace: true,
    check: jointly(...checks),
    route: "$a_n^2 = b_n^2 + c_n^2$ in every row, with $c_{n+1} = c_n^2/4a_{n+1}$ by itself",
  };
}
