// Jacobi's functions as operations that a value records: operands u (or x), m, m1.
import { asDisc, type Operation } from "../number/origin.ts";
import { jacobiAmplitude } from "./jacobi-amplitude.ts";
import { jacobiInverse } from "./jacobi-inverse.ts";
import { jacobiEpsilon, jacobiZeta } from "./jacobi-second.ts";
import {
  type JacobiContext,
  type JacobiLetter,
  type JacobiName,
  jacobiContext,
  jacobiValues,
} from "./jacobi-values.ts";
import type { Modulus } from "./legendre-complete.ts";
import { operationOf, settle } from "./operations.ts";

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

/** The twelve functions. */
export const JACOBI = table("", (name) => ({
  name,
  evaluate: ([u, m, m1], at, prec) => {
    const modulus: Modulus = { m: asDisc(at(m)), m1: asDisc(at(m1)) };
    return settle(jacobiValues([name], asDisc(at(u)), modulus, prec, keptContext(m))[0]!);
  },
}));

/** Their inverses. */
export const JACOBI_INVERSE = table("arc", (name) =>
  operationOf(name, 3, ([x, m, m1], _rest, prec) => jacobiInverse(name, x!, { m: m!, m1: m1! }, prec)),
);

export const AMPLITUDE: Operation = operationOf("am", 3, ([u, m, m1], _rest, prec) =>
  jacobiAmplitude(u!, { m: m!, m1: m1! }, prec),
);
export const EPSILON: Operation = operationOf("Jacobi epsilon", 3, ([u, m, m1], _rest, prec) =>
  jacobiEpsilon(u!, { m: m!, m1: m1! }, prec),
);
export const ZETA: Operation = operationOf("Jacobi zeta", 3, ([u, m, m1], _rest, prec) =>
  jacobiZeta(u!, { m: m!, m1: m1! }, prec),
);
