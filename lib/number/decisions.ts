// Comparison of values: yes, no or unknown, by exact arguments first and refined enclosures then.
import { UndecidedError } from "../proof/errors.ts";
import * as ball from "./ball.ts";
import * as disc from "./disc.ts";
import { exactOrder, oneField, sameExact } from "./exactness.ts";
import { LADDER } from "./ladder.ts";
import {
  asBall,
  asDisc,
  type Enclosure,
  evaluate,
  isDisc,
  isNode,
  mayPass,
  type Node,
  refinable,
  vanishes,
} from "./origin.ts";
import { plainParts, withRadius } from "./print.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

/** Sign of x − y (of x without y): exact if both are exact, else by enclosures on the ladder; undefined if it stays open. */
export function compareNodes(x: Node, y: Node | undefined): -1 | 0 | 1 | undefined {
  const exact = x.exact && (y ? y.exact && exactOrder(x.exact, y.exact) : x.exact.sign());
  if (exact !== undefined) return exact;
  if (y && sameConstruction(x, y, 64)) return 0;
  const zero = ball.zero;
  const first = ball.compare(asBall(x.enclosure), y ? asBall(y.enclosure) : zero);
  if (first !== undefined && first !== 0) return first;
  if (!refinable(x) && !(y && refinable(y))) return first;
  if (vanishes(x, y)) return 0;
  return climb((prec) => {
    const c = ball.compare(asBall(evaluate(x, prec)), y ? asBall(evaluate(y, prec)) : zero);
    return c === 0 ? undefined : c;
  });
}

// The rungs up to 4096 bits: a comparison is asked for often, and most are decided at once or never.
function climb<T>(attempt: (prec: number) => T | undefined): T | undefined {
  for (const prec of LADDER.slice(0, 7)) {
    try {
      const answer = attempt(prec);
      if (answer !== undefined) return answer;
    } catch (error) {
      if (!mayPass(error)) throw error;
    }
  }
  return undefined;
}

/** Whether x = y: yes by an exact argument, no by disjoint enclosures. Throws UndecidedError else, with both. */
export function equalNodes(x: Node, y: Node): boolean {
  if (x === y) return true;
  if (x.exact && y.exact && oneField(x.exact, y.exact)) return sameExact(x.exact, y.exact);
  if (sameConstruction(x, y, 64)) return true;
  const apart = (a: Enclosure, b: Enclosure): true | undefined => (overlap(a, b) ? undefined : true);
  if (apart(x.enclosure, y.enclosure)) return false;
  if (x.enclosure.rad === 0 && y.enclosure.rad === 0) return true;
  const same = vanishes(x, y);
  if (same !== undefined) return same;
  const different =
    refinable(x) || refinable(y) ? climb((prec) => apart(evaluate(x, prec), evaluate(y, prec))) : undefined;
  if (different) return false;
  throw undecided(x, y, "=");
}

function overlap(a: Enclosure, b: Enclosure): boolean {
  return isDisc(a) || isDisc(b) ? disc.overlaps(asDisc(a), asDisc(b)) : ball.overlaps(a, b);
}

/** Whether two values were built by the same operations from the same exact values, down to a depth. Measured input counts only as itself. */
function sameConstruction(x: unknown, y: unknown, depth: number): boolean {
  if (x === y) return true;
  if (depth === 0) return false;
  if (x instanceof Rational) return y instanceof Rational && x.equals(y);
  if (x instanceof Quadratic) return y instanceof Quadratic && x.equals(y);
  if (!isNode(x) || !isNode(y)) return false;
  if (x.exact || y.exact) return x.exact !== undefined && y.exact !== undefined && sameExact(x.exact, y.exact);
  const a = x.origin;
  const b = y.origin;
  if (!a || !b || a.operation !== b.operation || a.depth !== b.depth || a.operands.length !== b.operands.length)
    return false;
  return a.operands.every((operand, k) => sameConstruction(operand, b.operands[k], depth - 1));
}

/** The error of a comparison that stays open, with both enclosures as far as they go. */
export function undecided(x: Node, y: Node, relation: string): UndecidedError {
  const bits = LADDER[6]!;
  const sharp = refinable(x) || refinable(y);
  return new UndecidedError({
    subject: "comparison",
    given: `${shown(x)} ${relation} ${shown(y)} stays open${sharp ? ` after working with ${bits} bits` : ""}`,
    expected: "enclosures that decide it",
    hint: sharp ? "If they are equal, an exact argument has to show it." : "Sharper input may decide it.",
  });
}

function shown(x: Node): string {
  if (x.exact) return `${x.exact}`;
  const e = x.enclosure;
  if (!isDisc(e)) return plainParts(withRadius(e));
  return `(${plainParts(withRadius(ball.midpoint(disc.real(e))))} + ${plainParts(withRadius(disc.imag(e)))} i)`;
}
