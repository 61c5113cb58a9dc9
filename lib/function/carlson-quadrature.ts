// Carlson's integrals from their definitions, by quadrature: a second route that shares no formula with duplications and means.
//
// With t = s² up to S, and t = 1/w² beyond, for arguments x, y, z and p
//     RF = ∫_0^S s ds/Π√(s²+x) + ∫_0^(1/S) dw/Π√(1+xw²)
//     RJ = 3 ∫_0^S s ds/(Π√(s²+x) (s²+p)) + 3 ∫_0^(1/S) w² dw/(Π√(1+xw²) (1+pw²))
//     RG = ½ ∫_0^S (Σ x/(s²+x)) s³ ds/Π√(s²+x) + ½ ∫_0^(1/S) (Σ x/(1+xw²)) dw/Π√(1+xw²)             (DLMF 19.16.1–19.16.3)
// and RC(x, y) = RF(x, y, y), RD(x, y, z) = RJ(x, y, z, z). An argument 0 takes its root s out of the fractions.
// Principal values: turning the way to t = ir passes the pole on one side, which adds ∓πi times a real residue, so
//     RC(x, −q) = Re e^(−πi/4) RC(−ix, iq),     RJ(x, y, z, −q) = Re e^(−3πi/4) RJ(−ix, −iy, −iz, iq)   for x, y, z >= 0, q > 0.

import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { refuseCut, refuseZeros, type Triple } from "./carlson-duplication.ts";
import { ontoReal } from "./enclosure.ts";
import { BITS_A_NODE, type Integrand, integral } from "./quadrature.ts";
import { eighthRoot } from "./theta-multiplier.ts";

const MOST_PIECES = 8_000;

interface Kind {
  readonly name: string;
  readonly factor: 1 | 3;
  readonly near: Integrand;
  readonly far: Integrand;
}

/** RF by quadrature; as carlsonRF. */
export function rfByQuadrature(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  refuseZeros("RF", [x, y, z], 1);
  return along([x, y, z], { name: "RF", factor: 1, ...firstKind([x, y, z]) }, prec, real);
}

/** RC by quadrature, also its principal value for y < 0; as carlsonRC. */
export function rcByQuadrature(x: Disc, y: Disc, prec: number): Disc {
  refuseZeros("RC", [y], 0);
  if (!isNegative(y)) return rfByQuadrature(x, y, y, prec);
  const turned = rfByQuadrature(down(x), down(y), down(y), prec + 8);
  return ontoReal(disc.mul(turned, eighthRoot(7, prec + 8), prec));
}

/** RD by quadrature; as carlsonRD. */
export function rdByQuadrature(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  refuseZeros("RD", [z], 0);
  refuseZeros("RD", [x, y], 1);
  return along([x, y, z], { name: "RD", factor: 3, ...thirdKind([x, y, z], z) }, prec, real && z.axis === "real");
}

/** RJ by quadrature, also its principal value for p < 0; as carlsonRJ. */
export function rjByQuadrature(x: Disc, y: Disc, z: Disc, p: Disc, prec: number, real = false): Disc {
  refuseZeros("RJ", [p], 0);
  refuseZeros("RJ", [x, y, z], 1);
  if (isNegative(p)) return principalRJ([x, y, z], p, prec);
  const all = [x, y, z, p];
  return along(all, { name: "RJ", factor: 3, ...thirdKind([x, y, z], p) }, prec, real && p.axis === "real");
}

/** RG by quadrature; as carlsonRG. */
export function rgByQuadrature(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  const squares: Triple = [x, y, z];
  if (squares.every(disc.isZero)) return disc.zero;
  return disc.ldexp(along(squares, { name: "RG", factor: 1, ...secondKind(squares) }, prec + 1, real), -1);
}

function principalRJ(squares: Triple, p: Disc, prec: number): Disc {
  if (!squares.every((w) => w.axis === "real" && w.re >= 0n)) {
    throw new DomainError({
      subject: "RJ by quadrature",
      given: "a negative last argument with others that are not all >= 0",
      expected: "x, y, z >= 0 for a principal value",
      argument: "p",
    });
  }
  const [x, y, z] = squares.map(down) as unknown as Triple;
  return ontoReal(disc.mul(rjByQuadrature(x, y, z, down(p), prec + 8), eighthRoot(5, prec + 8), prec));
}

/** −iw. */
function down(w: Disc): Disc {
  return disc.neg(disc.mulI(w));
}

function isNegative(x: Disc): boolean {
  return x.axis === "real" && x.re < 0n && !disc.containsZero(x);
}

