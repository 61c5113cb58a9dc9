// A function of one real number, known by what it recorded on an interval: its values and its derivative at any precision.
import { DomainError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import {
  type At,
  asBall,
  type Enclosure,
  evaluator,
  isDisc,
  isNode,
  type Node,
  type Operation,
  refinable,
} from "./origin.ts";
import { type Complex, type ComplexNumeric, Real, scalar } from "./values.ts";

/** What f computed from `leaf`, which stands for every number of its ball: valid at each of them. */
export interface Recorded {
  readonly leaf: Real;
  readonly node: Node;
}

/** A number that may be any of its ball. What singles out one of them would make a constant of it, and of the proof a mistake. */
class Anywhere extends Real {
  override get midpoint(): Real {
    throw singled("midpoint");
  }

  override get radius(): Real {
    throw singled("radius");
  }

  override toDouble(): number {
    throw singled("toDouble()");
  }
}

function singled(member: string): DomainError {
  return new DomainError({
    subject: "zero",
    given: `a function that asks x for its ${member}`,
    expected: "a function made of the operations and functions of numbers",
    hint: "x stands for every number of an interval at once.",
  });
}

/**
 * Calls f once, with a number that may be any of the interval, and keeps the record of its result. A decision that f takes on the way (a
 * comparison, say) was then taken for all of them, or was an UndecidedError.
 * Throws   DomainError for a result that is not real, or was built by more operations than a record holds.
 */
export function recordOn(f: (x: Real) => ComplexNumeric, interval: Ball): Recorded {
  const leaf = new Anywhere(interval, { standing: "measured", source: "the interval" });
  const recorded = { leaf, node: real(scalar(f(leaf), "zero")) };
  if (fixedInputs(recorded).every(({ source }) => source !== undefined)) return recorded;
  throw new DomainError({
    subject: "zero",
    given: "a function with a chain of more than 256 operations, whose record was dropped",
    expected: "a function that one record holds",
    hint: "Write its long sum or product in parts: (a + b) + (c + d).",
  });
}

function real(y: Real | Complex): Real {
  if (y instanceof Real) return y;
  if (y.isReal) return y.re;
  throw new DomainError({
    subject: "zero",
    given: `a function with the complex value ${y}`,
    expected: "real values",
    hint: "Take the real part, with .re, where the imaginary part is known to be 0.",
  });
}

/** The function on a ball inside the interval that it was recorded on. */
export function valueOn({ leaf, node }: Recorded, x: Ball, prec: number): Ball {
  return asBall(evaluator(prec, new Map([[leaf, x]]))(node));
}

/** Its derivative there. Throws DomainError where an operation is met whose derivative is not known. */
export function slopeOn({ leaf, node }: Recorded, x: Ball, prec: number): Ball {
  const at = evaluator(prec, new Map([[leaf, x]]));
  const known = new Map<object, Enclosure>([[leaf, ball.one]]);
  const d: At = (operand) => {
    if (!isNode(operand)) return ball.zero;
    const old = known.get(operand);
    if (old) return old;
    const fresh = differential(operand, at, d, prec);
    known.set(operand, fresh);
    return fresh;
  };
  return asBall(d(node));
}

function differential({ exact, origin }: Node, at: At, d: At, prec: number): Enclosure {
  if (exact || !origin) return ball.zero;
  const { operation, operands } = origin;
  if (operands.every((operand) => isStill(d(operand)))) return ball.zero;
  if (operation.differential) return operation.differential(operands, at, d, prec);
  throw noDerivative(operation);
}

function isStill(x: Enclosure): boolean {
  return x.rad === 0 && (isDisc(x) ? x.re === 0n && x.im === 0n : x.man === 0n);
}

function noDerivative(operation: Operation): DomainError {
  return new DomainError({
    subject: "zero",
    given: `a function that uses ${operation.name} of x`,
    expected: "operations whose derivative is known here",
    hint: "A zero is proved to be the only one by the sign of the derivative.",
  });
}

/** The numbers other than x that the function rests on and that cannot be refined. */
export function fixedInputs({ leaf, node }: Recorded): readonly Node[] {
  const found: Node[] = [];
  const seen = new Set<unknown>([leaf]);
  const visit = (x: unknown): void => {
    if (!isNode(x) || seen.has(x)) return;
    seen.add(x);
    if (!refinable(x)) found.push(x);
    x.origin?.operands.forEach(visit);
  };
  visit(node);
  return found;
}
