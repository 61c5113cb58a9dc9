// Reading a polynomial in two letters as a long Weierstrass equation, rescaled if it is α y² + ... = δ x³ + ...

import { divide, type Field, square } from "../../algebra/field.ts";
import { coefficient, type Polynomial, unpack } from "../../algebra/multivariate.ts";
import type { Coefficients } from "../weierstrass.ts";

export interface LongForm<T> {
  readonly a: Coefficients<T>;
  /** The letters that play x and y. */
  readonly letters: readonly [string, string];
  /** x = scaleX·X, y = scaleY·Y from the equation as given to the long form; both 1 if nothing was rescaled. */
  readonly scaleX: T;
  readonly scaleY: T;
}

/**
 * The long form of α y² + β xy + γ y = δ x³ + ε x² + ζ x + η, in whichever letter is the cubic one.
 *
 * With k = δ/α: if k = m² then x = X, y = mY, which keeps x (m = 2 for y² = 4x³ − g2 x − g3, and dx/y becomes dX/2Y);
 * otherwise x = X/k, y = Y/k. Undefined if the polynomial has another shape.
 */
export function longForm<T>(F: Field<T>, f: Polynomial<T>): LongForm<T> | undefined {
  const [p, q] = f.variables;
  if (f.variables.length !== 2 || p === undefined || q === undefined) return undefined;
  for (const [x, y] of [[p, q] as const, [q, p] as const]) {
    const form = longFormIn(F, f, x, y);
    if (form) return form;
  }
  return undefined;
}

const SHAPE = [
  [0, 2],
  [1, 1],
  [0, 1],
  [3, 0],
  [2, 0],
  [1, 0],
  [0, 0],
] as const;

function longFormIn<T>(F: Field<T>, f: Polynomial<T>, x: string, y: string): LongForm<T> | undefined {
  const flipped = f.variables[0] !== x;
  const order = (i: number, j: number) => (flipped ? [j, i] : [i, j]);
  const fits = [...f.terms.keys()].every((key) => {
    const [i, j] = order(...(unpack(key, 2) as [number, number]));
    return SHAPE.some(([k, l]) => k === i && l === j);
  });
  if (!fits) return undefined;
  const at = (i: number, j: number) => coefficient(F, f, order(i, j));
  const alpha = at(0, 2);
  const delta = F.neg(at(3, 0));
  if (F.isZero(alpha) || F.isZero(delta)) return undefined;
  const { scaleX, scaleY } = scalesOf(F, divide(F, delta, alpha));
  // Put x = scaleX·X, y = scaleY·Y and divide by α·scaleY², the coefficient of Y².
  const unit = F.inv(F.mul(alpha, square(F, scaleY)));
  const term = (i: number, j: number, factor: T) => F.mul(unit, F.mul(at(i, j), factor));
  const a: Coefficients<T> = [
    term(1, 1, F.mul(scaleX, scaleY)),
    F.neg(term(2, 0, square(F, scaleX))),
    term(0, 1, scaleY),
    F.neg(term(1, 0, scaleX)),
    F.neg(term(0, 0, F.one)),
  ];
  return { a, letters: [x, y], scaleX, scaleY };
}

function scalesOf<T>(F: Field<T>, k: T): { readonly scaleX: T; readonly scaleY: T } {
  const m = F.sqrt(k);
  if (m !== undefined) return { scaleX: F.one, scaleY: m };
  const scaleX = F.inv(k);
  return { scaleX, scaleY: scaleX };
}
