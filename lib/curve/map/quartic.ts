// y² = quartic with a rational point as a long Weierstrass model, with the maps there and back.

import { divide, type Field, fraction, scale, square } from "../../algebra/field.ts";
import {
  add,
  fromTerms,
  multiply,
  type Polynomial,
  raise,
  scaleBy,
  subtract,
  variable,
} from "../../algebra/multivariate.ts";
import type { Coefficients } from "../weierstrass.ts";
import { composeMaps, type FormMap } from "./map.ts";
import type { Coordinates, Model } from "./model.ts";
import { weierstrassModel } from "./weierstrassmodel.ts";

/** [a, b, c, d, e] of a x⁴ + b x³ + c x² + d x + e. */
export type QuarticCoefficients<T> = readonly [T, T, T, T, T];

/** y² = a x⁴ + b x³z + ... + e z⁴ with y of weight two: smooth also over z = 0. */
export function quarticModel<T>(
  F: Field<T>,
  q: QuarticCoefficients<T>,
  letters: readonly [string, string] = ["x", "y"],
): Model<T> {
  const [x, y] = letters;
  const variables = [x, y, ["z", "w", "t"].find((name) => name !== x && name !== y)!];
  const equation = fromTerms(F, variables, [
    [F.one, [0, 2, 0]],
    ...q.map((c, k) => [F.neg(c), [4 - k, 0, k]] as const),
  ]);
  return { kind: "quartic", field: F, variables, weights: [1, 2, 1], equations: [equation] };
}

export interface QuarticTransformation<T> {
  readonly a: Coefficients<T>;
  readonly to: FormMap<T>;
  readonly from: FormMap<T>;
}

/**
 * The long Weierstrass model with the point P taken to O.
 *
 * P is first moved to (0, q). If q ≠ 0, on v² = a u⁴ + b u³ + c u² + d u + q²:
 *   x = (2q(v + q) + du)/u², y = (4q²(v + q) + 2q(du + cu²) − d²u²/(2q))/u³,
 *   a1 = d/q, a2 = c − d²/(4q²), a3 = 2qb, a4 = −4q²a, a6 = a2a4.
 * If q = 0 the quartic has the root 0 and x = d/u, y = dv/u² satisfy y² = x³ + cx² + bdx + ad².
 *
 * Domain   characteristic not 2, a quartic without double root (a may be 0 if b is not).
 * Source   Connell, Elliptic Curve Handbook, 1.2; Cassels, Lectures on Elliptic Curves, chapter 8.
 */
export function quarticThrough<T>(
  model: Model<T>,
  q: QuarticCoefficients<T>,
  P: Coordinates<T>,
): QuarticTransformation<T> {
  const { field: F } = model;
  const [x0, y0, z0] = P as [T, T, T];
  // New letters (u : v : w): a finite point by x = u + x0·w, z = w; one at infinity by exchanging x and z.
  const finite = !F.isZero(z0);
  const shift = finite ? divide(F, x0, z0) : F.zero;
  const moved = finite ? shifted(F, q, shift) : (q.toReversed() as unknown as QuarticCoefficients<T>);
  const value = finite ? divide(F, y0, square(F, z0)) : divide(F, y0, square(F, x0));
  const local = F.isZero(value) ? throughRoot(F, moved) : throughSquare(F, moved, value);
  const { to, from } = moves(model, quarticModel(F, moved, ["u", "v"]), finite, shift);
  return { a: local.a, to: composeMaps(to, local.to), from: composeMaps(local.from, from) };
}

/** Coefficients of q(u + s). */
function shifted<T>(F: Field<T>, q: QuarticCoefficients<T>, s: T): QuarticCoefficients<T> {
  const c = [...q];
  for (let round = 0; round < 4; round++) {
    for (let k = 1; k < 5 - round; k++) c[k] = F.add(c[k]!, F.mul(s, c[k - 1]!));
  }
  return c as unknown as QuarticCoefficients<T>;
}

function moves<T>(model: Model<T>, local: Model<T>, finite: boolean, shift: T): { to: FormMap<T>; from: FormMap<T> } {
  const { field: F } = model;
  const letters = (m: Model<T>) => m.variables.map((name) => variable(F, m.variables, name));
  const [x, y, z] = letters(model) as [Polynomial<T>, Polynomial<T>, Polynomial<T>];
  const [u, v, w] = letters(local) as [Polynomial<T>, Polynomial<T>, Polynomial<T>];
  const forward = finite ? [subtract(F, x, scaleBy(F, shift, z)), y, z] : [z, y, x];
  const back = finite ? [add(F, u, scaleBy(F, shift, w)), v, w] : [w, v, u];
  return { to: { from: model, to: local, forms: forward }, from: { from: local, to: model, forms: back } };
}

