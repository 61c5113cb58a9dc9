// Maps between curves: one type for changes of model, cubics and quartics to Weierstrass form, isogenies, isomorphisms, twists.

import type { Field } from "../algebra/field.ts";
import { fromTerms, type Polynomial } from "../algebra/multivariate.ts";
import type { Residue } from "../algebra/primefield.ts";
import { type AbscissaMap, composeAbscissas, imageOf } from "../curve/abscissamap.ts";
import { abscissas, isIsogeny } from "../curve/isogeny.ts";
import { pullbackConstant } from "../curve/map/differential.ts";
import { type Formula, formulaOf, formulaOnAbscissa } from "../curve/map/formula.ts";
import { isogenyMap } from "../curve/map/isogenymap.ts";
import { applyMap, composeMaps, type FormMap, isExceptional, isIdentity, landsOnTarget } from "../curve/map/map.ts";
import { toAffine, toCoordinates } from "../curve/map/weierstrassmodel.ts";
import type { ModelChange } from "../curve/weierstrass.ts";
import { primitive } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import { Curve } from "./curve.ts";
import type { Coordinate } from "./fields.ts";
import type { IntegerMatrix } from "./lattice.ts";
import { periodMatrixOf } from "./period-matrix.ts";
import { type AnyVariety, coordinatesOn, type PlaceOn, type PointOf, pointOn } from "./space.ts";

/** What a map is made of. */
export interface MorphismData<T> {
  readonly map: FormMap<T>;
  readonly degree: number;
  /** What the map is called in a sentence: "change of model", "isogeny of degree 3". */
  readonly title: string;
  /** A point of the source by which the constant of the differential is read; O of a Weierstrass model if absent. */
  readonly basePoint?: readonly T[];
  /** The inverse of an isomorphism, made on demand. */
  readonly inverse?: () => MorphismData<T>;
  /** For a change of model: x = u²x′ + r, y = u³y′ + su²x′ + t from the source's (x, y) to the target's (x′, y′). */
  readonly change?: ModelChange<T>;
  /** For an isogeny: the monic polynomial of the abscissas of its kernel, from the constant term up. */
  readonly kernel?: readonly T[];
  /** The dual of an isogeny, made on demand. */
  readonly dual?: () => MorphismData<T>;
  /** Between Weierstrass models with O ↦ O: the map on x and its factor, from which the rest follows. */
  readonly abscissa?: AbscissaMap<T>;
  /** A check that says more than the general one. */
  readonly check?: () => Standing;
}

/** What a map of Weierstrass models that fixes O is made of: all from its action on x. Its forms are made when they are asked for. */
export function abscissaData<T>(
  F: Field<T>,
  abscissa: AbscissaMap<T>,
  more: Omit<MorphismData<T>, "map" | "degree" | "abscissa" | "kernel">,
): MorphismData<T> {
  let map: FormMap<T> | undefined;
  return {
    check: () =>
      isIsogeny(F, abscissa.source, abscissa, abscissa.factor)
        ? { kind: "proved", argument: "exact substitution in the target's equation" }
        : { kind: "refuted", evidence: "the image does not satisfy the equation of the target" },
    ...more,
    degree: abscissa.degree,
    abscissa,
    kernel: abscissas(F, abscissa.kernel),
    get map() {
      map ??= isogenyMap(F, abscissa);
      return map;
    },
  };
}

/** The functions on points, whose instances get the methods of their class. */
class Base {
  constructor(call: (P: never) => unknown) {
    const callable = (P: never) => call(P);
    // biome-ignore lint/correctness/noConstructorReturn: an instance is itself a function, and its class's methods are its methods
    return Object.setPrototypeOf(callable, new.target.prototype);
  }
}

const OnPoints = Base as unknown as abstract new <A, B>(call: (P: A) => B) => (P: A) => B;

/**
 * A map of curves that is called on points: phi(P), also where its formula gives 0/0: there the image is read from the curve's power
 * series. Immutable.
 */
export class Morphism<V extends AnyVariety = Curve, W extends AnyVariety = Curve> extends OnPoints<
  PlaceOn<V>,
  PointOf<W>
