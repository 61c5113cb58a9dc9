// Relations between two numbers, decided as far as exact arithmetic and enclosures go.

import * as ball from "../number/ball.ts";
import { bitsOf, mostBits, provedDigits } from "../number/context.ts";
import * as disc from "../number/disc.ts";
import { sameExact } from "../number/exactness.ts";
import { LADDER } from "../number/ladder.ts";
import {
  asBall,
  DEEPEST,
  type Enclosure,
  evaluate,
  isDisc,
  isNode,
  mayPass,
  type Node,
  refinable,
  vanishes,
} from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { type Complex, Real } from "../number/values.ts";
import type { Standing } from "../proof/standing.ts";
import type { Relation } from "./claim-value.ts";

type ClaimNumber = Real | Complex;

const NO_SUCH_DIFFERENCE = "a difference of these radicals that is so small can only be 0";

export const NUMBER_RELATIONS: readonly Relation[] = ["=", "≠", "<", "≤"];

export function numberStanding(a: ClaimNumber, relation: Relation, b: ClaimNumber): Standing {
  if (a.exact && b.exact && (relation === "=" || relation === "≠")) {
    return exactStanding(a, relation, sameExact(a.exact, b.exact), b);
  }
  if (vanishes(a, b)) {
    if (relation === "=" || relation === "≤") return { kind: "proved", argument: NO_SUCH_DIFFERENCE };
    return { kind: "refuted", evidence: `the sides are equal: ${NO_SUCH_DIFFERENCE}` };
  }
  switch (relation) {
    case "=":
      return agreement(a, b);
    case "≠":
      return apart(a, b);
    default:
      return order(a, relation, b);
  }
}

function exactStanding(a: ClaimNumber, relation: "=" | "≠", same: boolean, b: ClaimNumber): Standing {
  if (same === (relation === "=")) return { kind: "proved", argument: "exact arithmetic" };
  return { kind: "refuted", evidence: same ? `both sides are ${brief(a)}` : `exactly, the sides are ${sides(a, b)}` };
}

/** Smallest e with |x| < 2^e. */
function size(x: Enclosure): number {
  return isDisc(x) ? disc.magnitude(x) : ball.magnitude(x);
}

function holdsZero(x: Enclosure): boolean {
  return isDisc(x) ? disc.containsZero(x) : ball.containsZero(x);
}

function isExactZero(x: Enclosure): boolean {
  return isDisc(x) ? disc.isZero(x) : ball.isZero(x);
}

const LOG = 0.3010299956639812;

/**
 * How well two numbers agree. The difference is enclosed with the precision that the digits asked for need, then again
 * with twice as many bits; an enclosure without 0 refutes.
 *
 * The digits are those asked for, counted from the leading digit where the numbers are smaller than 1, so that two
 * tiny numbers do not agree by being tiny.
 */
function agreement(a: ClaimNumber, b: ClaimNumber): Standing {
  const difference = a.minus(b);
  const digits = provedDigits();
  const scale = Math.max(...[a, b].map((x) => (holdsZero(x.enclosure) ? Number.NEGATIVE_INFINITY : size(x.enclosure))));
  // A side that may be 0 has no size to be relative to.
  const wanted = digits + (Number.isFinite(scale) ? Math.max(0, Math.floor(-scale * LOG)) : 0);
  let bits = bitsOf(digits) + 32 + Math.max(0, scale);
  let best = Number.NEGATIVE_INFINITY;
  for (const limit = mostBits(digits) + Math.max(0, scale); ; bits = Math.min(2 * bits, limit)) {
    const d = attempt(() => evaluate(difference, bits));
    if (d && !holdsZero(d)) return refuted(a, b, d);
    if (d && isExactZero(d)) return { kind: "proved", argument: "the difference is exactly 0" };
    const agreed = d ? Math.floor(-size(d) * LOG) : best;
    const stuck = agreed <= best && !refinable(difference);
    best = Math.max(best, agreed);
    if (best >= wanted || stuck || bits >= limit) break;
    if (difference.standing === "measured" || difference.standing === "double") break;
  }
  return repeated(difference, a, b, Math.min(best, wanted), bits);
}

function repeated(difference: ClaimNumber, a: ClaimNumber, b: ClaimNumber, digits: number, bits: number): Standing {
  const again = attempt(() => evaluate(difference, 2 * bits));
  if (again && !holdsZero(again)) return refuted(a, b, again);
  const common = relativeDigits(a, b, digits);
  const once = onceOnly(difference);
  if (!again || common < 1)
    return {
      kind: "undecided",
      tried: `enclosures that overlap${once ? `; ${once}` : `, at ${bits} and ${2 * bits} bits`}`,
    };
  return once ? { kind: "certified", digits, bits, once } : { kind: "certified", digits, bits };
}

/** Why computing again with more bits repeats nothing, where that is so; undefined where all is computed again. */
function onceOnly(x: ClaimNumber): string | undefined {
  const lost = cutNodes(x).some(
    ({ standing, source }) => standing === "defined" || (standing === "measured" && source === undefined),
  );
  return lost ? `a value was built by more than ${DEEPEST} operations and no longer knows how` : undefined;
}

