import { workingPrecision } from "../number/context.ts";
import * as disc from "../number/disc.ts";
import { asDisc, type Operation } from "../number/origin.ts";
import { apply, type Complex, type Real } from "../number/values.ts";
import { DomainError, LibraryError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";

/** A value beside the same value by another method. */
export class SecondRoute {
  /** What computed the first value. */
  readonly operation: string;
  readonly value: Real | Complex;
  readonly route: string;
  readonly other: Real | Complex;
  /** N with both enclosures, and so the values, within 10^−N of each other; undefined where they do not meet. */
  readonly digits: number | undefined;

  constructor(operation: string, value: Real | Complex, route: string, other: Real | Complex) {
    this.operation = operation;
    this.value = value;
    this.route = route;
    this.other = other;
    this.digits = agreement(value, other);
  }

  get agree(): boolean {
    return this.digits !== undefined;
  }

  get standing(): Standing {
    if (this.digits === undefined) return { kind: "refuted", evidence: `${this.value} and ${this.other} do not meet` };
    return { kind: "certified", digits: this.digits, bits: workingPrecision(), once: "two methods" };
  }

  toString(): string {
    const end = this.agree ? `they agree within 10^${-this.digits!}` : "they do not meet";
    return `${this.operation}: ${this.value}; by ${this.route}: ${this.other}; ${end}`;
  }
}

/** Decimal places to which the union of two enclosures is known. */
function agreement(x: Real | Complex, y: Real | Complex): number | undefined {
  if (!x.overlaps(y)) return undefined;
  const gap = disc.sub(asDisc(x.enclosure), asDisc(y.enclosure), 64);
  return disc.isZero(gap) ? undefined : Math.floor(-disc.magnitude(gap) * 0.30103);
}

/** The names of the other routes to a value; none for an exact one, or one that is no single function value. */
export function routesOf(x: Real | Complex): readonly string[] {
  return otherRoutes(x).map(({ name }) => name);
}

function otherRoutes(x: Real | Complex): readonly Operation[] {
  return x.origin?.operation.routes ?? [];
}

/**
 * The value computed again by another method from the same input: ℘ by sums over rows instead of a theta series, periods by Carlson's RF
 * instead of means, and so on.
 *
 * Domain   a value as a function gave it (L.wp(z), L.periods[0], L.invariants[0], ...), before sums and products; `routesOf(x)` lists the names. Without
 *          a name the first of them that holds at the arguments is taken; a route that is named and does not hold there says why.
 * Error    enclosures on both sides, at the digits in force; that they meet is what the agreement says.
 * Cost     the second methods are for checking, and slower: a sum of about one term a digit and more.
 * Throws   DomainError if there is no other route, or none of that name.
 * @example secondRoute(L.wp(1/3))
 */
export function secondRoute(x: Real | Complex, name?: string): SecondRoute {
  const routes = otherRoutes(x);
  const wanted = name === undefined ? routes : routes.filter((r) => r.name === name);
  if (wanted.length === 0) throw noRoute(x, routes, name);
  const { operation, operands } = x.origin!;
  for (const route of wanted) {
    try {
      return new SecondRoute(operation.name, x, route.name, apply(route, operands));
    } catch (error) {
      if (route === wanted.at(-1) || !(error instanceof LibraryError)) throw error;
    }
  }
  throw noRoute(x, routes, name);
}

function noRoute(x: Real | Complex, routes: readonly Operation[], name: string | undefined): DomainError {
  const names = routes.map((r) => `"${r.name}"`).join(", ");
  const what = x.exact ? "an exact value" : `a value by "${x.origin?.operation.name ?? "input"}"`;
  return new DomainError({
    subject: "secondRoute",
    given: name === undefined ? what : `the route "${name}"`,
    expected: names || "a value of a function with another route, as L.wp(z)",
    hint: x.exact ? "An exact value needs no second opinion." : "",
    argument: name === undefined ? "x" : "name",
  });
}