> {
  readonly from: V;
  readonly to: W;
  readonly degree: number;
  readonly title: string;
  /** The forms behind the formula, and how the inverse is made. */
  readonly data: MorphismData<unknown>;

  constructor(from: V, to: W, data: MorphismData<unknown>) {
    super((P) => image<V, W>(from, to, data, P));
    this.from = from;
    this.to = to;
    this.degree = data.degree;
    this.title = data.title;
    this.data = data;
  }

  /** The formula as data: each letter of the target as a quotient in lowest terms, or proportional forms. */
  get formula(): Formula<unknown> {
    const { abscissa } = this.data;
    if (abscissa) return formulaOnAbscissa(this.from.field as Field<unknown>, abscissa);
    return formulaOf(this.data.map, lettersOf(this.from), lettersOf(this.to));
  }

  /** c with φ*ω′ = c·ω for the invariant differentials, dx/(2y + a1x + a3) on a long Weierstrass form. */
  get factor(): Coordinate | Residue {
    const { map, basePoint, abscissa } = this.data;
    if (abscissa) return abscissa.factor as Coordinate | Residue;
    const F = map.from.field;
    return pullbackConstant(map, basePoint ?? [F.zero, F.one, F.zero]) as Coordinate | Residue;
  }

  /** The inverse of an isomorphism. Throws DomainError for a map of degree above 1. */
  get inverse(): Morphism<W, V> {
    const data = this.data.inverse?.();
    if (!data) {
      throw new DomainError({
        subject: "inverse",
        given: withArticle(this.title),
        expected: "an isomorphism",
        hint: this.degree > 1 ? "An isogeny has a dual: phi.dual()." : "",
      });
    }
    return new Morphism(this.to, this.from, data);
  }

  /**
   * The dual isogeny: dual()∘φ is multiplication by the degree on the source.
   * Throws   DomainError for a map that is no isogeny given by its kernel.
   */
  dual(): Morphism<W, V> {
    const data = this.data.dual?.();
    if (data) return new Morphism(this.to, this.from, data);
    throw new DomainError({
      subject: "dual",
      given: withArticle(this.title),
      expected: "an isogeny made by E.isogeny({ kernel })",
      hint: this.degree === 1 ? "An isomorphism has an inverse." : "",
    });
  }

  /** For a change of model: u, r, s, t with x = u²x′ + r, y = u³y′ + su²x′ + t, (x, y) on the source and (x′, y′) on the target. */
  get change(): ModelChange<unknown> | undefined {
    return this.data.change;
  }

  /** For an isogeny: the monic polynomial in x whose roots are the abscissas of the kernel. */
  get kernelPolynomial(): Polynomial<unknown> | undefined {
    const { kernel, map } = this.data;
    return (
      kernel &&
      fromTerms(
        map.from.field,
        ["x"],
        kernel.map((c, k) => [c, [k]] as const),
      )
    );
  }

  /**
   * Between elliptic curves with periods: the integer matrix M with c·(ω1, ω2) = M·(ω1′, ω2′) for the factor c of dz, so cΛ lies in Λ′ with
   * the index |det M| = degree. The algebraic and the analytic description of one map.
   */
  get periodMatrix(): IntegerMatrix {
    return periodMatrixOf(this.from, this.to, this.factor as Coordinate, this.degree);
  }

  /** True if the formula itself cannot take the point (the map still can). */
  isExceptional(P: PlaceOn<V>): boolean {
    return isExceptional(this.data.map, coordinatesOn(this.from, P as never, "isExceptional"));
  }

  /** This map after another: phi.compose(psi) takes P to phi(psi(P)). */
  compose<U extends AnyVariety>(first: Morphism<U, V>): Morphism<U, W> {
    requireSame(first.to, this.from);
    return new Morphism(first.from, this.to, composed(first.from.field as Field<unknown>, first.data, this.data));
  }

  /**
   * Exact substitution: the general image point satisfies the target's equation; for an isomorphism both compositions are the
   * identity; for an isogeny the dual after it is multiplication by the degree. "proved", or "refuted" with what fails.
   */
  verify(): Standing {
    const { inverse, check } = this.data;
    if (check && !inverse) return check();
    const { map } = this.data;
    if (inverse && map.from.kind === "quadrics") return verifiedFrom(inverse().map, map);
    if (inverse && map.to.kind === "quadrics") return verifiedFrom(map, inverse().map);
    if (!landsOnTarget(map))
      return { kind: "refuted", evidence: "the image does not satisfy the equation of the target" };
    if (!inverse) return { kind: "proved", argument: "exact substitution in the target's equation" };
    const back = inverse().map;
    const identities = landsOnTarget(back) && isIdentity(composeMaps(map, back)) && isIdentity(composeMaps(back, map));
    return identities ? BOTH_IDENTITIES : NOT_INVERSE;
  }

  /** "change of model from y^2 = ... to y^2 = ...". */
  override toString(): string {
    return `${this.title} from ${this.from} to ${this.to}`;
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "map");
  }
}