function throughSquare<T>(F: Field<T>, [a, b, c, d]: QuarticCoefficients<T>, q: T): QuarticTransformation<T> {
  const e = square(F, q);
  const source = quarticModel(F, [a, b, c, d, e], ["u", "v"]);
  const quarter = fraction(F, 1n, 4n);
  const half = fraction(F, 1n, 2n);
  const a2 = F.sub(c, F.mul(quarter, divide(F, square(F, d), e)));
  const a4 = scale(F, -4, F.mul(e, a));
  const model: Coefficients<T> = [divide(F, d, q), a2, scale(F, 2, F.mul(q, b)), a4, F.mul(a2, a4)];
  const target = weierstrassModel(F, model);
  const k = F.mul(half, divide(F, square(F, d), q)); // d²/(2q)
  const { variables } = source;
  const form = (...list: (readonly [T, readonly number[]])[]) => fromTerms(F, variables, list);
  // v + q w², and the numerators of x and y, homogeneous of weighted degree 2 and 3.
  const numeratorX = form([scale(F, 2, q), [0, 1, 0]], [scale(F, 2, e), [0, 0, 2]], [d, [1, 0, 1]]);
  const numeratorY = form(
    [scale(F, 4, e), [0, 1, 1]],
    [scale(F, 4, F.mul(e, q)), [0, 0, 3]],
    [scale(F, 2, F.mul(q, d)), [1, 0, 2]],
    [F.sub(scale(F, 2, F.mul(q, c)), k), [2, 0, 1]],
  );
  const u = variable(F, variables, "u");
  const to = { from: source, to: target, forms: [multiply(F, numeratorX, u), numeratorY, raise(F, u, 3)] };
  // u = (2q(x + c) − k)/y and v = −q + u(ux − d)/(2q): with N = 2q(x + c) − k as (N : −q y² + N(N x − d y)/(2q) : y).
  const N = fromTerms(F, target.variables, [
    [scale(F, 2, q), [1, 0, 0]],
    [F.sub(scale(F, 2, F.mul(q, c)), k), [0, 0, 1]],
  ]);
  const [x, y, z] = target.variables.map((name) => variable(F, target.variables, name)) as [
    Polynomial<T>,
    Polynomial<T>,
    Polynomial<T>,
  ];
  // Homogeneous: u = N/y, and v·y²·z has degree three: −q y² z + N(N x − d y z)/(2q).
  const inner = subtract(F, multiply(F, N, x), scaleBy(F, d, multiply(F, y, z)));
  const vy2z = add(
    F,
    scaleBy(F, F.neg(q), multiply(F, multiply(F, y, y), z)),
    scaleBy(F, F.mul(half, F.inv(q)), multiply(F, N, inner)),
  );
  // (u : v : w) = (N : v y² : y), times z in the weighted sense: (N z : v y² z² : y z).
  const from = {
    from: target,
    to: source,
    forms: [multiply(F, N, z), multiply(F, vy2z, z), multiply(F, y, z)],
  };
  return { a: model, to, from };
}

function throughRoot<T>(F: Field<T>, [a, b, c, d]: QuarticCoefficients<T>): QuarticTransformation<T> {
  const source = quarticModel(F, [a, b, c, d, F.zero], ["u", "v"]);
  const model: Coefficients<T> = [F.zero, c, F.zero, F.mul(b, d), F.mul(a, square(F, d))];
  const target = weierstrassModel(F, model);
  const s = source.variables;
  const to = {
    from: source,
    to: target,
    forms: [
      fromTerms(F, s, [[d, [1, 0, 1]]]),
      fromTerms(F, s, [[d, [0, 1, 0]]]),
      fromTerms(F, s, [[F.one, [2, 0, 0]]]),
    ],
  };
  // u = d/x, v = y u²/d = d y/x².
  const t = target.variables;
  const from = {
    from: target,
    to: source,
    forms: [
      fromTerms(F, t, [[d, [0, 0, 1]]]),
      fromTerms(F, t, [[d, [0, 1, 1]]]),
      fromTerms(F, t, [[F.one, [1, 0, 0]]]),
    ],
  };
  return { a: model, to, from };
}