function along(all: readonly Disc[], { name, factor, near, far }: Kind, prec: number, real: boolean): Disc {
  for (const w of all) refuseCut(name, w);
  const bits = prec + 40;
  // S² > 4 |x|: on the far way 1 + xw² stays in the right half plane.
  const reach = Math.ceil((Math.max(...all.map((w) => disc.magnitude(w))) + 2) / 2);
  const nodes = 2 * Math.ceil(bits / (2 * BITS_A_NODE[3]));
  const options = { nodes, around: 3, bits, mostPieces: MOST_PIECES } as const;
  const parts = [integral(near, { ...options, reach }), integral(far, { ...options, reach: -reach })];
  if (!parts[0] || !parts[1]) throw tooFar(name);
  const sum = disc.add(parts[0], parts[1], bits);
  const value = disc.round(disc.mulInt(sum, factor, bits), prec);
  return real ? ontoReal(value) : value;
}

function tooFar(name: string): DomainError {
  return new DomainError({
    subject: `${name} by quadrature`,
    given: `arguments so far apart that the integral takes more than ${MOST_PIECES} pieces`,
    expected: "arguments of like sizes, sharp ones",
    hint: "The other routes have no such limit.",
  });
}

/** Π √(s²+x) over the arguments that are not 0; the others are s each. */
function nearRoots(squares: Triple, square: Disc, bits: number): { readonly roots: Disc; readonly zeros: number } {
  const some = squares.filter((w) => !disc.isZero(w));
  const roots = some.map((w) => rootAlong(disc.add(square, w, bits), w, bits));
  return { roots: product(roots, bits), zeros: squares.length - some.length };
}

function farRoots(squares: Triple, square: Disc, bits: number): Disc {
  return product(
    squares.map((w) => disc.sqrt(plusOne(w, square, bits), bits)),
    bits,
  );
}

function plusOne(w: Disc, square: Disc, bits: number): Disc {
  return disc.add(disc.one, disc.mul(w, square, bits), bits);
}

function product(list: readonly Disc[], bits: number): Disc {
  return list.reduce((a, b) => disc.mul(a, b, bits), disc.one);
}

function firstKind(squares: Triple): Pick<Kind, "near" | "far"> {
  return {
    near: (s, bits) => {
      const { roots, zeros } = nearRoots(squares, disc.sqr(s, bits), bits);
      return disc.div(disc.pow(s, 1 - zeros, bits), roots, bits);
    },
    far: (w, bits) => disc.inv(farRoots(squares, disc.sqr(w, bits), bits), bits),
  };
}

/** The integrand of RJ/3, near and far. */
export function thirdKind(squares: Triple, p: Disc): Pick<Kind, "near" | "far"> {
  const first = firstKind(squares);
  return {
    near: (s, bits) => disc.div(first.near(s, bits), disc.add(disc.sqr(s, bits), p, bits), bits),
    far: (w, bits) => {
      const square = disc.sqr(w, bits);
      return disc.div(disc.mul(square, first.far(w, bits), bits), plusOne(p, square, bits), bits);
    },
  };
}

function secondKind(squares: Triple): Pick<Kind, "near" | "far"> {
  const some = squares.filter((w) => !disc.isZero(w));
  const sum = (terms: readonly Disc[], bits: number) => terms.reduce((a, b) => disc.add(a, b, bits));
  return {
    near: (s, bits) => {
      const square = disc.sqr(s, bits);
      const { roots, zeros } = nearRoots(squares, square, bits);
      const terms = some.map((x) => disc.div(x, disc.add(square, x, bits), bits));
      return disc.div(disc.mul(sum(terms, bits), disc.pow(s, 3 - zeros, bits), bits), roots, bits);
    },
    far: (w, bits) => {
      const square = disc.sqr(w, bits);
      const terms = some.map((x) => disc.div(x, plusOne(x, square, bits), bits));
      return disc.div(sum(terms, bits), farRoots(squares, square, bits), bits);
    },
  };
}

/**
 * √x for x = s² + w: as s runs over [0, ∞) it moves parallel to the real axis, away from the cut. Where w is not on the right its disc may reach
 * across the cut beside it, and the root is turned to the side of the axis where w is not.
 */
function rootAlong(x: Disc, w: Disc, bits: number): Disc {
  if (w.axis === "real" && w.re >= 0n) return disc.sqrt(x, bits);
  const low = w.im < 0n;
  const turned = low ? disc.mulI(x) : disc.neg(disc.mulI(x));
  return disc.mul(disc.sqrt(turned, bits), eighthRoot(low ? 7 : 1, bits), bits);
}
