import { add, div, inv, ldexp, mul, round, spread, sub } from "./arithmetic.ts";
import { type Ball, fromInt, isZero, magnitude, one, zero } from "./data.ts";
import { exp } from "./exp.ts";

/**
 * sinh x and cosh x together.
 * Error    through e^x and 1/e^x; a small x gets as many more bits as the difference loses, a very small one the series.
 */
export function sinhCosh(x: Ball, prec: number): { readonly sinh: Ball; readonly cosh: Ball } {
  if (isZero(x)) return { sinh: zero, cosh: one };
  const size = magnitude(x);
  if (size < -2 && -size > prec / 4) return tiny(x, prec);
  const work = prec + 8 + Math.max(0, -size);
  const e = exp(x, work);
  const f = inv(e, work);
  return { sinh: ldexp(sub(e, f, prec), -1), cosh: ldexp(add(e, f, prec), -1) };
}

/** |x| < 2^-2: the terms fall by more than 1/16 each, so the rest is under twice the first left out. */
function tiny(x: Ball, prec: number): { readonly sinh: Ball; readonly cosh: Ball } {
  const work = prec + 8;
  const u = mul(x, x, work);
  const perTerm = -magnitude(u);
  const count = Math.ceil(work / perTerm) + 1;
  let sinh: Ball = one;
  let cosh: Ball = one;
  for (let n = count; n > 0; n--) {
    sinh = add(one, mul(sinh, div(u, fromInt(2 * n * (2 * n + 1)), work), work), work);
    cosh = add(one, mul(cosh, div(u, fromInt(2 * n * (2 * n - 1)), work), work), work);
  }
  const tail = spread(2n, -perTerm * (count + 1));
  return { sinh: round(mul(x, add(sinh, tail, work), work), prec), cosh: add(cosh, tail, prec) };
}

export function sinh(x: Ball, prec: number): Ball {
  return sinhCosh(x, prec).sinh;
}

export function cosh(x: Ball, prec: number): Ball {
  return sinhCosh(x, prec).cosh;
}

/** tanh x; where |x| is large, 1 − 2/(e^(2x) + 1), which never overflows before its bound says so. */
export function tanh(x: Ball, prec: number): Ball {
  if (isZero(x)) return zero;
  if (magnitude(x) < 3) {
    const { sinh: s, cosh: c } = sinhCosh(x, prec + 8);
    return div(s, c, prec);
  }
  if (x.man < 0n) {
    const y = tanh({ man: -x.man, exp: x.exp, rad: x.rad }, prec);
    return { man: -y.man, exp: y.exp, rad: y.rad };
  }
  const e = exp(ldexp(x, 1), prec + 8);
  return sub(one, div(fromInt(2), add(e, one, prec + 8), prec), prec);
}