/** The values below x that are neither exact nor know how they were built. */
function cutNodes(x: Node): Node[] {
  const seen = new Set<unknown>();
  const cut: Node[] = [];
  const open: unknown[] = [x];
  while (open.length > 0) {
    const node = open.pop();
    if (!isNode(node) || seen.has(node)) continue;
    seen.add(node);
    if (!refinable(node)) cut.push(node);
    else open.push(...(node.origin?.operands ?? []));
  }
  return cut;
}

/** What was tried on a difference that never left 0: with how many bits, or why more would not help. */
function overlapping(difference: ClaimNumber, bits: number): Standing {
  const lost = onceOnly(difference);
  if (lost !== undefined) return { kind: "undecided", tried: `enclosures that overlap; ${lost}` };
  if (difference.standing === "measured" || difference.standing === "double")
    return { kind: "undecided", tried: "enclosures that overlap; the input is given no sharper" };
  return { kind: "undecided", tried: `enclosures that overlap up to ${bits} bits` };
}

/** Of the digits behind the point that agree, how many are digits of the numbers themselves. */
function relativeDigits(a: ClaimNumber, b: ClaimNumber, digits: number): number {
  const sizes = [a, b].map((x) => size(x.enclosure)).filter(Number.isFinite);
  // Nothing to compare with: both sides may be 0, and then every digit behind the point counts.
  if (sizes.length === 0 || [a, b].some((x) => holdsZero(x.enclosure))) return digits;
  return digits + Math.ceil(Math.max(...sizes) * LOG);
}

function refuted(a: ClaimNumber, b: ClaimNumber, difference: Enclosure): Standing {
  const exponent = Math.floor((size(difference) - 1) * LOG);
  return { kind: "refuted", evidence: `the sides are ${sides(a, b)}, apart by about 10^${exponent}` };
}

function apart(a: ClaimNumber, b: ClaimNumber): Standing {
  const difference = a.minus(b);
  for (const bits of LADDER) {
    const d = attempt(() => evaluate(difference, bits));
    if (d && !holdsZero(d)) return { kind: "proved", argument: `the enclosures are apart at ${bits} bits` };
    if (d && isExactZero(d)) return { kind: "refuted", evidence: "the difference is exactly 0" };
    if (!refinable(difference)) break;
  }
  return overlapping(difference, LADDER.at(-1)!);
}

function order(left: ClaimNumber, relation: Relation, right: ClaimNumber): Standing {
  const [a, b] = [realOf(left), realOf(right)];
  if (!a || !b) throw new TypeError(`claim: "${relation}" is for real numbers; got ${left} and ${right}`);
  const difference = b.minus(a);
  for (const bits of LADDER) {
    const d = attempt(() => asBall(evaluate(difference, bits)));
    const sign = d && ball.sign(d);
    if (sign === 1) return { kind: "proved", argument: `the enclosures are apart at ${bits} bits` };
    if (sign === -1) return { kind: "refuted", evidence: `the sides are ${sides(a, b)}, the left one is larger` };
    if (sign === 0) {
      if (relation === "≤") return { kind: "proved", argument: "the sides are exactly equal" };
      return { kind: "refuted", evidence: "the sides are exactly equal" };
    }
    if (!refinable(difference)) break;
  }
  return overlapping(difference, LADDER.at(-1)!);
}

/** A real number, also one that comes as a complex one known to be real, such as a real period. */
function realOf(x: ClaimNumber): Real | undefined {
  if (x instanceof Real) return x;
  return x.isReal ? x.re : undefined;
}

/** The value, or undefined where more bits may help. */
function attempt<T>(compute: () => T): T | undefined {
  try {
    return compute();
  } catch (error) {
    if (mayPass(error)) return undefined;
    throw error;
  }
}

/** Both numbers with as many digits as show that they differ. */
function sides(a: ClaimNumber, b: ClaimNumber): string {
  const gap = visibleGap(a, b);
  const common = gap ? Math.max(size(a.enclosure), size(b.enclosure)) - size(gap) : 0;
  const digits = Math.max(6, Math.ceil(common * LOG) + 3);
  return `${brief(a, digits)} and ${brief(b, digits)}`;
}

/** The difference at the first precision that tells it from 0. */
function visibleGap(a: ClaimNumber, b: ClaimNumber): Enclosure | undefined {
  const difference = a.minus(b);
  for (const bits of LADDER) {
    const d = attempt(() => evaluate(difference, bits));
    if (d && !holdsZero(d)) return d;
  }
  return undefined;
}

/** A short exact number as it stands, others with so many digits. */
function brief(x: ClaimNumber, digits = 12): string {
  const text = String(x);
  if (x.exact instanceof Rational && text.length <= 24) return text;
  return attempt(() => String(x.digits(digits))) ?? text;
}
