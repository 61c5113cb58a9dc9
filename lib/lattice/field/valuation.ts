// Where an elliptic function with exact coefficients vanishes or is infinite, by exact algebra over its coefficients.

import { deriveUni, divideUni, gcdUni, mulUni, scaleUni, subUni } from "../../algebra/univariate.ts";
import type { Element, ScalarPolynomial } from "./element.ts";
import { exactOf } from "./scalar.ts";

/** (G/D)(A + B y) with gcd(A, B) = gcd(G, D) = 1, and N = A² − B² y². */
export interface Factored {
  readonly G: ScalarPolynomial;
  readonly D: ScalarPolynomial;
  readonly A: ScalarPolynomial;
  readonly B: ScalarPolynomial;
  readonly N: ScalarPolynomial;
}

/** Whether all coefficients, g2 and g3 included, are exact numbers. */
export function isExactElement({ field, A, B, D }: Element): boolean {
  return [A, B, D, field.cubic].every((p) => p.every((c) => exactOf(c) !== undefined));
}

export function factored(f: Element): Factored {
  const { ring, cubic } = f.field;
  const G = gcdUni(ring, f.A, f.B);
  const cut = (p: ScalarPolynomial) => (p.length === 0 ? p : divideUni(ring, p, G).quotient);
  const [A, B] = [cut(f.A), cut(f.B)];
  const N = subUni(ring, mulUni(ring, A, A), mulUni(ring, mulUni(ring, B, B), cubic));
  return { G, D: f.D, A, B, N };
}

/** The abscissas of one factor of the base, with the multiplicities they have in G, D, N. */
export interface Place {
  /** A squarefree polynomial; all its roots are alike. */
  readonly q: ScalarPolynomial;
  readonly inG: number;
  readonly inD: number;
  readonly inN: number;
  /** Roots of the cubic: points of order two. */
  readonly twoTorsion: boolean;
}

/** The finite places where the function may have zeros or poles. */
export function places(f: Element): Place[] {
  const { ring, cubic } = f.field;
  const { G, D, N } = factored(f);
  const radical = (p: ScalarPolynomial) =>
    p.length < 2 ? p : divideUni(ring, p, gcdUni(ring, p, deriveUni(ring, p))).quotient;
  let base: ScalarPolynomial[] = [];
  for (const p of [G, D, N, cubic]) base = refined(f, base, radical(p));
  const multiplicity = (p: ScalarPolynomial, q: ScalarPolynomial) => {
    let count = 0;
    for (let rest = p; rest.length > 0; count++) {
      const { quotient, remainder } = divideUni(ring, rest, q);
      if (remainder.length > 0) break;
      rest = quotient;
    }
    return count;
  };
  return base
    .map((q) => ({
      q,
      inG: multiplicity(G, q),
      inD: multiplicity(D, q),
      inN: multiplicity(N, q),
      twoTorsion: divideUni(ring, cubic, q).remainder.length === 0,
    }))
    .filter((place) => place.inG + place.inD + place.inN > 0);
}

/** Pairwise coprime squarefree polynomials of which the old base and p are products. */
function refined(f: Element, base: readonly ScalarPolynomial[], p: ScalarPolynomial): ScalarPolynomial[] {
  const { ring } = f.field;
  const out: ScalarPolynomial[] = [];
  let rest = p;
  for (const q of base) {
    const common = rest.length > 1 ? gcdUni(ring, q, rest) : [ring.one];
    if (common.length < 2) {
      out.push(q);
      continue;
    }
    out.push(common);
    const left = divideUni(ring, q, common).quotient;
    if (left.length > 1) out.push(left);
    rest = divideUni(ring, rest, common).quotient;
  }
  if (rest.length > 1) out.push(scaleUni(ring, ring.inv(rest[rest.length - 1]!), rest));
  return out;
}

/** The order at the lattice points: A ~ z^(−2 deg A), B℘′ ~ z^(−2 deg B − 3), whose parities differ. */
export function orderAtOrigin({ A, B, D }: Element): number {
  const top = Math.max(A.length > 0 ? 2 * (A.length - 1) : -1, B.length > 0 ? 2 * (B.length - 1) + 3 : -1);
  return 2 * (D.length - 1) - top;
}

/** Orders at the points over a place: at the one with y = −A/B, and at its mirror image (the same point for order two). */
export function ordersOver({ inG, inD, inN, twoTorsion }: Place): { readonly there: number; readonly mirror: number } {
  if (twoTorsion) return { there: 2 * (inG - inD) + inN, mirror: 0 };
  return { there: inG - inD + inN, mirror: inG - inD };
}

/** Number of poles with multiplicity, which is the number of zeros: the degree of the function as a map to the sphere. */
export function degreeOfElement(f: Element): number {
  let poles = Math.max(0, -orderAtOrigin(f));
  for (const place of places(f)) {
    const { there, mirror } = ordersOver(place);
    const count = place.q.length - 1;
    poles += count * Math.max(0, -there);
    if (!place.twoTorsion) poles += count * Math.max(0, -mirror);
  }
  return poles;
}
