// The invariant differential of a model along a branch, and the constant by which a map pulls it back.

import { divide, type Field } from "../../algebra/field.ts";
import { derivative, evaluateIn } from "../../algebra/multivariate.ts";
import { constantSeries, deriveSeries, orderOf, type Series, seriesRing } from "../../algebra/series.ts";
import type { FormMap } from "./map.ts";
import { branchAt, type Coordinates, type Model } from "./model.ts";

/**
 * c with φ*ω = c·ω, for the residue forms of the two models: (w du − u dw)/F_v for a plane cubic F(u, v, w), which is du/F_v for w = 1
 * and dx/(2y + a1x + a3) for the long form, dx/(2y) for y² = quartic(x), and the residue form of two quadrics, which is dx/F_y for a curve
 * F(x, y) = 0 of bidegree (2, 2).
 *
 * The pull-back of a holomorphic form is holomorphic, hence a constant multiple of ω, and one point P of the curve
 * shows the constant.
 * Domain   characteristic 0, φ not constant.
 */
export function pullbackConstant<T>(map: FormMap<T>, P: Coordinates<T>): T {
  const { from, to, forms } = map;
  const F = from.field;
  for (let length = 8; ; length *= 2) {
    const branch = branchAt(from, P, length)!;
    const ring = seriesRing(F, length);
    const image = forms.map((f) => evaluateIn(f, branch.coordinates, ring, (c) => constantSeries(F, c, length)));
    const order = Math.min(...image.map((s, k) => (to.weights[k] === 1 ? orderOf(F, s) : Infinity)));
    // Division by ε^order leaves that many coefficients fewer, twice as many for y of a quartic.
    if (2 * order + 3 >= length) continue;
    const reduced = image.map((s, k) => [...s.slice(order * to.weights[k]!), ...zeros(F, order * to.weights[k]!)]);
    const known = length - 2 * order - 1;
    const above = leading(F, ratioAlong(to, reduced), known);
    const below = leading(F, ratioAlong(from, branch.coordinates), length - 1);
    if (above && below && above.order === below.order) return divide(F, above.value, below.value);
  }
}

function zeros<T>(F: Field<T>, n: number): T[] {
  return new Array<T>(n).fill(F.zero);
}

interface Leading<T> {
  readonly order: number;
  readonly value: T;
}

/** Order and first coefficient of numerator/denominator, if both show within the known coefficients. */
function leading<T>(F: Field<T>, { numerator, denominator }: Ratio<T>, known: number): Leading<T> | undefined {
  const [n, d] = [orderOf(F, numerator), orderOf(F, denominator)];
  if (n >= known || d >= known) return undefined;
  return { order: n - d, value: divide(F, numerator[n]!, denominator[d]!) };
}

interface Ratio<T> {
  readonly numerator: Series<T>;
  readonly denominator: Series<T>;
}

/** ω/dε along coordinate series, from the first partial derivative that does not vanish at the point. */
function ratioAlong<T>(model: Model<T>, coordinates: readonly Series<T>[]): Ratio<T> {
  const options =
    model.kind === "quartic"
      ? quarticForms(model, coordinates)
      : model.kind === "quadrics"
        ? spaceForms(model, coordinates)
        : planeForms(model, coordinates);
  const F = model.field;
  return options.reduce((best, option) =>
    orderOf(F, option.denominator) < orderOf(F, best.denominator) ? option : best,
  );
}

/** (x_i dx_j − x_j dx_i)/F_k for cyclic (i, j, k). */
function planeForms<T>(model: Model<T>, coordinates: readonly Series<T>[]): Ratio<T>[] {
  return [0, 1, 2].map((k) => {
    const [i, j] = [(k + 1) % 3, (k + 2) % 3] as const;
    return {
      numerator: wronskian(model.field, coordinates[i]!, coordinates[j]!),
      denominator: partial(model, k, coordinates),
    };
  });
}

/** (x_i dx_j − x_j dx_i)/∂(f, g)/∂(x_k, x_l), with the sign that makes it dx/F_y for a curve F = 0 of bidegree (2, 2). */
function spaceForms<T>(model: Model<T>, coordinates: readonly Series<T>[]): Ratio<T>[] {
  const F = model.field;
  const ring = seriesRing(F, coordinates[0]!.length);
  const d = (equation: number, k: number) => partial(model, k, coordinates, equation);
  const places = [
    [3, 0, 1, 2],
    [3, 1, 2, 0],
    [3, 2, 0, 1],
    [0, 1, 3, 2],
    [1, 2, 3, 0],
    [2, 0, 3, 1],
  ] as const;
  return places.map(([i, j, k, l]) => ({
    numerator: wronskian(F, coordinates[i]!, coordinates[j]!),
    denominator: ring.add(ring.mul(d(0, k), d(1, l)), negated(F, ring.mul(d(0, l), d(1, k)))),
  }));
}

/** (z dx − x dz)/(2y), or where y = 0 the same from the derivatives of the quartic: z dy/q_x and −x dy/q_z up to weights. */
function quarticForms<T>(model: Model<T>, coordinates: readonly Series<T>[]): Ratio<T>[] {
  const F = model.field;
  const [x, y, z] = coordinates as [Series<T>, Series<T>, Series<T>];
  const ring = seriesRing(F, x.length);
  const two = constantSeries(F, F.fromInt(2n), x.length);
  const weighted = (a: Series<T>) => {
    // a dy − 2 y da, of weight three: the derivative of y/a² times a³.
    const first = ring.mul(a, deriveSeries(F, y));
    return ring.add(first, ring.mul(negated(F, two), ring.mul(y, deriveSeries(F, a))));
  };
  return [
    { numerator: wronskian(F, z, x), denominator: partial(model, 1, coordinates) },
    { numerator: negated(F, weighted(z)), denominator: partial(model, 0, coordinates) },
    { numerator: weighted(x), denominator: partial(model, 2, coordinates) },
  ];
}

function partial<T>(model: Model<T>, k: number, coordinates: readonly Series<T>[], equation = 0): Series<T> {
  const F = model.field;
  const { length } = coordinates[0]!;
  const f = derivative(F, model.equations[equation]!, model.variables[k]!);
  return evaluateIn(f, coordinates, seriesRing(F, length), (c) => constantSeries(F, c, length));
}

function wronskian<T>(F: Field<T>, a: Series<T>, b: Series<T>): Series<T> {
  const ring = seriesRing(F, a.length);
  return ring.add(ring.mul(a, deriveSeries(F, b)), negated(F, ring.mul(b, deriveSeries(F, a))));
}

function negated<T>(F: Field<T>, a: Series<T>): Series<T> {
  return a.map((c) => F.neg(c));
}
