// Jacobi's functions as operations that a value records: operands u (or x), m, m1.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { asDisc, type Operation } from "../number/origin.ts";
import { DomainError } from "../proof/errors.ts";
import { rfByQuadrature } from "./carlson-quadrature.ts";
import { jacobiAmplitude } from "./jacobi-amplitude.ts";
import { type Integrals, jacobiInverse } from "./jacobi-inverse.ts";
import { amplitudeByFourier, amplitudeByLogarithm, epsilonByFourier, zetaByFourier } from "./jacobi-routes.ts";
import { jacobiEpsilon, jacobiZeta } from "./jacobi-second.ts";
import { jacobiByTheta, jacobiSlope } from "./jacobi-theta.ts";
import {
  type JacobiContext,
  type JacobiLetter,
  type JacobiName,
  jacobiContext,
  jacobiValues,
} from "./jacobi-values.ts";
import type { Modulus } from "./legendre-complete.ts";
import { completeE, completeK } from "./legendre-complete.ts";
import { incompleteE } from "./legendre-incomplete.ts";
import { completeByQuadrature } from "./legendre-routes.ts";
import { type Evaluate, operationOf, settle } from "./operations.ts";

const LETTERS: readonly JacobiLetter[] = ["s", "c", "d", "n"];

export const JACOBI_NAMES: readonly JacobiName[] = LETTERS.flatMap((p) =>
  LETTERS.filter((q) => q !== p).map((q): JacobiName => `${p}${q}`),
);

function table(prefix: string, make: (name: JacobiName) => Operation): Readonly<Record<string, Operation>> {
  return Object.fromEntries(JACOBI_NAMES.map((name) => [name, { ...make(name), name: `${prefix}${name}` }]));
}

/** Contexts kept for a modulus, one a precision; the oldest goes first. */
const KEPT = 8;
const GRAIN = 32;
const contexts = new WeakMap<object, Map<number, JacobiContext>>();

/** The context of the modulus that an operand stands for, computed once a precision: a thousand values cost two means. */
function keptContext(key: unknown): (modulus: Modulus, prec: number) => JacobiContext {
  return (modulus, prec) => {
    const rounded = GRAIN * Math.ceil(prec / GRAIN);
    if (typeof key !== "object" || key === null) return jacobiContext(modulus, rounded);
    const kept = contexts.get(key) ?? new Map<number, JacobiContext>();
    contexts.set(key, kept);
    const found = kept.get(rounded);
    if (found) return found;
    const context = jacobiContext(modulus, rounded);
    if (kept.size >= KEPT) kept.delete(kept.keys().next().value!);
    kept.set(rounded, context);
    return context;
  };
}

const modulusOf = (m: Disc, m1: Disc): Modulus => ({ m, m1 });

/** The twelve functions. */
export const JACOBI = table("", (name) => ({
  ...operationOf(name, 3, ([u, m, m1], _rest, prec) => jacobiValues([name], u!, modulusOf(m!, m1!), prec)[0]!, {
    partials: [([u, m, m1], _rest, prec) => jacobiSlope(name, u!, modulusOf(m!, m1!), prec)],
    routes: { "theta series": ([u, m, m1], _rest, prec) => jacobiByTheta(name, u!, modulusOf(m!, m1!), prec) },
  }),
  evaluate: ([u, m, m1], at, prec) => {
    const modulus = modulusOf(asDisc(at(m)), asDisc(at(m1)));
    return settle(jacobiValues([name], asDisc(at(u)), modulus, prec, keptContext(m))[0]!);
  },
}));

const QUADRATURE: Integrals = {
  rf: rfByQuadrature,
  quarter: (k, prec) => completeByQuadrature("F", k, prec),
};

/** Their inverses, with derivative 1/(pq)′. */
export const JACOBI_INVERSE = table("arc", (name) => {
  const f: Evaluate = ([x, m, m1], _rest, prec) => jacobiInverse(name, x!, modulusOf(m!, m1!), prec);
  return operationOf(name, 3, f, {
    routes: {
      quadrature: ([x, m, m1], _rest, prec) => jacobiInverse(name, x!, modulusOf(m!, m1!), prec, QUADRATURE),
    },
    partials: [
      (x, rest, prec) => disc.inv(jacobiSlope(name, f(x, rest, prec + 8), modulusOf(x[1]!, x[2]!), prec + 8), prec),
    ],
  });
});

const dn = (u: Disc, modulus: Modulus, prec: number) => jacobiValues(["dn"], u, modulus, prec)[0]!;

function integral(
  name: string,
  f: (u: Disc, modulus: Modulus, prec: number) => Disc,
  slope: (u: Disc, modulus: Modulus, prec: number) => Disc,
  routes: Readonly<Record<string, Evaluate>> = {},
): Operation {
  return operationOf(name, 3, ([u, m, m1], _rest, prec) => f(u!, modulusOf(m!, m1!), prec), {
    partials: [([u, m, m1], _rest, prec) => slope(u!, modulusOf(m!, m1!), prec)],
    routes,
  });
}

const onModulus =
  (f: (u: Disc, modulus: Modulus, prec: number) => Disc): Evaluate =>
  ([u, m, m1], _rest, prec) =>
    f(u!, modulusOf(m!, m1!), prec);

/** E(am u | m) for real u and m < 1: elsewhere dn may be the other root of 1 − m sn². */
function epsilonByAmplitude(u: Disc, modulus: Modulus, prec: number): Disc {
  if (u.axis !== "real" || modulus.m1.axis !== "real" || modulus.m1.re <= 0n) {
    throw new DomainError({
      subject: "Jacobi epsilon by E of the amplitude",
      given: "u or m that is not real, or m >= 1",
      expected: "real u and m < 1, where dn is positive",
      hint: 'The route "Fourier series" holds for all of them.',
      argument: "u",
    });
  }
  return incompleteE(jacobiAmplitude(u, modulus, prec + 8), modulus, prec);
}

export const AMPLITUDE: Operation = integral("am", jacobiAmplitude, dn, {
  "logarithm of cn + i sn": onModulus(amplitudeByLogarithm),
  "Fourier series": onModulus(amplitudeByFourier),
});
export const EPSILON: Operation = integral(
  "Jacobi epsilon",
  jacobiEpsilon,
  (u, modulus, prec) => disc.sqr(dn(u, modulus, prec), prec),
  { "Fourier series": onModulus(epsilonByFourier), "E of the amplitude": onModulus(epsilonByAmplitude) },
);
export const ZETA: Operation = integral(
  "Jacobi zeta",
  jacobiZeta,
  (u, modulus, prec) => {
    const mean = disc.div(completeE(modulus, prec), completeK(modulus, prec), prec);
    return disc.sub(disc.sqr(dn(u, modulus, prec), prec), mean, prec);
  },
  { "Fourier series": onModulus(zetaByFourier) },
);