function withArticle(title: string): string {
  return title.startsWith("multiplication") ? title : `${/^[aeio]/.test(title) ? "an" : "a"} ${title}`;
}

const BOTH_IDENTITIES: Standing = {
  kind: "proved",
  argument: "exact substitution in both equations, and both compositions are the identity",
};
const NOT_INVERSE: Standing = { kind: "refuted", evidence: "the map and its inverse do not compose to the identity" };

/**
 * All from the side with one equation: if `out` lands on the irreducible curve and `home` after it is the identity, then `home` is its
 * inverse on the image, which is the whole curve, and so lands too.
 */
function verifiedFrom(out: FormMap<unknown>, home: FormMap<unknown>): Standing {
  return landsOnTarget(out) && isIdentity(composeMaps(out, home)) ? BOTH_IDENTITIES : NOT_INVERSE;
}

type Data = MorphismData<unknown>;

/** One map after another: on x where both are given so, else by their forms; with what is known of inverse and dual. */
function composed(F: Field<unknown>, first: Data, second: Data): Data {
  const title = compositionTitle(second, first);
  const inverse = composedBackwards(F, second.inverse, first.inverse);
  if (first.abscissa && second.abscissa) {
    const dual = composedBackwards(F, dualOrInverse(second), dualOrInverse(first));
    const more = { title, ...(inverse ? { inverse } : {}), ...(dual && !inverse ? { dual } : {}) };
    return abscissaData(F, composeAbscissas(F, first.abscissa, second.abscissa), more);
  }
  return {
    map: composeMaps(first.map, second.map),
    degree: second.degree * first.degree,
    title,
    ...(first.basePoint ? { basePoint: first.basePoint } : {}),
    ...(inverse ? { inverse } : {}),
  };
}

/** What goes back through both, made on demand. */
function composedBackwards(F: Field<unknown>, first: (() => Data) | undefined, second: (() => Data) | undefined) {
  return first && second ? () => composed(F, first(), second()) : undefined;
}

/** For an isomorphism the inverse is the dual. */
function dualOrInverse(data: Data): (() => Data) | undefined {
  return data.dual ?? (data.degree === 1 ? data.inverse : undefined);
}

/** A change of model does not alter what a map is called. */
function compositionTitle(second: Titled, first: Titled): string {
  if (first.title === "change of model") return second.title;
  if (second.title === "change of model") return first.title;
  return second.degree * first.degree === 1 ? "isomorphism" : `composition of degree ${second.degree * first.degree}`;
}

interface Titled {
  readonly title: string;
  readonly degree: number;
}

function image<V extends AnyVariety, W extends AnyVariety>(
  from: V,
  to: W,
  data: MorphismData<unknown>,
  P: PlaceOn<V>,
): PointOf<W> {
  const coordinates = coordinatesOn(from, P as never, "a map");
  const { abscissa } = data;
  if (!abscissa) return pointOn(to, applyMap(data.map, coordinates)) as PointOf<W>;
  const F = from.field as Field<unknown>;
  return pointOn(to, toCoordinates(F, imageOf(F, abscissa, toAffine(F, coordinates)))) as PointOf<W>;
}

function lettersOf(variety: AnyVariety): readonly string[] {
  return variety instanceof Curve ? ["x", "y"] : variety.letters;
}

function requireSame(target: AnyVariety, source: AnyVariety): void {
  if (target === source || `${target}` === `${source}`) return;
  throw new DomainError({
    subject: "compose",
    given: `a map to ${target} followed by a map from ${source}`,
    expected: "maps that meet on one curve",
  });
}
