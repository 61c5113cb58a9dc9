// How a value was built: an operation and its operands. Digits asked for later are computed through this record.
import { BranchError, type LibraryError, PoleError, PrecisionError, UndecidedError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { mostBits } from "./context.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import { type GrowthRule, separation } from "./separation.ts";

export type Enclosure = Ball | Disc;
export type Exact = Rational | Quadratic;

/** An operand (a value of this folder, a rational, a quadratic number, a bigint or a safe integer) as an enclosure of about prec bits. */
export type At = (operand: unknown) => Enclosure;

/**
 * A step that can be repeated at any precision: a constant of its module, holding no values. `evaluate` turns number operands into
 * enclosures with `at` and works with `prec` bits; operands of other kinds it reads itself.
 */
export interface Operation {
  readonly name: string;
  evaluate(operands: readonly unknown[], at: At, prec: number): Enclosure;
  /**
   * The differential at the same operands, `d(operand)` being that of an operand (exactly 0 for what does not move). Missing where the
   * operation has none that is known here.
   */
  differential?(operands: readonly unknown[], at: At, d: At, prec: number): Enclosure;
  /** How the conjugates of a result grow from those of the operands; missing where algebraic numbers give others (separation.ts). */
  readonly growth?: GrowthRule;
  /** Other ways to the same value from the same operands, by another method each; for second opinions. */
  readonly routes?: readonly Operation[];
}

export interface Origin {
  readonly operation: Operation;
  readonly operands: readonly unknown[];
  /** Length of the longest chain below; capped, see `DEEPEST`. */
  readonly depth: number;
}

/** A chain longer than this loses its origin: recomputing it would go too deep. */
export const DEEPEST = 256;

/**
 * How a value is known. exact: a rational or quadratic number; defined: exact input behind it; measured: an enclosure that was given; double: a plain
 * number that is no safe integer, right to half a unit of its last place by assumption only.
 */
export type NumberStanding = "exact" | "defined" | "measured" | "double";

/** What the record needs of a value. */
export interface Node {
  readonly enclosure: Enclosure;
  readonly exact?: Exact | undefined;
  readonly origin?: Origin | undefined;
  readonly standing: NumberStanding;
  /** The text of a measured input. */
  readonly source?: string | undefined;
  /** Whether its record was dropped, because the chain was too deep. */
  readonly dropped?: boolean | undefined;
}

export function isNode(x: unknown): x is Node {
  return typeof x === "object" && x !== null && "enclosure" in x && "standing" in x;
}

export function isDisc(x: Enclosure): x is Disc {
  return "axis" in x;
}

/** A disc of either kind of enclosure. */
export function asDisc(x: Enclosure): Disc {
  return isDisc(x) ? x : disc.fromBall(x);
}

/** The ball of a real enclosure. Throws TypeError for a disc off the real axis: the caller's operation is for real numbers. */
export function asBall(x: Enclosure): Ball {
  if (!isDisc(x)) return x;
  if (x.axis === "real") return disc.along(x);
  throw new TypeError("expected a real number, got a complex one");
}

/** Whether computing again with more bits can narrow the value. */
export function refinable(x: Node): boolean {
  return x.exact !== undefined || x.origin !== undefined;
}

/** An exact number as an enclosure of about prec bits. */
export function enclosureOf(exact: Exact, prec: number): Enclosure {
  return exact instanceof Rational ? ball.fromRational(exact, prec) : exact.enclosure(prec);
}

/** Computes the value anew with `prec` bits throughout; what has no origin stays as it is. Every node is computed once. */
export function evaluate(x: Node, prec: number): Enclosure {
  return evaluator(prec)(x);
}

/**
 * Computes values anew with `prec` bits, each once. A node that `known` holds has the enclosure given there: so a record is evaluated at another
 * argument.
 */
export function evaluator(prec: number, known = new Map<object, Enclosure>()): At {
  const at: At = (operand) => {
    if (typeof operand === "bigint" || typeof operand === "number") return ball.fromInt(operand);
    if (operand instanceof Rational) return ball.fromRational(operand, prec);
    if (operand instanceof Quadratic) return operand.enclosure(prec);
    if (!isNode(operand)) throw new TypeError("expected a number as operand");
    const old = known.get(operand);
    if (old) return old;
    const fresh = computed(operand, at, prec);
    known.set(operand, fresh);
    return fresh;
  };
  return at;
}

function computed(x: Node, at: At, prec: number): Enclosure {
  if (x.exact) return at(x.exact);
  if (!x.origin || accuracy(x.enclosure) >= prec) return x.enclosure;
  return x.origin.operation.evaluate(x.origin.operands, at, prec);
}

/** Relative accuracy in bits. */
export function accuracy(x: Enclosure): number {
  return isDisc(x) ? disc.bits(x) : ball.bits(x);
}

/** Whether an error may go away with more bits. */
export function mayPass(error: unknown): error is LibraryError {
  return (
    error instanceof PoleError ||
    error instanceof BranchError ||
    error instanceof UndecidedError ||
    error instanceof PrecisionError
  );
}

/**
 * An enclosure of x with at least prec relative bits: as it is if that suffices, else through the origin with rising precision.
 * Measured input behind it ends the rise: then the best enclosure that it allows is returned.
 * Throws PrecisionError when `limit` bits did not do.
 */
export function refineEnclosure(x: Node, prec: number, limit = 4 * prec + 4096): Enclosure {
  if (accuracy(x.enclosure) >= prec) return x.enclosure;
  if (!refinable(x)) {
    if (x.dropped && x.standing === "defined") throw recordDropped(x.enclosure, prec);
    return x.enclosure;
  }
  if (accuracy(x.enclosure) < 1 && vanishes(x, undefined)) return isDisc(x.enclosure) ? disc.zero : ball.zero;
  let best = x.enclosure;
  let failure: LibraryError | undefined;
  for (let bits = prec + 32; ; bits = Math.min(2 * bits, limit)) {
    try {
      const next = evaluate(x, bits);
      const stuck = x.standing !== "defined" && x.standing !== "exact" && accuracy(next) <= accuracy(best) + 1;
      if (accuracy(next) >= prec || (stuck && bits > prec + 32)) return next;
      // Two rungs without a gain are what a dropped record below looks like.
      if (accuracy(next) <= accuracy(best) + 1 && bits > prec + 32 && restsOnDropped(x))
        throw recordDropped(next, prec);
      best = next;
      failure = undefined;
    } catch (error) {
      if (!mayPass(error)) throw error;
      failure = error;
    }
    if (bits >= limit) break;
  }
  if (failure) throw failure;
  if (restsOnDropped(x)) throw recordDropped(best, prec);
  throw tooNear(best, prec, limit);
}

/** Least sizes of differences beyond these bits are not waited for. */
const FARTHEST = 16384;

/**
 * Whether x = y (x = 0 without y), for values built from exact numbers by + − × ÷ and roots: by the least size that a difference other than 0
 * has. Undefined for other values, and where that size is under 2^−16384.
 */
export function vanishes(x: Node, y: Node | undefined): boolean | undefined {
  const least = separation(x, y, FARTHEST);
  if (least === undefined) return undefined;
  const size = Math.max(0, ...[x, ...(y ? [y] : [])].map((node) => disc.magnitude(asDisc(node.enclosure))));
  for (const spare of [64, 1024, 16384]) {
    try {
      const at = evaluator(least + size + spare);
      const difference = disc.sub(asDisc(at(x)), y ? asDisc(at(y)) : disc.zero, least + size + spare);
      if (!disc.containsZero(difference)) return false;
      if (disc.magnitude(difference) <= -least) return true;
    } catch (error) {
      if (!mayPass(error)) throw error;
    }
  }
  return undefined;
}

/** Whether x was built from a value whose record is gone. */
function restsOnDropped(x: Node): boolean {
  const seen = new Set<unknown>();
  const visit = (node: unknown): boolean => {
    if (!isNode(node) || seen.has(node)) return false;
    seen.add(node);
    return (node.dropped === true && !refinable(node)) || (node.origin?.operands ?? []).some(visit);
  };
  return visit(x);
}

function recordDropped(best: Enclosure, prec: number): PrecisionError {
  const known = Math.max(0, Math.floor(accuracy(best) * 0.30103));
  return new PrecisionError({
    subject: "digits",
    given: `${known} proved digits of a value whose record of operations was dropped, since it was longer than ${DEEPEST}`,
    expected: `${Math.floor(prec * 0.30103)} proved digits`,
    hint: "Compute the chain at that precision: atDigits(n, () => ...), or provedDigits(n) before it.",
  });
}

function tooNear(best: Enclosure, prec: number, limit: number): PrecisionError {
  const size = isDisc(best) ? disc.magnitude(best) : ball.magnitude(best);
  const zero = accuracy(best) < 1;
  return new PrecisionError({
    subject: "digits",
    given: zero
      ? `a value that cannot be told from 0 at 10^${Math.ceil(size * 0.30103)}`
      : `${Math.max(0, accuracy(best))} proved bits after working with ${limit}`,
    expected: `${prec} proved bits`,
    hint: zero ? "If it is 0, an exact argument has to show it." : "Ask for fewer digits.",
  });
}

/** Standing of a result of these operands. An operand that is not a number may carry a standing of its own. */
export function jointStanding(operands: readonly unknown[]): NumberStanding {
  let standing: NumberStanding = "defined";
  for (const operand of operands) {
    const s = isStanding(operand) ? operand.standing : "exact";
    if (s === "double") return "double";
    if (s === "measured") standing = "measured";
  }
  return standing;
}

function isStanding(x: unknown): x is { readonly standing: NumberStanding } {
  return typeof x === "object" && x !== null && "standing" in x && typeof x.standing === "string";
}

/** The measured inputs that x rests on, as they were written, each once. */
export function measuredInputs(x: Node): readonly string[] {
  const found = new Set<string>();
  const seen = new Set<unknown>();
  const visit = (node: unknown): void => {
    if (!isNode(node) || seen.has(node)) return;
    seen.add(node);
    if (node.source !== undefined) found.add(node.source);
    for (const operand of node.origin?.operands ?? []) visit(operand);
  };
  visit(x);
  return [...found];
}

/** The bits at which a display of n digits gives up. */
export function displayLimit(digits: number): number {
  return mostBits(digits);
}

/** Depth of a new node over these operands. */
export function depthOver(operands: readonly unknown[]): number {
  let depth = 0;
  for (const operand of operands) {
    const below = isNode(operand) ? (operand.origin?.depth ?? 0) : 0;
    if (below > depth) depth = below;
  }
  return depth + 1;
}
